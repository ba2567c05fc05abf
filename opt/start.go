package opt

import "math"

// Start is a design for a search to begin with.
type Start struct {
	Space int
	X     []float64
}

// startsOf returns the variables of the start designs of a space.
func (s *Settings) startsOf(space int) (xs [][]float64) {
	for i := range s.Start {
		if s.Start[i].Space == space {
			xs = append(xs, s.Start[i].X)
		}
	}
	return xs
}

// fit copies a design of the domain into dst, brought into range and onto the steps.
func (d *domain) fit(dst, x []float64) {
	for _, i := range d.free {
		if v := x[i]; v == v {
			dst[i] = d.settle(i, math.Max(d.low[i], math.Min(d.high[i], v)))
		}
	}
}
