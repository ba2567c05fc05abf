package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// rodLeg is a drive on the base, and a rod from it to the platform.
type rodLeg struct {
	drive
	b      Vec // R_home (platform joint - tool): R·b is r, from the tool point to the joint
	ua, ub Vec // unit mounting axes: in the drive's own frame, and in platform axes turned by R_home
}

// rods is what machines whose legs are a drive and a rod have in common. The
// types around it differ in how the platform moves.
//
// The joint between drive and rod is mounted on the drive and turns with it. Its
// mounting axis is, in the drive's own frame, the rod's direction at home
// (AxisHomeLeg), or the vector as it stands in base axes at home (AxisVector), or
// (AxisPlate) the direction square to the crank in which its end moves when the angle
// grows: at crank angle 0 this is the normal of the base plate wherever cranks
// turn in vertical planes. A carriage does not turn: AxisPlate is the base plate's normal.
type rods struct {
	frame Frame
	leg   [6]rodLeg
	n     int
	home  Vec // tool point at home, base frame
	invLc float64
	links linkPairs
}

// newRods joins drives to the platform joints. half is half the distance of the
// two rods of a leg's parallelogram, 0 for single rods. Dimensions that are no
// finite numbers make a machine whose every pose is NotFinite.
func newRods(freedoms []Freedom, drives []drive, platform []Vec, home Vec, homeRot Rot, half float64, s *Setup) rods {
	m := rods{
		frame: Frame{
			Freedoms: freedoms, Platform: platform, Home: home, HomeRot: homeRot, Tool: s.Tool, Length: s.Length,
		},
		n:     len(drives),
		home:  r3.Add(home, homeRot.Apply(s.Tool)),
		invLc: 1 / s.Length,
	}
	wrong := half - half
	for i := range drives {
		l := &m.leg[i]
		l.drive = drives[i]
		l.b = homeRot.Apply(r3.Sub(platform[i], s.Tool))
		wrong += r3.Norm2(l.e1) + l.length + l.rod
		m.frame.Base = append(m.frame.Base, l.at)
		m.frame.Rods = append(m.frame.Rods, l.rod)
		if !l.crank {
			m.frame.Rails = append(m.frame.Rails, l.e1)
		}
	}
	m.mount(homeRot, &s.Axis)
	if wrong-wrong != 0 {
		m.leg[0].b.X = math.NaN()
	}
	m.links = pairLinks(&m, half, s)
	return m
}

// mount finds the postures at home and the mounting axes of the legs' joints. A leg
// that cannot reach home counts its angle from 0 and has no axis there.
func (m *rods) mount(homeRot Rot, axis *Axis) {
	for i := range m.leg[:m.n] {
		l := &m.leg[i]
		var (
			c closures
			s State
			o = rods{n: 1, leg: [6]rodLeg{*l}}
		)
		c.w[0] = r3.Sub(r3.Add(m.home, l.b), l.at)
		if o.close(&c, &s) {
			l.settle(s.Q[0], s.End[0])
		}
		switch axis.Kind {
		case AxisHomeLeg:
			l.ua, l.ub = l.own(s.Rod[0]), s.Rod[0]
		case AxisPlate:
			l.ua, l.ub = Vec{Z: 1}, homeRot.Apply(Vec{Z: 1})
			if l.crank {
				l.ua = Vec{Y: 1}
			}
		case AxisVector:
			v := unit(axis.Vec)
			l.ua, l.ub = l.own(v), homeRot.Apply(v)
		}
	}
}

// own is the vector v, given in base axes at home, in the drive's own frame: along a
// crank, across it and along its axis; base axes for a carriage.
func (d *drive) own(v Vec) Vec {
	if !d.crank {
		return v
	}
	return Vec{X: r3.Dot(v, d.e1), Y: r3.Dot(v, d.e2), Z: r3.Dot(v, d.e3)}
}

func (m *rods) Frame() *Frame { return &m.frame }

// Place is that of the frame.
func (m *rods) Place(p *Pose) (Vec, Rot) { return m.frame.Place(p) }

// Tie is not wanted: the freedoms are free of each other.
func (m *rods) Tie(*Pose, *[36]float64) { panic("kin: freedoms are not tied") }

// Serial is the least |u·c'(q)|/|c'(q)|: the first three of a row of J are u/(u·c'(q)).
func (m *rods) Serial(s *State) float64 {
	least := math.Inf(1)
	for i := range m.leg[:m.n] {
		row := (*[6]float64)(s.J[6*i : 6*i+6])
		least = math.Min(least, 1/(m.leg[i].length*math.Sqrt(row[0]*row[0]+row[1]*row[1]+row[2]*row[2])))
	}
	return least
}

// Gap is the least distance between the surfaces of the links of two legs.
func (m *rods) Gap(s *State) (gap float64, i, j int) { return m.links.gap(m, s, math.Inf(1)) }

// GapBelow is Gap where that is below keep.
func (m *rods) GapBelow(s *State, keep float64) (gap float64, i, j int) {
	return m.links.gap(m, s, keep)
}

// unreached says why the loop of leg i does not close, and gives false.
func (s *State) unreached(i int, room float64) bool {
	s.Fail, s.Leg = OutOfReach, i
	if room-room != 0 {
		s.Fail = NotFinite
	}
	return false
}
