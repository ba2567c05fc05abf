package opt

import (
	"cmp"
	"slices"
)

const (
	keptPerLimit = 10 // Outcome.Single
	keptFailed   = 20 // Outcome.Failed
)

// misses keeps the infeasible designs worth showing.
type misses struct {
	limit    int
	near     []miss
	single   [][]miss
	failed   []Design
	failures int
}

// miss is a design and what it misses by.
type miss struct {
	by    float64
	g     *genome
	order int
}

// add looks at an infeasible design.
func (m *misses) add(g *genome, order int) {
	if g.fault != "" {
		if m.failures++; len(m.failed) < keptFailed {
			m.failed = append(m.failed, g.design(order))
		}
		return
	}
	m.near = keep(m.near, miss{g.violation, g, order}, m.limit)
	broken := -1
	for l, v := range g.excess {
		if v > 0 {
			if broken >= 0 {
				return
			}
			broken = l
		}
	}
	if broken >= 0 {
		m.single[broken] = keep(m.single[broken], miss{g.excess[broken], g, order}, keptPerLimit)
	}
}

// keep inserts a miss into an ascending list of bounded length; of equals the
// earlier stays ahead.
func keep(list []miss, x miss, limit int) []miss {
	if len(list) >= limit && x.by >= list[len(list)-1].by {
		return list
	}
	at, _ := slices.BinarySearchFunc(list, x, func(a, b miss) int {
		if c := cmp.Compare(a.by, b.by); c != 0 {
			return c
		}
		return -1
	})
	if len(list) >= limit {
		list = list[:limit-1]
	}
	return slices.Insert(list, at, x)
}

func designs(list []miss) []Design {
	out := make([]Design, len(list))
	for i, x := range list {
		out[i] = x.g.design(x.order)
	}
	return out
}
