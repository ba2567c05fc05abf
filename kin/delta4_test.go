package kin

import (
	"math/rand/v2"
	"testing"
)

// Delta-4 moves its platform as delta does: the first three arms have the same angles and the same rows of J
// for any yaw, which its fourth motor gives. The two are built by the same dimensions.
func TestDeltaFourTranslatesAsDelta(t *testing.T) {
	three, four := FamilyNamed("delta"), FamilyNamed("delta-4")
	rng := rand.New(rand.NewPCG(4, 3))
	seen := 0
	for range 200 {
		a, b := make([]float64, len(three.Dimensions)), make([]float64, len(four.Dimensions))
		for i := range three.Dimensions {
			d := &three.Dimensions[i]
			a[i] = d.Low + rng.Float64()*(d.High-d.Low)
			if d.Optional {
				a[i] = d.Default
			}
		}
		for i := range four.Dimensions {
			d := &four.Dimensions[i]
			b[i] = d.Default
			if k := three.Index(d.Name); k >= 0 {
				b[i] = a[k]
			} else if !d.Optional {
				b[i] = d.Low
			}
		}
		for name, v := range map[string]float64{"shaft_min": 0.01, "shaft_stroke": 5, "shaft_swing": 1.5} {
			b[four.Index(name)] = v
		}
		setup := Setup{Length: 0.2, Diameter: 0.01}
		m3, m4 := three.Build(a, &setup), four.Build(b, &setup)
		c := Coords{0.05 * rng.NormFloat64(), 0.05 * rng.NormFloat64(), 0.03 * rng.NormFloat64()}
		p3 := NewPose(c)
		c[Yaw] = rng.Float64()
		p4 := NewPose(c)
		var s3, s4 State
		m3.Move(&p3, &s3)
		m4.Move(&p4, &s4)
		if s3.Fail != Reached || s4.Fail != Reached {
			if s3.Fail != s4.Fail && s4.Fail != Stopped {
				t.Fatalf("delta %v, delta-4 %v", s3.Fail, s4.Fail)
			}
			continue
		}
		seen++
		for i := range 3 {
			if d := s3.Q[i] - s4.Q[i]; d > 1e-12 || d < -1e-12 {
				t.Errorf("arm %d: %v and %v", i+1, s3.Q[i], s4.Q[i])
			}
			for k := range 3 {
				if d := s3.J[6*i+k] - s4.J[6*i+k]; d > 1e-9 || d < -1e-9 {
					t.Errorf("row %d: %v and %v", i+1, s3.J[6*i:6*i+3], s4.J[6*i:6*i+3])
				}
			}
		}
		if d := s4.Q[3] - c[Yaw]; d > 1e-12 || d < -1e-12 {
			t.Errorf("fourth motor at %v for a yaw of %v", s4.Q[3], c[Yaw])
		}
	}
	if seen < 20 {
		t.Errorf("%d postures compared", seen)
	}
}
