package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// tripod is a platform on three prismatic legs, each of which swings in the vertical
// plane through the z axis at its own azimuth a: its spherical joint at B stays
// there, t·B = 0 with t = (-sin a, cos a, 0) along its revolute axis. Of a pose only the
// height of the tool point and the last row of the rotation, which roll and pitch
// alone decide, are free; settle finds the rest.
type tripod struct {
	struts
	sin, cos [3]float64 // of the azimuths
	turns    [3]float64 // K: Σ K t = 0

	// D = yawS·S + yawM·M holds for the rotation, where D = R21-R12, S = R21+R12 and M = R22-R11:
	// both are 0 for legs 120° apart.
	yawS, yawM float64
	shift      [4]float64 // x = shift0·S + shift1·M, y = shift2·S + shift3·M of the platform origin
	flat       [2][3]float64
}

// newTripod builds the machine. With b = rb (cos a, sin a, 0) the condition t·B = 0 reads
//
//	-x sin a + y cos a + rb/2 (D + S cos 2a + M sin 2a) = 0
//
// for each of three azimuths: linear in x, y and D.
func newTripod(freedoms []Freedom, ra, rb, height float64, azimuths []float64, s *Setup) *tripod {
	m := &tripod{struts: *newStruts(freedoms, onCircle(ra, azimuths), onCircle(rb, azimuths), Vec{Z: height}, Identity(), s)}
	m.frame.Tied = true
	for i, a := range azimuths {
		m.sin[i], m.cos[i] = math.Sincos(a)
	}
	k := &m.turns
	for i := range k {
		j, l := (i+1)%3, (i+2)%3
		k[i] = m.sin[l]*m.cos[j] - m.cos[l]*m.sin[j]
	}
	var double [3][2]float64
	all, withS, withM := 0.0, 0.0, 0.0
	var ss, sc, cc float64
	for i := range 3 {
		c, z := m.cos[i], m.sin[i]
		double[i] = [2]float64{c*c - z*z, 2 * z * c}
		all += k[i]
		withS += k[i] * double[i][0]
		withM += k[i] * double[i][1]
		ss, sc, cc = ss+z*z, sc+z*c, cc+c*c
	}
	m.yawS, m.yawM = -withS/all, -withM/all
	// The left inverse of the rows t, by the normal equations.
	det := ss*cc - sc*sc
	for i := range 3 {
		m.flat[0][i] = (-cc*m.sin[i] + sc*m.cos[i]) / det
		m.flat[1][i] = (-sc*m.sin[i] + ss*m.cos[i]) / det
	}
	for i := range 3 {
		for axis := range 2 {
			m.shift[2*axis] -= rb / 2 * m.flat[axis][i] * (m.yawS + double[i][0])
			m.shift[2*axis+1] -= rb / 2 * m.flat[axis][i] * (m.yawM + double[i][1])
		}
	}
	return m
}

// settle gives the pose with the height, roll and pitch of p and what follows from
// them. The rotation about z that has to come on top of p.R is found without angles: it
// multiplies a = (R11+R22) + i(R21-R12) and b = (R11-R22) + i(R21+R12), whose parts are
// D, S and M, by e^iψ, and D = yawS·S + yawM·M says that e^iψ (a - (yawS - i yawM) b) is real. Of
// its two solutions this is the one of home.
func (m *tripod) settle(p *Pose) Pose {
	r := &p.R
	ar, ai := r[0]+r[4], r[3]-r[1]
	br, bi := r[0]-r[4], r[3]+r[1]
	gr := ar - m.yawS*br - m.yawM*bi
	gi := ai - m.yawS*bi + m.yawM*br
	inv := 1 / math.Sqrt(gr*gr+gi*gi)
	c, s := gr*inv, -gi*inv
	q := Pose{R: Rot{
		c*r[0] - s*r[3], c*r[1] - s*r[4], c*r[2] - s*r[5],
		s*r[0] + c*r[3], s*r[1] + c*r[4], s*r[2] + c*r[5],
		r[6], r[7], r[8],
	}}
	sum, diff := s*br+c*bi, s*bi-c*br // S and M
	t := &m.frame.Tool
	// What the pose says of x and y is not looked at, unless it is no number.
	q.P.X = 0*p.P.X + m.shift[0]*sum + m.shift[1]*diff + (q.R[0]*t.X + q.R[1]*t.Y + q.R[2]*t.Z) - t.X
	q.P.Y = 0*p.P.Y + m.shift[2]*sum + m.shift[3]*diff + (q.R[3]*t.X + q.R[4]*t.Y + q.R[5]*t.Z) - t.Y
	q.P.Z = p.P.Z
	return q
}

