package proof

// symmetric is the lower triangle of a symmetric matrix of order six, row by row; of a smaller one, the first rows.
type symmetric [21]float64

// place is where row i, column j of a symmetric matrix is found.
func place(i, j int) int {
	if i < j {
		i, j = j, i
	}
	return i*(i+1)/2 + j
}

// definite tells whether a - shift·I is positive definite, a of order n. It may say no wrongly; where it
// says yes, a - (shift-e)·I is positive definite with an e below 1e-14 of the trace of a - shift·I: a
// triangular decomposition that ends with positive pivots is that of a matrix not further away
// (J. Demmel 1989, LAPACK Working Note 14; S. M. Rump 2006, BIT 46:433; from memory). Callers add slack of the
// matrices' size, which is far more.
func definite(n int, a *symmetric, shift float64) bool {
	if n != 6 {
		return definiteSmall(n, a, shift)
	}
	d0 := a[0] - shift
	if !(d0 > 0) {
		return false
	}
	i0 := 1 / d0
	l1, l2, l3, l4, l5 := a[1]*i0, a[3]*i0, a[6]*i0, a[10]*i0, a[15]*i0
	d1 := a[2] - shift - l1*a[1]
	if !(d1 > 0) {
		return false
	}
	b2, b3, b4, b5 := a[4]-l2*a[1], a[7]-l3*a[1], a[11]-l4*a[1], a[16]-l5*a[1]
	c22, c32, c42, c52 := a[5]-shift-l2*a[3], a[8]-l3*a[3], a[12]-l4*a[3], a[17]-l5*a[3]
	c33, c43, c53 := a[9]-shift-l3*a[6], a[13]-l4*a[6], a[18]-l5*a[6]
	c44, c54 := a[14]-shift-l4*a[10], a[19]-l5*a[10]
	c55 := a[20] - shift - l5*a[15]
	i1 := 1 / d1
	m2, m3, m4, m5 := b2*i1, b3*i1, b4*i1, b5*i1
	d2 := c22 - m2*b2
	if !(d2 > 0) {
		return false
	}
	e3, e4, e5 := c32-m3*b2, c42-m4*b2, c52-m5*b2
	f33, f43, f53 := c33-m3*b3, c43-m4*b3, c53-m5*b3
	f44, f54 := c44-m4*b4, c54-m5*b4
	f55 := c55 - m5*b5
	i2 := 1 / d2
	n3, n4, n5 := e3*i2, e4*i2, e5*i2
	d3 := f33 - n3*e3
	if !(d3 > 0) {
		return false
	}
	g4, g5 := f43-n4*e3, f53-n5*e3
	h44, h54 := f44-n4*e4, f54-n5*e4
	h55 := f55 - n5*e5
	i3 := 1 / d3
	o4, o5 := g4*i3, g5*i3
	d4 := h44 - o4*g4
	if !(d4 > 0) {
		return false
	}
	k5 := h54 - o5*g4
	return h55-o5*g5-k5*k5/d4 > 0
}

// definiteSmall is definite by loops.
func definiteSmall(n int, a *symmetric, shift float64) bool {
	w := *a
	for k := range n {
		d := w[place(k, k)] - shift
		if !(d > 0) {
			return false
		}
		for i := k + 1; i < n; i++ {
			l := w[place(i, k)] / d
			for j := k + 1; j <= i; j++ {
				w[place(i, j)] -= l * w[place(j, k)]
			}
		}
	}
	return true
}
