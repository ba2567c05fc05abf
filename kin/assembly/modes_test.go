package assembly

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"
)

// built is a machine of the family near the middle of its usual ranges, asymmetric where it may be.
func built(rng *rand.Rand, f *kin.Family) kin.Machine {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = dim.Low + uniform(rng, 0.25, 0.4)*(dim.High-dim.Low)
		if dim.Optional {
			d[i] = dim.Default
		}
	}
	return f.Build(d, &kin.Setup{Tool: kin.Vec{X: 0.01, Y: -0.02, Z: 0.05}, Length: 0.2})
}

// somePose is a pose within a part of the family's starter box.
func somePose(rng *rand.Rand, f *kin.Family, part float64) kin.Pose {
	var c kin.Coords
	for _, q := range f.Freedoms {
		c[q] = part * uniform(rng, -f.Starter.Box[q], f.Starter.Box[q])
	}
	return kin.NewPose(c)
}

// Of every family but the one without rods, the pose that gave the actuator coordinates is
// among the modes, the machine holds it, and it is the one reached from home.
func TestModesOfFamilies(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 21))
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			machines := 3
			if testing.Short() {
				machines = 1
			}
			for done, tries := 0, 0; done < machines; tries++ {
				if tries == 200 {
					t.Fatalf("only %d machines reach a pose", done)
				}
				m, p := built(rng, f), somePose(rng, f, 0.5)
				frame := m.Frame()
				var s kin.State
				m.Move(&p, &s)
				home := kin.Pose{R: kin.Identity()}
				var h kin.State
				m.Move(&home, &h)
				if s.Fail != kin.Reached || h.Fail != kin.Reached || math.Abs(kin.Determinant(m, &h)) < 1e-9 {
					continue
				}
				done++
				q := s.Q[:f.Legs]
				ends := s.End[:f.Legs]
				if frame.Rods == nil || frame.Rails != nil {
					ends = nil
				}
				got, ok := Modes(frame, ends, q, 0)
				if f.Name == "level-arm" {
					if ok {
						t.Error("a family that has no rods is solved")
					}
					return
				}
				if !ok || got.Lost != 0 {
					t.Fatalf("solved %v, %d lost", ok, got.Lost)
				}
				p = kin.Settle(m, &p)
				at := -1
				for i := range got.Modes {
					mode := &got.Modes[i]
					o, r := m.Place(&p)
					if want := (Mode{Origin: o, Rot: r}); farthest(mode, &want) < 1e-7 {
						at = i
					}
					// The pose about home is the placement that the machine gives it.
					if frame.Tied {
						continue // holds for poses that the machine takes
					}
					pose := mode.Pose(frame)
					o, r = m.Place(&pose)
					if want := (Mode{Origin: o, Rot: r}); !(farthest(mode, &want) < 1e-12) {
						t.Errorf("mode %d as a pose is off by %g", i, farthest(mode, &want))
					}
				}
				if at < 0 {
					t.Errorf("the pose is none of %d modes", len(got.Modes))
					continue
				}
				if !Holds(m, &got.Modes[at], q) {
					t.Errorf("the machine does not hold mode %d", at)
				}
				if k := Reached(m, got.Modes, q); k != at && sameSign(m, &h, &s) {
					t.Errorf("mode %d is reached from home, want %d of %d", k, at, len(got.Modes))
				}
			}
		})
	}
}

// sameSign tells whether two postures are on one side of the singular ones.
func sameSign(m kin.Machine, a, b *kin.State) bool {
	return kin.Determinant(m, a)*kin.Determinant(m, b) > 0
}

// A crank machine is not guessed at.
func TestModesWantsEnds(t *testing.T) {
	m := built(rand.New(rand.NewPCG(1, 1)), kin.FamilyNamed("3-RRR"))
	if _, ok := Modes(m.Frame(), nil, []float64{0, 0, 0}, 0); ok {
		t.Error("solved without the crank ends")
	}
}
