package kin

import (
	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// enclose encloses leg i of a tripod.
func (m *tripod) enclose(i int, t *tilt, e *Enclosure) {
	var (
		out, across, leg0, leg1, q, inv, in0, in1, dot enclose.Quad // leg and in: outward and up in the leg's plane
		u, r, v                                        enclose.QuadVec
	)
	l := &m.leg[i]
	c, s := m.cos[i], m.sin[i]
	foot := l.a.X*c + l.a.Y*s

	// r, from the tool point to the joint: outward in the leg's plane, square to it, up.
	out.Along(&t.asm, m.out(i))
	dot.Along(&t.tool, Vec{X: c, Y: s})
	out.Sub(&out, &dot)
	across.Along(&t.base, Vec{X: s, Y: -c})
	r[0].Scale(&out, c)
	r[0].AddScaled(&r[0], -s, &across)
	r[1].Scale(&out, s)
	r[1].AddScaled(&r[1], c, &across)
	r[2].Along((*enclose.QuadVec)(t.rot[6:9]), l.b)

	from := m.out(i)
	from.Y += c*m.shift[0] + s*m.shift[2]
	from.Z += c*m.shift[1] + s*m.shift[3]
	leg0.Along(&t.asm, from)
	leg1.Add(&t.base[2], &r[2])
	e.Links = append(e.Links, Link{Leg: i, Radius: m.pairs.diameter / 2, Hold: Turned, Tip: l.b})
	link := &e.Links[len(e.Links)-1]
	link.From.Const(l.a)
	link.To[0].Quad(dot.Scale(&leg0, c))
	link.To[1].Quad(dot.Scale(&leg0, s))
	link.To[2].Quad(&leg1)

	leg0.AddConst(&leg0, -foot)
	leg1.AddConst(&leg1, -l.a.Z)
	q.Sum2(&leg0, &leg0, &leg1, &leg1)
	inv.InvSqrt(&q)
	e.Q[i].Quad(q.Sqrt(&q))
	e.decide(i, &e.Q[i], 0)
	in0.Mul(&leg0, &inv)
	in1.Mul(&leg1, &inv)
	u[0].Scale(&in0, c)
	u[1].Scale(&in0, s)
	u[2] = in1

	force(e.Wrenches[6*i:6*i+6], &u, &r, m.invLc)
	v[0].Const(-s)
	v[1].Const(c)
	v[2].Const(0)
	force(e.Wrenches[18+6*i:24+6*i], &v, &r, m.invLc)

	// The joint's velocity in the leg's plane, per unit of Lc·ω about x and about y.
	row := e.J[6*i : 6*i+6]
	row[2].Quad(&in1)
	for k := range 2 {
		v[0].Scale(&t.tie[0][k], c)
		v[0].AddScaled(&v[0], s, &t.tie[1][k])
		v[0].AddScaled(&v[0], [2]float64{-s, c}[k]*m.invLc, &r[2])
		dot.Mul(&across, &t.tie[2][k])
		v[0].AddScaled(&v[0], -m.invLc, &dot)
		v[1].Scale(&r[1-k], [2]float64{1, -1}[k]*m.invLc)
		row[3+k].Quad(dot.Sum2(&in0, &v[0], &in1, &v[1]))
	}

	dot.Along(&u, l.ua)
	chord(&e.BaseChord[i], e.BaseChord[i].Quad(&dot), r3.Norm2(l.ua))
	for k := range v {
		v[k].Along((*enclose.QuadVec)(t.rot[3*k:3*k+3]), l.ub)
	}
	dot.Dot(&u, &v)
	chord(&e.PlatformChord[i], e.PlatformChord[i].Quad(&dot), r3.Norm2(l.ub))
}
