package linalg

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// turned returns Q diag(l) Qᵀ with a random orthogonal Q as (xx, yy, zz, xy, xz,
// yz).
func turned(rng *rand.Rand, l [3]float64) (a [6]float64) {
	q := orthogonal(rng, 3)
	for place, ik := range [6][2]int{{0, 0}, {1, 1}, {2, 2}, {0, 1}, {0, 2}, {1, 2}} {
		for m, v := range l {
			a[place] += v * q[3*m+ik[0]] * q[3*m+ik[1]]
		}
	}
	return a
}

func TestSym3LargestAgainstGonum(t *testing.T) {
	rng := rand.New(rand.NewPCG(41, 42))
	spectra := [][3]float64{
		{1, 2, 3}, {0, 0, 1}, {1, 1, 1}, {1, 1, 0}, {2, 2, 1}, {1, 1 - 1e-9, 0.5}, {1, 1 - 1e-15, 0},
		{-1, -2, -3}, {-1, -1, -5}, {-1, 0, 1}, {0, 0, 0}, {1, 1, 1 - 1e-8}, {1 + 1e-7, 1, 1}, {1, 1e-12, 1e-12}, {-5, 1e-3, -2},
	}
	for _, l := range spectra {
		for range 50 {
			for _, f := range []float64{1, 1e-6, 1e6, 1e-200, 1e200} {
				a := turned(rng, l)
				var eig mat.EigenSym
				if !eig.Factorize(mat.NewSymDense(3, []float64{a[0], a[3], a[4], a[3], a[1], a[5], a[4], a[5], a[2]}), false) {
					t.Fatal("gonum EigenSym failed")
				}
				v := eig.Values(nil)
				norm := max(math.Abs(v[0]), math.Abs(v[2]))
				for k := range a {
					a[k] *= f
				}
				if got := Sym3Largest(&a) / f; math.Abs(got-v[2]) > 4e-15*norm {
					t.Errorf("spectrum %v times %g: %v, gonum %v", l, f, got, v[2])
				}
			}
		}
	}
	for _, l := range [][3]float64{{1, 2, 3}, {4, 4, 4}, {-1, -2, -3}} { // already diagonal
		a := [6]float64{l[0], l[1], l[2]}
		if got, want := Sym3Largest(&a), max(l[0], l[1], l[2]); relative(got, want) > 1e-15 {
			t.Errorf("diagonal %v: %v", l, got)
		}
	}
}

// Isotropic matrices of order two and three, as symmetric machines have them,
// and double singular values on either side.
func TestRatio2MultipleValues(t *testing.T) {
	rng := rand.New(rand.NewPCG(43, 44))
	for range 300 {
		for n := 2; n <= 3; n++ {
			for _, s := range [][6]float64{{1, 1, 1}, {1, 1, 0.3}, {1, 0.3, 0.3}, {1, 1, 1 - 1e-8}, {1, 1 - 1e-13, 0.01}} {
				a := withSingularValues(rng, n, s)
				lo := s[n-1]
				if got := math.Sqrt(Ratio2(n, &a)); relative(got, lo) > 1e-9 {
					t.Errorf("n %d: 1/κ = %v, want %v", n, got, lo)
				}
			}
		}
	}
}

// 1/κ of [1 t; 0 1] is (sqrt(4+t²)-t)² / 4.
func TestRatio2Shear(t *testing.T) {
	for _, s := range []float64{0, 0.1, 1, 10, 900} {
		a := [36]float64{1, s, 0, 1}
		r := 2 / (math.Sqrt(4+s*s) + s)
		if got := math.Sqrt(Ratio2(2, &a)); relative(got, r*r) > 1e-14 {
			t.Errorf("shear %v: 1/κ = %v, want %v", s, got, r*r)
		}
	}
}
