package kin_test

import (
	"testing"

	"legwright/kin"
)

// poses are poses within the family's starter box, enough to keep a processor from learning them.
func poses(f *kin.Family) []kin.Pose {
	rng := seeded(9)
	out := make([]kin.Pose, 256)
	for k := range out {
		out[k] = kin.NewPose(randomCoords(rng, f, 1))
	}
	return out
}

func BenchmarkMove(b *testing.B) {
	for _, f := range kin.Families() {
		b.Run(f.Name, func(b *testing.B) {
			m, ps := f.Build(sound(f), offCentre()), poses(f)
			var s kin.State
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				m.Move(&ps[i%len(ps)], &s)
			}
		})
	}
}

func BenchmarkGap(b *testing.B) {
	for _, f := range kin.Families() {
		b.Run(f.Name, func(b *testing.B) {
			m, ps := f.Build(sound(f), offCentre()), poses(f)
			states := make([]kin.State, len(ps))
			for k := range ps {
				m.Move(&ps[k], &states[k])
			}
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				m.Gap(&states[i%len(states)])
			}
		})
	}
}

func BenchmarkLocate(b *testing.B) {
	for _, f := range kin.Families() {
		b.Run(f.Name, func(b *testing.B) {
			m, ps := f.Build(sound(f), offCentre()), poses(f)
			states := make([]kin.State, len(ps))
			for k := range ps {
				m.Move(&ps[k], &states[k])
			}
			steps := 0
			for i := 0; b.Loop(); i++ {
				p, ok := kin.Locate(m, states[i%len(states)].Q[:f.Legs], atHome())
				if !ok {
					b.Fatal("not located")
				}
				steps += p.Steps
			}
			b.ReportMetric(float64(steps)/float64(b.N), "steps/op")
		})
	}
}
