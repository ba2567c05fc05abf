package kin

import (
	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// tilt encloses a tripod's settled rotation and what follows from it.
type tilt struct {
	asm  enclose.Vec        // R11+R22, R21+R12, R22-R11
	tie  [3][2]enclose.Form // as follow gives it
	tool enclose.Vec        // from the platform origin to the tool point
	base enclose.Vec        // the tool point, base frame
}

// Enclose encloses the legs' postures, each in its own vertical plane, over the box.
func (m *tripod) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c [6]enclose.Form
		t tilt
	)
	m.frame.coordinates(b, &c)
	e.start()
	m.turn(&c, &t, e)
	m.tied(&t, e)
	for i := range 3 {
		m.enclose(i, &t, e)
	}
	for k := range m.pairs.pair[:m.pairs.n] {
		p := &m.pairs.pair[k]
		e.Pairs = append(e.Pairs, [2]int{p.i, p.j})
	}
}

// turn settles the pose, as settle does: the rotation, and where the tool point goes.
func (m *tripod) turn(c *[6]enclose.Form, t *tilt, e *Enclosure) {
	var sr, cr, sp, cp, ar, ai, br, bi, gr, gi, psi enclose.Form
	sr.Sin(&c[Roll])
	cr.Cos(&c[Roll])
	sp.Sin(&c[Pitch])
	cp.Cos(&c[Pitch])
	bi.Mul(&sp, &sr)
	ai.Neg(&bi)
	ar.Add(&cp, &cr)
	br.Sub(&cp, &cr)
	gr.AddScaled(&ar, -m.yawS, &br)
	gr.AddScaled(&gr, -m.yawM, &bi)
	gi.AddScaled(&ai, -m.yawS, &bi)
	gi.AddScaled(&gi, m.yawM, &br)
	psi.Neg(psi.Atan2(&gi, &gr))
	enclose.Turned(&c[Roll], &c[Pitch], &psi, &e.R)

	// The rotation by psi multiplies ar + i ai and br + i bi.
	var x, y enclose.Vec
	x[0].Cos(&psi)
	x[1].Sin(&psi)
	y[0] = ar
	y[1].Neg(&ai)
	t.asm[0].Dot(&x, &y)
	y[0], y[1] = bi, br
	t.asm[1].Dot(&x, &y)
	y[0].Neg(&br)
	y[1] = bi
	t.asm[2].Dot(&x, &y)

	tool := m.frame.Tool
	t.tool.Turn(&e.R, tool)
	t.base[0].Along(&t.asm, Vec{Y: m.shift[0], Z: m.shift[1]})
	t.base[1].Along(&t.asm, Vec{Y: m.shift[2], Z: m.shift[3]})
	t.base[0].Add(&t.base[0], &t.tool[0])
	t.base[1].Add(&t.base[1], &t.tool[1])
	t.base[2].AddConst(&c[Z], m.home.Z)
	e.P[0].AddConst(&t.base[0], -tool.X)
	e.P[1].AddConst(&t.base[1], -tool.Y)
	e.P[2] = c[Z]
}

// out gives the factors of tilt.asm in the platform joint's distance, in its leg's plane, from the axis through
// the platform origin: with b the joint's radius
//
//	b/2 (R11+R22) + b/2 (R21+R12) sin 2a - b/2 (R22-R11) cos 2a
func (m *tripod) out(i int) Vec {
	c, s, p := m.cos[i], m.sin[i], &m.frame.Platform[i]
	half := (p.X*c + p.Y*s) / 2
	return Vec{X: half, Y: 2 * s * c * half, Z: (s*s - c*c) * half}
}

