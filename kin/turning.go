package kin

// turningRods is a machine of drives and rods whose platform turns: the
// six-legged platforms with cranks or carriages, and the planar stage with cranks.
type turningRods struct{ rods }

// Move is the inverse kinematics of all legs in one pass.
func (m *turningRods) Move(p *Pose, s *State) {
	var (
		c   closures
		arm [6]Vec // from the tool point to the platform joint
	)
	r := &p.R
	px, py, pz := m.home.X+p.P.X, m.home.Y+p.P.Y, m.home.Z+p.P.Z
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l := &m.leg[i]
		rx := r[0]*l.b.X + r[1]*l.b.Y + r[2]*l.b.Z
		ry := r[3]*l.b.X + r[4]*l.b.Y + r[5]*l.b.Z
		rz := r[6]*l.b.X + r[7]*l.b.Y + r[8]*l.b.Z
		arm[i] = Vec{X: rx, Y: ry, Z: rz}
		c.w[i] = Vec{X: px + rx - l.at.X, Y: py + ry - l.at.Y, Z: pz + rz - l.at.Z}
	}
	if !m.close(&c, s) {
		return
	}
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l, u, a := &m.leg[i], &s.Rod[i], &arm[i]
		g := c.rate[i]
		row := (*[6]float64)(s.J[6*i : 6*i+6])
		row[0], row[1], row[2] = u.X*g, u.Y*g, u.Z*g
		g *= m.invLc
		row[3] = (a.Y*u.Z - a.Z*u.Y) * g
		row[4] = (a.Z*u.X - a.X*u.Z) * g
		row[5] = (a.X*u.Y - a.Y*u.X) * g
		dx := u.X - (r[0]*l.ub.X + r[1]*l.ub.Y + r[2]*l.ub.Z)
		dy := u.Y - (r[3]*l.ub.X + r[4]*l.ub.Y + r[5]*l.ub.Z)
		dz := u.Z - (r[6]*l.ub.X + r[7]*l.ub.Y + r[8]*l.ub.Z)
		s.PlatformChord[i] = dx*dx + dy*dy + dz*dz
	}
	s.Fail, s.Leg = Reached, -1
}

// Constraints of a planar machine: the force along z and the couples about x and y. A six-legged platform has none.
func (m *turningRods) Constraints(_ *State, rows *[36]float64) int {
	return unitConstraints(m.frame.Freedoms, rows)
}
