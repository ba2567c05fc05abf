package opt

import "slices"

// How spaces share the budget. Each starts with an even share. Once a quarter
// of the budget is spent, shares follow merit: how many of a space's latest
// evaluations improved the front when they came, or nearly did. Nearly is a
// tenth of the front's range in every goal at the start and falls to nothing
// at the end: a space that only lags behind an equal would be starved for
// good without it. A space without a feasible design keeps its even share as
// long as its least violation falls. No space falls below a tenth of an even
// share, so that one that finds its feet late is noticed; one without another
// design to try hands its share on. (The idea is that of adaptive operator
// choice, Thierens 2005; the constants were found on pairs of equal and of
// shifted known problems.)
//
// Decisions fall at generation barriers only, from designs counted in a fixed
// order, so they do not depend on the workers. A space breeds whole
// generations: the one with the largest share breeds every time, the others
// when enough has gathered.
const (
	evenUntil   = 0.25 // share of the budget
	leastOfEven = 0.1
	nearlyStart = 0.1  // of the front's range
	memory      = 200  // evaluations of a space that its merit remembers
	notable     = 0.99 // of the least violation: what counts as less
)

// standing is what a space's share is decided by.
type standing struct {
	merit    float64 // share of the latest evaluations that improved the front, or nearly did
	judged   int     // evaluations that it was taken from
	feasible bool    // a feasible design was met
	least    float64 // violation, when it last fell notably
	since    int     // evaluations since then
}

// approaching reports that the space has no feasible design, but comes nearer.
func (s *standing) approaching() bool { return !s.feasible && s.since < memory }

// take judges an evaluated design that improves the front, or nearly does, or
// does not.
func (s *standing) take(g *genome, improves bool) {
	v := 0.0
	if improves {
		v = 1
	}
	s.judged++
	s.merit += (v - s.merit) / float64(min(s.judged, memory))
	s.feasible = s.feasible || g.feasible()
	if s.since++; s.judged == 1 || g.violation < float64(notable*s.least) {
		s.least, s.since = g.violation, 0
	}
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
	improves := g.feasible()
	if improves {
		p := slices.Clone(g.goals)
		for k := range slack {
			p[k] -= slack[k]
		}
		improves = !r.archive.beats(p)
	}
	r.islands[g.space].take(g, improves)
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
		l.budget = l.used + l.turn + int(l.share*float64(r.left))
	}
}

// divide sets the shares of the evaluations to come.
func (r *run) divide() {
	open, rated, merit := 0, 0, 0.0
	even := float64(r.evaluations) < evenUntil*float64(r.set.Evaluations)
	for _, l := range r.islands {
		switch {
		case l.done:
		case even || l.approaching():
			open++
		default:
			open++
			rated++
			merit += l.merit
		}
	}
	least := leastOfEven / float64(open)
	more := float64(rated) * (1/float64(open) - least) // what merit divides
	for _, l := range r.islands {
		switch {
		case l.done:
			l.share = 0
		case even || l.approaching() || merit == 0:
			l.share = 1 / float64(open)
		default:
			l.share = least + float64(more*(l.merit/merit))
		}
	}
}
