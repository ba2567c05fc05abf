package opt

import "math/rand"

// operator is one way to make children from a ranked population.
type operator struct {
	name string
	make func(b *breeder, op int) // appends one or two children to b.kids
}

// operators holds what breeds, in the order of the shares, then the origins
// that are not bred.
var operators = [...]operator{
	{OriginSBX, (*breeder).cross},
	{OriginDE2, func(b *breeder, op int) { b.trial(op, 0.2) }},
	{OriginDE9, func(b *breeder, op int) { b.trial(op, 0.9) }},
	{OriginReset, (*breeder).reset},
	{OriginLocal, (*breeder).local},
	{OriginSample, nil},
	{OriginPolish, nil},
}

const (
	bred         = 5 // operators that breed
	originSample = bred
	originPolish = bred + 1
)

func originIndex(name string) int {
	for i := range operators {
		if operators[i].name == name {
			return i
		}
	}
	return originSample
}

// breeder makes children for one space.
type breeder struct {
	dom     *domain
	space   int
	goals   int
	limits  int
	rng     *rand.Rand
	parents []*genome // best first
	kids    []*genome
	share   [bred]float64       // probability of each operator
	ops     int                 // of them are in use, the first ones
	seen    map[uint64]struct{} // fingerprints of all designs of the space

	pop      *population
	pool     pool
	model    linear
	weight   []float64 // scratch of local
	expected []float64
	corner   []float64
}

func (b *breeder) blank(origin int) *genome {
	g := newGenome(b.dom, b.space, b.goals, b.limits)
	g.origin = origin
	return g
}

// begin gives the operators even shares; the last one is for few variables only.
func (b *breeder) begin() {
	if b.ops = bred; !b.modelled() {
		b.ops--
	}
	for k := range b.ops {
		b.share[k] = 1 / float64(b.ops)
	}
}

// breed makes n children, none of them a design that was made before; fewer
// if the space seems to hold no other.
func (b *breeder) breed(n int) []*genome {
	b.kids = make([]*genome, 0, n+1)
	if b.modelled() {
		b.pool.fill(b.parents)
	}
	for tries := 0; len(b.kids) < n && tries < 4*n; tries++ {
		u, op := b.rng.Float64(), 0
		for op < b.ops-1 && u >= b.share[op] {
			u -= b.share[op]
			op++
		}
		at := len(b.kids)
		operators[op].make(b, op)
		made := b.kids[at:]
		b.kids = b.kids[:at]
		for _, g := range made {
			if b.fresh(g) {
				b.kids = append(b.kids, g)
			}
		}
	}
	for _, g := range b.kids[min(n, len(b.kids)):] { // second twin of a crossover
		delete(b.seen, fingerprint(g.x))
	}
	return b.kids[:min(n, len(b.kids))]
}

// fresh marks g as made. A design that was made before is changed first, one
// random coordinate at a time, and in the end drawn anew.
func (b *breeder) fresh(g *genome) bool {
	const nudges, draws = 10, 50
	for try := range nudges + draws {
		h := fingerprint(g.x)
		if _, ok := b.seen[h]; !ok {
			b.seen[h] = struct{}{}
			return true
		}
		if len(b.dom.free) == 0 {
			return false
		}
		if try < nudges {
			b.dom.nudge(g.x, b.dom.free[b.rng.Intn(len(b.dom.free))], b.rng)
		} else {
			b.dom.random(g.x, b.rng)
			g.origin = originSample
		}
	}
	return false
}

// tournament returns the better of two random parents.
func (b *breeder) tournament() *genome {
	p, q := b.any(), b.any()
	if p.rank != q.rank {
		if p.rank < q.rank {
			return p
		}
		return q
	}
	if p.crowd >= q.crowd {
		return p
	}
	return q
}

func (b *breeder) any() *genome { return b.parents[b.rng.Intn(len(b.parents))] }

// rate is the probability that mutation changes a coordinate after another
// operator did its work: half a coordinate per child in the mean.
func (b *breeder) rate() float64 { return 0.5 / float64(max(1, len(b.dom.free))) }

// cross appends two children of crossover and mutation.
func (b *breeder) cross(op int) {
	p, q := b.blank(op), b.blank(op)
	copy(p.x, b.tournament().x)
	copy(q.x, b.tournament().x)
	if b.rng.Float64() < 0.9 {
		b.dom.crossover(p.x, q.x, b.rng)
	}
	b.dom.mutate(p.x, b.rate(), b.rng)
	b.dom.mutate(q.x, b.rate(), b.rng)
	b.kids = append(b.kids, p, q)
}

// trial appends a child of differential evolution. With few coordinates the
// base is another parent, with most of them the one that the trial varies.
func (b *breeder) trial(op int, rate float64) {
	g := b.blank(op)
	x := b.tournament()
	base := x
	if rate < 0.5 {
		base = b.tournament()
	}
	f := 0.3 + 0.6*b.rng.Float64()
	b.dom.differ(g.x, x.x, base.x, b.any().x, b.any().x, f, rate, b.rng)
	b.dom.mutate(g.x, b.rate(), b.rng)
	b.kids = append(b.kids, g)
}

// reset appends a parent with one coordinate drawn anew. It keeps fronts
// apart alive that no small step connects.
func (b *breeder) reset(op int) {
	g := b.blank(op)
	copy(g.x, b.tournament().x)
	if n := len(b.dom.free); n > 0 {
		b.dom.redraw(g.x, b.dom.free[b.rng.Intn(n)], b.rng)
	}
	b.dom.mutate(g.x, b.rate(), b.rng)
	b.kids = append(b.kids, g)
}

// credit moves the operators' shares towards the share of their children that
// survived, none below a tenth (adaptive operator choice: Thierens 2005).
func (b *breeder) credit(kids, alive []*genome) {
	const least, speed = 0.1, 0.1
	var made, lived [bred]float64
	for _, g := range kids {
		if g.origin < bred {
			made[g.origin]++
		}
	}
	for _, g := range alive {
		if g.young && g.origin < bred {
			lived[g.origin]++
		}
	}
	var merit [bred]float64
	total := 0.0
	for k := range b.ops {
		merit[k] = (lived[k] + 0.5) / (made[k] + 1)
		total += merit[k]
	}
	sum := 0.0
	for k := range b.ops {
		want := least + float64((1-float64(b.ops)*least)*merit[k]/total)
		b.share[k] += float64(speed * (want - b.share[k]))
		sum += b.share[k]
	}
	for k := range b.share {
		b.share[k] /= sum
	}
}
