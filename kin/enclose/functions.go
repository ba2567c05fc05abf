package enclose

import "math"

// tangent sets z to φ(x): the tangent at x.C, where φ has the value v and the slope d, and a rest between low and high,
// all of them within 2⁻⁴⁸ of m or of their own sizes.
func (z *Form) tangent(x *Form, v, d, low, high, m float64) *Form {
	r := math.Abs(d)*x.R + 0.5*(high-low)
	m += math.Abs(v) + math.Abs(low) + math.Abs(high) + math.Abs(d)*x.Spread()
	z.C = v + 0.5*(low+high)
	for k := range z.G {
		z.G[k] = d * x.G[k]
	}
	return z.settle(r, m)
}

// Inv sets z to 1/x; unknown where x can be 0.
//
// With x = c(1+e) the rest over the tangent is (1/c) e²/(1+e), and |e| ≤ d gives 0 to d²/(1-d) of 1/c.
func (z *Form) Inv(x *Form) *Form {
	c := math.Abs(x.C)
	d := x.away() / c * (1 + widen)
	if !(d < 1 && c >= least && c <= most) {
		return z.unknown()
	}
	v := 1 / x.C
	q := v * (d * d / (1 - d))
	return z.tangent(x, v, -v*v, min(q, 0), max(q, 0), 0)
}

// Div sets z to x/y; unknown where y can be 0.
func (z *Form) Div(x, y *Form) *Form {
	var i Form
	return z.Mul(x, i.Inv(y))
}

// Sqrt sets z to the square root of x; unknown where x can be below 0.
//
// The rest over the tangent at c is -(x-c)²/(2√c(√x+√c)²); |x-c| ≤ d·c gives 0 to √c d²/(2(1+√(1-d))²) below it.
func (z *Form) Sqrt(x *Form) *Form {
	d := x.away() / x.C * (1 + widen)
	if !(d >= 0 && d <= 1 && x.C >= least && x.C <= most) {
		return z.unknown()
	}
	v := math.Sqrt(x.C)
	s := 1 + math.Sqrt(1-d)
	return z.tangent(x, v, 0.5/v, -0.5*v*d*d/(s*s), 0, 0)
}

// beyond is the argument up to which sine and cosine are trusted.
const beyond = 0x1p20

// Sin sets z to the sine of x.
func (z *Form) Sin(x *Form) *Form {
	sin, cos := math.Sincos(x.C)
	return z.wave(x, sin, cos)
}

// Cos sets z to the cosine of x.
func (z *Form) Cos(x *Form) *Form {
	sin, cos := math.Sincos(x.C)
	return z.wave(x, cos, -sin)
}

// wave sets z to the sine or cosine of x, of the value v and slope d at x.C. The second derivative is minus the value,
// which moves by no more than x does.
func (z *Form) wave(x *Form, v, d float64) *Form {
	if !x.Known() {
		return z.unknown()
	}
	w := x.away()
	if !(w < 2 && math.Abs(x.C) < beyond) {
		*z = Form{R: 1} // between -1 and 1, wherever x is
		return z
	}
	q := 0.5 * w * w
	low, high := q*max(-1, -v-w), q*min(1, w-v)
	return z.tangent(x, v, d, min(low, 0), max(high, 0), 2*(1+w))
}

// Acos sets z to the arccosine of x; unknown where x can reach -1 or 1, where the slope has no bound.
//
// The second derivative -x/(1-x²)^1.5 falls all the way from -1 to 1.
func (z *Form) Acos(x *Form) *Form {
	w := x.away() + widen
	low, high := x.C-w, x.C+w
	if !(low > -1 && high < 1) {
		return z.unknown()
	}
	v := 2 * math.Atan2(math.Sqrt(1-x.C), math.Sqrt(1+x.C))
	d := -1 / math.Sqrt((1-x.C)*(1+x.C))
	bend := func(x float64) float64 {
		c := (1 - x) * (1 + x)
		return -x / (c * math.Sqrt(c))
	}
	q := 0.5 * w * w
	return z.tangent(x, v, d, min(q*bend(high), 0), max(q*bend(low), 0), 4)
}

// Atan2 sets z to the angle of the point (x, y), as math.Atan2 has the arguments. It is the branch that is
// continuous over the box and in [-π, π] at the centre; unknown where the point can be the origin.
//
// The angle is the imaginary part of log(x+iy). With the point at (1+e) times the centre, |log(1+e)-e| ≤ |e|²/(2(1-|e|)).
func (z *Form) Atan2(y, x *Form) *Form {
	a, b := x.C, y.C
	s := a*a + b*b
	if !(s >= least && s <= most) {
		return z.unknown()
	}
	wx, wy := x.away(), y.away()
	e := math.Sqrt((wx*wx+wy*wy)/s) * (1 + widen)
	if !(e < 1) {
		return z.unknown()
	}
	a, b = a/s, b/s
	r := math.Abs(a)*y.R + math.Abs(b)*x.R + 0.5*e*e/(1-e)
	m := math.Abs(a)*y.Spread() + math.Abs(b)*x.Spread() + 4
	z.C = math.Atan2(y.C, x.C)
	for k := range z.G {
		z.G[k] = a*y.G[k] - b*x.G[k]
	}
	return z.settle(r, m)
}
