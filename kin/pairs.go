package kin

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// legPair is two legs that do not share a joint. Joints nearer to each other
// than 1e-9 of the leg's length at home count as one: centres that a double
// joint has twice, through two azimuths, differ by rounding.
type legPair struct {
	i, j int
	d    Vec // base joint i less base joint j

	// e is a fixed unit vector that points from leg j to leg i at home. The
	// distance of the legs' projections on any direction is a lower bound of
	// their distance, and this one is sharp enough to skip most pairs.
	e    Vec
	base float64 // e·d
}

// legPairs are all pairs of prismatic legs, the nearest at home first.
type legPairs struct {
	diameter float64
	pair     [15]legPair
	n        int
}

func pairLegs(leg *[6]strut, n int, home Vec, s *Setup) legPairs {
	ps := legPairs{diameter: s.Diameter}
	tip := func(i int) Vec { return r3.Add(home, leg[i].b) }
	var dist [15]float64
	for i := range n {
		for j := i + 1; j < n; j++ {
			if s.Neighbours && j != i+1 && j-i != n-1 {
				continue
			}
			d := r3.Sub(leg[i].a, leg[j].a)
			t := r3.Sub(tip(i), tip(j))
			if one := oneJoint * oneJoint * r3.Norm2(r3.Sub(tip(i), leg[i].a)); r3.Norm2(d) <= one || r3.Norm2(t) <= one {
				continue // they share a joint
			}
			e := unit(r3.Add(d, t))
			ps.pair[ps.n] = legPair{i: i, j: j, d: d, e: e, base: r3.Dot(e, d)}
			dist[ps.n] = math.Min(r3.Norm2(d), r3.Norm2(t))
			ps.n++
		}
	}
	nearestFirst(ps.pair[:ps.n], dist[:ps.n])
	return ps
}

// nearestFirst sorts pairs by their distances; equals keep their order.
func nearestFirst[P any](pairs []P, dist []float64) {
	order := make([]int, len(pairs))
	for k := range order {
		order[k] = k
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(dist[a], dist[b]) })
	was := slices.Clone(pairs)
	for k, o := range order {
		pairs[k] = was[o]
	}
}

// gap looks at the pairs in order and skips those whose bound shows that they cannot be the least, or not below keep. The
// first three of a row of six are the unit vector along a leg, q are the lengths.
func (ps *legPairs) gap(rows *[36]float64, q *[6]float64, keep float64) (gap float64, i, j int) {
	i, j = -1, -1
	reach := keep + ps.diameter - gapSlack*q[0]
	if reach < 0 {
		return math.Inf(1), i, j
	}
	best := reach * reach
	for k := range ps.pair[:ps.n] {
		p := &ps.pair[k]
		u := (*[6]float64)(rows[6*p.i : 6*p.i+6])
		v := (*[6]float64)(rows[6*p.j : 6*p.j+6])
		lu, lv := q[p.i], q[p.j]
		// projections on e: leg i runs from base to base+pu, leg j from 0 to pv
		pu := lu * (u[0]*p.e.X + u[1]*p.e.Y + u[2]*p.e.Z)
		pv := lv * (v[0]*p.e.X + v[1]*p.e.Y + v[2]*p.e.Z)
		low := p.base
		if pu < 0 {
			low += pu
		}
		if pv > 0 {
			low -= pv
		}
		if low > 0 && low*low >= best {
			continue
		}
		un, vn := Vec{X: u[0], Y: u[1], Z: u[2]}, Vec{X: v[0], Y: v[1], Z: v[2]}
		if d2 := segmentGap2(&p.d, &un, &vn, lu, lv); d2 < best {
			best, i, j = d2, p.i, p.j
		}
	}
	if i < 0 {
		return math.Inf(1), i, j
	}
	return math.Sqrt(best) - ps.diameter, i, j
}
