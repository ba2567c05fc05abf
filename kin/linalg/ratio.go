package linalg

import "math"

// Ratio2 returns (σmin/σmax)² of the matrix a of order n. The relative error of
// its root, 1/κ, is below 1e-9 for 1/κ down to 1e-6. It returns 0 for a matrix
// that is zero or not finite.
//
// Method: closed form for n = 2; for n = 3 and 4 Laguerre's iteration on the
// characteristic polynomial of A Aᵀ, its coefficients made of the minors of A;
// [Ratio2Six] for n = 6; one-sided Jacobi for the rest and where the faster ways
// fall short of the accuracy.
func Ratio2(n int, a *[36]float64) float64 {
	switch n {
	case 2:
		if ratio, ok := ratio2Two(a[0], a[1], a[2], a[3]); ok {
			return ratio
		}
	case 3, 4:
		var p squares
		var x [36]float64
		p.factor(n, a, &x)
		if ratio, ok := p.extremes(math.Inf(1)); ok {
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

// ratio2Jacobi is the squared ratio by the readable method.
func ratio2Jacobi(n int, a *[36]float64) float64 {
	lo, hi := Singular(n, a)
	if hi == 0 {
		return 0
	}
	r := lo / hi
	return r * r
}
