package linalg

import "math"

// Six holds what one pose needs of an inverse Jacobian J of order six: its
// inverse and the sign of its determinant. The zero value is ready for use; one
// Six serves one goroutine, for any number of poses.
type Six struct {
	X [36]float64 // inverse of J, row-major
}

// Factor inverts j into s.X and returns the sign of the determinant of j: +1,
// -1, or 0 when j is singular to rounding or not finite; s.X is then not to be
// used.
//
// Method: Gauss-Jordan elimination by 3x3 blocks without pivoting, in straight
// lines; when a guard says that this could cost accuracy, [Inverse].
func (s *Six) Factor(j *[36]float64) int {
	return Inverse(6, j, &s.X)
}

// Ratio2 returns (σmin/σmax)² of j. 1/κ, its root, has a relative error below
// 1e-9 for 1/κ down to 1e-6. If bounds prove the ratio to be above keep, such a
// bound, itself above keep, is returned early: the least ratio over a set of
// poses, with keep the least so far, is the same to the last bit as with keep 2,
// which asks for the ratio itself.
func (s *Six) Ratio2(j *[36]float64, keep float64) float64 {
	return Ratio2Six(j, keep)
}

// Ratio2Six is [Six.Ratio2] for callers that need no inverse.
//
// Method: Gram matrix J Jᵀ, Householder tridiagonalisation, Laguerre's
// iteration from both ends; if that falls short of the accuracy, one-sided
// Jacobi.
func Ratio2Six(j *[36]float64, keep float64) float64 {
	var t tridiagonal
	tridiagonalise(j, &t)
	if ratio, ok := t.extremes(keep); ok {
		return ratio
	}
	return ratio2Jacobi(6, j)
}

// withSign returns the magnitude of x with the sign of s; x is not negative.
func withSign(x, s float64) float64 {
	return math.Float64frombits(math.Float64bits(x) | math.Float64bits(s)&(1<<63))
}
