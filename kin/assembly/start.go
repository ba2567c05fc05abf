package assembly

import "math/rand/v2"

// sixLegPaths is the number of solutions of a general six-legged platform
// (M. Raghavan 1993, ASME J. Mech. Des. 115:277; F. Ronga and T. Vust 1995; both from memory).
const sixLegPaths = 40

// startSystem is a generic platform and all its solutions, for a seed above 0 another one.
//
// The parameters and solutions for seed 0 are data (start_generated.go); those of
// another seed are random, and their solutions are the ends of the paths that lead there.
func startSystem(seed uint64) (*legs, []end) {
	base := new(legs)
	for i := range base {
		l := &startLegs[i]
		base[i] = leg{less: complexVec(l[0:3]), sum: complexVec(l[3:6]), square: l[6]}
	}
	points := make([]end, sixLegPaths)
	k := newTracker(&soma{from: base, to: base, gamma: 1})
	for i := range points {
		points[i].x = startPoints[i]
		if k.settle(&points[i].x) {
			points[i].outcome = regular
		}
	}
	if seed == 0 {
		return base, points
	}
	rng := rand.New(rand.NewPCG(seed, 1))
	other := randomLegs(rng)
	return other, runAll(&soma{from: base, to: other, gamma: 1}, points)
}

// randomLegs are parameters without any relation.
func randomLegs(rng *rand.Rand) *legs {
	z := func() complex128 { return complex(rng.NormFloat64(), rng.NormFloat64()) }
	out := new(legs)
	for i := range out {
		for k := range 3 {
			out[i].less[k], out[i].sum[k] = z(), z()
		}
		out[i].square = z()
	}
	return out
}
