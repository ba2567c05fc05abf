package kin_test

import (
	"math/rand/v2"
	"testing"

	"legwright/kin"
)

// seeded gives the same numbers on every run.
func seeded(seed uint64) *rand.Rand { return rand.New(rand.NewPCG(seed, 20240611)) }

// between is a number in [low, high].
func between(rng *rand.Rand, low, high float64) float64 { return low + (high-low)*rng.Float64() }

// ball is a vector with each component in [-r, r].
func ball(rng *rand.Rand, r float64) kin.Vec {
	return kin.Vec{X: between(rng, -r, r), Y: between(rng, -r, r), Z: between(rng, -r, r)}
}

// midRange is the design in the middle of the family's usual ranges.
func midRange(f *kin.Family) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = (dim.Low + dim.High) / 2
	}
	return d
}

// sound is a regular design inside the family's usual ranges: three tenths up
// each of them. (In the middle 6-UPS has similar hexagons, which are singular everywhere: C5.)
func sound(f *kin.Family) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = dim.Low + 0.3*(dim.High-dim.Low)
	}
	return d
}

// randomDesign is a design within the family's usual ranges.
func randomDesign(rng *rand.Rand, f *kin.Family) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = between(rng, dim.Low, dim.High)
	}
	return d
}

// randomCoords are coordinates within `part` times the family's starter box.
func randomCoords(rng *rand.Rand, f *kin.Family, part float64) kin.Coords {
	var c kin.Coords
	for _, q := range f.Freedoms {
		c[q] = part * between(rng, -f.Starter.Box[q], f.Starter.Box[q])
	}
	return c
}

// offCentre is a setup with nothing at zero and nothing symmetric.
func offCentre() *kin.Setup {
	return &kin.Setup{
		Tool:     kin.Vec{X: 0.02, Y: -0.03, Z: 0.1},
		Diameter: 0.05,
		Length:   0.3,
	}
}

// outright gives the joints that place the legs of a built machine.
func outright(f *kin.Frame) *kin.Joints {
	return &kin.Joints{
		Base:     append([]kin.Vec(nil), f.Base...),
		Platform: append([]kin.Vec(nil), f.Platform...),
		Home:     f.Home,
		HomeRot:  f.HomeRot,
	}
}

// eachMachine runs check on the mid-range design and on n random designs of
// every family, each at a random pose within 1.5 times the starter box.
func eachMachine(t *testing.T, n int, check func(t *testing.T, rng *rand.Rand, f *kin.Family, m kin.Machine, p kin.Pose)) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(1)
			check(t, rng, f, f.Build(midRange(f), offCentre()), kin.NewPose(randomCoords(rng, f, 1)))
			for range n {
				m := f.Build(randomDesign(rng, f), offCentre())
				check(t, rng, f, m, kin.NewPose(randomCoords(rng, f, 1.5)))
				if t.Failed() {
					return
				}
			}
		})
	}
}
