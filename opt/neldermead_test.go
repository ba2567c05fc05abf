package opt

import (
	"context"
	"math"
	"testing"
)

// Classical test functions and starts: Rosenbrock (1960); Powell's singular
// function and Fletcher and Powell's helical valley as in More, Garbow,
// Hillstrom (1981); minimum 0 each. Values at the start: 24.2, 215, 2500. For
// comparison, scipy's Nelder-Mead needs 249, 1190 and 394 evaluations.
func TestNelderMeadOnClassics(t *testing.T) {
	for _, c := range []struct {
		name      string
		f         func(x []float64) float64
		x0        []float64
		f0        float64
		low, high float64
	}{
		{"Rosenbrock", func(x []float64) float64 {
			a, b := x[1]-x[0]*x[0], 1-x[0]
			return 100*a*a + b*b
		}, []float64{-1.2, 1}, 24.2, -5, 5},
		{"Powell singular", func(x []float64) float64 {
			a, b, c, d := x[0]+10*x[1], x[2]-x[3], x[1]-2*x[2], x[0]-x[3]
			return a*a + 5*b*b + c*c*c*c + 10*d*d*d*d
		}, []float64{3, -1, 0, 1}, 215, -5, 5},
		{"helical valley", func(x []float64) float64 {
			theta := math.Atan2(x[1], x[0]) / (2 * math.Pi)
			a, b := x[2]-10*theta, math.Hypot(x[0], x[1])-1
			return 100*(a*a+b*b) + x[2]*x[2]
		}, []float64{-1, 0, 0}, 2500, -12, 12},
	} {
		if f := c.f(c.x0); math.Abs(f-c.f0) > 1e-12*c.f0 {
			t.Errorf("%s: %v at the start, want %v", c.name, f, c.f0)
		}
		n := len(c.x0)
		low, high := make([]float64, n), make([]float64, n)
		for k := range low {
			low[k], high[k] = c.low, c.high
		}
		calls := 0
		x, f := nelderMead(context.Background(), func(x []float64) float64 { calls++; return c.f(x) }, low, high, c.x0, c.f0, 2000)
		if f > 1e-10 || calls > 2000 || c.f(x) != f {
			t.Errorf("%s: %g at %v after %d evaluations, want 1e-10 within 2000", c.name, f, x, calls)
		}
	}
}

// The least point of a bowl whose middle is outside the box is the nearest
// point of the box.
func TestNelderMeadStaysInTheBox(t *testing.T) {
	middle := []float64{2, 0.3, -3}
	low, high := []float64{-1, 0, -1}, []float64{1, 1, 4}
	for _, x0 := range [][]float64{{0, 0.5, 1}, {1, 0, -1}, {-1, 1, 4}} {
		x, f := nelderMead(context.Background(), func(x []float64) float64 {
			s := 0.0
			for k, v := range x {
				if v < low[k] || v > high[k] {
					t.Fatalf("asked outside the box: %v", x)
				}
				s += (v - middle[k]) * (v - middle[k])
			}
			return s
		}, low, high, x0, math.Inf(1), 600)
		if math.Abs(f-5) > 1e-6 {
			t.Errorf("from %v: %v at %v, want 5 at [1 0.3 -1]", x0, f, x)
		}
	}
}

func TestNelderMeadBudgetNaNAndCancel(t *testing.T) {
	for _, budget := range []int{4, 17, 50} {
		calls := 0
		nelderMead(context.Background(), func(x []float64) float64 { calls++; return x[0]*x[0] + x[1] }, []float64{-1, -1}, []float64{1, 1}, []float64{0.5, 0.5}, 0.75, budget)
		if calls > budget {
			t.Errorf("%d evaluations of %d", calls, budget)
		}
	}
	// Half of the plane gives NaN; the minimum of the rest is at its rim.
	_, f := nelderMead(context.Background(), func(x []float64) float64 {
		if x[0] < 0.2 {
			return math.NaN()
		}
		return x[0]*x[0] + x[1]*x[1]
	}, []float64{-1, -1}, []float64{1, 1}, []float64{0.9, 0.9}, 1.62, 400)
	if math.Abs(f-0.04) > 1e-3 {
		t.Errorf("with NaN beside: %v, want 0.04", f)
	}
	ctx, stop := context.WithCancel(context.Background())
	calls := 0
	nelderMead(ctx, func(x []float64) float64 {
		if calls++; calls == 10 {
			stop()
		}
		return x[0] * x[0]
	}, []float64{-1}, []float64{1}, []float64{0.5}, 0.25, 1000)
	if calls > 10 {
		t.Errorf("%d evaluations after the context ended at 10", calls)
	}
}

// The achievement function is less at every point that beats another, and
// zero where the goals meet the target.
func TestAchievement(t *testing.T) {
	a := aim{target: []float64{1, 2, 3}, weight: []float64{1, 0.5, 2}}
	if v := a.value([]float64{1, 2, 3}); v != 0 {
		t.Errorf("at the target %v", v)
	}
	if v := a.value([]float64{2, 2, 3}); math.Abs(v-1.001) > 1e-15 { // max(1, 0, 0) + 0.001 (1 + 0 + 0)
		t.Errorf("off by one: %v, want 1.001", v)
	}
	if a.value([]float64{2, 2, 3}) <= a.value([]float64{2, 1.9, 3}) {
		t.Error("a better point is not rated better")
	}
}