// Move is the inverse kinematics of all legs in one pass. The rows of J are the
// legs' wrenches times the matrix of Tie: rates against the platform's own three freedoms.
func (m *tripod) Move(p *Pose, s *State) {
	q := m.settle(p)
	m.struts.Move(&q, s)
	if s.Fail != Reached {
		return
	}
	s.Tool = Vec{X: m.home.X + q.P.X, Y: m.home.Y + q.P.Y, Z: m.home.Z + q.P.Z}
	t := m.follow(&q.R)
	for i := range 3 {
		w := (*[6]float64)(s.J[6*i : 6*i+6])
		s.Rod[i] = Vec{X: w[0], Y: w[1], Z: w[2]}
		w[3] += w[0]*t[0][0] + w[1]*t[1][0] + w[5]*t[2][0]
		w[4] += w[0]*t[0][1] + w[1]*t[1][1] + w[5]*t[2][1]
		w[0], w[1], w[5] = 0, 0, 0
		if x := w[3] + w[4]; x-x != 0 { // the joints leave the platform more freedoms than three
			s.Fail, s.Leg = OutOfReach, i
		}
	}
}

// follow gives vx, vy and Lc·ωz of the tool point per unit of Lc·ωx and of Lc·ωy, at
// the settled rotation. The spherical joint at r from the tool point keeps to its plane:
//
//	-sin a vx + cos a vy + (rx cos a + ry sin a) ωz = rz (cos a ωx + sin a ωy)
func (m *tripod) follow(r *Rot) (t [3][2]float64) {
	var w [3]float64
	var h [3][2]float64
	all := 0.0
	for i := range 3 {
		b := &m.leg[i].b
		x := r[0]*b.X + r[1]*b.Y + r[2]*b.Z
		y := r[3]*b.X + r[4]*b.Y + r[5]*b.Z
		z := (r[6]*b.X + r[7]*b.Y + r[8]*b.Z) * m.invLc
		w[i] = (x*m.cos[i] + y*m.sin[i]) * m.invLc
		h[i] = [2]float64{z * m.cos[i], z * m.sin[i]}
		all += m.turns[i] * w[i]
	}
	inv := 1 / all
	for k := range 2 {
		t[2][k] = (m.turns[0]*h[0][k] + m.turns[1]*h[1][k] + m.turns[2]*h[2][k]) * inv
		for i := range 3 {
			e := h[i][k] - w[i]*t[2][k]
			t[0][k] += m.flat[0][i] * e
			t[1][k] += m.flat[1][i] * e
		}
	}
	return t
}

// Tie has vz, Lc·ωx and Lc·ωy as they are, and what follow says of the rest.
func (m *tripod) Tie(p *Pose, t *[36]float64) {
	q := m.settle(p)
	f := m.follow(&q.R)
	*t = [36]float64{}
	t[6*2], t[6*3+1], t[6*4+2] = 1, 1, 1
	for i, row := range [3]int{0, 1, 5} {
		t[6*row+1], t[6*row+2] = f[i][0], f[i][1]
	}
}

// Place gives the platform as it stands, with its parasitic x, y and yaw.
func (m *tripod) Place(p *Pose) (Vec, Rot) {
	q := m.settle(p)
	return m.frame.Place(&q)
}

// Gap is the least distance of two leg axes less the leg diameter.
func (m *tripod) Gap(s *State) (gap float64, i, j int) { return m.GapBelow(s, math.Inf(1)) }

// GapBelow is Gap where that is below keep.
func (m *tripod) GapBelow(s *State, keep float64) (gap float64, i, j int) {
	var rows [36]float64
	for i := range 3 {
		rows[6*i], rows[6*i+1], rows[6*i+2] = s.Rod[i].X, s.Rod[i].Y, s.Rod[i].Z
	}
	return m.pairs.gap(&rows, &s.Q, keep)
}

// joint is the place of platform joint i from the tool point.
func (m *tripod) joint(s *State, i int) Vec {
	return r3.Sub(r3.Add(m.leg[i].a, r3.Scale(s.Q[i], s.Rod[i])), s.Tool)
}

// Constraints are forces on the spherical joints along the directions of the revolute axes.
func (m *tripod) Constraints(s *State, rows *[36]float64) int {
	for i := range 3 {
		forceRow(Vec{X: -m.sin[i], Y: m.cos[i]}, m.joint(s, i), m.invLc, rows[6*i:6*i+6])
	}
	return 3
}

// Actuation is forces along the legs.
func (m *tripod) Actuation(s *State, rows *[36]float64) int {
	for i := range 3 {
		forceRow(s.Rod[i], m.joint(s, i), m.invLc, rows[6*i:6*i+6])
	}
	return 3
}
