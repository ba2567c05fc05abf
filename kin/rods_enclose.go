package kin

import (
	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// start sets what the legs' enclosures then narrow.
func (e *Enclosure) start() {
	e.Reach, e.Leg, e.What = AllReach, -1, ""
	e.J = [36]enclose.Form{}
	e.Links, e.Pairs = e.Links[:0], e.Pairs[:0]
}

// Enclose encloses all legs' postures over the box. Chains of operations are of second degree up to what is asked for.
func (m *turningRods) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c                    [6]enclose.Form
		p, arm, axis, moment enclose.QuadVec
		turn                 enclose.Turn
		o                    loop
		dot                  enclose.Quad
	)
	m.frame.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.turned(&m.frame, &c)
	p.Set(&e.P)
	turn.Set(b, m.frame.turns())
	for i := range m.leg[:m.n] {
		l := &m.leg[i]
		arm.Arm(&turn, l.b)
		o.w.AddConst(&p, r3.Sub(m.home, l.at))
		o.w.Add(&o.w, &arm)
		l.enclose(&o)
		e.leg(i, l, &o)
		m.links.enclose(e, &m.rods, i, &o, Turned)

		moment.Cross(&arm, &o.rate)
		moment.Scale(&moment, m.invLc)
		quads(e.J[6*i+3:6*i+6], &moment)
		axis.Arm(&turn, l.ub)
		dot.Scale(dot.Dot(&o.rod, &axis), l.invRod)
		chord(&e.PlatformChord[i], e.PlatformChord[i].Quad(&dot), r3.Norm2(l.ub))

		s := l.mode * l.invRod
		if !l.crank {
			s = -s
		}
		o.rod.Scale(&o.rod, s)
		force(e.Wrenches[6*i:6*i+6], &o.rod, &arm, m.invLc)
	}
	e.held(&m.frame)
	m.links.pairs(e, m.leg[0].crank)
}

// leg takes in what the loop of leg i tells whatever the platform does.
func (e *Enclosure) leg(i int, l *rodLeg, o *loop) {
	var room enclose.Form
	e.decide(i, room.Quad(&o.room), o.edge)
	e.Q[i].Quad(&o.q)
	quads(e.J[6*i:6*i+3], &o.rate)
	chord(&e.BaseChord[i], e.BaseChord[i].Quad(&o.dot), r3.Norm2(l.ua))
}

// Enclose encloses all legs' postures over the box.
func (m *shiftingRods) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c    [6]enclose.Form
		d, u enclose.QuadVec
		o    loop
	)
	m.frame.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.heading(nil)
	d.Set(&e.P)
	for i := range m.leg[:m.n] {
		m.shifted(i, &d, &o, &u, e)
	}
	if !m.parallel {
		e.held(&m.frame)
	}
	m.links.pairs(e, m.leg[0].crank)
}

// shifted encloses the posture of leg i where the platform is moved by d from home. u is set to the unit vector along the rod.
func (m *shiftingRods) shifted(i int, d *enclose.QuadVec, o *loop, u *enclose.QuadVec, e *Enclosure) {
	var (
		cos, inv enclose.Quad
		v        enclose.QuadVec
	)
	l := &m.leg[i]
	o.w.AddConst(d, m.off[i])
	l.enclose(o)
	e.leg(i, l, o)
	m.links.enclose(e, &m.rods, i, o, Shifted)
	u.Scale(&o.rod, l.invRod)
	quads(e.Wrenches[6*i:6*i+3], u)
	crossed(&v, r3.Scale(m.invLc, l.b), u)
	quads(e.Wrenches[6*i+3:6*i+6], &v)
	if !m.parallel {
		cos.Along(u, l.ub)
		chord(&e.PlatformChord[i], e.PlatformChord[i].Quad(&cos), r3.Norm2(l.ub))
		return
	}
	cos.AddConst(cos.Neg(cos.Mul(&o.sine, &o.sine)), 1)
	inv.InvSqrt(&cos)
	cos.Sqrt(&cos)
	chord(&e.BaseChord[i], e.BaseChord[i].Quad(&cos), 1)
	e.PlatformChord[i] = e.BaseChord[i]
	crossed(&v, r3.Scale(-1, l.e3), u)
	v.Mul(&v, &inv)
	row := e.Wrenches[18+6*i : 24+6*i]
	clear(row[:3])
	quads(row[3:], &v)
}
