package linalg

import (
	"math"
	"math/rand/v2"
	"testing"
)

// diagonal returns the matrix of order n with d on its diagonal.
func diagonal(n int, d ...float64) (a [36]float64) {
	for i, v := range d {
		a[n*i+i] = v
	}
	return a
}

// Matrices whose ratio, inverse and sign are seen at a glance, with the exact
// zeros that machines with aligned axes have.
func TestExactStructure(t *testing.T) {
	swap := diagonal(6, 1, 1, 2, 1, 0, 0)
	swap[29], swap[34] = 1, 1 // rows 4 and 5 exchanged
	cycle := [36]float64{1: 1, 8: 1, 15: 1, 22: 1, 29: 1, 30: 2}
	blocks := diagonal(6, 1, 1, 1, 3, 3, 3)
	blocks[1], blocks[6] = 0.5, 0.5 // singular values 1.5, 0.5
	tests := []struct {
		name  string
		a     [36]float64
		sign  int
		ratio float64
	}{
		{"identity", diagonal(6, 1, 1, 1, 1, 1, 1), 1, 1},
		{"mirror", diagonal(6, 1, 1, -1, 1, 1, 1), -1, 1},
		{"diagonal", diagonal(6, 1, 2, 3, 4, -5, -8), 1, 1. / 64},
		{"exchanged rows", swap, -1, 0.25},
		{"cycled rows", cycle, -1, 0.25},
		{"two blocks", blocks, 1, 1. / 36},
	}
	for _, tt := range tests {
		var s Six
		if got := s.Factor(&tt.a); got != tt.sign {
			t.Errorf("%s: sign %d, want %d", tt.name, got, tt.sign)
		}
		var one [36]float64
		multiply(&one, &tt.a, &s.X)
		for k, v := range diagonal(6, 1, 1, 1, 1, 1, 1) {
			if math.Abs(one[k]-v) > 1e-15 {
				t.Errorf("%s: element %d of the product with the inverse is %v", tt.name, k, one[k])
			}
		}
		if got := s.Ratio2(&tt.a, 2); relative(got, tt.ratio) > 2e-10 {
			t.Errorf("%s: ratio %v, want %v", tt.name, got, tt.ratio)
		}
	}
	// They must not need the slow way either: zero columns have a stand-in.
	for _, tt := range tests {
		if tt.ratio == 1 {
			continue // isotropic, another reason for the slow way
		}
		var g [36]float64
		var tri tridiagonal
		gram(&tt.a, &g)
		tridiagonalise(&g, &tri)
		if _, ok := tri.extremes(2); !ok {
			t.Errorf("%s: falls back to the slow way", tt.name)
		}
	}
}

// Singular matrices have sign 0 and a ratio of rounding size; nothing loops,
// nothing panics.
func TestSingularMatrices(t *testing.T) {
	for _, j := range legMatrices(20, 10, 1) {
		zeroRow, zeroColumn, twice, combined := j, j, j, j
		for k := range 6 {
			zeroRow[12+k] = 0
			zeroColumn[6*k+4] = 0
			twice[30+k] = j[k]
			combined[30+k] = 0.3*j[k] + 0.7*j[6+k] - 0.2*j[18+k]
		}
		for name, a := range map[string][36]float64{
			"zero row": zeroRow, "zero column": zeroColumn, "equal rows": twice, "dependent rows": combined, "zero": {},
		} {
			var s Six
			var x [36]float64
			if got := s.Factor(&a); got != 0 {
				t.Errorf("%s: Factor %d", name, got)
			}
			if got := Inverse(6, &a, &x); got != 0 {
				t.Errorf("%s: Inverse %d", name, got)
			}
			if got := s.Ratio2(&a, 2); !(got >= 0 && got < 1e-28) {
				t.Errorf("%s: ratio %v", name, got)
			}
		}
	}
}

// Two singular values below rounding: the determinant of the Gram matrix has any
// sign, and an iteration that trusted it would find a larger eigenvalue.
func TestTwoSmallSingularValues(t *testing.T) {
	rng := rand.New(rand.NewPCG(35, 36))
	for _, small := range []float64{1e-7, 1e-8, 1e-9, 1e-12, 1e-17} {
		for range 2000 {
			for n := 3; n <= 6; n += 3 {
				s := [6]float64{1, 0.7, 0.5, 0.2, small, small}
				s[n-1], s[n-2] = small, small
				a := withSingularValues(rng, n, s)
				// The elements are rounded: 6 eps of σmax is not to be told from 0.
				if got := math.Sqrt(Ratio2(n, &a)); math.Abs(got-small) > 1e-15 {
					t.Errorf("n %d: 1/κ = %v, want %v", n, got, small)
				}
			}
		}
	}
}

