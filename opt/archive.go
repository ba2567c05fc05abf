package opt

import (
	"math"
	"slices"
)

// Archive keeps the feasible designs that no other beats. The zero value is
// ready and unbounded.
//
// With a Limit the archive is thinned to it whenever it grows a quarter
// beyond: a grid over the range of the goals is made so coarse that at most
// Limit cells are taken, and each cell keeps the design nearest to its best
// corner (as in epsilon-dominance archives: Laumanns, Thiele, Deb, Zitzler
// 2002). The best design in each goal always stays.
type Archive struct {
	Limit   int
	designs []*genome
	orders  []int
	goals   []float64 // of all designs, one after another: scanned for every newcomer
	m       int
}

// Len returns the number of designs kept.
func (a *Archive) Len() int { return len(a.designs) }

// Add offers a design and reports whether it is kept. Infeasible, dominated
// and equal ones are not; those that d beats are dropped. It costs one pass
// over the archive at most.
func (a *Archive) Add(d Design) bool {
	g := &genome{space: d.Space, x: slices.Clone(d.X), goals: slices.Clone(d.Goals),
		excess: slices.Clone(d.Excess), violation: d.Violation, fault: d.Fault, origin: originIndex(d.Origin)}
	return a.add(g, d.Order)
}

// Designs returns copies of all designs in ascending order of their goals.
func (a *Archive) Designs() []Design {
	out := make([]Design, len(a.designs))
	for i, g := range a.designs {
		out[i] = g.design(a.orders[i])
	}
	slices.SortFunc(out, func(x, y Design) int { return slices.Compare(x.Goals, y.Goals) })
	return out
}

func (a *Archive) add(g *genome, order int) bool {
	if !g.feasible() {
		return false
	}
	a.m = len(g.goals)
	for i := 0; ; {
		var r int
		switch i, r = related(a.goals, g.goals, i); r {
		case -1: // brought forward: it is likely to beat the next one, too
			a.swap(i, i/2)
			g.beaten = true
			return false
		case 1:
			a.designs[i].beaten = true
			a.drop(i)
			continue
		}
		break
	}
	a.designs = append(a.designs, g)
	a.orders = append(a.orders, order)
	a.goals = append(a.goals, g.goals...)
	if a.Limit > 0 && len(a.designs) > a.Limit+a.Limit/4 {
		a.thin()
	}
	return true
}

// beats reports whether a design kept beats p or equals it.
func (a *Archive) beats(p []float64) bool {
	relation := 1
	for i := 0; relation > 0; i++ {
		i, relation = related(a.goals, p, i)
	}
	return relation < 0
}

func (a *Archive) swap(i, j int) {
	a.designs[i], a.designs[j] = a.designs[j], a.designs[i]
	a.orders[i], a.orders[j] = a.orders[j], a.orders[i]
	p, q := a.goals[i*a.m:i*a.m+a.m], a.goals[j*a.m:j*a.m+a.m]
	for k := range p {
		p[k], q[k] = q[k], p[k]
	}
}

// drop removes design i; the last one takes its place.
func (a *Archive) drop(i int) {
	last := len(a.designs) - 1
	a.swap(i, last)
	a.designs, a.orders, a.goals = a.designs[:last], a.orders[:last], a.goals[:last*a.m]
}

// bounds returns the best and the worst value per goal.
func (a *Archive) bounds() (low, high []float64) {
	low, high = slices.Clone(a.goals[:a.m]), slices.Clone(a.goals[:a.m])
	for i := 0; i < len(a.goals); i += a.m {
		for k := range low {
			low[k], high[k] = min(low[k], a.goals[i+k]), max(high[k], a.goals[i+k])
		}
	}
	return low, high
}

// thin reduces the archive to at most Limit designs.
func (a *Archive) thin() {
	n, m := len(a.designs), a.m
	low, high := a.bounds()
	cell := make([]int32, n*m)
	taken := make(map[uint64]int32, n)
	// divide places each design in a grid of c cells per goal and counts the
	// cells that are taken.
	divide := func(c int) int {
		clear(taken)
		for i := range n {
			h := uint64(14695981039346656037)
			for k := range m {
				t := int32(0)
				if high[k] > low[k] {
					t = int32(float64(c) * ((a.goals[i*m+k] - low[k]) / (high[k] - low[k])))
				}
				cell[i*m+k] = t
				h = (h ^ uint64(t)) * 1099511628211
				h ^= h >> 29
			}
			b, ok := taken[h]
			if !ok || a.nearer(i, int(b), cell, c, low, high) {
				taken[h] = int32(i)
			}
		}
		return len(taken)
	}
	fine := 2 // the finest grid that takes at most Limit cells, by doubling and halving
	for divide(fine) <= a.Limit && fine < 1<<20 {
		fine *= 2
	}
	coarse := fine / 2
	for fine-coarse > max(1, coarse/32) {
		if c := (fine + coarse) / 2; divide(c) <= a.Limit {
			coarse = c
		} else {
			fine = c
		}
	}
	divide(coarse)
	keep := make([]bool, n)
	for _, i := range taken {
		keep[i] = true
	}
	for k := range m {
		best := 0
		for i := range n {
			if a.goals[i*m+k] < a.goals[best*m+k] {
				best = i
			}
		}
		keep[best] = true
	}
	w := 0
	for i := range n {
		if keep[i] {
			a.designs[w], a.orders[w] = a.designs[i], a.orders[i]
			copy(a.goals[w*m:w*m+m], a.goals[i*m:i*m+m])
			w++
		}
	}
	clear(a.designs[w:])
	a.designs, a.orders, a.goals = a.designs[:w], a.orders[:w], a.goals[:w*m]
}

// nearer reports whether design i is nearer to the best corner of its cell
// than design j, which shares the cell.
func (a *Archive) nearer(i, j int, cell []int32, c int, low, high []float64) bool {
	si, sj := 0.0, 0.0
	for k := range a.m {
		span := high[k] - low[k]
		if span <= 0 {
			continue
		}
		at := float64(cell[i*a.m+k])
		di := float64(c)*((a.goals[i*a.m+k]-low[k])/span) - at
		dj := float64(c)*((a.goals[j*a.m+k]-low[k])/span) - at
		si += float64(di * di)
		sj += float64(dj * dj)
	}
	return si < sj || (si == sj && math.Float64bits(a.goals[i*a.m]) < math.Float64bits(a.goals[j*a.m]))
}
