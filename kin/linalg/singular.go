package linalg

import "math"

// sweepMax bounds the number of Jacobi sweeps. Convergence is quadratic and
// takes about five sweeps at order six; the bound only stops a stagnation in
// the last bit.
const sweepMax = 40

// Singular returns the smallest and the largest singular value of the matrix a
// of order n. It is accurate to a few rounding errors times the condition
// number for every finite matrix, whatever its scale. A matrix with a NaN or an
// infinity gives 0, 0.
//
// Method: one-sided Jacobi, Hestenes 1958, with the rotations of Rutishauser
// 1966. Cost: about 3 µs at order six.
func Singular(n int, a *[36]float64) (lo, hi float64) {
	var s [6]float64
	SingularValues(n, a, &s)
	return s[n-1], s[0]
}

// SingularValues writes the n singular values of the matrix a of order n into
// out in descending order, and 0 into the places after them. Accuracy, method
// and the answer to non-finite input are those of [Singular].
func SingularValues(n int, a *[36]float64, out *[6]float64) {
	*out = [6]float64{}
	w, exp, ok := normalised(n, a)
	if !ok {
		return
	}
	orthogonaliseRows(n, &w)
	for i := range n {
		out[i] = math.Ldexp(rowLength(n, &w, i), exp)
	}
	for i := 1; i < n; i++ { // insertion sort, descending
		for k := i; k > 0 && out[k] > out[k-1]; k-- {
			out[k], out[k-1] = out[k-1], out[k]
		}
	}
}

// normalised returns a times 2^-exp with its largest element in [0.5, 1), so
// that squares neither overflow nor lose the large elements to underflow. ok is
// false if a is zero or not finite.
func normalised(n int, a *[36]float64) (w [36]float64, exp int, ok bool) {
	top := largest(n, a)
	if !(top > 0) || math.IsInf(top, 1) {
		return w, 0, false
	}
	_, exp = math.Frexp(top)
	// Two factors: a single one would overflow for subnormal matrices.
	f, g := math.Ldexp(1, -exp/2), math.Ldexp(1, exp/2-exp)
	for i := range n * n {
		w[i] = a[i] * f * g
	}
	return w, exp, true
}

// largest returns the largest magnitude in the matrix a of order n, NaN if one
// of its elements is NaN.
func largest(n int, a *[36]float64) float64 {
	if n < 1 || n > 6 {
		panic("linalg: order of matrix outside 1 to 6")
	}
	top := 0.0
	for _, v := range a[:n*n] {
		top = max(top, math.Abs(v))
	}
	return top
}

// orthogonaliseRows turns pairs of rows of w in their common plane until all
// are orthogonal. Their lengths are then the singular values.
func orthogonaliseRows(n int, w *[36]float64) {
	for range sweepMax {
		turned := false
		for p := range n - 1 {
			for q := p + 1; q < n; q++ {
				if turnRows(n, w, p, q) {
					turned = true
				}
			}
		}
		if !turned {
			return
		}
	}
}

// turnRows makes rows p and q of w orthogonal. It reports false, and changes
// nothing, if they are already orthogonal to rounding.
func turnRows(n int, w *[36]float64, p, q int) bool {
	const orthogonal = 1e-31 // cos² of the angle, (1.4 eps)²
	x, y := w[n*p:n*p+n], w[n*q:n*q+n]
	y = y[:len(x)]
	pp, qq, pq := 0.0, 0.0, 0.0
	for k, xk := range x {
		yk := y[k]
		pp += float64(xk * xk)
		qq += float64(yk * yk)
		pq += float64(xk * yk)
	}
	if !(pq*pq > orthogonal*pp*qq) {
		return false
	}
	z := (qq - pp) / (2 * pq) // cot 2φ
	t := 0.5 / z              // tan φ for a small angle
	if math.Abs(z) < 1e10 {
		t = math.Copysign(1/(math.Abs(z)+math.Sqrt(1+float64(z*z))), z)
	}
	c := 1 / math.Sqrt(1+float64(t*t))
	s := c * t
	for k, xk := range x {
		yk := y[k]
		x[k] = float64(c*xk) - float64(s*yk)
		y[k] = float64(s*xk) + float64(c*yk)
	}
	return true
}

// rowLength returns the Euclidean length of row p of w.
func rowLength(n int, w *[36]float64, p int) float64 {
	sum := 0.0
	for _, v := range w[n*p : n*p+n] {
		sum += float64(v * v)
	}
	return math.Sqrt(sum)
}
