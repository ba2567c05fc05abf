package opt

import (
	"math"
	"math/rand"
)

// domain is a Space made ready for sampling and variation.
type domain struct {
	vars      []Var
	low, high []float64
	free      []int // variables that can move
	real      []int // those of them that are Real
	discrete  []int // and those that are not
}

func newDomain(s *Space) *domain {
	d := &domain{vars: s.Vars}
	for i := range s.Vars {
		v := &s.Vars[i]
		low, high := v.bounds()
		d.low, d.high = append(d.low, low), append(d.high, high)
		if v.free() {
			d.free = append(d.free, i)
			if v.Kind == Real {
				d.real = append(d.real, i)
			} else {
				d.discrete = append(d.discrete, i)
			}
		}
	}
	return d
}

// at maps u in [0, 1) onto variable i.
func (d *domain) at(i int, u float64) float64 {
	if v := &d.vars[i]; v.Kind != Real {
		return min(math.Floor(u*float64(v.Levels)), d.high[i])
	}
	return min(d.low[i]+float64(u*(d.high[i]-d.low[i])), d.high[i])
}

// random fills x uniformly.
func (d *domain) random(x []float64, rng *rand.Rand) {
	for i := range x {
		x[i] = d.at(i, rng.Float64())
	}
}

// latin fills xs with a Latin hypercube: each variable has one value in each
// of len(xs) equal slices of its range (McKay, Beckman, Conover 1979).
func (d *domain) latin(xs [][]float64, rng *rand.Rand) {
	n := len(xs)
	for i := range d.vars {
		for k, slice := range rng.Perm(n) {
			xs[k][i] = d.at(i, (float64(slice)+rng.Float64())/float64(n))
		}
	}
}

// settle rounds an Ordered variable to its nearest step; v is already inside
// the range.
func (d *domain) settle(i int, v float64) float64 {
	if d.vars[i].Kind == Ordered {
		v = math.Round(v)
	}
	return min(max(v, d.low[i]), d.high[i])
}

// fingerprint hashes the bits of x (FNV-1a over 64-bit words, then mixed).
func fingerprint(x []float64) uint64 {
	h := uint64(14695981039346656037)
	for _, v := range x {
		h = (h ^ math.Float64bits(v+0)) * 1099511628211
		h ^= h >> 29
	}
	return h
}
