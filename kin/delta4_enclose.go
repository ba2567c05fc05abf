package kin

import (
	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// Enclose encloses the postures of the arms and of the shaft over the box.
func (m *toolDelta) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c                  [6]enclose.Form
		p, d, tool, arm, v enclose.QuadVec // d is the platform's way from home, tool the tool point from the platform origin
		u                  enclose.QuadVec
		about              enclose.Quad
		turn               enclose.Turn
		o                  loop
	)
	f := &m.frame
	f.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.heading(&c[Yaw])
	turn.Set(b, f.turns())
	tool.Arm(&turn, Vec{X: f.Tool.X, Y: f.Tool.Y})
	tool[2].Const(f.Tool.Z)
	p.Set(&e.P)
	d.AddConst(d.Sub(&p, &tool), f.Tool)
	d[2] = p[2]
	arm.Scale(&tool, -m.invLc)
	for i := range 3 {
		m.shifted(i, &d, &o, &u, e)
		v.AddConst(&arm, r3.Scale(m.invLc, f.Platform[i]))
		v.Cross(&v, &u)
		quads(e.Wrenches[6*i+3:6*i+6], &v)
		e.Wrenches[6*i+5].Quad(moment(&about, &u, &arm))
		e.J[6*i+5].Quad(moment(&about, &o.rate, &arm))
	}
	m.links.pairs(e, true)
	e.Q[3] = c[Yaw]
	e.J[23].Const(m.invLc)
	e.BaseChord[3], e.PlatformChord[3] = enclose.Form{}, enclose.Form{}
	formsOf(e.Wrenches[18:24], []float64{0, 0, 0, 0, 0, 1})
	e.held(f)
	m.within(&d, e)
}

// moment sets z to that of the force u at r about z.
func moment(z *enclose.Quad, u, r *enclose.QuadVec) *enclose.Quad {
	var y enclose.Quad
	return z.Sum2(&r[0], &u[1], y.Neg(&r[1]), &u[0])
}

// within decides whether the shaft is within its stops, with the platform moved by d.
func (m *toolDelta) within(d *enclose.QuadVec, e *Enclosure) {
	var (
		shaft        enclose.Vec
		length, room enclose.Form
	)
	shaft.AddConst(shaft.Quads(d), m.frame.Home)
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
