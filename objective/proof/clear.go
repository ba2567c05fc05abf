package proof

import (
	"math"

	"legwright/kin"
	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

// clear proves that the links of each pair keep their distance.
func (b *bench) clear(i int) bool {
	least := math.Inf(1)
	for _, p := range b.e.Pairs {
		d := b.distance(&b.e.Links[p[0]], &b.e.Links[p[1]], b.target[i])
		least = min(least, d)
		if !(least >= b.target[i]) {
			return false
		}
	}
	b.worst[i] = least
	return true
}

// distance is a lower bound of the distance of two links' surfaces over the box, by a separating direction that turns with
// the pose. It tries no further than until the bound is enough.
//
// Let e be the direction between the nearest points at the centre, and e(t) = e + Σ e_k t_k. For every direction the
// distance of two segments is at least the least of e·(p-q)/|e| over the ends p of the one and q of the other. Where the nearest point
// of a link lies inside it, or can come to lie there within the box, e(t) must stay square to that link, or as
// it is to it, for this to be exact to first order; where it stays at an end, e(t) is best left alone.
func (b *bench) distance(u, v *kin.Link, enough float64) float64 {
	moving := b.region.moving
	p := pair{u: u, v: v, want: enough + u.Radius + v.Radius, moving: moving}
	if p.rigid = u.Hold == v.Hold && u.Hold != kin.Loose; p.rigid { // the difference of their far ends turns at most
		d := r3.Sub(u.Tip, v.Tip)
		if u.Hold == kin.Turned {
			p.tips.Turn(&b.e.R, d)
		} else {
			p.tips.Const(d)
		}
	}
	s, t := between(&u.From, &u.To), between(&v.From, &v.To)
	p.e = nearest(&u.From, &s, &v.From, &t)
	if p.e == [3]float64{} {
		return -(u.Radius + v.Radius)
	}
	// e·s and e·t, how they change, and the parts of s and t that are square to e
	es, et := dot3(&p.e, &s), dot3(&p.e, &t)
	for c := range 3 {
		p.s[c], p.t[c] = s[c]-es*p.e[c], t[c]-et*p.e[c]
	}
	ds, dt := 0.0, 0.0
	for k, q := range moving {
		p.ds[k] = p.e[0]*(u.To[0].G[q]-u.From[0].G[q]) + p.e[1]*(u.To[1].G[q]-u.From[1].G[q]) + p.e[2]*(u.To[2].G[q]-u.From[2].G[q])
		p.dt[k] = p.e[0]*(v.To[0].G[q]-v.From[0].G[q]) + p.e[1]*(v.To[1].G[q]-v.From[1].G[q]) + p.e[2]*(v.To[2].G[q]-v.From[2].G[q])
		ds += math.Abs(p.ds[k])
		dt += math.Abs(p.dt[k])
	}
	first := 0 // bit 0: turn with u, bit 1: with v
	if math.Abs(es) < ds+1e-9 {
		first |= 1
	}
	if math.Abs(et) < dt+1e-9 {
		first |= 2
	}
	most := 0.0
	for _, other := range [4]int{0, 1, 2, 3} {
		if most = max(most, p.apart(first^other)); most >= p.want {
			break
		}
	}
	most -= u.Radius + v.Radius
	return most - slack*math.Abs(most)
}

// pair is two links over a box.
type pair struct {
	u, v   *kin.Link
	want   float64
	moving []int
	e      [3]float64  // unit, from v to u
	s, t   [3]float64  // along u and v, what of it is square to e
	ds, dt [6]float64  // slopes of e·u and e·v
	tips   enclose.Vec // the difference of their far ends, where these are fixed to each other
	rigid  bool
}

// apart is a lower bound of the distance of the axes with a direction that turns with the links in the set.
func (p *pair) apart(with int) float64 {
	var ek, g [6][3]float64
	turned := 0.0 // bound of |Σ e_k t_k|
	if with != 0 {
		ss, tt, st := dot3(&p.s, &p.s), dot3(&p.t, &p.t), dot3(&p.s, &p.t)
		det := ss*tt - st*st
		for k := range p.moving {
			x, y := 0.0, 0.0
			switch {
			case with == 3 && det > 1e-6*ss*tt:
				x, y = (p.dt[k]*st-p.ds[k]*tt)/det, (p.ds[k]*st-p.dt[k]*ss)/det
			case with == 1 && ss > 0:
				x = -p.ds[k] / ss
			case with == 2 && tt > 0:
				y = -p.dt[k] / tt
			default:
				return 0
			}
			for c := range 3 {
				ek[k][c] = x*p.s[c] + y*p.t[c]
			}
			turned += math.Sqrt(dot3(&ek[k], &ek[k]))
		}
	}
	// |e(t)|: the e_k are square to e but for rounding
	size := math.Sqrt(1+turned*turned) * (1 + slack)
	least := math.Inf(1)
	for _, a := range [2]*enclose.Vec{&p.u.From, &p.u.To} {
		for _, z := range [2]*enclose.Vec{&p.v.From, &p.v.To} {
			var w, r [3]float64
			if p.rigid && a == &p.u.To && z == &p.v.To {
				for c := range w {
					f := &p.tips[c]
					w[c], r[c] = f.C, f.R
					for k, q := range p.moving {
						g[k][c] = f.G[q]
					}
				}
			} else {
				for c := range w {
					w[c], r[c] = a[c].C-z[c].C, a[c].R+z[c].R
					for k, q := range p.moving {
						g[k][c] = a[c].G[q] - z[c].G[q]
					}
				}
			}
			value, moved, extent := dot3(&p.e, &w), 0.0, math.Sqrt(dot3(&w, &w))
			for k := range p.moving {
				value -= math.Abs(dot3(&p.e, &g[k]) + dot3(&ek[k], &w))
				moved += math.Sqrt(dot3(&g[k], &g[k]))
			}
			value -= (1+turned)*math.Sqrt(dot3(&r, &r)) + slack*(1+turned)*(extent+moved+coordinates(a)+coordinates(z))
			if low := (value - turned*moved) / size; low >= p.want {
				value -= turned * moved
			} else { // the part of second degree, t_k t_l in [-1, 1] and t_k² in [0, 1]
				for k := range p.moving {
					value += min(dot3(&ek[k], &g[k]), 0)
					for l := range k {
						value -= math.Abs(dot3(&ek[k], &g[l]) + dot3(&ek[l], &g[k]))
					}
				}
			}
			if least = min(least, max(value/size, 0)); least < p.want {
				return least
			}
		}
	}
	return least
}

// coordinates is a bound of the size of a point's coordinates, for rounding.
func coordinates(p *enclose.Vec) float64 {
	return math.Abs(p[0].C) + math.Abs(p[1].C) + math.Abs(p[2].C)
}

func between(from, to *enclose.Vec) [3]float64 {
	return [3]float64{to[0].C - from[0].C, to[1].C - from[1].C, to[2].C - from[2].C}
}

func dot3(a, b *[3]float64) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

// nearest gives the unit direction from the second to the first of two segments, from a along s and from b along t, at their
// nearest points, zero where they touch (the way of kin's own distance).
func nearest(a *enclose.Vec, s *[3]float64, b *enclose.Vec, t *[3]float64) (e [3]float64) {
	r := [3]float64{a[0].C - b[0].C, a[1].C - b[1].C, a[2].C - b[2].C}
	ss, st, tt := dot3(s, s), dot3(s, t), dot3(t, t)
	c, f := dot3(s, &r), dot3(t, &r)
	x := 0.0
	if det := ss*tt - st*st; det > 1e-12*ss*tt {
		x = unitClamp((st*f - c*tt) / det)
	}
	y := (st*x + f) / tt
	switch {
	case y < 0:
		y = 0
		x = unitClamp(-c / ss)
	case y > 1:
		y = 1
		x = unitClamp((st - c) / ss)
	}
	for k := range e {
		e[k] = r[k] + x*s[k] - y*t[k]
	}
	l := math.Sqrt(dot3(&e, &e))
	if !(l > 0) {
		return [3]float64{}
	}
	for k := range e {
		e[k] /= l
	}
	return e
}

// unitClamp keeps x within [0, 1].
func unitClamp(x float64) float64 { return min(max(x, 0), 1) }
