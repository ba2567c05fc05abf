package opt

import (
	"math"
	"slices"
)

// pick returns the indices of at most k of the mutually non-dominated pts
// that cover much hypervolume up to ref: greedily the point that adds most
// (within 1-1/e of the best, Nemhauser, Wolsey, Fisher 1978), then, while it
// pays, a chosen point is replaced by the one that adds most without it. With
// more than 4 goals the points are spread instead, see scatter.
func pick(pts [][]float64, k int, ref []float64) []int {
	if len(pts) <= k {
		all := make([]int, len(pts))
		for i := range all {
			all[i] = i
		}
		return all
	}
	if len(ref) > maxShareGoals {
		return scatter(pts, k)
	}
	p := picker{pts: pts}
	p.chosen.reset(ref)
	p.gains = make([]float64, len(pts))
	p.upper = make([][]float64, len(pts))
	flat := make([]float64, len(pts)*len(ref))
	for i := range pts {
		p.upper[i] = flat[i*len(ref) : (i+1)*len(ref)]
		p.update(i)
	}
	for len(p.index) < k {
		p.take(p.best())
	}
	p.exchange()
	return p.index
}

// picker grows and improves a selection.
type picker struct {
	pts    [][]float64
	chosen shares
	index  []int       // of the chosen points, in the order of chosen.pts
	gains  []float64   // what each point would add; -1 once chosen
	upper  [][]float64 // corner of the box that holds this gain
}

func (p *picker) update(i int) { p.gains[i] = p.chosen.gain(p.pts[i], -1, p.upper[i]) }

// best returns the point outside that adds most, the first of equals.
func (p *picker) best() int {
	b := 0
	for i, g := range p.gains {
		if g > p.gains[b] {
			b = i
		}
	}
	return b
}

func (p *picker) take(i int) {
	p.chosen.add(p.pts[i])
	p.index = append(p.index, i)
	p.gains[i] = -1
	for j, u := range p.upper {
		if p.gains[j] > 0 && below(p.pts[i], u) {
			p.update(j)
		}
	}
}

func (p *picker) leave(c int) {
	i := p.index[c]
	last := len(p.index) - 1
	p.index[c] = p.index[last]
	p.index = p.index[:last]
	p.chosen.remove(c)
	p.gains[i] = 0
	for j, g := range p.gains {
		// A gain of 0 has no box to tell by: what covered j may have been i.
		if g >= 0 && (g == 0 || within(p.pts[i], p.upper[j])) {
			p.update(j)
		}
	}
}

// exchange swaps single points until a whole round brings nothing.
func (p *picker) exchange() {
	const rounds = 20
	for range rounds {
		swapped := false
		for _, i := range slices.Clone(p.index) {
			c := slices.Index(p.index, i)
			lost := p.chosen.alone[c]
			p.leave(c)
			b := p.best()
			if p.gains[b] > lost*(1+1e-9) {
				swapped = true
			} else {
				b = i
			}
			p.take(b)
		}
		if !swapped {
			return
		}
	}
}

// scatter chooses k points that are far from each other: the best in each
// goal, then always the point whose nearest chosen neighbour is farthest, in
// goals scaled by their ranges (Gonzalez 1985).
func scatter(pts [][]float64, k int) []int {
	low, high := slices.Clone(pts[0]), slices.Clone(pts[0])
	for _, p := range pts {
		for j, v := range p {
			low[j], high[j] = min(low[j], v), max(high[j], v)
		}
	}
	near := make([]float64, len(pts))
	for i := range near {
		near[i] = math.Inf(1)
	}
	var out []int
	take := func(i int) {
		if near[i] < 0 {
			return
		}
		out = append(out, i)
		for j, p := range pts {
			d := 0.0
			for g, v := range p {
				if high[g] > low[g] {
					t := (v - pts[i][g]) / (high[g] - low[g])
					d += float64(t * t)
				}
			}
			near[j] = min(near[j], d)
		}
		near[i] = -1
	}
	for g := range low {
		if len(out) == k {
			return out
		}
		best := 0
		for i, p := range pts {
			if p[g] < pts[best][g] {
				best = i
			}
		}
		take(best)
	}
	for len(out) < k {
		far := 0
		for i, d := range near {
			if d > near[far] {
				far = i
			}
		}
		take(far)
	}
	return out
}
