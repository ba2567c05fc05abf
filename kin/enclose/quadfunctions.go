package enclose

import "math"

// taylor sets z to φ(x): φ, its slope and half its second derivative at x.C are v, d1 and d2, and what is left out of
// Taylor's series is at most t. Each of them is within 2⁻⁴⁸ of m or of its own size.
//
// With the parts of x beyond C of sizes l, q and R, the square of their sum differs from that of
// the first part by at most (q+R)(2l+q+R).
func (z *Quad) taylor(x *Quad, v, d1, d2, t, m float64) *Quad {
	l, q := x.sizes()
	w := q + x.R
	r := math.Abs(d1)*x.R + math.Abs(d2)*(w*(2*l+w)) + t
	m += math.Abs(v) + math.Abs(d1)*(l+q) + math.Abs(d2)*l*l
	z.C = v
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
// With x = c(1+e), 1/x is (1 - e + e²)/c and less than |e|³/(1-|e|) of 1/c more.
func (z *Quad) Inv(x *Quad) *Quad {
	c := math.Abs(x.C)
	e := x.away() / c * (1 + widen)
	if !(e < 1 && c >= least && c <= most) {
		return z.unknown()
	}
	v := 1 / x.C
	return z.taylor(x, v, -v*v, v*v*v, e*e*e/(1-e)*math.Abs(v), 0)
}

// Sqrt sets z to the square root of x; unknown where x can be below 0.
//
// With x = c(1+e) the series is √c (1 + e/2 - e²/8 + …). The sizes of its other coefficients, that of e³ being
// 1/16, fall, and their sum is 3/8: they give less than |e|³ times the lesser of 3/8 and 1/16/(1-|e|).
func (z *Quad) Sqrt(x *Quad) *Quad {
	e := x.away() / x.C * (1 + widen)
	if !(e >= 0 && e <= 1 && x.C >= least && x.C <= most) {
		return z.unknown()
	}
	v := math.Sqrt(x.C)
	return z.taylor(x, v, 0.5/v, -0.125/(v*x.C), e*e*e*v*min(0.375, 0.0625/(1-e)), 0)
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
	return z.taylor(x, v, d, -0.5*v, w*w*w/6, 2*(1+w+w*w))
}

// Atan2 sets z to the angle of the point (x, y), as Form.Atan2.
//
// The angle is the imaginary part of log(x+iy). With the point at (1+e) times the centre, e = a + ib, log(1+e) is
// e - e²/2 and at most |e|³/3/(1-|e|) more; the imaginary part of e - e²/2 is b - ab.
func (z *Quad) Atan2(y, x *Quad) *Quad {
	s := x.C*x.C + y.C*y.C
	if !(s >= least && s <= most) {
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
