package linalg

import "math"

// Ratio2 returns (σmin/σmax)² of the matrix a of order n; 1/κ, its root, has a
// relative error below 1e-9 for 1/κ down to 1e-6. It is 0 for a matrix that is
// zero or not finite.
func Ratio2(n int, a *[36]float64) float64 {
	if n == 6 {
		return Ratio2Six(a, math.Inf(1))
	}
	return ratio2Jacobi(n, a)
}

// ratio2Jacobi is the squared ratio by the readable method. It is 0 if the
// matrix is zero or not finite.
func ratio2Jacobi(n int, a *[36]float64) float64 {
	lo, hi := Singular(n, a)
	if hi == 0 {
		return 0
	}
	r := lo / hi
	return r * r
}

// Sym3Largest returns the largest eigenvalue of the symmetric matrix of order
// three whose elements are a = (xx, yy, zz, xy, xz, yz), with an error of a few
// rounding errors of its norm.
func Sym3Largest(a *[6]float64) float64 {
	// One-sided Jacobi on the matrix shifted to be positive definite.
	shift := 0.0
	for _, v := range a {
		shift += 2 * math.Abs(v)
	}
	m := [36]float64{a[0] + shift, a[3], a[4], a[3], a[1] + shift, a[5], a[4], a[5], a[2] + shift}
	_, hi := Singular(3, &m)
	return hi - shift
}
