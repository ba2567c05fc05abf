package proof

import (
	"math"

	"legwright/kin"
	"legwright/kin/enclose"
)

// clear proves that the links of each pair keep their distance, by a separating direction that turns with the pose.
//
// Let e be the direction between the nearest points at the centre, and e(t) = e + Σ e_k t_k where the e_k keep e(t) square to
// first order to those links whose nearest point lies inside. For every e the distance of two segments is at least the least of
// e·(p-q)/|e| over the ends p of the one and q of the other, which here is exact to first order. A fixed
// direction would not be.
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

// distance is a lower bound of the distance of two links' surfaces over the box, a sharper one where it would be below enough.
func (b *bench) distance(u, v *kin.Link, enough float64) float64 {
	want := enough + u.Radius + v.Radius
	s, t := between(&u.From, &u.To), between(&v.From, &v.To)
	e, inU, inV := nearest(&u.From, &s, &v.From, &t)
	if e == [3]float64{} {
		return math.Inf(-1)
	}
	moving := b.region.moving
	var ek [6][3]float64
	turned := 0.0 // bound of |Σ e_k t_k|
	ss, tt, st := dot3(&s, &s), dot3(&t, &t), dot3(&s, &t)
	for k, q := range moving {
		bu := -(e[0]*(u.To[0].G[q]-u.From[0].G[q]) + e[1]*(u.To[1].G[q]-u.From[1].G[q]) + e[2]*(u.To[2].G[q]-u.From[2].G[q]))
		bv := -(e[0]*(v.To[0].G[q]-v.From[0].G[q]) + e[1]*(v.To[1].G[q]-v.From[1].G[q]) + e[2]*(v.To[2].G[q]-v.From[2].G[q]))
		x, y := 0.0, 0.0
		switch {
		case inU && inV:
			if det := ss*tt - st*st; det > 1e-6*ss*tt {
				x, y = (bu*tt-bv*st)/det, (bv*ss-bu*st)/det
			}
		case inU:
			x = bu / ss
		case inV:
			y = bv / tt
		}
		for c := range 3 {
			ek[k][c] = x*s[c] + y*t[c]
		}
		turned += math.Sqrt(dot3(&ek[k], &ek[k]))
	}
	// |e(t)|: the e_k are square to e but for rounding
	size := math.Sqrt(1+turned*turned) * (1 + slack)
	least := math.Inf(1)
	for _, p := range [2]*enclose.Vec{&u.From, &u.To} {
		for _, q := range [2]*enclose.Vec{&v.From, &v.To} {
			w := [3]float64{p[0].C - q[0].C, p[1].C - q[1].C, p[2].C - q[2].C}
			value, moved, extent := dot3(&e, &w), 0.0, math.Sqrt(dot3(&w, &w))
			var g [6][3]float64
			for k, c := range moving {
				g[k] = [3]float64{p[0].G[c] - q[0].G[c], p[1].G[c] - q[1].G[c], p[2].G[c] - q[2].G[c]}
				value -= math.Abs(dot3(&e, &g[k]) + dot3(&ek[k], &w))
				moved += math.Sqrt(dot3(&g[k], &g[k]))
			}
			r := [3]float64{p[0].R + q[0].R, p[1].R + q[1].R, p[2].R + q[2].R}
			value -= (1+turned)*math.Sqrt(dot3(&r, &r)) + slack*(1+turned)*(extent+moved+coordinates(p)+coordinates(q))
			if low := (value - turned*moved) / size; low >= want {
				value -= turned * moved
			} else { // the part of second degree, t_k t_l in [-1, 1] and t_k² in [0, 1]
				for k := range moving {
					value += min(dot3(&ek[k], &g[k]), 0)
					for l := range k {
						value -= math.Abs(dot3(&ek[k], &g[l]) + dot3(&ek[l], &g[k]))
					}
				}
			}
			least = min(least, max(value/size, 0))
		}
	}
	least -= u.Radius + v.Radius
	return least - slack*math.Abs(least)
}

// coordinates is a bound of the size of a point's coordinates, for rounding.
func coordinates(p *enclose.Vec) float64 {
	return math.Abs(p[0].C) + math.Abs(p[1].C) + math.Abs(p[2].C)
}

func between(from, to *enclose.Vec) [3]float64 {
	return [3]float64{to[0].C - from[0].C, to[1].C - from[1].C, to[2].C - from[2].C}
}

func dot3(a, b *[3]float64) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

// nearest gives the unit direction from the second to the first of two segments from a along s and from b along t at their
// nearest points, zero where they touch, and whether these lie inside (the way of kin's own distance).
func nearest(a *enclose.Vec, s *[3]float64, b *enclose.Vec, t *[3]float64) (e [3]float64, inS, inT bool) {
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
		return [3]float64{}, false, false
	}
	for k := range e {
		e[k] /= l
	}
	return e, x > 0 && x < 1, y > 0 && y < 1
}

// unitClamp keeps x within [0, 1].
func unitClamp(x float64) float64 { return min(max(x, 0), 1) }
