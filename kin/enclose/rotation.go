package enclose

// Rotation sets r to Rz(yaw) Ry(pitch) Rx(roll), row by row: the rotation of the box's poses.
func Rotation(b *Box, r *[9]Form) {
	var roll, pitch, yaw Form
	Turned(roll.Coordinate(b, 3), pitch.Coordinate(b, 4), yaw.Coordinate(b, 5), r)
}

// Turned sets r to Rz(yaw) Ry(pitch) Rx(roll), row by row, of angles that are forms themselves.
func Turned(roll, pitch, yaw *Form, r *[9]Form) {
	var sr, cr, sp, cp, sy, cy, ss, cs Form
	sr.Sin(roll)
	cr.Cos(roll)
	sp.Sin(pitch)
	cp.Cos(pitch)
	sy.Sin(yaw)
	cy.Cos(yaw)
	ss.Mul(&sp, &sr)
	cs.Mul(&sp, &cr)

	r[0].Mul(&cy, &cp)
	pair(&r[1], &cy, &ss, &sy, &cr, -1)
	pair(&r[2], &cy, &cs, &sy, &sr, 1)
	r[3].Mul(&sy, &cp)
	pair(&r[4], &sy, &ss, &cy, &cr, 1)
	pair(&r[5], &sy, &cs, &cy, &sr, -1)
	r[6].Neg(&sp)
	r[7].Mul(&cp, &sr)
	r[8].Mul(&cp, &cr)
}

// pair sets z to a·b + s·c·d, s being 1 or -1.
func pair(z, a, b, c, d *Form, s float64) {
	var p products
	p.add(a, b, 1)
	p.add(c, d, s)
	p.form(z)
}
