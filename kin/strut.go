package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// strut is a prismatic leg between a base joint and a platform joint.
type strut struct {
	a      Vec // base joint, base frame
	b      Vec // R_home (platform joint - tool): R·b is r, from the tool point to the joint
	ua, ub Vec // unit mounting axes: base axes, and platform axes turned by R_home
}

// struts is a machine all of whose legs are prismatic: the six-legged platform
// and the planar three-leg stage.
type struts struct {
	frame Frame
	leg   [6]strut
	n     int
	home  Vec // tool point at home, base frame
	invLc float64
	pairs legPairs
}

// newStruts builds the machine. Joints are given in their own plates' frames.
func newStruts(freedoms []Freedom, base, platform []Vec, home Vec, homeRot Rot, s *Setup) *struts {
	if len(base) != len(freedoms) || len(platform) != len(freedoms) {
		panic("kin: there must be one base joint and one platform joint for each freedom")
	}
	m := &struts{
		frame: Frame{
			Freedoms: freedoms, Base: base, Platform: platform,
			Home: home, HomeRot: homeRot, Tool: s.Tool, Length: s.Length,
		},
		n:     len(base),
		home:  r3.Add(home, homeRot.Apply(s.Tool)),
		invLc: 1 / s.Length,
	}
	for i := range base {
		l := &m.leg[i]
		l.a = base[i]
		l.b = homeRot.Apply(r3.Sub(platform[i], s.Tool))
		switch s.Axis.Kind {
		case AxisHomeLeg:
			l.ua = unit(r3.Sub(r3.Add(m.home, l.b), l.a))
			l.ub = l.ua
		case AxisPlate:
			l.ua = Vec{Z: 1}
			l.ub = homeRot.Apply(Vec{Z: 1})
		case AxisVector:
			l.ua = unit(s.Axis.Vec)
			l.ub = homeRot.Apply(l.ua)
		}
	}
	m.pairs = pairLegs(&m.leg, m.n, m.home, s)
	return m
}

// unit is v/|v|, or zero for a zero vector.
func unit(v Vec) Vec {
	n := r3.Norm(v)
	if n == 0 {
		return Vec{}
	}
	return r3.Scale(1/n, v)
}

func (m *struts) Frame() *Frame { return &m.frame }

// Move is the inverse kinematics of all legs in one pass: lengths, rows of the
// inverse Jacobian and swing chords.
func (m *struts) Move(p *Pose, s *State) {
	r := &p.R
	px, py, pz := m.home.X+p.P.X, m.home.Y+p.P.Y, m.home.Z+p.P.Z
	sum := 0.0
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l := &m.leg[i]
		rx := r[0]*l.b.X + r[1]*l.b.Y + r[2]*l.b.Z
		ry := r[3]*l.b.X + r[4]*l.b.Y + r[5]*l.b.Z
		rz := r[6]*l.b.X + r[7]*l.b.Y + r[8]*l.b.Z
		sx, sy, sz := px+rx-l.a.X, py+ry-l.a.Y, pz+rz-l.a.Z
		q := math.Sqrt(sx*sx + sy*sy + sz*sz)
		il := 1 / q
		nx, ny, nz := sx*il, sy*il, sz*il
		sum += q * il
		s.Q[i] = q
		il = m.invLc
		row := (*[6]float64)(s.J[6*i : 6*i+6])
		row[0], row[1], row[2] = nx, ny, nz
		row[3] = (ry*nz - rz*ny) * il
		row[4] = (rz*nx - rx*nz) * il
		row[5] = (rx*ny - ry*nx) * il
		dx, dy, dz := nx-l.ua.X, ny-l.ua.Y, nz-l.ua.Z
		s.BaseChord[i] = dx*dx + dy*dy + dz*dz
		ex := nx - (r[0]*l.ub.X + r[1]*l.ub.Y + r[2]*l.ub.Z)
		ey := ny - (r[3]*l.ub.X + r[4]*l.ub.Y + r[5]*l.ub.Z)
		ez := nz - (r[6]*l.ub.X + r[7]*l.ub.Y + r[8]*l.ub.Z)
		s.PlatformChord[i] = ex*ex + ey*ey + ez*ez
	}
	s.Fail, s.Leg = Reached, -1
	if sum-sum != 0 { // NaN: q·(1/q) is 1 but for a leg of no length (0·Inf), of infinite length (Inf·0) or of NaN
		s.Fail = NotFinite
		for i := range m.n {
			if x := s.Q[i] * (1 / s.Q[i]); x-x != 0 {
				s.Leg = i
				return
			}
		}
	}
}

// Gap is the least distance of two leg axes less the leg diameter.
func (m *struts) Gap(s *State) (gap float64, i, j int) {
	return m.pairs.gap(&s.J, &s.Q, math.Inf(1))
}

// GapBelow is Gap where that is below keep.
func (m *struts) GapBelow(s *State, keep float64) (gap float64, i, j int) {
	return m.pairs.gap(&s.J, &s.Q, keep)
}

// Constraints of a planar machine: the force along z and the couples about x and y. A six-legged platform has none.
func (m *struts) Constraints(_ *State, rows *[36]float64) int {
	return unitConstraints(m.frame.Freedoms, rows)
}

func (m *struts) ends([]float64) []Vec { return m.frame.Base }

// Place is that of the frame.
func (m *struts) Place(p *Pose) (Vec, Rot) { return m.frame.Place(p) }

// Serial is 1: the drive moves along the leg.
func (m *struts) Serial(*State) float64 { return 1 }

// Tie is not wanted: the freedoms are free of each other.
func (m *struts) Tie(*Pose, *[36]float64) { panic("kin: freedoms are not tied") }
