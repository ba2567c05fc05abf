package proof

import "math"

// polar holds the polar decomposition c = U·H of a matrix with its extreme singular vectors, all of them approximate:
// what is proved with them does not depend on how close they are.
type polar struct {
	u      matrix     // orthogonal factor
	bent   float64    // bound of the norm of uᵀu - I
	h      symmetric  // uᵀc, made symmetric
	v, w   [6]float64 // right and left vector of the smallest singular value
	p, q   [6]float64 // right and left vector of the largest
	lo, hi float64    // smallest and largest singular value
}

// factor finds the decomposition of the matrix a of order n by Newton's iteration for the orthogonal factor, scaled by the
// norms of the matrix and of its inverse (N. J. Higham 1986, SIAM J. Sci. Stat. Comput. 7:1160, from memory), and the
// vectors by power iteration. x is an approximate inverse of a.
func (z *polar) factor(n int, a, x *matrix, inv *inverter) bool {
	z.u = *a
	y := *x
	for step := 0; ; step++ {
		if step == 20 {
			return false
		}
		scale := 1.0
		if step < 5 {
			scale = math.Sqrt(math.Sqrt(y.norm2() / z.u.norm2()))
		}
		f, g, moved := 0.5*scale, 0.5/scale, 0.0
		for i := range n {
			for j := range n {
				old := z.u[6*i+j]
				new := f*old + g*y[6*j+i]
				z.u[6*i+j] = new
				moved += (new - old) * (new - old)
			}
		}
		if moved < 1e-16 {
			break
		}
		if inv.invert(n, &z.u, &y) == 0 {
			return false
		}
	}
	z.bent = 0
	for i := range n {
		for j := range i + 1 {
			sum := 0.0
			for k := range n {
				sum += z.u[6*k+i] * z.u[6*k+j]
			}
			if i == j {
				sum--
			}
			z.bent += 2 * sum * sum
		}
	}
	z.bent = math.Sqrt(z.bent)*(1+slack) + slack
	z.project(n, a, &z.h)
	z.smallest(n, x)
	z.largest(n)
	return z.bent < 1e-6
}

// project sets s to the symmetric part of uᵀa.
func (z *polar) project(n int, a *matrix, s *symmetric) {
	var p matrix
	for k := range n {
		row := (*[6]float64)(a[6*k : 6*k+6])
		for i := range n {
			u := z.u[6*k+i]
			o := (*[6]float64)(p[6*i : 6*i+6])
			o[0] += u * row[0]
			o[1] += u * row[1]
			o[2] += u * row[2]
			o[3] += u * row[3]
			o[4] += u * row[4]
			o[5] += u * row[5]
		}
	}
	at := 0
	for i := range n {
		for j := range i + 1 {
			s[at] = 0.5 * (p[6*i+j] + p[6*j+i])
			at++
		}
	}
}

// smallest finds v and w by power iteration on the inverse, x·u.
func (z *polar) smallest(n int, x *matrix) {
	var m matrix
	m.mul(x, &z.u)
	z.v = start(n)
	z.lo = 1 / iterate(n, &m, &z.v, 12)
	z.w = apply(n, &z.u, &z.v)
}

// largest finds p and q by power iteration on h.
func (z *polar) largest(n int) {
	var m matrix
	for i := range n {
		for j := range n {
			m[6*i+j] = z.h[place(i, j)]
		}
	}
	z.p = start(n)
	z.hi = iterate(n, &m, &z.p, 12)
	z.q = apply(n, &z.u, &z.p)
}

// start is a vector that is not square to any in particular.
func start(n int) (v [6]float64) {
	for i := range n {
		v[i] = [6]float64{0.5, 0.46, 0.42, 0.39, 0.35, 0.31}[i]
	}
	return v
}

// iterate turns v towards the vector of the largest eigenvalue of the positive matrix m and gives an estimate of it.
func iterate(n int, m *matrix, v *[6]float64, steps int) float64 {
	size := 0.0
	for range steps {
		y := apply(n, m, v)
		size = length(&y)
		for i := range y {
			v[i] = y[i] / size
		}
	}
	return size
}

// apply is m·v.
func apply(n int, m *matrix, v *[6]float64) (y [6]float64) {
	for i := range n {
		r := (*[6]float64)(m[6*i : 6*i+6])
		y[i] = (r[0]*v[0] + r[1]*v[1] + r[2]*v[2]) + (r[3]*v[3] + r[4]*v[4] + r[5]*v[5])
	}
	return y
}

// length is the Euclidean norm.
func length(v *[6]float64) float64 {
	return math.Sqrt((v[0]*v[0] + v[1]*v[1] + v[2]*v[2]) + (v[3]*v[3] + v[4]*v[4] + v[5]*v[5]))
}

// dot is the scalar product.
func dot(a, b *[6]float64) float64 {
	return (a[0]*b[0] + a[1]*b[1] + a[2]*b[2]) + (a[3]*b[3] + a[4]*b[4] + a[5]*b[5])
}
