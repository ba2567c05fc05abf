package enclose

import "math"

// Divisors and radicands of quads lie within these: third powers of their inverses then neither overflow nor underflow, and a
// product of a second derivative and a slope that underflows, times another slope, is less than 2⁻⁴⁸ of the
// first derivative times that slope.
const (
	quadLeast = 0x1p-100
	quadMost  = 0x1p100
)

// taylor sets z to φ(x): φ, its slope and half its second derivative at x.C are v, d1 and d2, and what is left out of
// Taylor's series lies between low and high. Each of them is within 2⁻⁴⁸ of m or of its own size.
//
// With the parts of x beyond C of sizes l, q and R, the square of their sum differs from that of
// the first part by at most (q+R)(2l+q+R).
func (z *Quad) taylor(x *Quad, v, d1, d2, low, high, m float64) *Quad {
	l, q := x.sizes()
	w := q + x.R
	r := math.Abs(d1)*x.R + math.Abs(d2)*(w*(2*l+w)) + 0.5*(high-low)
	m += math.Abs(v) + math.Abs(d1)*(l+q) + math.Abs(d2)*l*l + math.Abs(low) + math.Abs(high)
	z.C = v + 0.5*(low+high)
	n := 0
	g := x.G
	for j := range g {
		s := d2 * g[j]
		z.G[j] = d1 * g[j]
		z.H[n] = d1*x.H[n] + s*g[j]
		n++
		for k := j + 1; k < Coords; k++ {
			z.H[n] = d1*x.H[n] + 2*s*g[k]
			n++
		}
	}
	return z.settle(r, m)
}

// away is an upper bound of |f(t) - C|.
func (z *Quad) away() float64 {
	l, q := z.sizes()
	return (l + q + z.R) * (1 + widen)
}

// Inv sets z to 1/x; unknown where x can be 0.
//
// With x = c(1+e), 1/x is (1 - e + e² - e³/(1+e))/c, and the last part falls all the way from e = -d to d.
func (z *Quad) Inv(x *Quad) *Quad {
	c := math.Abs(x.C)
	d := x.away() / c * (1 + widen)
	if !(d < 1 && c >= quadLeast && c <= quadMost) {
		return z.unknown()
	}
	v := 1 / x.C
	q := v * d * d * d
	a, b := -q/(1+d), q/(1-d)
	return z.taylor(x, v, -v*v, v*v*v, min(a, b), max(a, b), 0)
}

// Sqrt sets z to the square root of x; unknown where x can be below 0.
//
// With x = c(1+e) and s = √(1+e), s is 1 + e/2 - e²/8 + e³ (3+s)/(8(1+s)³), and the last part
// grows all the way from e = -d to d.
func (z *Quad) Sqrt(x *Quad) *Quad {
	d := x.away() / x.C * (1 + widen)
	if !(d >= 0 && d <= 1 && x.C >= quadLeast && x.C <= quadMost) {
		return z.unknown()
	}
	v := math.Sqrt(x.C)
	rest := func(s float64) float64 {
		t := 1 + s
		return v * (d * d * d * (3 + s) / (8 * t * t * t))
	}
	return z.taylor(x, v, 0.5/v, -0.125/(v*x.C), -rest(math.Sqrt(1-d)), rest(math.Sqrt(1+d)), 0)
}

// InvSqrt sets z to 1 over the square root of x; unknown where x can be 0 or below.
//
// With x = c(1+e) and s = √(1+e), 1/s is 1 - e/2 + 3e²/8 - e³ (8+9s+3s²)/(8s(1+s)³), and the last part
// falls all the way from e = -d to d.
func (z *Quad) InvSqrt(x *Quad) *Quad {
	d := x.away() / x.C * (1 + widen)
	if !(d >= 0 && d < 1 && x.C >= quadLeast && x.C <= quadMost) {
		return z.unknown()
	}
	v := 1 / math.Sqrt(x.C)
	rest := func(s float64) float64 {
		t := 1 + s
		return v * (d * d * d * (8 + s*(9+3*s)) / (8 * s * (t * t * t)))
	}
	d1 := -0.5 * v / x.C
	return z.taylor(x, v, d1, -0.75*d1/x.C, -rest(math.Sqrt(1+d)), rest(math.Sqrt(1-d)), 0)
}

// Sin sets z to the sine of x.
func (z *Quad) Sin(x *Quad) *Quad {
	sin, cos := math.Sincos(x.C)
	return z.wave(x, sin, cos)
}

// Cos sets z to the cosine of x.
func (z *Quad) Cos(x *Quad) *Quad {
	sin, cos := math.Sincos(x.C)
	return z.wave(x, cos, -sin)
}

// wave sets z to the sine or cosine of x, of the value v and slope d at x.C; the third derivative is at most 1.
func (z *Quad) wave(x *Quad, v, d float64) *Quad {
	w := x.away()
	if !(w <= math.MaxFloat64) {
		return z.unknown()
	}
	if !(w < 2 && math.Abs(x.C) < beyond) {
		*z = Quad{R: 1}
		return z
	}
	return z.taylor(x, v, d, -0.5*v, -w*w*w/6, w*w*w/6, 2*(1+w+w*w))
}

// Atan2 sets z to the angle of the point (x, y), as Form.Atan2.
//
// The angle is the imaginary part of log(x+iy). With the point at (1+e) times the centre, e = a + ib, log(1+e) is
// e - e²/2 and at most |e|³/3/(1-|e|) more; the imaginary part of e - e²/2 is b - ab.
func (z *Quad) Atan2(y, x *Quad) *Quad {
	s := x.C*x.C + y.C*y.C
	if !(s >= quadLeast && s <= quadMost) {
		return z.unknown()
	}
	wx, wy := x.away(), y.away()
	e := math.Sqrt((wx*wx+wy*wy)/s) * (1 + widen)
	if !(e < 1) {
		return z.unknown()
	}
	at := math.Atan2(y.C, x.C)
	c, d := x.C/s, y.C/s
	var a, b, u, v Quad
	u, v = *x, *y
	u.C, v.C = 0, 0
	a.AddScaled(a.Scale(&u, c), d, &v)
	b.AddScaled(b.Scale(&v, c), -d, &u)
	u.Mul(&a, &b)
	z.Sub(&b, &u)
	z.C += at
	return z.settle(z.R+e*e*e/(3*(1-e)), math.Abs(z.C)+4)
}
