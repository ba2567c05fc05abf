package proof

import (
	"math"

	"legwright/kin/linalg"
)

// conditioner proves bounds of the singular values of a family of matrices.
//
// Let U be the orthogonal polar factor of the family's centre. For unit vectors x, |Jx| ≥ xᵀUᵀJx, so that
// σmin(J) ≥ λmin(sym(UᵀJ)), with equality at the centre, to first order. This is a concave function of J, and σmax a convex one:
// σmin ≥ k·σmax + floor holds on the whole family without its remainder if it holds at the family's 2ᵈ vertices, and there a
// triangular decomposition decides it. The remainder E enters by |xᵀUᵀEx| ≤ Σ r|Ux||x| ≤ ½(Ux)ᵀD₁(Ux) + ½xᵀD₂x, with
// diagonal matrices that make this equal to wᵀrv for the vectors w, v of the least singular value at the centre.
type conditioner struct {
	s, rest symmetric
	sk      [6]symmetric
	tilt    [6]float64 // slopes of σmax
	j       matrix
	t       [6]float64
}

// holds proves σmin ≥ k·σmax + floor for every matrix of the family, of whose centre p is the polar decomposition.
// Where it cannot, vertex is the corner at which the condition seems to be worst: bit i is set where t[i] is 1.
func (z *conditioner) holds(m *family, p *polar, k, floor float64) (ok bool, vertex int) {
	n, d := m.n, m.d
	// A bent U gives |Jx| ≥ xᵀUᵀJx/|U|, |U|² ≤ 1 + bent.
	widened := (1 + p.bent)
	floor = (floor+k*m.rest)*widened + slack*m.size
	k *= widened
	z.loss(m, p)
	z.s = p.h
	for i := range z.s {
		z.s[i] -= z.rest[i]
	}
	low := quadratic(n, &z.s, &p.v) - k*p.hi - floor
	if !(low > 0) {
		return false, -1
	}
	// The vertex at which the first-order change is worst comes first.
	eta := 0.0
	for i := range d {
		g := &m.g[i]
		y := apply(n, g, &p.v)
		c := dot(&y, &p.w)
		if k > 0 {
			y = apply(n, g, &p.p)
			z.tilt[i] = dot(&y, &p.q)
			c -= k * z.tilt[i]
			eta += g.norm()
		}
		z.t[i] = 1
		if c > 0 {
			z.t[i] = -1
		}
		low -= math.Abs(c)
	}
	vertex = z.vertex(d)
	if !(low > 0) {
		return false, vertex
	}
	eta *= eta / p.hi
	tau := p.hi
	z.j = m.c
	for i := range d {
		p.project(n, &m.g[i], &z.sk[i])
		addSymmetric(&z.s, z.t[i], &z.sk[i])
		tau += z.t[i] * z.tilt[i]
		if k > 0 {
			addMatrix(&z.j, z.t[i], &m.g[i])
		}
	}
	for c := 1; ; c++ {
		most := 0.0
		if k > 0 {
			most = z.stretch(n, tau, eta, slack*m.size)
		}
		if !definite(n, &z.s, k*most+floor) {
			return false, z.vertex(d)
		}
		if c == 1<<d {
			return true, -1
		}
		i := turn(c)
		f := -2 * z.t[i]
		z.t[i] = -z.t[i]
		addSymmetric(&z.s, f, &z.sk[i])
		tau += f * z.tilt[i]
		if k > 0 {
			addMatrix(&z.j, f, &m.g[i])
		}
	}
}

// below proves σmax ≤ most for every matrix of the family.
func (z *conditioner) below(m *family, p *polar, most float64) (ok bool, vertex int) {
	n, d := m.n, m.d
	most -= m.rest + slack*m.size
	if !(most > p.hi) {
		return false, -1
	}
	z.j = m.c
	for i := range d {
		y := apply(n, &m.g[i], &p.p)
		z.t[i] = 1
		if dot(&y, &p.q) < 0 {
			z.t[i] = -1
		}
		addMatrix(&z.j, z.t[i], &m.g[i])
	}
	for c := 1; ; c++ {
		if !z.within(n, most) {
			return false, z.vertex(d)
		}
		if c == 1<<d {
			return true, -1
		}
		i := turn(c)
		f := -2 * z.t[i]
		z.t[i] = -z.t[i]
		addMatrix(&z.j, f, &m.g[i])
	}
}

// stretch is an upper bound of σmax at the vertex in work: the linear guess where it holds. Where several singular values
// are near to each other it does not; then σmax is worked out, and the bound holds a little above that.
func (z *conditioner) stretch(n int, guess, eta, rounding float64) float64 {
	if most := guess + eta; z.within(n, most) {
		return most + rounding
	}
	var own [36]float64
	for i := range n {
		copy(own[n*i:n*i+n], z.j[6*i:6*i+n])
	}
	_, hi := linalg.Singular(n, &own)
	if most := hi * (1 + 1e-9); z.within(n, most) {
		return most + rounding
	}
	return z.j.norm() + rounding
}

// within tells whether σmax of the matrix at the vertex in work is below most, up to rounding.
func (z *conditioner) within(n int, most float64) bool {
	var g symmetric
	at := 0
	for i := range n {
		x := (*[6]float64)(z.j[6*i : 6*i+6])
		for j := range i + 1 {
			g[at] = -dot(x, (*[6]float64)(z.j[6*j:6*j+6]))
			at++
		}
	}
	return definite(n, &g, -most*most)
}

// loss sets rest to ½(UᵀD₁U + D₂).
func (z *conditioner) loss(m *family, p *polar) {
	n := m.n
	var left, right [6]float64
	least := 0.35 / math.Sqrt(float64(n))
	for i := range n {
		left[i], right[i] = max(math.Abs(p.w[i]), least), max(math.Abs(p.v[i]), least)
	}
	var d1, d2 [6]float64
	for i := range n {
		for j := range n {
			r := m.r[6*i+j]
			d1[i] += r * right[j]
			d2[j] += r * left[i]
		}
	}
	for i := range n {
		d1[i] *= 0.5 / left[i]
		d2[i] *= 0.5 / right[i]
	}
	z.rest = symmetric{}
	for k := range n {
		u := (*[6]float64)(p.u[6*k : 6*k+6])
		at := 0
		for i := range n {
			f := d1[k] * u[i]
			for j := range i + 1 {
				z.rest[at] += f * u[j]
				at++
			}
		}
	}
	for i := range n {
		z.rest[place(i, i)] += d2[i]
	}
}

// vertex is the vertex in work.
func (z *conditioner) vertex(d int) int {
	v := 0
	for i := range d {
		if z.t[i] > 0 {
			v |= 1 << i
		}
	}
	return v
}

// turn is the coordinate that changes at step c ≥ 1 of a walk through all vertices (F. Gray's reflected code).
func turn(c int) int {
	i := 0
	for c>>i&1 == 0 {
		i++
	}
	return i
}

// quadratic is xᵀsx.
func quadratic(n int, s *symmetric, x *[6]float64) float64 {
	sum, at := 0.0, 0
	for i := range n {
		for j := range i {
			sum += 2 * s[at] * x[i] * x[j]
			at++
		}
		sum += s[at] * x[i] * x[i]
		at++
	}
	return sum
}

func addSymmetric(z *symmetric, f float64, a *symmetric) {
	for i := range z {
		z[i] += f * a[i]
	}
}

func addMatrix(z *matrix, f float64, a *matrix) {
	for i := range z {
		z[i] += f * a[i]
	}
}
