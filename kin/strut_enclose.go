package kin

import (
	"math"

	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

// strutBox is what all legs have in common in a box of poses.
type strutBox struct {
	turn   enclose.Turn
	moving [6]Freedom // the coordinates that have a width
	n      int        // how many of them
	at     Vec        // tool point at the centre, base frame
	half   [6]float64
	c      [6]enclose.Form
}

// Enclose is Move over a box. Legs are enclosed by hand, see strut_taylor.go.
func (m *struts) Enclose(b *enclose.Box, e *Enclosure) {
	e.Reach, e.Leg, e.What = AllReach, -1, ""
	var x strutBox
	m.frame.coordinates(b, &x.c)
	copy(e.P[:], x.c[:3])
	e.turned(&m.frame, &x.c)
	var own [3]bool
	for _, q := range m.frame.Freedoms {
		x.half[q] = x.c[q].G[q]
		if x.half[q] != 0 {
			x.moving[x.n] = q
			x.n++
		}
		if q.Angular() {
			own[q-Roll] = true
		}
	}
	x.turn.Set(b, own)
	x.at = Vec{X: m.home.X + x.c[X].C, Y: m.home.Y + x.c[Y].C, Z: m.home.Z + x.c[Z].C}
	if len(e.Links) != m.n {
		e.Links = make([]Link, m.n)
	}
	for i := range m.n {
		m.encloseLeg(i, &x, e)
	}
	e.Pairs = e.Pairs[:0]
	for k := range m.pairs.pair[:m.pairs.n] {
		p := &m.pairs.pair[k]
		e.Pairs = append(e.Pairs, [2]int{p.i, p.j})
	}
	copy(e.Wrenches[:6*m.n], e.J[:6*m.n])
	e.held(&m.frame)
}

// encloseLeg fills what e says of leg i.
func (m *struts) encloseLeg(i int, x *strutBox, e *Enclosure) {
	l := &m.leg[i]
	link := &e.Links[i]
	link.Leg, link.Radius, link.Hold, link.Tip = i, m.pairs.diameter/2, Turned, l.b
	link.From.Const(l.a)

	var t strutTaylor
	t.start(l, m.invLc, x)
	var r strutRest
	if !r.set(&t, l, m.invLc, x) {
		e.lose(i)
		return
	}
	t.second(l, m.invLc, x)

	var z enclose.Form
	t.length.form(&e.Q[i], r.length, math.Inf(1), r.metre)
	t.lift.at, t.lift.slope, t.lift.mid = t.length.at, t.length.slope, t.lift.mid+r.convex
	if t.lift.form(&z, r.convex+r.s3, math.Inf(1), r.metre); z.R < e.Q[i].R {
		e.Q[i] = z
	}
	for c := range 3 {
		t.row[c].form(&e.J[6*i+c], r.n3, r.n2, r.round)
		t.row[3+c].form(&e.J[6*i+3+c], r.m3, r.m2, r.moment)
		t.tip[c].form(&link.To[c], r.s3, r.s2, r.metre)
	}
	for q, own := X, 0; m.n < 6 && q <= Yaw; q++ { // planar: what lies in a freedom that the platform lacks is exactly 0
		if own < m.n && m.frame.Freedoms[own] == q {
			own++
			continue
		}
		e.J[6*i+int(q)].Const(0)
	}
	t.base.form(&z, r.n3, r.n2, r.round)
	chord(&e.BaseChord[i], &z, r3.Norm2(l.ua))
	t.plat.form(&z, r.v3, r.v2, 2*r.round)
	chord(&e.PlatformChord[i], &z, r3.Norm2(l.ub))
}

// lose says that nothing is known of leg i: its length can be 0.
func (e *Enclosure) lose(i int) {
	unknown := enclose.Form{R: math.Inf(1)}
	e.Reach, e.Leg = Unsure, i
	for c := range 6 {
		e.J[6*i+c] = unknown
	}
	e.Q[i], e.BaseChord[i], e.PlatformChord[i] = unknown, unknown, unknown
	for c := range 3 {
		e.Links[i].From[c], e.Links[i].To[c] = unknown, unknown
	}
}

// poly is a polynomial of second degree in the normal coordinates of a box.
type poly struct {
	at    float64
	slope [6]float64
	mid   float64 // of the part of second degree
	wide  float64 // half the width of that part
}

// add adds c·t[j]·t[k]: a square lies in [0, 1], another product in [-1, 1].
func (p *poly) add(c float64, square bool) {
	if square {
		c *= 0.5
		p.mid += c
	}
	p.wide += math.Abs(c)
}

// form sets z to the polynomial, which leaves out rest, or to its part of first degree, which leaves out first, whichever is
// narrower; round goes on top.
func (p *poly) form(z *enclose.Form, rest, first, round float64) {
	c, r := p.at+p.mid, p.wide+rest
	if first < r {
		c, r = p.at, first
	}
	z.C, z.G = c, p.slope
	z.Settle(r*(1+strutRound)+round, 0)
}
