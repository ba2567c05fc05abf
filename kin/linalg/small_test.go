package linalg

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// smallMatrices are matrices of order n of every condition number that the adjugate serves, others, and some whose
// singular values lie close together.
func smallMatrices(rng *rand.Rand, n, count int) (out [][36]float64) {
	for range count {
		for _, kappa := range []float64{1.2, 3, 20, 300, 1e4, 1e6} {
			out = append(out, withKappa(rng, n, kappa))
		}
		d := math.Pow(10, -1-7*rng.Float64())
		for _, s := range [][6]float64{
			{1, 1 - d, 0.3, 0.1, 0.1}, {1, 0.3, 0.3 * (1 - d), 0.1, 0.1}, {1, 1 - d, 1 - d, 1 - d, 1 - d},
			{1, 1 - d/3, 1 - d/2, 1 - d, 1 - d}, {1, 1, 0.2, 0.2, 0.2},
		} {
			out = append(out, withSingularValues(rng, n, s))
		}
	}
	return out
}

func TestSmallAgainstGonum(t *testing.T) {
	rng := rand.New(rand.NewPCG(61, 62))
	for n := 1; n <= 5; n++ {
		for _, a := range smallMatrices(rng, n, 100) {
			s := Small{A: a}
			sign := s.Factor(n)
			m := dense(n, &a)
			if want := math.Copysign(1, mat.Det(m)); float64(sign) != want {
				t.Errorf("n %d: sign %d, gonum %v", n, sign, want)
			}
			v := gonumValues(t, n, &a)
			lo := v[n-1] / v[0]
			if got := math.Sqrt(s.Ratio2(math.Inf(1))); relative(got, lo) > 1e-9+1e-15/lo {
				t.Errorf("n %d: 1/κ = %v, gonum %v", n, got, lo)
			}
			if got, want := s.Ratio2(math.NaN()), Ratio2(n, &a); got != want {
				t.Errorf("n %d: Small.Ratio2 %v, Ratio2 %v", n, got, want)
			}
			var inv mat.Dense
			_ = inv.Inverse(m)
			size := mat.Norm(&inv, 2)
			for i, w := range inv.RawMatrix().Data {
				if math.Abs(s.X[i]-w) > 3e-13/lo*size {
					t.Errorf("n %d: x[%d] = %v, gonum %v", n, i, s.X[i], w)
				}
			}
		}
	}
}

// The coefficients are the elementary symmetric functions of the squared singular values (Vieta).
func TestSquaresOfKnownValues(t *testing.T) {
	rng := rand.New(rand.NewPCG(63, 64))
	for _, v := range [][6]float64{{3, 2, 1, 0.5}, {1, 0.1, 0.05, 0.02}} {
		a2, b2, c2, d2 := v[0]*v[0], v[1]*v[1], v[2]*v[2], v[3]*v[3]
		want := map[int][5]float64{
			3: {a2 * b2 * c2, a2*b2 + a2*c2 + b2*c2, a2 + b2 + c2, 1, 0},
			4: {a2 * b2 * c2 * d2, a2*b2*c2 + a2*b2*d2 + a2*c2*d2 + b2*c2*d2, a2*b2 + a2*c2 + a2*d2 + b2*c2 + b2*d2 + c2*d2, a2 + b2 + c2 + d2, 1},
		}
		for n, c := range want {
			for range 50 {
				a := withSingularValues(rng, n, v)
				var x [36]float64
				var p squares
				if _, ok := p.factor(n, &a, &x); !ok {
					t.Fatalf("n %d: values %v are not trusted", n, v)
				}
				for k := range c {
					if math.Abs(p.c[k]-c[k]) > 1e-12*c[k] {
						t.Errorf("n %d: c%d = %v, want %v", n, k, p.c[k], c[k])
					}
				}
			}
		}
	}
}

// The least ratio over a set is the same to the last bit with a running keep as without, whatever is close together in it;
// most ratios are then never found.
func TestSmallKeepGivesTheSameMinimum(t *testing.T) {
	rng := rand.New(rand.NewPCG(65, 66))
	for n := 2; n <= 5; n++ {
		early, total := 0, 0
		for range 200 {
			js := smallMatrices(rng, n, 3)
			rng.Shuffle(len(js), func(i, k int) { js[i], js[k] = js[k], js[i] })
			js = js[:2+rng.IntN(len(js)-2)]
			want, least := math.Inf(1), math.Inf(1)
			for i := range js {
				s := Small{A: js[i]}
				s.Factor(n)
				exact := s.Ratio2(math.Inf(1))
				got := s.Ratio2(least)
				if got != exact {
					early++
					if got <= least || got > exact*(1+1e-4) {
						t.Errorf("n %d: keep %v gives %v for the ratio %v", n, least, got, exact)
					}
				}
				total++
				want, least = min(want, exact), min(least, got)
			}
			if least != want {
				t.Errorf("n %d: least ratio %v, with keep %v", n, want, least)
			}
		}
		if fast := n == 3 || n == 4; fast != (early > total/2) {
			t.Errorf("n %d: %d of %d ratios returned early", n, early, total)
		}
	}
}

// Matrices that machines have, with exact zeros, need not the slow ways.
func TestSmallServesMachines(t *testing.T) {
	for _, c := range []struct {
		n int
		a [36]float64
	}{
		{3, [36]float64{1, 0, 0.2, 0, 1, 0.3, 0, 0, 2}},
		{4, [36]float64{2, 0, 1, 0, -1, 1.7, 1, 0, -1, -1.8, 1.1, 0, 0, 0, 0, 2.5}},
		{4, [36]float64{0, 1, 0, 0.1, 1, 0, 2, 0, -1, 0, 0.5, 0, 0, -1, 0, 2}},
	} {
		var p squares
		var x [36]float64
		if _, ok := p.factor(c.n, &c.a, &x); !ok {
			t.Errorf("%v: not trusted", c.a[:c.n*c.n])
		}
		if _, ok := p.extremes(math.Inf(1)); !ok {
			t.Errorf("%v: no ratio", c.a[:c.n*c.n])
		}
	}
}
