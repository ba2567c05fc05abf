package opt

import (
	"cmp"
	"math"
	"slices"
)

// maxShareGoals is the largest number of goals for which designs are weighed
// by the hypervolume that they cover alone; beyond, by crowding distance.
const maxShareGoals = 4

// population is one space's designs under selection: rank, then the
// hypervolume covered alone (SMS-EMOA: Beume, Naujoks, Emmerich 2007), with
// constrained domination (Deb 2000).
type population struct {
	m     int
	front []*genome // feasible and not dominated within the population
	share shares    // of front, index by index; plain above maxShareGoals
	rest  []*genome // dominated, then infeasible designs, best first
	ref   []float64 // reference of the whole search, nil at first

	beaten, unfit []*genome // scratch of selectBest
	order         []placed  // scratch of ranked
	low, high     []float64
	at            []float64
}

// placed is a design under sorting.
type placed struct {
	g     *genome
	crowd float64
	at    int
}

func newPopulation(goals int) *population {
	p := &population{m: goals, low: make([]float64, goals), high: make([]float64, goals), at: make([]float64, goals)}
	for k := range p.at {
		p.at[k] = 1
	}
	p.share.reset(p.at)
	p.share.plain = goals > maxShareGoals
	return p
}

// ranked returns all designs, best first. The slice is dst, reused.
func (p *population) ranked(dst []*genome) []*genome {
	dst = append(dst[:0], p.front...)
	if p.m <= mostByVolume { // beyond, that some may cover a little more will do
		p.share.settle()
	}
	for i, g := range p.front {
		g.rank = 0
		g.crowd = p.share.alone[i]
	}
	if p.share.plain && len(dst) > 0 {
		crowding(dst)
	}
	p.order = p.order[:0]
	for i, g := range dst {
		p.order = append(p.order, placed{g, g.crowd, i})
	}
	slices.SortFunc(p.order, func(a, b placed) int {
		switch {
		case a.crowd > b.crowd:
			return -1
		case a.crowd < b.crowd:
			return 1
		}
		return a.at - b.at
	})
	for i := range dst {
		dst[i] = p.order[i].g
	}
	return append(dst, p.rest...)
}

// selectBest merges newcomers and keeps the n best of all.
func (p *population) selectBest(newcomers []*genome, n int) {
	beaten, unfit := p.beaten[:0], p.unfit[:0]
	for _, g := range p.rest {
		if g.feasible() {
			beaten = append(beaten, g)
		} else {
			unfit = append(unfit, g)
		}
	}
	for _, g := range newcomers {
		switch {
		case !g.feasible():
			unfit = append(unfit, g)
		default:
			beaten = p.enter(g, beaten)
		}
	}
	p.scale()
	p.reduce(n)
	p.beaten, p.unfit = beaten, unfit
	p.rest = p.rest[:0]
	if need := n - len(p.front); need > 0 {
		p.rest = p.layers(p.rest, beaten, need)
	}
	if need := n - len(p.front) - len(p.rest); need > 0 {
		slices.SortStableFunc(unfit, func(a, b *genome) int { return cmp.Compare(a.violation, b.violation) })
		for i, g := range unfit[:min(need, len(unfit))] {
			g.rank, g.crowd = math.MaxInt32+i, 0
			p.rest = append(p.rest, g)
		}
	}
}

// enter adds a feasible design to the front, or to beaten; what it beats
// moves from the front to beaten.
func (p *population) enter(g *genome, beaten []*genome) []*genome {
	for i := 0; ; {
		var r int
		switch i, r = related(p.share.pts, g.goals, i); r {
		case -1:
			g.beaten = true
			return append(beaten, g)
		case 1:
			beaten = append(beaten, p.front[i])
			p.leave(i)
			continue
		}
		break
	}
	p.front = slices.Insert(p.front, p.share.add(g.goals), g)
	return beaten
}

// leave removes a member of the front.
func (p *population) leave(i int) {
	p.front = slices.Delete(p.front, i, i+1)
	p.share.remove(i)
}

// scale sets the reference of the shares: that of the search, so that the
// designs at the rim of the front weigh what they weigh in the end; but at
// least a tenth and at most ten times the front's range beyond its worst
// values, since a reference out there would leave the rim only.
func (p *population) scale() {
	if len(p.front) == 0 {
		return
	}
	copy(p.low, p.front[0].goals)
	copy(p.high, p.front[0].goals)
	for _, g := range p.front {
		for k, v := range g.goals {
			p.low[k], p.high[k] = min(p.low[k], v), max(p.high[k], v)
		}
	}
	for k := range p.at {
		p.at[k] = margin(p.low[k], p.high[k], 0.1)
		if p.ref != nil {
			far := p.high[k] + 10*(p.high[k]-p.low[k])
			p.at[k] = max(p.at[k], min(p.ref[k], far))
		}
	}
	p.share.move(p.at)
}

// margin returns a value the share of the range beyond high, clear of it even
// when the range is nothing: then the share of high's magnitude, or 1.
func margin(low, high, share float64) float64 {
	for _, d := range []float64{high - low, math.Abs(high)} {
		if at := high + float64(share*d); at > high && !math.IsInf(at, 0) {
			return at
		}
	}
	return high + 1
}

// reduce cuts the front to n designs.
func (p *population) reduce(n int) {
	if p.share.plain && len(p.front) > n {
		crowding(p.front)
		byCrowd := slices.Clone(p.front)
		slices.SortStableFunc(byCrowd, func(a, b *genome) int { return cmp.Compare(a.crowd, b.crowd) })
		for _, g := range byCrowd[:len(byCrowd)-n] {
			p.leave(slices.Index(p.front, g))
		}
	}
	for len(p.front) > n {
		p.leave(p.share.least())
	}
}

// layers appends the need best of the dominated designs to dst: whole layers
// of non-dominated sorting (Deb et al. 2002), of the last one those that cover
// most alone.
func (p *population) layers(dst, beaten []*genome, need int) []*genome {
	left := beaten
	for rank := 1; need > 0 && len(left) > 0; rank++ {
		layer := left[:0:0]
		next := left[:0:0]
	scan:
		for i, g := range left {
			for j, q := range left {
				if c := compare(q.goals, g.goals); i != j && c == -1 && (compare(g.goals, q.goals) != -1 || j < i) {
					next = append(next, g)
					continue scan
				}
			}
			layer = append(layer, g)
		}
		sub := newPopulation(p.m)
		sub.ref = p.ref
		for _, g := range layer {
			sub.enter(g, nil)
		}
		sub.scale()
		sub.reduce(need)
		for _, g := range sub.ranked(nil) {
			g.rank = rank
			dst = append(dst, g)
			need--
		}
		left = next
	}
	return dst
}

// crowding sets crowd to the crowding distance within a set of mutually
// non-dominated designs (Deb et al. 2002).
func crowding(set []*genome) {
	for _, g := range set {
		g.crowd = 0
	}
	s := slices.Clone(set)
	for k := range len(set[0].goals) {
		slices.SortStableFunc(s, func(a, b *genome) int { return cmp.Compare(a.goals[k], b.goals[k]) })
		n := len(s)
		span := s[n-1].goals[k] - s[0].goals[k]
		s[0].crowd, s[n-1].crowd = math.Inf(1), math.Inf(1)
		if span <= 0 {
			continue
		}
		for i := 1; i < n-1; i++ {
			s[i].crowd += (s[i+1].goals[k] - s[i-1].goals[k]) / span
		}
	}
}
