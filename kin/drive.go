package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// drive moves the end c(q) of a rod of fixed length, whose other end is the
// platform joint P: a crank, c = at + length (cos q e1 + sin q e2), or a carriage on
// a rail, c = at + q e1. The loop |P - c(q)| = rod has two solutions, the working
// modes; its derivative is u·dP = u·c'(q) dq with u the unit vector along the rod,
// in which |u·c'(q)| is the root in q's formula, over the rod, times |c'(q)|.
type drive struct {
	crank      bool
	at         Vec     // pivot, or where the rail's coordinate is 0
	e1, e2, e3 Vec     // orthonormal; e1 the crank at home or the rail, e3 the pivot axis or the short side of a parallelogram
	length     float64 // of the crank; 1 for a carriage: |c'(q)|
	rod        float64
	mode       float64 // 1 or -1
	zero       float64 // crank angle at home, in (-π, π]

	invRod float64
	k, k0  float64 // 1/(2 length), (length² - rod²)/(2 length)
	lever  float64 // rod/length
}

// newCrank is a crank that turns from e1 towards e2, both unit vectors at right
// angles. With mode 1 the angle of the crank is smaller than that of the line from
// pivot to platform joint, so that (crank × rod)·(e1 × e2) has the sign of mode.
func newCrank(pivot, e1, e2 Vec, length, rod, mode float64) drive {
	return drive{
		crank: true, at: pivot, e1: e1, e2: e2, e3: r3.Cross(e1, e2), length: length, rod: rod, mode: sign(mode),
		invRod: 1 / rod, k: 1 / (2 * length), k0: (length*length - rod*rod) / (2 * length), lever: rod / length,
	}
}

// newCarriage is a carriage on a rail. With mode 1 it is farther along the rail than
// the platform joint, with mode -1 less far. short is the direction of the
// short sides of a parallelogram of rods; it does not matter for a single rod.
func newCarriage(r Rail, short Vec, rod, mode float64) drive {
	return drive{
		at: r.Point, e1: unit(r.Direction), e3: short, length: 1, rod: rod, mode: sign(mode),
		invRod: 1 / rod,
	}
}

// sign is -1 for negative numbers and 1 for all others.
func sign(x float64) float64 {
	if x < 0 {
		return -1
	}
	return 1
}

// closures are the solutions of all legs' loops at one pose.
type closures struct {
	w    [6]Vec     // given: from drive.at to the platform joint
	rate [6]float64 // 1/(u·c'(q))
}

// close solves the loops of all legs: Q, End, Rod and BaseChord of s, and the rates.
// It reports false, and why in s, where a rod is too short or too long. The very edge
// of reach, where the drive cannot move the rod's end along the rod, counts as out of reach.
func (m *rods) close(c *closures, s *State) bool {
	if m.leg[0].crank {
		return m.turn(c, s)
	}
	return m.slide(c, s)
}

// turn is close for cranks. With a and b the components of w in the crank's plane,
// a cos q + b sin q = c, c = (w² + length² - rod²)/(2 length). Angles lie within half a
// turn of the angle at home.
func (m *rods) turn(c *closures, s *State) bool {
	var cs, sn, across [6]float64
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l, w := &m.leg[i], &c.w[i]
		a := w.X*l.e1.X + w.Y*l.e1.Y + w.Z*l.e1.Z
		b := w.X*l.e2.X + w.Y*l.e2.Y + w.Z*l.e2.Z
		k := l.k*(w.X*w.X+w.Y*w.Y+w.Z*w.Z) + l.k0
		rho2 := a*a + b*b
		room := rho2 - k*k
		if !(room > 0) {
			return s.unreached(i, room)
		}
		h := l.mode * math.Sqrt(room)
		inv := 1 / rho2
		c.rate[i] = l.lever / h
		cs[i], sn[i] = (a*k+b*h)*inv, (b*k-a*h)*inv
		// the rod in the crank's frame: along the crank, across it, along its axis
		dx, dy := (k-l.length)*l.invRod-l.ua.X, h*l.invRod-l.ua.Y
		across[i] = dx*dx + dy*dy
	}
	angles(m.n, &cs, &sn, &s.Q)
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l, w := &m.leg[i], &c.w[i]
		s.Q[i] += l.zero
		cos, sin := l.length*cs[i], l.length*sn[i]
		x, y, z := cos*l.e1.X+sin*l.e2.X, cos*l.e1.Y+sin*l.e2.Y, cos*l.e1.Z+sin*l.e2.Z
		s.End[i] = Vec{X: l.at.X + x, Y: l.at.Y + y, Z: l.at.Z + z}
		s.Rod[i] = Vec{X: (w.X - x) * l.invRod, Y: (w.Y - y) * l.invRod, Z: (w.Z - z) * l.invRod}
		dz := (w.X*l.e3.X+w.Y*l.e3.Y+w.Z*l.e3.Z)*l.invRod - l.ua.Z
		s.BaseChord[i] = across[i] + dz*dz
	}
	return true
}

// slide is close for carriages: with a the component of w along the rail, q = a ± √(rod² - w² + a²).
func (m *rods) slide(c *closures, s *State) bool {
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l, w := &m.leg[i], &c.w[i]
		a := w.X*l.e1.X + w.Y*l.e1.Y + w.Z*l.e1.Z
		room := l.rod*l.rod - (w.X*w.X + w.Y*w.Y + w.Z*w.Z - a*a)
		if !(room > 0) {
			return s.unreached(i, room)
		}
		h := l.mode * math.Sqrt(room)
		q := a + h
		s.Q[i], c.rate[i] = q, -l.rod/h
		x, y, z := q*l.e1.X, q*l.e1.Y, q*l.e1.Z
		s.End[i] = Vec{X: l.at.X + x, Y: l.at.Y + y, Z: l.at.Z + z}
		x, y, z = (w.X-x)*l.invRod, (w.Y-y)*l.invRod, (w.Z-z)*l.invRod
		s.Rod[i] = Vec{X: x, Y: y, Z: z}
		x, y, z = x-l.ua.X, y-l.ua.Y, z-l.ua.Z
		s.BaseChord[i] = x*x + y*y + z*z
	}
	return true
}

// settle makes the posture s at home the one from which crank angles are counted
// without a jump: e1 and e2 turn with the crank.
func (d *drive) settle(q float64, end Vec) {
	if !d.crank {
		return
	}
	d.zero = q
	if d.zero <= -math.Pi { // the same angle
		d.zero = math.Pi
	}
	d.e1 = r3.Scale(1/d.length, r3.Sub(end, d.at))
	d.e2 = r3.Cross(d.e3, d.e1)
}
