package linalg

import "math"

// tridiagonalThree is a symmetric tridiagonal matrix of order three.
type tridiagonalThree struct {
	d0, d1, d2 float64 // diagonal
	e0, e1     float64 // squares of the elements beside it
}

// negligible is the square of an element that is lost beside any other number of
// a matrix in range.
const negligible = 1e-200

// newTridiagonalThree turns the last two axes of the symmetric matrix
// a = (xx, yy, zz, xy, xz, yz) until it is tridiagonal.
func newTridiagonalThree(a *[6]float64) tridiagonalThree {
	xx, yy, zz, xy, xz, yz := a[0], a[1], a[2], a[3], a[4], a[5]
	s := float64(xy*xy) + float64(xz*xz)
	if s < negligible {
		return tridiagonalThree{xx, yy, zz, 0, float64(yz * yz)}
	}
	// Cosine and sine are xy/√s and xz/√s; only their products occur.
	cc, ss, cs := float64(xy*xy)/s, float64(xz*xz)/s, float64(xy*xz)/s
	d1 := float64(cc*yy) + float64(ss*zz) + float64(2*cs*yz)
	off := float64((cc-ss)*yz) + float64(cs*(zz-yy))
	return tridiagonalThree{xx, d1, yy + zz - d1, s, float64(off * off)}
}

// upperBound returns a bound of the largest eigenvalue: Laguerre's step from
// infinity.
func (t *tridiagonalThree) upperBound() float64 {
	trace := t.d0 + t.d1 + t.d2
	squares := float64(t.d0*t.d0) + float64(t.d1*t.d1) + float64(t.d2*t.d2) + float64(2*(t.e0+t.e1))
	spread := float64(6*squares) - float64(2*trace*trace)
	if spread < 0 {
		spread = 0
	}
	return float64((trace + math.Sqrt(spread)) * (1.0 / 3))
}

// step returns Laguerre's step from x to the nearest eigenvalue above, for x
// below them all, or below, for x above them all; 0 at an eigenvalue to rounding.
func (t *tridiagonalThree) step(x float64) float64 {
	a0, a1, a2 := t.d0-x, t.d1-x, t.d2-x
	p2 := float64(a0*a1) - t.e0
	p := float64(a2*p2) - float64(t.e1*a0) // det(T - xI)
	q := t.e1 - p2 - float64(a2*(a0+a1))   // its derivative, not positive outside
	s := float64(4*q*q) - float64(12*p*(a0+a1+a2))
	if !(q < 0) {
		return 0
	}
	if s < 0 {
		s = 0
	}
	return float64(3 * p / (math.Sqrt(s) - q))
}

// Sym3Largest returns the largest eigenvalue of the symmetric matrix of order
// three a = (xx, yy, zz, xy, xz, yz). The error is a few rounding errors of the
// largest magnitude of an eigenvalue, so the relative error is as small if the
// matrix is positive semidefinite. A matrix with a NaN or an infinity gives NaN.
//
// Method: the mean of the diagonal taken out, one rotation to tridiagonal form, then Laguerre's iteration from
// above (Parlett 1964).
func Sym3Largest(a *[6]float64) float64 {
	top := 0.0
	for _, v := range a {
		top = max(top, math.Abs(v))
	}
	if top == 0 {
		return 0
	}
	if !(top <= math.MaxFloat64) {
		return math.NaN()
	}
	_, exp := math.Frexp(top)
	var b [6]float64
	for i, v := range a {
		b[i] = math.Ldexp(v, -exp)
	}
	mean := float64((b[0] + b[1] + b[2]) * (1.0 / 3)) // taken out, or it would hide small differences
	b[0], b[1], b[2] = b[0]-mean, b[1]-mean, b[2]-mean
	t := newTridiagonalThree(&b)
	y := t.upperBound()
	for range iterationMax {
		step := -t.step(y)
		if !(step > 0x1p-53) {
			break
		}
		y -= step
	}
	return math.Ldexp(mean+y, exp)
}
