package opt

import (
	"errors"

	"github.com/MaxHalford/eaopt"
)

// island is the search within one space.
type island struct {
	run     *run
	index   int
	dom     *domain
	pop     *population
	breed   breeder
	sample  []*genome // the first designs, as eaopt gets them
	first   []*genome // those of them that were evaluated
	pending *batch    // children being evaluated
	fresh   []*genome // evaluated, not yet merged
	guests  []*genome // polished designs that want to join
	ranked  []*genome
	done    bool // the space holds no other design

	turn   int     // children to breed in the next generation
	used   int     // evaluations given out
	budget int     // what they are expected to come to in the end
	share  float64 // of the evaluations to come
	due    float64 // generations owed
	books  books
	standing
}

func newIsland(r *run, index int) *island {
	p := r.problem
	l := &island{pending: new(batch), run: r, index: index, dom: newDomain(&p.Spaces[index]), pop: newPopulation(p.Goals)}
	l.budget = r.set.Evaluations / len(p.Spaces)
	rng := stream(r.set.Seed, streamSample, index, 0)
	l.breed = breeder{dom: l.dom, space: index, goals: p.Goals, limits: p.Limits, rng: rng, seen: make(map[uint64]struct{}, min(l.budget, 1<<16)),
		pop: l.pop, pool: pool{dom: l.dom}}
	l.breed.begin()
	xs := make([][]float64, r.start)
	for i := range xs {
		g := l.breed.blank(originSample)
		g.place = float64(i)
		l.sample = append(l.sample, g)
		xs[i] = g.x
	}
	l.dom.latin(xs, rng)
	for i, d := range r.set.startsOf(index) {
		if i < len(xs) {
			l.dom.fit(xs[i], d)
		}
	}
	for _, g := range l.sample {
		if l.breed.fresh(g) {
			l.pending.designs = append(l.pending.designs, g)
		}
	}
	l.used = len(l.pending.designs)
	r.left -= l.used
	return l
}

// spent reports that nothing is left to make or to wait for.
func (l *island) spent() bool {
	return len(l.pending.designs) == 0 && len(l.fresh) == 0 && l.turn == 0
}

// collect takes the evaluated designs of a batch and empties it.
func (l *island) collect(b *batch) (kids []*genome) {
	for _, g := range b.designs {
		if g.done {
			kids = append(kids, g)
		}
	}
	l.fresh = append(l.fresh, kids...)
	for _, g := range kids {
		l.breed.pool.take(g)
	}
	b.designs = nil
	return kids
}

// model is the eaopt.Model of a run.
type model run

// Validate is called by eaopt once.
func (m *model) Validate() error {
	if len(m.islands) == 0 {
		return errors.New("opt: no space")
	}
	return nil
}

// Apply is one generation of one population; eaopt calls it side by side for
// all. Children are bred while those of the generation before are still being
// evaluated, so no worker waits for selection and selection for no worker.
func (m *model) Apply(pop *eaopt.Population) error {
	r := (*run)(m)
	if err := r.ctx.Err(); err != nil {
		return err
	}
	i := 0
	for pop != &r.ga.Populations[i] {
		i++
	}
	return r.islands[i].generation(pop)
}

// generation breeds, selects and hands the ordered population to eaopt.
func (l *island) generation(pop *eaopt.Population) error {
	r := l.run
	at := int(pop.Generations)
	l.breed.rng = stream(r.set.Seed, streamBreed, l.index, at)
	pop.RNG = l.breed.rng // eaopt names its clones from it
	if at == 0 {
		l.join(l.first)
		l.first = nil
	}
	next := new(batch)
	if l.turn > 0 {
		l.breed.parents = l.ranked
		next.designs = l.breed.breed(l.turn)
		l.used += len(next.designs)
		l.turn -= len(next.designs)
		l.done = len(next.designs) == 0
	}
	next.front = r.snapshot
	r.ev.submit(next)
	r.ev.finish(l.pending)
	kids := l.collect(l.pending)
	l.join(kids)
	l.pending = next
	l.publish(pop, at)
	return nil
}

// join selects among the population, newcomers and guests.
func (l *island) join(kids []*genome) {
	if len(kids)+len(l.guests) == 0 {
		return
	}
	for _, g := range kids {
		g.young = true
	}
	l.pop.ref = l.run.reference
	l.pop.selectBest(append(kids, l.guests...), l.size())
	l.guests = nil
	l.ranked = l.pop.ranked(l.ranked)
	l.breed.credit(kids, l.ranked)
	for _, g := range kids {
		g.young = false
	}
}

// size returns how many designs the population may hold now: it grows in step
// with the evaluations, small first to get to the front, large then to fill it.
func (l *island) size() int {
	r := l.run
	spent := float64(l.used) / float64(l.budget)
	return r.start + int(float64(l.grown()-r.start)*spent)
}

// publish gives eaopt the population in order. The fitness falls from
// generation to generation, so that eaopt's hall of fame follows, and differs
// between individuals, since its sort is unstable.
func (l *island) publish(pop *eaopt.Population, generation int) {
	ind := pop.Individuals[:0]
	for i, g := range l.ranked {
		place := float64(i)/float64(len(l.ranked)) - float64(generation+1)
		ind = append(ind, eaopt.Individual{Genome: g, Fitness: place, Evaluated: true})
	}
	pop.Individuals = ind
}
