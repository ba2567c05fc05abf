package proof

import "math"

// inverse holds an approximate inverse x of a family's centre, and what it makes of the rest.
type inverse struct {
	inverter
	x     matrix
	sign  int       // of the determinant at the centre, 0 where it is singular to rounding
	a     [6]matrix // x·g
	off   float64   // more than the Frobenius norm of x·c - I
	bound matrix    // of |x·J - I| over the family without its remainder, place by place
	whole matrix    // of |x·J - I|
}

// take inverts the centre.
func (z *inverse) take(m *family) bool {
	z.sign = z.invert(m.n, &m.c, &z.x)
	if z.sign == 0 {
		return false
	}
	z.whole.mul(&z.x, &m.c)
	for i := range m.n {
		z.whole[7*i]--
	}
	z.bound = matrix{}
	rounding := slack * (1 + z.x.norm()*m.size)
	for i := range m.n {
		for j := range m.n {
			z.bound[6*i+j] = math.Abs(z.whole[6*i+j]) + rounding
		}
	}
	z.off = z.bound.norm() * (1 + slack)
	for k := range m.d {
		z.a[k].mul(&z.x, &m.g[k])
		for i, y := range z.a[k] {
			z.bound[i] += math.Abs(y)
		}
	}
	var p matrix
	for i, x := range z.x {
		p[i] = math.Abs(x)
	}
	z.whole.mul(&p, &m.r)
	for i := range z.whole {
		z.whole[i] += z.bound[i]
	}
	return true
}

// regular gives a lower bound of σmin/σmax over the family, 0 where some matrix may be singular. With T = xJ - I
// bounded by whole, and a positive vector v such that whole·v ≤ θv with θ < 1, (I+T)⁻¹ is at most √n·max(v)/min(v)/(1-θ) long
// (L. Collatz 1942; H. Wielandt 1950; from memory), and J⁻¹ = (I+T)⁻¹x.
func (z *inverse) regular(m *family) float64 {
	n := m.n
	var v [6]float64
	for i := range n {
		v[i] = 1
	}
	for range 12 {
		y := apply(n, &z.whole, &v)
		worst, size, low, high := 0.0, 0.0, math.Inf(1), 0.0
		for i := range n {
			worst = max(worst, y[i]/v[i])
			low, high = min(low, v[i]), max(high, v[i])
		}
		if worst*(1+slack) < 0.999 {
			stretch := math.Sqrt(float64(n)) * high / low / (1 - worst*(1+slack)) * z.x.norm()
			return 1 / (stretch * m.size * (1 + slack))
		}
		for i := range n {
			y[i] += 0.3 * v[i]
			size = max(size, y[i])
		}
		for i := range n {
			v[i] = y[i]/size + 1e-9
		}
	}
	return 0
}
