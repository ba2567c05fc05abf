package linalg

import "math"

// Ratio2 returns (σmin/σmax)² of the matrix a of order n. The relative error of
// its root, 1/κ, is below 1e-9 for 1/κ down to 1e-6. It returns 0 for a matrix
// that is zero or not finite.
//
// Method: closed form for n = 2; for n = 3 Gram matrix, one rotation and
// Laguerre's iteration; [Ratio2Six] for n = 6; one-sided Jacobi for the rest
// and where the faster ways fall short of the accuracy.
func Ratio2(n int, a *[36]float64) float64 {
	switch n {
	case 2:
		if ratio, ok := ratio2Two(a[0], a[1], a[2], a[3]); ok {
			return ratio
		}
	case 3:
		if ratio, ok := ratio2Three(a); ok {
			return ratio
		}
	case 6:
		return Ratio2Six(a, math.Inf(1))
	}
	return ratio2Jacobi(n, a)
}

// ratio2Two is the squared ratio of [a b; c d]. The matrix is the sum of a
// rotation stretched by r and a reflection stretched by s, so σmax = r + s and
// σmin = |r - s| = |ad - bc|/σmax (Blinn 1996, Consider the lowly 2x2 matrix;
// from memory). ok is false where squares would overflow or lose digits.
func ratio2Two(a, b, c, d float64) (ratio float64, ok bool) {
	squares := float64(a*a) + float64(b*b) + float64(c*c) + float64(d*d)
	if !(squares > 1e-140 && squares < 1e140) {
		return 0, false
	}
	r := math.Sqrt(float64((a+d)*(a+d)) + float64((c-b)*(c-b)))
	s := math.Sqrt(float64((a-d)*(a-d)) + float64((c+b)*(c+b)))
	q := 4 * (float64(a*d) - float64(b*c)) / ((r + s) * (r + s))
	return q * q, true
}

// ratio2Three is the squared ratio of a matrix of order three. ok is false if
// its Gram matrix does not show it.
func ratio2Three(a *[36]float64) (ratio float64, ok bool) {
	dot := func(p, q int) float64 {
		return float64(a[p]*a[q]) + float64(a[p+1]*a[q+1]) + float64(a[p+2]*a[q+2])
	}
	g := [6]float64{dot(0, 0), dot(3, 3), dot(6, 6), dot(0, 3), dot(0, 6), dot(3, 6)}
	t := newTridiagonalThree(&g)
	return t.extremes(g[0] + g[1] + g[2])
}

// ratio2Jacobi is the squared ratio by the readable method.
func ratio2Jacobi(n int, a *[36]float64) float64 {
	lo, hi := Singular(n, a)
	if hi == 0 {
		return 0
	}
	r := lo / hi
	return r * r
}
