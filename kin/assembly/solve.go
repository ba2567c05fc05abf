package assembly

import "math"

// order is the largest number of homogeneous unknowns of any system here.
const order = 8

// point holds the homogeneous unknowns of a system, the first n of them.
type point [order]complex128

// size2 is |z|².
func size2(z complex128) float64 { return real(z)*real(z) + imag(z)*imag(z) }

// conj is the complex conjugate.
func conj(z complex128) complex128 { return complex(real(z), -imag(z)) }

// inverse is 1/z, without the care that Go's division takes of infinities.
func inverse(z complex128) complex128 {
	s := 1 / size2(z)
	return complex(s*real(z), -s*imag(z))
}

// norm is the Euclidean norm.
func (x *point) norm() float64 {
	s := 0.0
	for _, z := range x {
		s += size2(z)
	}
	return math.Sqrt(s)
}

// addScaled adds s·y to x.
func (x *point) addScaled(s complex128, y *point) {
	for i := range x {
		x[i] += s * y[i]
	}
}

// lu is a factored matrix of order n.
type lu struct {
	n   int
	a   [order][order]complex128
	row [order]int
}

// factor overwrites a with its triangular factors, rows exchanged by the largest
// pivot after each row has been divided by its largest element. It reports false
// if the matrix is singular to working precision.
func (m *lu) factor() bool {
	n := m.n
	var weight [order]float64
	for i := range n {
		m.row[i] = i
		for _, z := range m.a[i][:n] {
			weight[i] = math.Max(weight[i], size2(z))
		}
		if weight[i] == 0 {
			return false
		}
		weight[i] = 1 / weight[i]
	}
	for k := range n {
		p, best := k, 0.0
		for i := k; i < n; i++ {
			if s := size2(m.a[i][k]) * weight[i]; s > best {
				p, best = i, s
			}
		}
		if !(best > 1e-28) { // NaN too
			return false
		}
		if p != k {
			m.a[p], m.a[k] = m.a[k], m.a[p]
			m.row[p], m.row[k] = m.row[k], m.row[p]
			weight[p], weight[k] = weight[k], weight[p]
		}
		pivot := &m.a[k]
		inv := inverse(pivot[k])
		pivot[k] = inv
		for i := k + 1; i < n; i++ {
			row := &m.a[i]
			f := row[k] * inv
			row[k] = f
			for j := k + 1; j < n; j++ {
				row[j] -= f * pivot[j]
			}
		}
	}
	return true
}

// solve replaces b by the solution of A·x = b.
func (m *lu) solve(b *point) {
	n := m.n
	var x point
	for i := range n {
		s := b[m.row[i]]
		for j := range i {
			s -= m.a[i][j] * x[j]
		}
		x[i] = s
	}
	for i := n - 1; i >= 0; i-- {
		s := x[i]
		for j := i + 1; j < n; j++ {
			s -= m.a[i][j] * x[j]
		}
		x[i] = s * m.a[i][i]
	}
	*b = x
}

// inverseNorm is the Frobenius norm of the inverse of the factored matrix.
func (m *lu) inverseNorm() float64 {
	s := 0.0
	for k := range m.n {
		var e point
		e[k] = 1
		m.solve(&e)
		c := e.norm()
		s += c * c
	}
	return math.Sqrt(s)
}
