package linalg

import "math"

// Small holds what one pose needs of an inverse Jacobian of order below six. The
// zero value is ready for use; one Small serves one goroutine, for any number of
// poses.
type Small struct {
	// A is the matrix of order n, row-major with stride n: to be filled before
	// [Small.Factor].
	A [36]float64

	// X is the inverse of A: what [Small.Factor] found last.
	X [36]float64

	n int
	p squares
}

// Factor inverts s.A, of order n, into s.X and returns the sign of its
// determinant: +1, -1, or 0 if it is singular to rounding or not finite; s.X is
// then not to be used. The relative error of the inverse is below 3e-13 times
// the condition number.
//
// Method: the adjugate for orders two to four; where the determinant is so small
// that this would cost accuracy, and for other orders, [Inverse]. Cost: 5 to
// 40 ns, seldom 0.1 to 0.2 µs.
func (s *Small) Factor(n int) int {
	s.n = n
	if det, ok := s.p.factor(n, &s.A, &s.X); ok {
		if det > 0 {
			return 1
		}
		return -1
	}
	return Inverse(n, &s.A, &s.X)
}

// Ratio2 returns (σmin/σmax)² of the matrix that [Small.Factor] saw last, with
// the accuracy of the function [Ratio2]. keep is that of [Ratio2Six].
func (s *Small) Ratio2(keep float64) float64 {
	if s.n == 2 {
		if ratio, ok := ratio2Two(s.A[0], s.A[1], s.A[2], s.A[3]); ok {
			return ratio
		}
	}
	if ratio, ok := s.p.extremes(keep); ok {
		return ratio
	}
	return ratio2Jacobi(s.n, &s.A)
}

// detMin bounds det²/trⁿ, with the trace tr of A Aᵀ, from below for matrices whose
// determinant and minors are trusted. Their rounding errors are some eps times the
// largest product of elements; what is left of the determinant is then right to
// 1e-10.
const detMin = 1e-10

// squares is the characteristic polynomial of A Aᵀ, whose roots are the squared
// singular values of A: det(A Aᵀ - xI) = c₀ - c₁x + c₂x² - c₃x³ + c₄x⁴. For order
// three c₃ is 1 and c₄ is 0.
//
// Each coefficient is a sum of squares of minors of A (Cauchy and Binet), so
// none loses digits, and small roots come out as accurate as the
// determinant: the Gram matrix itself would have lost half of theirs.
type squares struct {
	c [5]float64
	n float64 // degree; 0 if the coefficients are not to be trusted
}

// factor writes the inverse of a into x and sets p to its polynomial. ok is false if
// neither is to be trusted, or the order is not among those of this way; for
// order two p stays untrusted.
func (p *squares) factor(n int, a, x *[36]float64) (det float64, ok bool) {
	p.n = 0
	switch n {
	case 2:
		det, trace := invertTwo(a, x)
		return det, trace > traceMin && trace < traceMax && det*det > detMin*trace*trace
	case 3:
		det = p.invertThree(a, x)
		trace := p.c[2]
		ok = trace > traceMin && trace < traceMax && p.c[0] > detMin*trace*trace*trace
	case 4:
		det = p.invertFour(a, x)
		trace := p.c[3]
		ok = trace > traceMin && trace < traceMax && p.c[0] > detMin*(trace*trace)*(trace*trace)
	}
	if ok {
		p.n = float64(n)
	}
	return det, ok
}

// invertTwo writes the inverse of a into x. trace is the sum of its squares.
func invertTwo(a, x *[36]float64) (det, trace float64) {
	p, q, r, s := a[0], a[1], a[2], a[3]
	det = float64(p*s) - float64(q*r)
	inv := 1 / det
	x[0], x[1], x[2], x[3] = s*inv, -q*inv, -r*inv, p*inv
	return det, (float64(p*p) + float64(q*q)) + (float64(r*r) + float64(s*s))
}

