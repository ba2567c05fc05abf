package opt

import (
	"math"
	"slices"
)

// mostModelled is the largest number of real variables for which models are
// made: with more, the designs that it takes to fit one lie too far apart.
const mostModelled = 8

// strides is the number of steps that a model judges for each child.
const strides = 16

// mostByVolume is the largest number of goals for which expected goals are
// rated by hypervolume; beyond, that takes too long to do for every step.
const mostByVolume = 3

// modelled tells whether the space has children made by models.
func (b *breeder) modelled() bool { return len(b.dom.real) > 0 && len(b.dom.real) <= mostModelled }

// local appends a child that a linear model about a parent expects most of: of
// steps from there, each the difference of two designs near it, the one that breaks the
// limits least, and of those that break none the one that is worth most.
func (b *breeder) local(op int) {
	x := b.tournament()
	l := &b.model
	if !l.fit(&b.pool, x) {
		b.trial(op, 0.9)
		return
	}
	g := b.blank(op)
	copy(g.x, x.x)
	b.wish()
	least, most := math.Inf(1), math.Inf(-1)
	for range strides {
		step := b.stride(l)
		v := l.violation(x, step)
		if v > least {
			continue
		}
		worth := 0.0
		if x.feasible() {
			b.expected = l.goals(b.expected, x, step)
			worth = b.worth(x.goals, b.expected)
		}
		if v == least && worth <= most {
			continue
		}
		least, most = v, worth
		for c, i := range b.dom.real {
			if g.x[i] = x.x[i]; step[c] != 0 {
				g.x[i] = b.dom.at(i, l.centre[c]+step[c])
			}
		}
	}
	b.kids = append(b.kids, g)
}

// stride draws a step, cut where it would leave the space.
func (b *breeder) stride(l *linear) []float64 {
	n := l.n
	f := 0.3 + 0.7*b.rng.Float64()
	i, j := b.rng.Intn(len(l.near)), b.rng.Intn(len(l.near)-1)
	if j >= i {
		j++
	}
	p, q := l.pool.x[n*l.near[i]:], l.pool.x[n*l.near[j]:]
	for c, at := range l.centre {
		l.step[c] = min(max(at+float64(f*(p[c]-q[c])), 0), 1) - at
	}
	return l.step
}

// wish draws what worth goes by where it does not go by hypervolume: a weight
// per goal.
func (b *breeder) wish() {
	if b.goals <= mostByVolume {
		return
	}
	b.weight = slices.Grow(b.weight[:0], b.goals)[:b.goals]
	for k := range b.weight {
		b.weight[k] = b.rng.Float64()
		if span := b.pop.high[k] - b.pop.low[k]; span > 0 {
			b.weight[k] /= span
		}
	}
}

// worth rates expected goals: by the hypervolume that they add to the
// population's, or, with many goals, by how much better than the parent they
// are, least and in all.
func (b *breeder) worth(parent, goals []float64) float64 {
	if b.goals <= mostByVolume {
		b.corner = append(b.corner[:0], b.pop.share.ref...)
		return b.pop.share.gain(goals, -1, b.corner)
	}
	least, sum := math.Inf(1), 0.0
	for k, v := range goals {
		t := float64(b.weight[k] * (parent[k] - v))
		least = min(least, t)
		sum += t
	}
	return least + sum
}
