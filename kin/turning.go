package kin

// turningRods is a machine of drives and rods whose platform turns: the
// six-legged platforms with cranks or carriages, and the planar stage with cranks.
type turningRods struct{ rods }

// Move is the inverse kinematics of all legs in one pass.
func (m *turningRods) Move(p *Pose, s *State) {
	r := &p.R
	px, py, pz := m.home.X+p.P.X, m.home.Y+p.P.Y, m.home.Z+p.P.Z
	var o closure
	for i := range m.leg {
		if i >= m.n {
			break
		}
		l := &m.leg[i]
		rx := r[0]*l.b.X + r[1]*l.b.Y + r[2]*l.b.Z
		ry := r[3]*l.b.X + r[4]*l.b.Y + r[5]*l.b.Z
		rz := r[6]*l.b.X + r[7]*l.b.Y + r[8]*l.b.Z
		w := Vec{X: px + rx - l.at.X, Y: py + ry - l.at.Y, Z: pz + rz - l.at.Z}
		if !l.close(&w, &o) {
			s.unreached(i, o.room)
			return
		}
		s.Q[i], s.End[i], s.Rod[i] = o.q, o.end, o.u
		g, gl := o.rate, o.rate*m.invLc
		u := o.u
		row := (*[6]float64)(s.J[6*i : 6*i+6])
		row[0], row[1], row[2] = u.X*g, u.Y*g, u.Z*g
		row[3] = (ry*u.Z - rz*u.Y) * gl
		row[4] = (rz*u.X - rx*u.Z) * gl
		row[5] = (rx*u.Y - ry*u.X) * gl
		dx, dy, dz := o.own.X-l.ua.X, o.own.Y-l.ua.Y, o.own.Z-l.ua.Z
		s.BaseChord[i] = dx*dx + dy*dy + dz*dz
		ex := u.X - (r[0]*l.ub.X + r[1]*l.ub.Y + r[2]*l.ub.Z)
		ey := u.Y - (r[3]*l.ub.X + r[4]*l.ub.Y + r[5]*l.ub.Z)
		ez := u.Z - (r[6]*l.ub.X + r[7]*l.ub.Y + r[8]*l.ub.Z)
		s.PlatformChord[i] = ex*ex + ey*ey + ez*ez
	}
	s.Fail, s.Leg = Reached, -1
}

// Constraints of a planar machine: the force along z and the couples about x and y. A six-legged platform has none.
func (m *turningRods) Constraints(_ *State, rows *[36]float64) int {
	return unitConstraints(m.frame.Freedoms, rows)
}