// invertThree writes the inverse of a, by the adjugate, into x and sets p.c.
func (p *squares) invertThree(a, x *[36]float64) (det float64) {
	a0, a1, a2, b0, b1, b2, c0, c1, c2 := a[0], a[1], a[2], a[3], a[4], a[5], a[6], a[7], a[8]
	u0, u1, u2 := float64(b1*c2)-float64(b2*c1), float64(b2*c0)-float64(b0*c2), float64(b0*c1)-float64(b1*c0)
	v0, v1, v2 := float64(c1*a2)-float64(c2*a1), float64(c2*a0)-float64(c0*a2), float64(c0*a1)-float64(c1*a0)
	w0, w1, w2 := float64(a1*b2)-float64(a2*b1), float64(a2*b0)-float64(a0*b2), float64(a0*b1)-float64(a1*b0)
	det = float64(a0*u0) + float64(a1*u1) + float64(a2*u2)
	inv := 1 / det
	x[0], x[1], x[2] = u0*inv, v0*inv, w0*inv
	x[3], x[4], x[5] = u1*inv, v1*inv, w1*inv
	x[6], x[7], x[8] = u2*inv, v2*inv, w2*inv
	p.c = [5]float64{
		det * det,
		((float64(u0*u0) + float64(u1*u1)) + float64(u2*u2)) + ((float64(v0*v0) + float64(v1*v1)) + float64(v2*v2)) +
			((float64(w0*w0) + float64(w1*w1)) + float64(w2*w2)),
		((float64(a0*a0) + float64(a1*a1)) + float64(a2*a2)) + ((float64(b0*b0) + float64(b1*b1)) + float64(b2*b2)) +
			((float64(c0*c0) + float64(c1*c1)) + float64(c2*c2)),
		1, 0,
	}
	return det
}

// invertFour writes the inverse of a into x and sets p.c. The determinant and
// the adjugate are made of the minors of the upper and of the lower two rows
// (Laplace's expansion), numbered 01, 02, 03, 12, 13, 23 by their columns.
func (p *squares) invertFour(a, x *[36]float64) (det float64) {
	u, v, w, z := (*[4]float64)(a[0:4]), (*[4]float64)(a[4:8]), (*[4]float64)(a[8:12]), (*[4]float64)(a[12:16])
	s, t := pairMinors(u, v), pairMinors(w, z)
	det = ((float64(s[0]*t[5]) - float64(s[1]*t[4])) + (float64(s[2]*t[3]) + float64(s[3]*t[2]))) -
		(float64(s[4]*t[1]) - float64(s[5]*t[0]))
	inv := 1 / det
	cofactors := (adjugateColumn(v, &t, inv, x, 0) + adjugateColumn(u, &t, -inv, x, 1)) +
		(adjugateColumn(z, &s, inv, x, 2) + adjugateColumn(w, &s, -inv, x, 3))

	uu, vv, ww, zz := dotFour(u, u), dotFour(v, v), dotFour(w, w), dotFour(z, z)
	uv, uw, uz, vw, vz, wz := dotFour(u, v), dotFour(u, w), dotFour(u, z), dotFour(v, w), dotFour(v, z), dotFour(w, z)
	pairs := (float64(uu*vv) - float64(uv*uv)) + (float64(uu*ww) - float64(uw*uw)) + (float64(uu*zz) - float64(uz*uz)) +
		(float64(vv*ww) - float64(vw*vw)) + (float64(vv*zz) - float64(vz*vz)) + (float64(ww*zz) - float64(wz*wz))
	p.c = [5]float64{det * det, cofactors, pairs, (uu + vv) + (ww + zz), 1}
	return det
}

// pairMinors are the minors of order two of the rows u and v.
func pairMinors(u, v *[4]float64) [6]float64 {
	return [6]float64{
		float64(u[0]*v[1]) - float64(u[1]*v[0]), float64(u[0]*v[2]) - float64(u[2]*v[0]), float64(u[0]*v[3]) - float64(u[3]*v[0]),
		float64(u[1]*v[2]) - float64(u[2]*v[1]), float64(u[1]*v[3]) - float64(u[3]*v[1]), float64(u[2]*v[3]) - float64(u[3]*v[2]),
	}
}

// adjugateColumn writes column k of the adjugate times f into x: the minors of
// order three of the row r and two other rows, whose minors of order two are m.
// It returns their sum of squares.
func adjugateColumn(r *[4]float64, m *[6]float64, f float64, x *[36]float64, k int) float64 {
	y0 := (float64(r[1]*m[5]) - float64(r[2]*m[4])) + float64(r[3]*m[3])
	y1 := (float64(r[2]*m[2]) - float64(r[0]*m[5])) - float64(r[3]*m[1])
	y2 := (float64(r[0]*m[4]) - float64(r[1]*m[2])) + float64(r[3]*m[0])
	y3 := (float64(r[1]*m[1]) - float64(r[0]*m[3])) - float64(r[2]*m[0])
	x[k], x[4+k], x[8+k], x[12+k] = y0*f, y1*f, y2*f, y3*f
	return (float64(y0*y0) + float64(y1*y1)) + (float64(y2*y2) + float64(y3*y3))
}

func dotFour(u, v *[4]float64) float64 {
	return (float64(u[0]*v[0]) + float64(u[1]*v[1])) + (float64(u[2]*v[2]) + float64(u[3]*v[3]))
}

