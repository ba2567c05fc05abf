package linalg

import "math"

// tridiagonal is a symmetric tridiagonal matrix of order six, similar to J Jᵀ.
type tridiagonal struct {
	d     [6]float64 // diagonal
	e     [5]float64 // squares of the off-diagonal elements
	trace float64    // sum of the eigenvalues
}

const (
	// traceMin and traceMax bound the trace of J Jᵀ for which no product in
	// the iteration overflows or underflows: it forms tenth powers.
	traceMin, traceMax = 1e-24, 1e24

	// ratioMin is the squared ratio below which the Gram matrix has lost too
	// much: the error of its smallest eigenvalue, a few eps times the largest,
	// would pass 1e-9 of it at about ratio 2.5e-7.
	ratioMin = 1e-6

	// stepTol is the wanted relative error of the eigenvalues. Simple roots
	// reach it with much to spare; double roots (symmetric poses), where the
	// convergence is linear, end within 20 times stepTol.
	stepTol = 1e-11

	// keepMargin is the excess over keep that a bound must have before it may
	// stand for the ratio: more than all rounding errors, so that the least
	// ratio of a set does not depend on what is kept.
	keepMargin = 1 + 1e-8

	iterationMax = 60
)

// extremes returns lo/hi, the ratio of the smallest to the largest eigenvalue.
// If bounds prove the ratio above keep it returns such a bound instead. ok is
// false if rounding errors hide the smallest eigenvalue.
//
// Method: Laguerre's iteration on the characteristic polynomial from both outer
// ends. All roots are real, so each step stays on its side of the root and
// lo/hi rises to the ratio from below (Parlett 1964; Wilkinson 1965, The
// Algebraic Eigenvalue Problem, chapter 7). The determinant is split in the
// middle, p₆ = p₃ t₃ - e₂ p₂ t₂, with the minors of the leading and the
// trailing half: half the length of the three-term recurrence.
func (t *tridiagonal) extremes(keep float64) (ratio float64, ok bool) {
	if !(t.trace > traceMin && t.trace < traceMax) {
		return 0, false
	}
	d0, d1, d2, d3, d4, d5 := t.d[0], t.d[1], t.d[2], t.d[3], t.d[4], t.d[5]
	e0, e1, e2, e3, e4 := t.e[0], t.e[1], t.e[2], t.e[3], t.e[4]
	keep *= keepMargin

	// Upper bound of the largest eigenvalue: Laguerre's step from infinity.
	squares := (float64(d0*d0) + float64(d1*d1) + float64(d2*d2)) +
		(float64(d3*d3) + float64(d4*d4) + float64(d5*d5)) + float64(2*((e0+e1)+(e2+e3)+e4))
	spread := float64(30*squares) - float64(5*t.trace*t.trace)
	if spread < 0 {
		spread = 0
	}
	y := (t.trace + math.Sqrt(spread)) * (1.0 / 6)

	x, prevX, prevY := 0.0, t.trace, t.trace
	for it := range iterationMax {
		var p, q, h float64
		{
			a0, a1, a2, a3, a4, a5 := d0-x, d1-x, d2-x, d3-x, d4-x, d5-x
			u, v := a0+a1, a4+a5
			p2, t2 := float64(a0*a1)-e0, float64(a4*a5)-e4
			p3, t3 := float64(a2*p2)-float64(e1*a0), float64(a3*t2)-float64(e3*a5)
			q3, s3 := e1-p2-float64(a2*u), e3-t2-float64(a3*v)
			p = float64(p3*t3) - float64(e2*p2*t2)
			q = float64(q3*t3) + float64(p3*s3) + float64(e2*(float64(u*t2)+float64(p2*v)))
			h = float64((u+a2)*t3) + float64(q3*s3) + float64(p3*(v+a3)) - float64(e2*(t2+float64(u*v)+p2))
		}
		sx := float64(25*q*q) - float64(60*p*h)
		nx, qx := 6*p, -q
		{
			a0, a1, a2, a3, a4, a5 := d0-y, d1-y, d2-y, d3-y, d4-y, d5-y
			u, v := a0+a1, a4+a5
			p2, t2 := float64(a0*a1)-e0, float64(a4*a5)-e4
			p3, t3 := float64(a2*p2)-float64(e1*a0), float64(a3*t2)-float64(e3*a5)
			q3, s3 := e1-p2-float64(a2*u), e3-t2-float64(a3*v)
			p = float64(p3*t3) - float64(e2*p2*t2)
			q = float64(q3*t3) + float64(p3*s3) + float64(e2*(float64(u*t2)+float64(p2*v)))
			h = float64((u+a2)*t3) + float64(q3*s3) + float64(p3*(v+a3)) - float64(e2*(t2+float64(u*v)+p2))
		}
		sy := float64(25*q*q) - float64(60*p*h)
		if sx < 0 {
			sx = 0
		}
		if sy < 0 {
			sy = 0
		}
		stepX := nx / (qx + math.Sqrt(sx))
		stepY := 6 * p / (q + math.Sqrt(sy))
		if !(stepX > 0) || qx <= 0 {
			stepX = 0
			if it == 0 {
				return 0, false
			}
		}
		if !(stepY > 0) || q <= 0 {
			stepY = 0
		}
		x += stepX
		y -= stepY
		if x >= keep*y {
			return x / y, true
		}
		sx2, sy2 := stepX*stepX, stepY*stepY
		if it > 0 && sx2*sx2 <= stepTol*x*(prevX*prevX*prevX) && sy2*sy2 <= stepTol*y*(prevY*prevY*prevY) {
			return x / y, x > ratioMin*y
		}
		prevX, prevY = stepX, stepY
	}
	return 0, false
}
