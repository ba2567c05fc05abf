package linalg

import "math"

// tridiagonal is a symmetric tridiagonal matrix of order six, similar to J Jᵀ.
type tridiagonal struct {
	d     [6]float64 // diagonal
	e     [5]float64 // squares of the elements beside it
	trace float64    // sum of the eigenvalues
}

const (
	// traceMin and traceMax bound the traces for which no product of the
	// iteration overflows or underflows: it forms tenth powers of eigenvalues.
	traceMin, traceMax = 1e-24, 1e24

	// ratioMin is the squared ratio below which the Gram matrix has lost too
	// much: the error of its smallest eigenvalue, a few eps times the largest,
	// passes 1e-9 of it at a squared ratio of about 2.5e-7.
	ratioMin = 1e-6

	// isotropic is the ratio above which all eigenvalues lie so close together
	// that the roots in Laguerre's steps from afar are rounding errors, and the
	// steps may pass their goal by that much.
	isotropic = 1 - 1e-4

	// stepTol is the wanted relative error of the eigenvalues. Simple roots
	// reach it with much to spare. At double roots, which symmetric poses have,
	// convergence is linear and may end with 20 times as much.
	stepTol = 1e-11

	// keepMargin is the excess over keep that a bound must have before it
	// stands for the ratio: more than all rounding errors, so that the least
	// ratio of a set does not depend on what was kept.
	keepMargin = 1 + 1e-8

	// iterationMax is never reached by finite numbers in a trusted range;
	// double roots take about 17 iterations.
	iterationMax = 60

	// tiny stands in for a column that is zero below the diagonal, where a
	// reflection has no direction.
	tiny = 1e-80
)

// extremes returns the ratio of the smallest to the largest eigenvalue, or, if
// bounds prove it above keep, such a bound. ok is false if rounding errors hide
// the smallest eigenvalue, or the differences between all of them.
//
// Laguerre's iteration runs from both outer ends. All roots are real, so each
// step stays on its side of the root, and x/y rises to the ratio from below
// (Parlett 1964, Laguerre's method applied to the matrix eigenvalue problem).
func (t *tridiagonal) extremes(keep float64) (ratio float64, ok bool) {
	if !(t.trace > traceMin && t.trace < traceMax) {
		return 0, false
	}
	if keep *= keepMargin; keep > isotropic {
		keep = math.Inf(1)
	}

	// First step of the lower end, from 0. Rounding errors that put an
	// eigenvalue below 0 show here, as wrong signs.
	p, q, r := t.laguerre(0)
	if !(p > 0 && q < 0) {
		return 0, false
	}
	x := p / (r - q)
	y := t.upperBound()
	if x >= keep*y {
		return x / y, true
	}

	lastX, lastY := x, y
	for it := range iterationMax {
		px, qx, rx := t.laguerre(x)
		py, qy, ry := t.laguerre(y)
		stepX, stepY := px/(rx-qx), py/(ry+qy)
		if !(stepX > 0 && qx < 0) { // at the root to rounding
			stepX = 0
		}
		if !(stepY > 0 && qy > 0) {
			stepY = 0
		}
		x += stepX
		y -= stepY
		if x >= keep*y {
			return x / y, true
		}
		// Convergence is cubic: the next step would be step·(step/last)³. The
		// first step tells nothing of that.
		x4, y4 := stepX*stepX*(stepX*stepX), stepY*stepY*(stepY*stepY)
		if it > 0 && x4 <= stepTol*x*(lastX*lastX*lastX) && y4 <= stepTol*y*(lastY*lastY*lastY) {
			return x / y, x > ratioMin*y && x < isotropic*y
		}
		lastX, lastY = stepX, stepY
	}
	return 0, false
}

// largest returns the largest eigenvalue, with a relative error of a few times
// stepTol at most. ok is false if the matrix is not finite or out of range.
func (t *tridiagonal) largest() (y float64, ok bool) {
	if !(t.trace > traceMin && t.trace < traceMax) {
		return 0, false
	}
	y = t.upperBound()
	last := y
	for it := range iterationMax {
		p, q, r := t.laguerre(y)
		step := p / (r + q)
		if !(step > 0 && q > 0) {
			step = 0
		}
		y -= step
		if it > 0 && step*step*(step*step) <= stepTol*y*(last*last*last) {
			return y, true
		}
		last = step
	}
	return 0, false
}

// upperBound returns a bound of the largest eigenvalue from the sum of the
// eigenvalues and that of their squares: Laguerre's step from infinity.
func (t *tridiagonal) upperBound() float64 {
	d, e := &t.d, &t.e
	squares := (float64(d[0]*d[0]) + float64(d[1]*d[1]) + float64(d[2]*d[2])) +
		(float64(d[3]*d[3]) + float64(d[4]*d[4]) + float64(d[5]*d[5])) +
		float64(2*((e[0]+e[1])+(e[2]+e[3])+e[4]))
	spread := float64(30*squares) - float64(5*t.trace*t.trace)
	if spread < 0 {
		spread = 0
	}
	return float64((t.trace + math.Sqrt(spread)) * (1.0 / 6))
}

// laguerre returns the characteristic polynomial p = det(T - xI), a sixth of its
// derivative, q = p'/6, and the root r = sqrt((5p')² - 30pp”)/6. Laguerre's step
// for a polynomial of degree six is p/(r-q) upwards and p/(r+q) downwards.
//
// The determinant is split in the middle: p = p₃t₃ - e₂p₂t₂ with the leading
// minors p₂, p₃ and the trailing minors t₂, t₃, which halves the chain of the
// three-term recurrence. Rounding errors of p are those of slightly different
// elements of T, so multiple roots stay accurate.
func (t *tridiagonal) laguerre(x float64) (p, q, r float64) {
	d, e := &t.d, &t.e
	a0, a1, a2, a3, a4, a5 := d[0]-x, d[1]-x, d[2]-x, d[3]-x, d[4]-x, d[5]-x
	u, v := a0+a1, a4+a5 // -p₂', -t₂'
	p2, t2 := float64(a0*a1)-e[0], float64(a4*a5)-e[4]
	p3, t3 := float64(a2*p2)-float64(e[1]*a0), float64(a3*t2)-float64(e[3]*a5)
	q3, s3 := e[1]-p2-float64(a2*u), e[3]-t2-float64(a3*v) // p₃', t₃'
	p = float64(p3*t3) - float64(e[2]*p2*t2)
	q = (float64(q3*t3) + float64(p3*s3)) + float64(e[2]*(float64(u*t2)+float64(p2*v)))
	h := (float64((u+a2)*t3) + float64(q3*s3)) + (float64(p3*(v+a3)) - float64(e[2]*(t2+float64(u*v)+p2))) // p''/2
	q = float64(q * (1.0 / 6))
	s := float64(25*q*q) - float64(5.0/3*p*h)
	if s < 0 {
		s = 0
	}
	return p, q, math.Sqrt(s)
}

// withSign returns x, which is not negative, with the sign of s.
func withSign(x, s float64) float64 {
	return math.Float64frombits(math.Float64bits(x) | math.Float64bits(s)&(1<<63))
}
