package linalg

import (
	"math"
	"testing"
)

// hilbert returns the Hilbert matrix of order n, elements 1/(i+j-1).
func hilbert(n int) (a [36]float64) {
	for i := range n {
		for k := range n {
			a[n*i+k] = 1 / float64(i+k+1)
		}
	}
	return a
}

// Condition numbers of the Hilbert matrices, elements rounded to double, by
// mpmath eigsy with 50 digits. Rounded they stand in many books: 19.3, 524,
// 1.55e4, 4.77e5, 1.50e7 (Higham 2002, section 28.1).
func TestHilbertCondition(t *testing.T) {
	want := map[int]float64{
		1: 1, 2: 19.281470067903976, 3: 524.05677758606226, 4: 15513.738738930456,
		5: 476607.2502419878, 6: 14951058.641297266,
	}
	for n, kappa := range want {
		a := hilbert(n)
		tol := 1e-11
		if n == 6 {
			tol = 1e-8 // beyond the promised 1e6
		}
		if got := 1 / math.Sqrt(Ratio2(n, &a)); relative(got, kappa) > tol {
			t.Errorf("n %d: Ratio2 gives κ = %.15g, want %.15g", n, got, kappa)
		}
		lo, hi := Singular(n, &a)
		if got := hi / lo; relative(got, kappa) > tol {
			t.Errorf("n %d: Singular gives κ = %.15g, want %.15g", n, got, kappa)
		}
	}
}

// The six singular values, same source.
func TestHilbertSingularValues(t *testing.T) {
	want := [6]float64{
		1.6188998589243391, 0.24236087057520955, 0.016321521319875826,
		0.00061574835418264524, 1.2570757122637029e-5, 1.082799484481101e-7,
	}
	a := hilbert(6)
	var got [6]float64
	SingularValues(6, &a, &got)
	for k, w := range want {
		if math.Abs(got[k]-w) > 1e-15 {
			t.Errorf("σ%d = %.17g, want %.17g", k, got[k], w)
		}
	}
}

// The inverse of a Hilbert matrix has the integer elements
// (-1)^(i+j) (i+j-1) C(n+i-1, n-j) C(n+j-1, n-i) C(i+j-2, i-1)² (Choi 1983,
// Tricks or treats with the Hilbert matrix).
func TestHilbertInverse(t *testing.T) {
	choose := func(n, k int) float64 {
		c := 1.0
		for i := range k {
			c = c * float64(n-i) / float64(i+1)
		}
		return math.Round(c)
	}
	for n := 1; n <= 6; n++ {
		a := hilbert(n)
		var x [36]float64
		if got := Inverse(n, &a, &x); got != 1 {
			t.Errorf("n %d: sign %d of a positive definite matrix", n, got)
		}
		kappa := 1 / math.Sqrt(Ratio2(n, &a))
		for i := 1; i <= n; i++ {
			for j := 1; j <= n; j++ {
				c := choose(i+j-2, i-1)
				want := float64(1-2*((i+j)%2)) * float64(i+j-1) * choose(n+i-1, n-j) * choose(n+j-1, n-i) * c * c
				if got := x[n*(i-1)+j-1]; relative(got, want) > 1e-15*kappa {
					t.Errorf("n %d: element %d,%d of the inverse is %v, want %v", n, i, j, got, want)
				}
			}
		}
	}
}
