package proof

import (
	"math"

	"legwright/kin/enclose"
	"legwright/kin/linalg"
)

// matrix is a matrix of order up to six, row by row with stride six. Places beyond its order are zero.
type matrix [36]float64

// mul sets z to a·b. z must be another matrix than both.
func (z *matrix) mul(a, b *matrix) {
	for i := 0; i < 36; i += 6 {
		r := (*[6]float64)(a[i : i+6])
		o := (*[6]float64)(z[i : i+6])
		for j := range o {
			o[j] = (r[0]*b[j] + r[1]*b[6+j] + r[2]*b[12+j]) + (r[3]*b[18+j] + r[4]*b[24+j] + r[5]*b[30+j])
		}
	}
}

// norm2 is the square of the Frobenius norm.
func (z *matrix) norm2() float64 {
	sum := 0.0
	for _, x := range z {
		sum += x * x
	}
	return sum
}

// norm is the Frobenius norm.
func (z *matrix) norm() float64 { return math.Sqrt(z.norm2()) }

// family is an affine family of matrices with a remainder: for every t in [-1, 1]ᵈ a matrix within
// c + Σ g[k] t[k] ± r, place by place. It encloses an inverse Jacobian, or a matrix of wrenches, over a box.
type family struct {
	n, d int
	c, r matrix
	g    [6]matrix
	size float64 // more than the Frobenius norm of any of them
	rest float64 // Frobenius norm of r
}

// take reads the family from forms with stride six: n rows, the columns given, slopes over the moving
// coordinates. It reports false where a form says nothing.
func (m *family) take(forms *[36]enclose.Form, n int, columns, moving []int) bool {
	m.n, m.d = n, len(moving)
	sum := 0.0
	for i := range n {
		for j, col := range columns {
			f := &forms[6*i+col]
			at := 6*i + j
			m.c[at], m.r[at] = f.C, f.R
			most := math.Abs(f.C) + f.R
			for k, q := range moving {
				m.g[k][at] = f.G[q]
				most += math.Abs(f.G[q])
			}
			sum += most * most
		}
	}
	m.size = math.Sqrt(sum) * (1 + slack)
	m.rest = m.r.norm() * (1 + slack)
	return sum <= math.MaxFloat64
}

// slack is the relative widening of what a test computes: none sums more than a thousand products, whose rounding
// errors are at most 1000·2⁻⁵³ ≈ 1.2e-13 of the sum of their sizes.
const slack = 1e-12

// inverter inverts matrices of order up to six.
type inverter struct{ six linalg.Six }

// invert sets x to an approximate inverse of the matrix a of order n and gives the sign of a's determinant, 0 where a is
// singular to rounding.
func (v *inverter) invert(n int, a, x *matrix) int {
	p := *a
	for i := n; i < 6; i++ {
		p[7*i] = 1
	}
	sign := v.six.Factor((*[36]float64)(&p))
	if sign == 0 {
		return 0
	}
	*x = v.six.X
	for i := n; i < 6; i++ {
		x[7*i] = 0
	}
	return sign
}