const (
	// rootTrust bounds the condition number of an outer root in terms of the
	// coefficients: Σ cₖxᵏ/|x p'(x)|. Roots that lie close together, as those of
	// symmetric poses and isotropic designs, are beyond it.
	rootTrust = 3e5

	// slopeMin bounds p' from below, in the units of c₁ at the lower end and of
	// trⁿ⁻¹ at the upper: where it is less, rootTrust is passed, and rounding errors
	// of p would make steps of any size.
	slopeMin = 1e-7

	// smallSteps is more than simple roots need; roots that it does not
	// suffice for would not be trusted.
	smallSteps = 12

	// smallMargin and smallIsotropic are to the polynomial what keepMargin and
	// isotropic are to the tridiagonal matrix. Its multiple roots move by roots of
	// eps, less than 1e-4 as long as the outer ones lie 1e-2 apart.
	smallMargin    = 1 + 1e-4
	smallIsotropic = 1 - 1e-2
)

// extremes returns the ratio of the smallest to the largest root, or, if bounds
// prove it above keep, such a bound. ok is false if the polynomial does not show
// it. Laguerre's iteration runs from both outer ends as for the tridiagonal matrix.
func (p *squares) extremes(keep float64) (ratio float64, ok bool) {
	n := p.n
	if n == 0 {
		return 0, false
	}
	if keep *= smallMargin; !(keep <= smallIsotropic) {
		keep = math.Inf(1)
	}
	c0, c1, c2, c3, c4 := p.c[0], p.c[1], p.c[2], p.c[3], p.c[4]
	trace, pairs, up := c3, c2, 1.0
	if n == 3 {
		trace, pairs, up = c2, c1, -1
	}

	// First steps, from 0 and from infinity.
	n1 := n - 1
	inner := float64(n1 * (float64(n1*c1*c1) - float64(2*n*c0*c2)))
	outer := float64(n1 * (float64(n1*trace*trace) - float64(2*n*pairs)))
	if inner < 0 {
		inner = 0
	}
	if outer < 0 {
		outer = 0
	}
	x, y := n*c0/(c1+math.Sqrt(inner)), (trace+math.Sqrt(outer))/n
	if x >= keep*y {
		return x / y, true
	}

	floorX, floorY := slopeMin*c1, slopeMin*trace*trace
	if n == 4 {
		floorY *= trace
	}
	lastX, lastY := x, y
	for it := range smallSteps {
		px := c0 - float64(x*(c1-float64(x*(c2-float64(x*(c3-float64(x*c4)))))))
		py := c0 - float64(y*(c1-float64(y*(c2-float64(y*(c3-float64(y*c4)))))))
		qx := c1 - float64(x*(float64(2*c2)-float64(x*(float64(3*c3)-float64(4*c4*x))))) // -p'
		qy := c1 - float64(y*(float64(2*c2)-float64(y*(float64(3*c3)-float64(4*c4*y)))))
		hx := c2 - float64(x*(float64(3*c3)-float64(6*c4*x))) // p''/2
		hy := c2 - float64(y*(float64(3*c3)-float64(6*c4*y)))
		rx := float64(n1 * (float64(n1*qx*qx) - float64(2*n*px*hx)))
		ry := float64(n1 * (float64(n1*qy*qy) - float64(2*n*py*hy)))
		if rx < 0 {
			rx = 0
		}
		if ry < 0 {
			ry = 0
		}
		py, qy = float64(up*py), float64(-up*qy) // towards positive values and slope above the roots
		if !(qx > floorX && qy > floorY && x < y) {
			return 0, false
		}
		stepX, stepY := n*px/(qx+math.Sqrt(rx)), n*py/(qy+math.Sqrt(ry))
		if !(stepX > 0) { // at the root to rounding
			stepX = 0
		}
		if !(stepY > 0) {
			stepY = 0
		}
		x += stepX
		y -= stepY
		if x >= keep*y {
			return x / y, true
		}
		x4, y4 := stepX*stepX*(stepX*stepX), stepY*stepY*(stepY*stepY)
		if it > 0 && x4 <= stepTol*x*(lastX*lastX*lastX) && y4 <= stepTol*y*(lastY*lastY*lastY) {
			return x / y, x < y && p.sum(x) <= rootTrust*x*qx && p.sum(y) <= rootTrust*y*qy
		}
		lastX, lastY = stepX, stepY
	}
	return 0, false
}

// sum is Σ cₖxᵏ.
func (p *squares) sum(x float64) float64 {
	c := &p.c
	return c[0] + float64(x*(c[1]+float64(x*(c[2]+float64(x*(c[3]+float64(x*c[4])))))))
}
