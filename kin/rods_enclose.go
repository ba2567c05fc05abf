package kin

import "legwright/kin/enclose"

// start sets what the legs' enclosures then narrow.
func (e *Enclosure) start() {
	e.Reach, e.Leg, e.What = AllReach, -1, ""
	e.J = [36]enclose.Form{}
	e.Links, e.Pairs = e.Links[:0], e.Pairs[:0]
}

// Enclose encloses all legs' postures over the box.
func (m *turningRods) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c       [6]enclose.Form
		at, arm enclose.Vec
		o       loop
	)
	m.frame.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.turned(&m.frame, &c)
	for i := range m.leg[:m.n] {
		l := &m.leg[i]
		arm.Turn(&e.R, l.b)
		at.AddConst(&e.P, Vec{X: m.home.X - l.at.X, Y: m.home.Y - l.at.Y, Z: m.home.Z - l.at.Z})
		o.w.Add(&at, &arm)
		l.enclose(&o)
		e.leg(i, l, &o)

		// r × u, with r = p + r - p: what r has of the tool point's place falls out
		var moment, axis enclose.Vec
		moment.Scale(moment.Cross(&arm, &o.rate), m.invLc)
		copy(e.J[6*i+3:], moment[:])
		axis.Turn(&e.R, l.ub)
		var dot enclose.Form
		dot.Scale(dot.Dot(&o.rod, &axis), l.invRod)
		chord(&e.PlatformChord[i], &dot, l.ub.X*l.ub.X+l.ub.Y*l.ub.Y+l.ub.Z*l.ub.Z)

		if m.n < 6 {
			s := l.mode * l.invRod
			if !l.crank {
				s = -s
			}
			o.rod.Scale(&o.rod, s)
			force(e.Wrenches[6*i:6*i+6], &o.rod, &arm, m.invLc)
		}
		m.links.enclose(e, &m.rods, i, &o)
	}
	if m.n < 6 {
		e.held(&m.frame)
	}
	m.links.pairs(e, m.leg[0].crank)
}

// leg takes in what the loop of leg i tells whatever the platform does.
func (e *Enclosure) leg(i int, l *rodLeg, o *loop) {
	e.decide(i, &o.room, o.edge)
	e.Q[i] = o.q
	copy(e.J[6*i:], o.rate[:])
	e.BaseChord[i] = o.chord
}

// Enclose encloses all legs' postures over the box.
func (m *shiftingRods) Enclose(b *enclose.Box, e *Enclosure) {
	var c [6]enclose.Form
	m.frame.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.heading(nil)
	m.shifted(&e.P, e)
	if !m.parallel {
		e.held(&m.frame)
	}
}

// shifted encloses the legs' postures where the platform is moved by d from home.
func (m *shiftingRods) shifted(d *enclose.Vec, e *Enclosure) {
	var o loop
	for i := range m.leg[:m.n] {
		l := &m.leg[i]
		o.w.AddConst(d, m.off[i])
		l.enclose(&o)
		e.leg(i, l, &o)
		m.links.enclose(e, &m.rods, i, &o)
		if m.parallel {
			flatChord(&e.BaseChord[i], &o.side)
			e.PlatformChord[i] = e.BaseChord[i]
		} else {
			var dot enclose.Form
			dot.Scale(dot.Along(&o.rod, l.ub), l.invRod)
			chord(&e.PlatformChord[i], &dot, l.ub.X*l.ub.X+l.ub.Y*l.ub.Y+l.ub.Z*l.ub.Z)
		}

		var u, v enclose.Vec
		u.Scale(&o.rod, l.invRod)
		copy(e.Wrenches[6*i:], u[:])
		crossed(&v, l.b, &u)
		v.Scale(&v, m.invLc)
		copy(e.Wrenches[6*i+3:], v[:])
		if m.parallel {
			row := e.Wrenches[18+6*i : 24+6*i]
			clear(row)
			crossed(&v, Vec{X: -l.e3.X, Y: -l.e3.Y, Z: -l.e3.Z}, &o.rod)
			v.Unit(&v)
			copy(row[3:], v[:])
		}
	}
	m.links.pairs(e, m.leg[0].crank)
}

// flatChord is planeChord, of the sine x.
func flatChord(z, x *enclose.Form) {
	z.Neg(z.Sqr(x))
	z.Sqrt(z.AddConst(z, 1))
	z.AddConst(z.Scale(z, -2), 2)
}
