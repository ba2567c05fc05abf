package opt

import (
	"math"
	"slices"
)

// pick returns the indices of at most k of the mutually non-dominated pts
// that cover much hypervolume up to ref: unless k is less than 4 per goal, the
// best in each goal to begin with, even beyond ref; then greedily the point that adds most
// (within 1-1/e of the best, Nemhauser, Wolsey, Fisher 1978), then, with up to
// 3 goals and while it pays, a chosen point is replaced by the one that adds
// most without it. With more than 4 goals the points are spread instead, see
// scatter.
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
	p := picker{pts: pts, m: len(ref), gains: make([]float64, len(pts)), stale: make([]bool, len(pts))}
	p.chosen.reset(ref)
	p.upper = make([]float64, len(pts)*p.m)
	for i := range pts {
		copy(p.corner(i), ref)
		p.update(i)
	}
	if k >= 4*len(ref) {
		for _, i := range Extremes(pts) {
			if p.gains[i] >= 0 {
				p.take(i, true)
				p.fixed = append(p.fixed, i)
			}
		}
	}
	p.greedy(k)
	if len(ref) <= 3 {
		p.exchange()
	}
	return p.index
}

// picker grows and improves a selection.
type picker struct {
	m      int
	pts    [][]float64
	chosen shares
	index  []int     // of the chosen points, in the order of chosen
	gains  []float64 // what each point would add; -1 once chosen
	fixed  []int     // chosen points that stay
	stale  []bool    // the gain may have become less since it was computed
	upper  []float64 // corners of the boxes that hold these gains
}

func (p *picker) corner(i int) []float64 { return p.upper[i*p.m : (i+1)*p.m : (i+1)*p.m] }

func (p *picker) update(i int) {
	p.gains[i] = p.chosen.gain(p.pts[i], -1, p.corner(i))
	p.stale[i] = false
}

// greedy takes the points that add most until k are taken. Gains only become
// less while points are taken, so a stale one is computed anew no sooner than
// it comes to the top of the heap.
func (p *picker) greedy(k int) {
	h := make([]int, len(p.pts))
	for i := range h {
		h[i] = i
	}
	for i := len(h)/2 - 1; i >= 0; i-- {
		p.sink(h, i)
	}
	for len(p.index) < k {
		b := h[0]
		switch {
		case p.gains[b] < 0: // chosen before
			h[0] = h[len(h)-1]
			h = h[:len(h)-1]
		case p.stale[b]:
			p.update(b)
		default:
			p.take(b, true)
		}
		p.sink(h, 0)
	}
}

// sink restores the heap below position i: greatest gain first, of equals the
// first point.
func (p *picker) sink(h []int, i int) {
	ahead := func(a, b int) bool {
		return p.gains[a] > p.gains[b] || p.gains[a] == p.gains[b] && a < b
	}
	for {
		c := 2*i + 1
		if c >= len(h) {
			return
		}
		if c+1 < len(h) && ahead(h[c+1], h[c]) {
			c++
		}
		if !ahead(h[c], h[i]) {
			return
		}
		h[i], h[c] = h[c], h[i]
		i = c
	}
}

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

// take moves point i into the selection.
func (p *picker) take(i int, lazy bool) {
	p.index = slices.Insert(p.index, p.chosen.add(p.pts[i]), i)
	p.gains[i], p.stale[i] = -1, false
	for j := next(p.upper, p.pts[i], 0, true); j < len(p.pts); j = next(p.upper, p.pts[i], j+1, true) {
		switch {
		case p.gains[j] < 0:
		case lazy:
			p.stale[j] = true
		default:
			p.update(j)
		}
	}
}

// leave takes the c-th chosen point out again and returns the point outside
// that adds most among those whose gain this changes.
func (p *picker) leave(c int) int {
	i := p.index[c]
	p.index = slices.Delete(p.index, c, c+1)
	p.chosen.remove(c)
	copy(p.corner(i), p.chosen.ref)
	p.update(i)
	b := i
	for j := next(p.upper, p.pts[i], 0, false); j < len(p.pts); j = next(p.upper, p.pts[i], j+1, false) {
		if p.gains[j] >= 0 && j != i {
			loosen(p.corner(j), p.pts[i], p.chosen.ref)
			p.update(j)
			if p.gains[j] > p.gains[b] {
				b = j
			}
		}
	}
	return b
}

// exchange swaps single points until no swap pays. A point is tried again
// only after something in its neighbourhood has changed.
func (p *picker) exchange() {
	const rounds = 20
	for i, old := range p.stale {
		if old && p.gains[i] >= 0 {
			p.update(i)
		}
	}
	settled := make([]bool, len(p.pts))
	for _, i := range p.fixed {
		settled[i] = true
	}
	top := p.best()
	for range rounds {
		swapped := false
		for _, i := range slices.Clone(p.index) {
			if settled[i] {
				continue
			}
			c := slices.Index(p.index, i)
			lost := p.chosen.exact(c)
			b := p.leave(c)
			if p.gains[top] > p.gains[b] {
				b = top
			}
			if p.gains[b] <= lost*(1+1e-9) {
				p.take(i, false)
				settled[i] = true
				continue
			}
			swapped = true
			for _, j := range p.index {
				if settled[j] && !slices.Contains(p.fixed, j) {
					settled[j] = !p.near(j, i) && !p.near(j, b)
				}
			}
			p.take(b, false)
			settled[b] = true
			top = p.best()
		}
		if !swapped {
			return
		}
	}
}

// near reports whether the box of chosen point j reaches to point i.
func (p *picker) near(j, i int) bool {
	c := slices.Index(p.index, j)
	p.chosen.exact(c)
	return within(p.pts[i], p.chosen.corner(c))
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
