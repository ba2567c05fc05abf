package opt

import (
	"math/rand"

	"github.com/MaxHalford/eaopt"
)

// genome is the eaopt.Genome of the search. Once evaluated it never changes.
// eaopt's scalar fitness only carries the order of a population.
type genome struct {
	dom       *domain
	space     int
	x         []float64
	goals     []float64
	excess    []float64
	violation float64
	fault     string
	origin    int // index into operators, or one of the constants below
	done      bool
	recalled  bool // Result.Recalled

	rank   int       // 0 is the front; ahead of a larger one
	crowd  float64   // larger is better among equals in rank
	beaten bool      // by another that its population or the archive has met
	pooled int       // round of the pool that holds it
	unit   []float64 // real variables as pools hold them, once one does
	young  bool      // made by the generation that is being selected
	place  float64   // fitness in the first generation: eaopt's sort is unstable
}

func newGenome(dom *domain, space int, goals, limits int) *genome {
	n := len(dom.vars)
	end := n + goals + limits
	b := make([]float64, end, end+len(dom.real))
	return &genome{dom: dom, space: space, x: b[:n:n], goals: b[n : n+goals : n+goals], excess: b[n+goals : end : end], unit: b[end:]}
}

// Evaluate returns the place that the search gave the genome. The search
// evaluates whole batches itself before eaopt asks.
func (g *genome) Evaluate() (float64, error) { return g.place, nil }

// Mutate is polynomial mutation of one coordinate in the mean.
func (g *genome) Mutate(rng *rand.Rand) {
	g.dom.mutate(g.x, 1/float64(max(1, len(g.dom.free))), rng)
	g.done = false
}

// Crossover is simulated binary crossover with mate, in place.
func (g *genome) Crossover(mate eaopt.Genome, rng *rand.Rand) {
	m := mate.(*genome)
	g.dom.crossover(g.x, m.x, rng)
	g.done, m.done = false, false
}

// Clone copies the genome deeply.
func (g *genome) Clone() eaopt.Genome {
	c := *g
	n, m := len(g.x), len(g.goals)
	b := make([]float64, 0, n+m+len(g.excess))
	b = append(append(append(b, g.x...), g.goals...), g.excess...)
	c.x, c.goals, c.excess = b[:n:n], b[n:n+m:n+m], b[n+m:]
	return &c
}

// feasible reports that every limit holds.
func (g *genome) feasible() bool { return g.violation <= 0 }

// design copies the genome for the outcome.
func (g *genome) design(order int) Design {
	c := g.Clone().(*genome)
	return Design{
		Space: g.space, X: c.x, Goals: c.goals, Excess: c.excess, Violation: g.violation,
		Origin: operators[g.origin].name, Order: order, Fault: g.fault,
	}
}
