package opt

// SpaceOutcome is what a Search found in one space.
type SpaceOutcome struct {
	Evaluations int
	Feasible    int // feasible designs among the evaluated
	Front       int // designs of Outcome.Front
	// Best has the best feasible design in each goal, on the front or not, of
	// equals the first; it is empty if no design was feasible.
	Best []Design
	// Near holds the infeasible designs of least violation, best first, at
	// most 10; failed ones are left out.
	Near []Design
}

const nearPerSpace = 10

// books are kept of each space.
type books struct {
	evaluations, feasible int
	best                  []miss // by the value of the goal
	near                  []miss
}

// add takes an evaluated design into the books.
func (b *books) add(g *genome, order int) {
	b.evaluations++
	if !g.feasible() {
		if g.fault == "" {
			b.near = keep(b.near, miss{g.violation, g, order}, nearPerSpace)
		}
		return
	}
	b.feasible++
	if b.best == nil {
		b.best = make([]miss, len(g.goals))
	}
	for k, v := range g.goals {
		if m := &b.best[k]; m.g == nil || v < m.by {
			*m = miss{v, g, order}
		}
	}
}

// spaces sums up what became of each space.
func (r *run) spaces(front []Design) []SpaceOutcome {
	out := make([]SpaceOutcome, len(r.islands))
	for i, l := range r.islands {
		b := &l.books
		out[i] = SpaceOutcome{Evaluations: b.evaluations, Feasible: b.feasible, Best: designs(b.best), Near: designs(b.near)}
	}
	for i := range front {
		out[front[i].Space].Front++
	}
	return out
}
