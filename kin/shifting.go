package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// shiftingRods is a machine of drives and rods whose platform does not turn: deltas,
// each of whose legs has two parallel rods, and the five-bar. The rotation of a
// pose is not looked at.
//
// The joints of a parallelogram turn freely about the direction of its short sides
// (the pivot axis of a delta's arm). What is limited is the swing of the rods out of the
// plane square to that, the same at both ends: both chords are of that angle, and no
// mounting axis is asked for.
type shiftingRods struct {
	rods
	parallel bool
	off      [6]Vec // platform joint at home less `at`
}

// newShifting builds the machine. Where the setup has no characteristic length, which
// only unit wrenches read, and the platform no radius, it is 1 m.
func newShifting(freedoms []Freedom, drives []drive, platform []Vec, home Vec, homeRot Rot, parallel bool, half float64, s *Setup) *shiftingRods {
	t := *s
	if t.Length == 0 {
		t.Length = meanRadius(platform)
	}
	if t.Length == 0 {
		t.Length = 1
	}
	m := &shiftingRods{
		rods:     newRods(freedoms, drives, platform, home, homeRot, half, &t),
		parallel: parallel,
	}
	for i := range drives {
		m.off[i] = r3.Sub(r3.Add(m.home, m.leg[i].b), m.leg[i].at)
	}
	return m
}

// Move is the inverse kinematics of all legs in one pass.
func (m *shiftingRods) Move(p *Pose, s *State) {
	m.shift(&p.P, s)
}

// shift moves the platform by d from home.
func (m *shiftingRods) shift(d *Vec, s *State) {
	var c closures
	for i := range m.leg {
		if i >= m.n {
			break
		}
		o := &m.off[i]
		c.w[i] = Vec{X: o.X + d.X, Y: o.Y + d.Y, Z: o.Z + d.Z}
	}
	if !m.close(&c, s) {
		return
	}
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l, u, g := &m.leg[i], &s.Rod[i], c.rate[i]
		row := (*[6]float64)(s.J[6*i : 6*i+6])
		row[0], row[1], row[2] = u.X*g, u.Y*g, u.Z*g
		row[3], row[4], row[5] = 0, 0, 0
		if m.parallel {
			chord := planeChord(u.X*l.e3.X + u.Y*l.e3.Y + u.Z*l.e3.Z)
			s.BaseChord[i], s.PlatformChord[i] = chord, chord
			continue
		}
		x, y, z := u.X-l.ub.X, u.Y-l.ub.Y, u.Z-l.ub.Z
		s.PlatformChord[i] = x*x + y*y + z*z
	}
	s.Fail, s.Leg = Reached, -1
}

// planeChord is 2-2cos of the angle with the sine x, without loss of digits at small angles.
func planeChord(x float64) float64 {
	x2 := x * x
	if x2 >= 1 {
		return 2
	}
	return 2 * x2 / (1 + math.Sqrt(1-x2))
}

// Constraints of a delta are a couple for each leg, square to both sides of its
// parallelogram; the couple is zero where a parallelogram is flat. The five-bar has
// the force along z and all three couples.
func (m *shiftingRods) Constraints(s *State, rows *[36]float64) int {
	if !m.parallel {
		return unitConstraints(m.frame.Freedoms, rows)
	}
	*rows = [36]float64{}
	for i := range m.leg[:m.n] {
		c := unit(r3.Cross(s.Rod[i], m.leg[i].e3))
		rows[6*i+3], rows[6*i+4], rows[6*i+5] = c.X, c.Y, c.Z
	}
	return m.n
}

// Actuation is the rods' unit wrenches.
func (m *shiftingRods) Actuation(s *State, rows *[36]float64) int {
	for i := range m.leg[:m.n] {
		forceRow(s.Rod[i], m.leg[i].b, m.invLc, rows[6*i:6*i+6])
	}
	return m.n
}
