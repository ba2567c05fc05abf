package linalg

import (
	"math"
	"math/rand/v2"
	"testing"
)

// householder is the textbook reduction (Golub and Van Loan 2013, algorithm
// 8.3.1) of the symmetric matrix m, with full reflections and no shortcut.
func householder(m *[36]float64) (t tridiagonal) {
	a := *m
	for k := range 4 {
		var v [6]float64
		sq := 0.0
		for i := k + 1; i < 6; i++ {
			v[i] = a[6*i+k]
			sq += v[i] * v[i]
		}
		v[k+1] += math.Copysign(math.Sqrt(sq), v[k+1])
		vv := 0.0
		for _, e := range v {
			vv += e * e
		}
		if vv == 0 {
			continue
		}
		var h, ha [36]float64
		for i := range 6 {
			for j := range 6 {
				h[6*i+j] = -2 * v[i] * v[j] / vv
			}
			h[7*i]++
		}
		multiply(&ha, &h, &a)
		multiply(&a, &ha, &h)
	}
	for i := range 6 {
		t.d[i] = a[7*i]
		t.trace += a[7*i]
		if i < 5 {
			t.e[i] = a[6*i+6+i] * a[6*i+6+i]
		}
	}
	return t
}

// multiply sets out to x y, of order six.
func multiply(out, x, y *[36]float64) {
	for i := range 6 {
		for j := range 6 {
			s := 0.0
			for k := range 6 {
				s += x[6*i+k] * y[6*k+j]
			}
			out[6*i+j] = s
		}
	}
}

// fullGram returns J Jᵀ with both triangles.
func fullGram(j *[36]float64) (g [36]float64) {
	for p := range 6 {
		for q := range 6 {
			g[6*p+q] = rowDot(6, j, p, q)
		}
	}
	return g
}

// A Householder reduction is determined by its first column up to signs, so the
// generated code must give the same numbers as the textbook.
func TestTridiagonaliseAgainstTextbook(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 22))
	js := legMatrices(50, 10, 1)
	for range 200 {
		js = append(js, withKappa(rng, 6, 1+100*rng.Float64()))
	}
	for _, j := range js {
		var g [36]float64
		var got tridiagonal
		gram(&j, &g)
		tridiagonalise(&g, &got)
		full := fullGram(&j)
		want := householder(&full)
		for k := range 6 {
			// A small column turns its direction, and what follows, by its own error.
			if math.Abs(got.d[k]-want.d[k]) > 1e-10*want.trace {
				t.Fatalf("d%d = %v, textbook %v", k, got.d[k], want.d[k])
			}
			if k < 5 && math.Abs(got.e[k]-want.e[k]) > 1e-10*want.trace*want.trace {
				t.Fatalf("e%d = %v, textbook %v", k, got.e[k], want.e[k])
			}
		}
		if relative(got.trace, want.trace) > 1e-14 {
			t.Fatalf("trace %v, textbook %v", got.trace, want.trace)
		}
	}
}

// The unpivoted elimination against the pivoted one, up to the spread that
// Factor trusts.
func TestSweepAgainstPivoting(t *testing.T) {
	rng := rand.New(rand.NewPCG(23, 24))
	js := legMatrices(100, 100, 1)
	for range 2000 {
		js = append(js, withKappa(rng, 6, 3), withKappa(rng, 6, 1e3))
	}
	beyond := 0
	for _, j := range js {
		var x, y [36]float64
		det, spread := sweep(&j, &x)
		sign := Inverse(6, &j, &y)
		if spread < 36 {
			t.Fatalf("spread %v is below that of equal pivots", spread)
		}
		if !(spread <= spreadMax) {
			beyond++
			continue
		}
		if math.Copysign(1, det) != float64(sign) {
			t.Errorf("determinant %v, sign with pivoting %d", det, sign)
		}
		worst, size := 0.0, 0.0
		for k := range x {
			worst = max(worst, math.Abs(x[k]-y[k]))
			size = max(size, math.Abs(y[k]))
		}
		kappa := 1 / math.Sqrt(Ratio2Six(&j, 2))
		if worst > 3e-13*kappa*size {
			t.Errorf("relative error %.2g at condition number %.3g, spread %.2g", worst/size, kappa, spread)
		}
	}
	if share := float64(beyond) / float64(len(js)); share > 0.03 {
		t.Errorf("%.1f %% of the matrices need pivoting", 100*share)
	}
}