func TestNotFinite(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 32))
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		for n := 1; n <= 6; n++ {
			for place := range n * n {
				a := withKappa(rng, n, 10)
				a[place] = bad
				var x [36]float64
				var v [6]float64
				if got := Inverse(n, &a, &x); got != 0 {
					t.Errorf("n %d: %v at %d: Inverse %d", n, bad, place, got)
				}
				if got := Ratio2(n, &a); got != 0 {
					t.Errorf("n %d: %v at %d: Ratio2 %v", n, bad, place, got)
				}
				if lo, hi := Singular(n, &a); lo != 0 || hi != 0 {
					t.Errorf("n %d: %v at %d: Singular %v %v", n, bad, place, lo, hi)
				}
				if SingularValues(n, &a, &v); v != [6]float64{} {
					t.Errorf("n %d: %v at %d: SingularValues %v", n, bad, place, v)
				}
				if n == 6 {
					var s Six
					if got := s.Factor(&a); got != 0 {
						t.Errorf("%v at %d: Factor %d", bad, place, got)
					}
					if got := s.Ratio2(&a, 0.5); got != 0 {
						t.Errorf("%v at %d: Six.Ratio2 %v", bad, place, got)
					}
				}
			}
		}
		for place := range 6 {
			a := [6]float64{1, 2, 3, 0.1, 0.2, 0.3}
			a[place] = bad
			if got := Sym3Largest(&a); !math.IsNaN(got) {
				t.Errorf("%v at %d: Sym3Largest %v", bad, place, got)
			}
		}
	}
}

// A factor on the whole matrix divides the inverse and leaves sign and ratio.
// Powers of two do so exactly; the extreme ones leave the range of the fast way.
func TestScale(t *testing.T) {
	rng := rand.New(rand.NewPCG(33, 34))
	for _, exp := range []int{-1030, -1000, -500, -100, -20, 20, 100, 500, 1000} {
		f := math.Ldexp(1, exp)
		for n := 1; n <= 6; n++ {
			for _, kappa := range []float64{1, 5, 200} {
				a := withKappa(rng, n, kappa)
				b := a
				for k := range b {
					b[k] *= f
				}
				if exp < -1020 { // subnormal elements have lost digits
					var x [36]float64
					if got := Ratio2(n, &b); relative(got, Ratio2(n, &a)) > 1e-4 {
						t.Errorf("n %d, 2^%d: ratio %v, want %v", n, exp, got, Ratio2(n, &a))
					}
					Inverse(n, &b, &x) // may overflow, must return
					continue
				}
				var x, y [36]float64
				if sa, sb := Inverse(n, &a, &x), Inverse(n, &b, &y); sa != sb || sa == 0 {
					t.Errorf("n %d, 2^%d: signs %d and %d", n, exp, sa, sb)
				}
				for k := range n * n {
					if y[k]*f != x[k] {
						t.Errorf("n %d, 2^%d: inverse %v, want %v", n, exp, y[k]*f, x[k])
					}
				}
				if got, want := Ratio2(n, &b), Ratio2(n, &a); relative(got, want) > 2e-9 {
					t.Errorf("n %d, 2^%d: ratio %v, want %v", n, exp, got, want)
				}
				if n == 6 {
					var s Six
					if got, want := s.Factor(&b), Inverse(6, &a, &x); got != want {
						t.Errorf("2^%d: Factor %d, want %d", exp, got, want)
					}
				}
			}
		}
	}
}

func TestOrderPanics(t *testing.T) {
	var a, x [36]float64
	var v [6]float64
	for _, n := range []int{-1, 0, 7} {
		for name, f := range map[string]func(){
			"Inverse":        func() { Inverse(n, &a, &x) },
			"Ratio2":         func() { Ratio2(n, &a) },
			"Singular":       func() { Singular(n, &a) },
			"SingularValues": func() { SingularValues(n, &a, &v) },
		} {
			func() {
				defer func() {
					if recover() == nil {
						t.Errorf("%s accepts order %d", name, n)
					}
				}()
				f()
			}()
		}
	}
}

func TestNoAllocation(t *testing.T) {
	js := legMatrices(4, 5, 1)
	js = append(js, [36]float64{}, [36]float64{math.NaN()})
	a3 := [6]float64{1, 2, 3, 0.1, 0.2, 0.3}
	var s Six
	var x [36]float64
	var v [6]float64
	sum := 0.0
	if n := testing.AllocsPerRun(10, func() {
		for i := range js {
			sum += float64(s.Factor(&js[i])) + s.Ratio2(&js[i], 2)
			for n := 1; n <= 6; n++ {
				Inverse(n, &js[i], &x)
				SingularValues(n, &js[i], &v)
				sum += Ratio2(n, &js[i])
			}
		}
		sum += Sym3Largest(&a3)
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
