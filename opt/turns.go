package opt

import "slices"

// How spaces share the budget. Each starts with an even share. Once a quarter
// of the budget is spent, shares follow merit: how many of a space's latest
// designs are on the front, with a lesser weight for those that nearly were
// when they came. Nearly is a tenth of the front's range in every goal at the
// start and falls to nothing at the end: a space that only lags behind an
// equal would be starved for good without it. A space without a feasible
// design keeps its even share as long as its least violation falls. No space
// falls below a tenth of an even share, so that one that finds its feet late
// is noticed; one without another design to try hands its share on. (The idea
// is that of adaptive operator choice, Thierens 2005; the constants were found
// on pairs of equal and of shifted known problems, and on six-legged machines
// with three kinds of drive.)
//
// Decisions fall at generation barriers only, from designs counted in a fixed
// order, so they do not depend on the workers. A space breeds whole
// generations: the one with the largest share breeds every time, the others
// when enough has gathered.
const (
	evenUntil   = 0.25 // share of the budget
	leastOfEven = 0.1
	nearlyStart = 0.1  // of the front's range
	nearlyWorth = 0.3  // of a design on the front
	memory      = 200  // latest designs of a space
	notable     = 0.99 // of the least violation: what counts as less
)

// standing is what a space's share is decided by.
type standing struct {
	last     []recent // a ring
	judged   int
	feasible bool    // a feasible design was met
	least    float64 // violation, when it last fell notably
	since    int     // evaluations since then
}

// recent is one of the latest designs; near says that it nearly was on the
// front when it came, or was.
type recent struct {
	*genome
	near bool
}

// take notes an evaluated design.
func (s *standing) take(g *genome, near bool) {
	if len(s.last) < memory {
		s.last = append(s.last, recent{g, near})
	} else {
		s.last[s.judged%memory] = recent{g, near}
	}
	s.judged++
	s.feasible = s.feasible || g.feasible()
	if s.since++; s.judged == 1 || g.violation < float64(notable*s.least) {
		s.least, s.since = g.violation, 0
	}
}

// approaching reports that the space has no feasible design, but comes nearer.
func (s *standing) approaching() bool { return !s.feasible && s.since < memory }

// merit returns the share of the latest designs that are on the front.
func (s *standing) merit() float64 {
	on, near := 0, 0
	for _, l := range s.last {
		switch {
		case l.genome.feasible() && !l.beaten:
			on++
		case l.near:
			near++
		}
	}
	return (float64(on) + float64(nearlyWorth*float64(near))) / float64(max(1, len(s.last)))
}

// nearly returns by how much a design may miss the front in each goal and
// still count; nil while there is no front, or no other space.
func (r *run) nearly() []float64 {
	if len(r.islands) == 1 || r.archive.Len() == 0 {
		return nil
	}
	low, high := r.archive.bounds()
	share := nearlyStart * (1 - float64(r.evaluations)/float64(r.set.Evaluations))
	for k := range low {
		low[k] = float64(share * (high[k] - low[k]))
	}
	return low
}

// judge takes an evaluated design, before it is counted, into the standing of
// its space.
func (r *run) judge(g *genome, slack []float64) {
	if len(r.islands) == 1 {
		return
	}
	near := g.feasible()
	if near {
		p := slices.Clone(g.goals)
		for k := range slack {
			p[k] -= slack[k]
		}
		near = !r.archive.beats(p)
	}
	r.islands[g.space].take(g, near)
}

// allot says how many children each space breeds in the next generation.
func (r *run) allot() {
	r.divide()
	most := 0.0
	for _, l := range r.islands {
		most = max(most, l.share)
	}
	for _, l := range r.islands {
		if l.share == 0 {
			continue
		}
		if l.due += l.share / most; l.due < 1 {
			continue
		}
		l.due--
		l.turn = min(r.set.Children, r.left)
		r.left -= l.turn
	}
	for _, l := range r.islands {
		l.budget = l.used + l.turn + int(l.share*float64(r.left+r.set.Evaluations-r.set.StopAt))
	}
	r.gave()
}

// divide sets the shares of the evaluations to come.
func (r *run) divide() {
	even := float64(r.evaluations) < evenUntil*float64(r.set.Evaluations)
	open, rated, total := 0, 0, 0.0
	merit := make([]float64, len(r.islands))
	for i, l := range r.islands {
		switch {
		case l.done:
		case even || l.approaching():
			open++
		default:
			open++
			rated++
			merit[i] = l.merit()
			total += merit[i]
		}
	}
	least := leastOfEven / float64(open)
	more := float64(rated) * (1/float64(open) - least) // what merit divides
	for i, l := range r.islands {
		switch {
		case l.done:
			l.share = 0
		case even || l.approaching() || total == 0:
			l.share = 1 / float64(open)
		default:
			l.share = least + float64(more*(merit[i]/total))
		}
	}
}