// tied fills t.tie and e.T, as follow does. Sums over the legs are taken before forms come in.
func (m *tripod) tied(t *tilt, e *Enclosure) {
	var (
		all, inv, level, wide enclose.Form
		around                Vec
	)
	up := (*enclose.Vec)(e.R[6:9])
	for i := range 3 {
		around = r3.Add(around, r3.Scale(m.turns[i], m.out(i)))
	}
	inv.Inv(all.Along(&t.asm, around))
	for k := range 2 {
		along := [2]*[3]float64{&m.cos, &m.sin}[k]
		var sum Vec // the tool point's own part is Σ K t = 0
		for i := range 3 {
			sum = r3.Add(sum, r3.Scale(m.turns[i]*along[i], m.frame.Platform[i]))
		}
		turn := &t.tie[2][k]
		turn.Mul(turn.Along(up, sum), &inv)
		for axis := range 2 {
			var high, out, off Vec
			for i := range 3 {
				f := m.flat[axis][i] * m.invLc
				high = r3.Add(high, r3.Scale(f*along[i], r3.Sub(m.frame.Platform[i], m.frame.Tool)))
				out = r3.Add(out, r3.Scale(f, m.out(i)))
				off = r3.Add(off, r3.Scale(f, Vec{X: m.cos[i], Y: m.sin[i]}))
			}
			wide.Sub(wide.Along(&t.asm, out), level.Along(&t.tool, off))
			t.tie[axis][k].Sub(level.Along(up, high), wide.Mul(&wide, turn))
		}
	}
	e.T = [36]enclose.Form{}
	e.T[6*2].Const(1)
	e.T[6*3+1].Const(1)
	e.T[6*4+2].Const(1)
	for i, row := range [3]int{0, 1, 5} {
		e.T[6*row+1], e.T[6*row+2] = t.tie[i][0], t.tie[i][1]
	}
}

// enclose encloses leg i.
func (m *tripod) enclose(i int, t *tilt, e *Enclosure) {
	var (
		out, across, dot enclose.Form
		leg, in, v       enclose.Vec // in the leg's plane: outward and up
		u, r, side       enclose.Vec
	)
	l := &m.leg[i]
	c, s := m.cos[i], m.sin[i]

	// r, from the tool point to the joint: outward in the leg's plane, square to it, up.
	out.Along(&t.asm, m.out(i))
	dot.Along(&t.tool, Vec{X: c, Y: s})
	out.Sub(&out, &dot)
	across.Along(&t.base, Vec{X: s, Y: -c})
	r[0].Scale(&out, c)
	r[0].AddScaled(&r[0], -s, &across)
	r[1].Scale(&out, s)
	r[1].AddScaled(&r[1], c, &across)
	r[2].Along((*enclose.Vec)(e.R[6:9]), l.b)

	from := m.out(i)
	from.Y += c*m.shift[0] + s*m.shift[2]
	from.Z += c*m.shift[1] + s*m.shift[3]
	leg[0].AddConst(leg[0].Along(&t.asm, from), -(l.a.X*c + l.a.Y*s))
	leg[1].AddConst(leg[1].Add(&t.base[2], &r[2]), -l.a.Z)
	e.Q[i].Norm(&leg)
	e.decide(i, &e.Q[i], 0)
	in.Unit(&leg)
	u[0].Scale(&in[0], c)
	u[1].Scale(&in[0], s)
	u[2] = in[1]

	force(e.Wrenches[6*i:6*i+6], &u, &r, m.invLc)
	side.Const(Vec{X: -s, Y: c})
	force(e.Wrenches[18+6*i:24+6*i], &side, &r, m.invLc)

	// The joint's velocity in the leg's plane, per unit of Lc·ω about x and about y.
	row := e.J[6*i : 6*i+6]
	row[2] = in[1]
	for k := range 2 {
		v[0].Scale(&t.tie[0][k], c)
		v[0].AddScaled(&v[0], s, &t.tie[1][k])
		v[0].AddScaled(&v[0], [2]float64{-s, c}[k]*m.invLc, &r[2])
		dot.Mul(&across, &t.tie[2][k])
		v[0].AddScaled(&v[0], -m.invLc, &dot)
		v[1].Scale(&r[1-k], [2]float64{1, -1}[k]*m.invLc)
		row[3+k].Dot(&in, &v)
	}

	dot.Along(&u, l.ua)
	chord(&e.BaseChord[i], &dot, r3.Norm2(l.ua))
	side.Turn(&e.R, l.ub)
	dot.Dot(&u, &side)
	chord(&e.PlatformChord[i], &dot, r3.Norm2(l.ub))

	e.Links = append(e.Links, Link{Leg: i, Radius: m.pairs.diameter / 2})
	link := &e.Links[len(e.Links)-1]
	link.From.Const(l.a)
	link.To[0].AddConst(&leg[0], l.a.X*c+l.a.Y*s)
	link.To[1].Scale(&link.To[0], s)
	link.To[0].Scale(&link.To[0], c)
	link.To[2].AddConst(&leg[1], l.a.Z)
}
