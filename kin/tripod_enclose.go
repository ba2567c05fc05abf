package kin

import (
	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// tilt encloses a tripod's settled rotation and what follows from it.
type tilt struct {
	asm  enclose.QuadVec    // R11+R22, R21+R12, R22-R11
	rot  [9]enclose.Quad    // the rotation, row by row
	tie  [3][2]enclose.Quad // as follow gives it
	tool enclose.QuadVec    // from the platform origin to the tool point
	base enclose.QuadVec    // the tool point, base frame
}

// Enclose encloses the legs' postures, each in its own vertical plane, over the box.
func (m *tripod) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c [6]enclose.Form
		t tilt
	)
	m.frame.coordinates(b, &c)
	e.start()
	m.turn(&c, &t)
	for i := range t.rot {
		e.R[i].Quad(&t.rot[i])
	}
	tool := m.frame.Tool
	e.P[0].AddConst(e.P[0].Quad(&t.base[0]), -tool.X)
	e.P[1].AddConst(e.P[1].Quad(&t.base[1]), -tool.Y)
	e.P[2] = c[Z]
	m.tied(&t)
	e.T = [36]enclose.Form{}
	e.T[6*2].Const(1)
	e.T[6*3+1].Const(1)
	e.T[6*4+2].Const(1)
	for i, row := range [3]int{0, 1, 5} {
		e.T[6*row+1].Quad(&t.tie[i][0])
		e.T[6*row+2].Quad(&t.tie[i][1])
	}
	for i := range 3 {
		m.enclose(i, &t, e)
	}
	for k := range m.pairs.pair[:m.pairs.n] {
		p := &m.pairs.pair[k]
		e.Pairs = append(e.Pairs, [2]int{p.i, p.j})
	}
}

// turn settles the pose, as settle does: the rotation, and where the tool point goes.
func (m *tripod) turn(c *[6]enclose.Form, t *tilt) {
	var roll, pitch, sr, cr, sp, cp, ar, ai, br, bi, gr, gi, psi, cos, sin enclose.Quad
	roll.Set(&c[Roll])
	pitch.Set(&c[Pitch])
	sr.Sin(&roll)
	cr.Cos(&roll)
	sp.Sin(&pitch)
	cp.Cos(&pitch)
	bi.Mul(&sp, &sr)
	ai.Neg(&bi)
	ar.Add(&cp, &cr)
	br.Sub(&cp, &cr)
	gr.AddScaled(&ar, -m.yawS, &br)
	gr.AddScaled(&gr, -m.yawM, &bi)
	gi.AddScaled(&ai, -m.yawS, &bi)
	gi.AddScaled(&gi, m.yawM, &br)
	psi.Neg(psi.Atan2(&gi, &gr))

	// The rotation by psi multiplies ar + i ai and br + i bi.
	cos.Cos(&psi)
	sin.Sin(&psi)
	t.asm[0].Sum2(&cos, &ar, &sin, ai.Neg(&ai))
	t.asm[1].Sum2(&cos, &bi, &sin, &br)
	t.asm[2].Sum2(&sin, &bi, &cos, br.Neg(&br))

	// R21 - R12 = yawS S + yawM M.
	r := &t.rot
	r[0].Scale(r[0].Sub(&t.asm[0], &t.asm[2]), 0.5)
	r[1].Along(&t.asm, Vec{Y: (1 - m.yawS) / 2, Z: -m.yawM / 2})
	r[3].Along(&t.asm, Vec{Y: (1 + m.yawS) / 2, Z: m.yawM / 2})
	r[4].Scale(r[4].Add(&t.asm[0], &t.asm[2]), 0.5)
	ar.Mul(&sp, &cr)
	r[2].Sum2(&cos, &ar, &sin, &sr)
	r[5].Sum2(&sin, &ar, &cos, sr.Neg(&sr))
	r[6].Neg(&sp)
	r[7].Neg(r[7].Mul(&cp, &sr))
	r[8].Mul(&cp, &cr)

	tool := m.frame.Tool
	for k := range t.tool {
		t.tool[k].Along((*enclose.QuadVec)(r[3*k:3*k+3]), tool)
	}
	t.base[0].Along(&t.asm, Vec{Y: m.shift[0], Z: m.shift[1]})
	t.base[1].Along(&t.asm, Vec{Y: m.shift[2], Z: m.shift[3]})
	t.base[0].Add(&t.base[0], &t.tool[0])
	t.base[1].Add(&t.base[1], &t.tool[1])
	t.base[2].AddConst(t.base[2].Set(&c[Z]), m.home.Z)
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

// tied fills t.tie, as follow does. Sums over the legs are taken before quads come in.
func (m *tripod) tied(t *tilt) {
	var (
		all, inv, level, wide enclose.Quad
		around                Vec
	)
	up := (*enclose.QuadVec)(t.rot[6:9])
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
}