// One-sided Jacobi is the readable reference of every ratio. It differs from
// gonum in nothing but rounding (see TestSingularValuesAgainstGonum), so the
// fast ways may be held to the 1e-9 that they promise.
func TestRatio2AgainstJacobi(t *testing.T) {
	rng := rand.New(rand.NewPCG(25, 26))
	for n := 1; n <= 6; n++ {
		for _, kappa := range []float64{1, 1.001, 2, 30, 900, 1100, 2e4, 9e4, 1.1e5, 1e6} {
			for range 300 {
				a := withKappa(rng, n, kappa)
				got, want := math.Sqrt(Ratio2(n, &a)), math.Sqrt(ratio2Jacobi(n, &a))
				if relative(got, want) > 1e-9 {
					t.Errorf("n %d kappa %g: 1/κ = %v, Jacobi %v", n, kappa, got, want)
				}
			}
		}
	}
}

// Poses that keep a symmetry of the machine have double singular values, where
// Laguerre's iteration converges but linearly.
func TestRatio2SymmetricPoses(t *testing.T) {
	rng := rand.New(rand.NewPCG(27, 28))
	for range 200 {
		l := newSixLegs(rng)
		var poses []legPose
		for k := range 25 {
			s := math.Pow(10, -1-0.6*float64(k))
			z := 0.5 + 0.025*float64(k)
			poses = append(poses,
				legPose{z: z},
				legPose{z: z, yaw: 0.016 * float64(k)},
				legPose{x: s, y: -s / 2, z: 0.8 + s, roll: s, pitch: s / 3, yaw: -s}, // nearly
			)
		}
		for _, p := range poses {
			j := l.matrix(p)
			got, want := math.Sqrt(Ratio2Six(&j, 2)), math.Sqrt(ratio2Jacobi(6, &j))
			if want > 1e-6 && relative(got, want) > 1e-9 {
				t.Errorf("pose %+v: 1/κ = %v, Jacobi %v", p, got, want)
			}
		}
	}
}

// Singular values that are all but equal, as isotropic designs have them, hide
// their differences from a polynomial.
func TestRatio2NearlyIsotropic(t *testing.T) {
	rng := rand.New(rand.NewPCG(29, 30))
	for n := 2; n <= 6; n++ {
		for exp := -16.0; exp < -1; exp += 0.5 {
			d := math.Pow(10, exp)
			for range 40 {
				one, all, many := [6]float64{}, [6]float64{}, [6]float64{}
				for k := range n {
					one[k], many[k] = 1, 1-d
					all[k] = 1 - d*rng.Float64()
				}
				one[n-1], many[0] = 1-d, 1
				for _, s := range [][6]float64{one, all, many} {
					a := withSingularValues(rng, n, s)
					got, want := math.Sqrt(Ratio2(n, &a)), math.Sqrt(ratio2Jacobi(n, &a))
					if relative(got, want) > 1e-9 {
						t.Errorf("n %d, spread %.1g: 1/κ = %v, Jacobi %v", n, d, got, want)
					}
					if n == 6 {
						keep := want * want * (1 - 1e-12)
						if got := math.Sqrt(Ratio2Six(&a, keep)); relative(got, want) > 1e-9 {
							t.Errorf("spread %.1g, keep %v: 1/κ = %v, Jacobi %v", d, keep, got, want)
						}
					}
				}
			}
		}
	}
}
