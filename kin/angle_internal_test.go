package kin

import (
	"math"
	"testing"
)

// The angle of a unit vector against math.Atan2 (its own error is below 1e-15),
// all round, next to the marks and half way between them, and small. 1e-15, and for small angles relative.
func TestAngle(t *testing.T) {
	angle := func(cos, sin float64) float64 {
		var out [6]float64
		angles(1, &[6]float64{cos}, &[6]float64{sin}, &out)
		return out[0]
	}
	check := func(a float64) {
		t.Helper()
		sin, cos := math.Sincos(a)
		if got, want := angle(cos, sin), math.Atan2(sin, cos); math.Abs(got-want) > 1e-15*math.Min(1, 2*math.Abs(want)) {
			t.Errorf("angle of %g rad = %.17g, want %.17g", a, got, want)
		}
	}
	for k := range 100001 {
		check(-math.Pi + 2*math.Pi*float64(k)/100000)
	}
	for k := -40; k <= 40; k++ {
		for _, off := range []float64{0, 1e-12, -1e-12, 0.5, 0.5 + 1e-12, 0.5 - 1e-12} {
			check(2 * math.Atan((float64(k)+off)/angleSteps))
		}
	}
	for _, a := range []float64{1e-3, 1e-8, 1e-150, 0} {
		check(a)
		check(-a)
	}
	for _, v := range [][2]float64{{math.NaN(), 0}, {1, math.NaN()}, {math.Inf(1), math.Inf(1)}, {-1, 0}, {math.NaN(), math.NaN()}} {
		if got, want := angle(v[0], v[1]), math.Atan2(v[1], v[0]); got != want && !(math.IsNaN(got) && math.IsNaN(want)) {
			t.Errorf("angle of %v = %g, want %g", v, got, want)
		}
	}
}
