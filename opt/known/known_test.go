package known

import (
	"math"
	"testing"
)

// Values: computed from the definitions apart from this program, in Python;
// 14 digits.
func TestValues(t *testing.T) {
	x5 := []float64{0.3, 0.2, 0.7, 0.1, 0.9}
	x7 := []float64{0.3, 0.6, 0.5, 0.1, 0.8, 0.4, 0.55}
	for _, c := range []struct {
		p    Problem
		x    []float64
		want []float64
	}{
		{ZDT1(5), x5, []float64{0.3, 4.0170254374591}},
		{ZDT2(5), x5, []float64{0.3, 5.2579383886256}},
		{ZDT3(5), x5, []float64{0.3, 4.0170254374591}},
		{ZDT6(5), x5, []float64{0.98757893788823, 8.3565128119848}},
		{ZDT4(5), []float64{0.3, -1.5, 0.25, 2, -4}, []float64{0.3, 39.707815547791}},
		{DTLZ1(3, 5), x7, []float64{20.4525, 13.635, 79.5375}},
		{DTLZ2(3, 5), x7, []float64{0.66119712445055, 0.91005976796127, 0.57316300592118}},
	} {
		f := make([]float64, c.p.Goals)
		c.p.Evaluate(c.x, f)
		for k, v := range f {
			if math.Abs(v-c.want[k]) > 1e-12*math.Max(1, math.Abs(v)) {
				t.Errorf("%s: goal %d is %.15g, want %.15g", c.p.Name, k, v, c.want[k])
			}
		}
	}
}

// The fronts of UF1 and DTLZ7 have closed forms: UF1 with every link met lies
// on f2 = 1 - sqrt(f1); DTLZ7 with its distance variables at 0 has
// f3 = 6 - sum f (1 + sin 3 pi f).
func TestFrontsOfTheOthers(t *testing.T) {
	p := UF1(30)
	x, f := make([]float64, 30), make([]float64, 2)
	for i := range 11 {
		x[0] = float64(i) / 10
		for j := 2; j <= 30; j++ {
			x[j-1] = math.Sin(6*math.Pi*x[0] + float64(j)*math.Pi/30)
		}
		p.Evaluate(x, f)
		if math.Abs(f[0]-x[0]) > 1e-14 || math.Abs(f[1]-(1-math.Sqrt(x[0]))) > 1e-14 {
			t.Errorf("UF1 at %v: %v", x[0], f)
		}
	}
	p = DTLZ7(3, 20)
	x, f = make([]float64, 22), make([]float64, 3)
	for i := range 11 {
		x[0], x[1] = float64(i)/10, 1-float64(i)/20
		p.Evaluate(x, f)
		want := 6.0
		for _, v := range x[:2] {
			want -= v * (1 + math.Sin(3*math.Pi*v))
		}
		if f[0] != x[0] || f[1] != x[1] || math.Abs(f[2]-want) > 1e-14 {
			t.Errorf("DTLZ7 at %v: %v, want %v", x[:2], f, want)
		}
	}
}

func TestAllInsideTheirBounds(t *testing.T) {
	for _, p := range All() {
		f := make([]float64, p.Goals)
		for _, at := range []float64{0, 0.37, 1} {
			x := make([]float64, len(p.Low))
			for i := range x {
				x[i] = p.Low[i] + at*(p.High[i]-p.Low[i])
			}
			p.Evaluate(x, f)
			for k, v := range f {
				if math.IsNaN(v) || math.IsInf(v, 0) {
					t.Errorf("%s at %v of the box: goal %d is %v", p.Name, at, k, v)
				}
			}
		}
	}
}
