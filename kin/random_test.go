package kin_test

import (
	"math"
	"math/rand/v2"
	"slices"
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

// midRange is the design in the middle of the family's usual ranges, in its usual working mode.
func midRange(f *kin.Family) []float64 { return upRanges(f, 0.5) }

// sound is a regular design inside the family's usual ranges: three tenths up
// each of them. (In the middle 6-UPS has similar hexagons, which are singular everywhere: C5.)
func sound(f *kin.Family) []float64 { return upRanges(f, 0.3) }

// upRanges is the design a part of the way up the family's usual ranges.
func upRanges(f *kin.Family, part float64) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = dim.Low + part*(dim.High-dim.Low)
		if dim.Unit == kin.Sign {
			d[i] = dim.Default
		}
	}
	return d
}

// randomDesign is a design within the family's usual ranges, in any working mode.
func randomDesign(rng *rand.Rand, f *kin.Family) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = between(rng, dim.Low, dim.High)
		if dim.Unit == kin.Sign {
			d[i] = float64(2*rng.IntN(2) - 1)
		}
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

// outright gives the joints that place the legs of the machine with the dimensions d.
func outright(f *kin.Family, d []float64, m kin.Machine) *kin.Joints {
	fr := m.Frame()
	j := &kin.Joints{
		Base:     slices.Clone(fr.Base),
		Platform: slices.Clone(fr.Platform),
		Home:     fr.Home,
		HomeRot:  fr.HomeRot,
		Values:   slices.Clone(d),
	}
	for i, along := range fr.Rails {
		j.Rails = append(j.Rails, kin.Rail{Point: fr.Base[i], Direction: along})
	}
	for i, dim := range f.Dimensions {
		if dim.Joints {
			j.Values[i] = math.NaN() // not to be read
		}
	}
	return j
}

// trial is a machine of the dimensions d, which has postures at home and at the pose p.
type trial struct {
	f *kin.Family
	d []float64
	m kin.Machine
	p kin.Pose
}

// postured draws designs and poses within `part` times the starter box until the
// machine has postures there and at home. Prismatic legs reach anything at the first try.
func postured(t *testing.T, rng *rand.Rand, f *kin.Family, setup *kin.Setup, part float64) trial {
	t.Helper()
	for range 1000 {
		d := randomDesign(rng, f)
		x := trial{f: f, d: d, m: f.Build(d, setup)}
		x.p = settled(x.m, randomCoords(rng, f, part))
		if reaches(x.m, atHome()) && reaches(x.m, x.p) {
			return x
		}
	}
	t.Fatalf("%s: none of 1000 designs has a posture", f.Name)
	return trial{}
}

// reaches tells whether the machine has a posture at the pose, not too close to a serial singularity.
func reaches(m kin.Machine, p kin.Pose) bool {
	var s kin.State
	m.Move(&p, &s)
	return s.Fail == kin.Reached && m.Serial(&s) > 0.2
}

// eachMachine runs check on the mid-range design and on n random designs of
// every family, each at a random pose within 1.5 times the starter box.
func eachMachine(t *testing.T, n int, check func(t *testing.T, rng *rand.Rand, x trial)) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(1)
			d := midRange(f)
			m := f.Build(d, offCentre())
			check(t, rng, trial{f: f, d: d, m: m, p: settled(m, randomCoords(rng, f, 1))})
			for range n {
				check(t, rng, postured(t, rng, f, offCentre(), 1.5))
				if t.Failed() {
					return
				}
			}
		})
	}
}

// settled is the pose that the platform takes for the coordinates.
func settled(m kin.Machine, c kin.Coords) kin.Pose {
	p := kin.NewPose(c)
	return kin.Settle(m, &p)
}

// prismatic tells whether the machine's legs are prismatic.
func prismatic(m kin.Machine) bool { return m.Frame().Rods == nil }
