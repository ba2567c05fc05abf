package linalg

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// The oracle of this file is gonum: an LAPACK-style SVD (bidiagonal QR), LU
// with partial pivoting for inverse and determinant.

func dense(n int, a *[36]float64) *mat.Dense {
	return mat.NewDense(n, n, append([]float64(nil), a[:n*n]...))
}

func gonumValues(t testing.TB, n int, a *[36]float64) []float64 {
	t.Helper()
	var svd mat.SVD
	if !svd.Factorize(dense(n, a), mat.SVDNone) {
		t.Fatal("gonum SVD failed")
	}
	return svd.Values(nil)
}

func relative(got, want float64) float64 { return math.Abs(got-want) / math.Abs(want) }

func TestSingularValuesAgainstGonum(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	for n := 1; n <= 6; n++ {
		for _, kappa := range []float64{1, 3, 1e2, 1e4, 1e6, 1e9} {
			for range 50 {
				a := withKappa(rng, n, kappa)
				want := gonumValues(t, n, &a)
				var got [6]float64
				SingularValues(n, &a, &got)
				lo, hi := Singular(n, &a)
				if lo != got[n-1] || hi != got[0] {
					t.Fatalf("n %d: Singular gives %v %v, SingularValues %v", n, lo, hi, got)
				}
				for k, w := range want {
					// Backward stable on both sides: absolute error in units of σmax.
					if math.Abs(got[k]-w) > 1e-14*want[0] {
						t.Errorf("n %d kappa %g: σ%d = %v, gonum %v", n, kappa, k, got[k], w)
					}
				}
				for k := n; k < 6; k++ {
					if got[k] != 0 {
						t.Errorf("n %d: place %d after the last value is %v", n, k, got[k])
					}
				}
			}
		}
	}
}

func TestInverseAgainstGonum(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	for n := 1; n <= 6; n++ {
		for _, kappa := range []float64{1, 3, 1e2, 1e4, 1e6, 1e9} {
			for range 50 {
				a := withKappa(rng, n, kappa)
				var x [36]float64
				sign := Inverse(n, &a, &x)
				m := dense(n, &a)
				if want := math.Copysign(1, mat.Det(m)); float64(sign) != want {
					t.Errorf("n %d kappa %g: sign %d, gonum %v", n, kappa, sign, want)
				}
				var inv mat.Dense
				_ = inv.Inverse(m) // reports ill conditioning, still fills inv
				size := mat.Norm(&inv, 2)
				for i, w := range inv.RawMatrix().Data {
					if math.Abs(x[i]-w) > 1e-14*kappa*size {
						t.Errorf("n %d kappa %g: x[%d] = %v, gonum %v", n, kappa, i, x[i], w)
					}
				}
			}
		}
	}
}

// 1/κ of the fast method against the SVD, on machines and on matrices of every
// condition number it promises to serve.
func TestRatio2SixAgainstGonum(t *testing.T) {
	check := func(name string, a [36]float64) {
		t.Helper()
		v := gonumValues(t, 6, &a)
		want := v[5] / v[0]
		got := math.Sqrt(Ratio2Six(&a, 2))
		// gonum's own error is a few rounding errors times κ.
		if relative(got, want) > 1e-9+1e-15/want {
			t.Errorf("%s: 1/κ = %v, gonum %v, relative error %.2g", name, got, want, relative(got, want))
		}
	}
	for _, j := range legMatrices(40, 25, 1.5) {
		check("legs", j)
	}
	rng := rand.New(rand.NewPCG(5, 6))
	for _, kappa := range []float64{1, 1.5, 3, 30, 300, 900, 1100, 3e3, 1e4, 1e5, 1e6} {
		for range 200 {
			check("random", withKappa(rng, 6, kappa))
		}
	}
}

func TestFactorAgainstGonum(t *testing.T) {
	var s Six
	for _, j := range legMatrices(40, 25, 1.5) {
		sign := s.Factor(&j)
		m := dense(6, &j)
		if want := math.Copysign(1, mat.Det(m)); float64(sign) != want {
			t.Errorf("sign %d, gonum %v", sign, want)
		}
		var inv mat.Dense
		_ = inv.Inverse(m)
		size := mat.Norm(&inv, 2)
		for i, w := range inv.RawMatrix().Data {
			if math.Abs(s.X[i]-w) > 1e-11*size {
				t.Errorf("x[%d] = %v, gonum %v", i, s.X[i], w)
			}
		}
	}
}
