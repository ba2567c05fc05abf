package kin

import "legwright/kin/enclose"

// Enclose encloses the postures of the arms and of the shaft over the box.
func (m *toolDelta) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c       [6]enclose.Form
		d, tool enclose.Vec // the platform's way from home; the tool point from the platform origin
	)
	f := &m.frame
	f.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.heading(&c[Yaw])
	tool.Turn(&e.R, f.Tool)
	tool[2].Const(f.Tool.Z)
	d.AddConst(d.Sub(&e.P, &tool), f.Tool)
	d[2] = e.P[2]
	m.shifted(&d, e)

	var arm enclose.Vec
	for i := range 3 {
		// u × tool about z, of the rate's force and of the unit one
		row := e.J[6*i : 6*i+6]
		about(&row[5], row, &tool, m.invLc)
		arm.AddConst(arm.Scale(&tool, -1), f.Platform[i])
		row = e.Wrenches[6*i : 6*i+6]
		u := enclose.Vec(row[:3])
		force(row, &u, &arm, m.invLc)
		about(&row[5], row, &tool, m.invLc)
	}
	e.Q[3] = c[Yaw]
	e.J[23].Const(m.invLc)
	e.BaseChord[3], e.PlatformChord[3] = enclose.Form{}, enclose.Form{}
	formsOf(e.Wrenches[18:24], []float64{0, 0, 0, 0, 0, 1})
	e.held(f)
	m.within(&d, e)
}

// about sets z to the moment about z of the force u at minus r, over Lc.
func about(z *enclose.Form, u []enclose.Form, r *enclose.Vec, invLc float64) {
	var x, y, o enclose.Vec
	x[0], x[1] = u[0], u[1]
	y[0] = r[1]
	y[1].Neg(&r[0])
	o[0].Dot(&x, &y)
	z.Scale(&o[0], invLc)
}

// within decides whether the shaft is within its stops, with the platform moved by d.
func (m *toolDelta) within(d *enclose.Vec, e *Enclosure) {
	var shaft enclose.Vec
	var length, room enclose.Form
	shaft.AddConst(d, m.frame.Home)
	length.Norm(&shaft)
	was := e.Reach
	room.AddConst(&length, -m.least*(1-stopSlack))
	e.decide(3, &room, 0)
	room.AddConst(room.Neg(&length), m.most*(1+stopSlack))
	e.decide(3, &room, 0)
	if e.Reach != was {
		e.What = "shaft length"
		was = e.Reach
	}
	room.AddScaled(&shaft[2], stopSlack-m.upright, &length)
	e.decide(3, &room, 0)
	if e.Reach != was {
		e.What = "shaft swing"
	}
}
