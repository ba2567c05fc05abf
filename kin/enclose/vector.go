package enclose

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Const sets z to a vector of numbers.
func (z *Vec) Const(v r3.Vec) *Vec {
	z[0].Const(v.X)
	z[1].Const(v.Y)
	z[2].Const(v.Z)
	return z
}

// Add sets z to x + y.
func (z *Vec) Add(x, y *Vec) *Vec {
	for c := range z {
		z[c].Add(&x[c], &y[c])
	}
	return z
}

// Sub sets z to x - y.
func (z *Vec) Sub(x, y *Vec) *Vec {
	for c := range z {
		z[c].Sub(&x[c], &y[c])
	}
	return z
}

// AddConst sets z to x + v.
func (z *Vec) AddConst(x *Vec, v r3.Vec) *Vec {
	z[0].AddConst(&x[0], v.X)
	z[1].AddConst(&x[1], v.Y)
	z[2].AddConst(&x[2], v.Z)
	return z
}

// Scale sets z to a·x.
func (z *Vec) Scale(x *Vec, a float64) *Vec {
	for c := range z {
		z[c].Scale(&x[c], a)
	}
	return z
}

// Mul sets z to f·x.
func (z *Vec) Mul(x *Vec, f *Form) *Vec {
	g := *f
	for c := range z {
		z[c].Mul(&x[c], &g)
	}
	return z
}

// Along sets z to the dot product of x with a vector of numbers.
func (z *Form) Along(x *Vec, v r3.Vec) *Form {
	var p Form
	p.Scale(&x[0], v.X)
	p.AddScaled(&p, v.Y, &x[1])
	return z.AddScaled(&p, v.Z, &x[2])
}

// Turn sets z to R·v, R row by row.
func (z *Vec) Turn(rot *[9]Form, v r3.Vec) *Vec {
	for c := range z {
		z[c].Along((*Vec)(rot[3*c:3*c+3]), v)
	}
	return z
}

// reach gives bounds over the box of what moves x from its centre: of the whole, and of the remainders alone.
func (x *Vec) reach() (whole, rest float64) {
	sum, r2 := 0., 0.
	for k := range Coords {
		a, b, c := x[0].G[k], x[1].G[k], x[2].G[k]
		sum += math.Sqrt(a*a + b*b + c*c)
	}
	w2 := 0.
	for c := range x {
		w := x[c].Spread()
		w2 += w * w
		r2 += x[c].R * x[c].R
	}
	rest = math.Sqrt(r2)
	return (min(sum, math.Sqrt(w2))+rest)*(1+widen) + tiny, rest*(1+widen) + tiny
}

// Norm sets z to the length of x; unknown where x can be 0.
//
// With the length l at the centre and the unit vector n there, moved by h, |h| ≤ d, the length lies
// between l + n·h and l + n·h + d²/(2l): the greatest excess is met where the length is l again.
func (z *Form) Norm(x *Vec) *Form {
	l2 := x[0].C*x[0].C + x[1].C*x[1].C + x[2].C*x[2].C
	d, rest := x.reach()
	if !(l2 >= least && l2 <= most && d*d < l2) {
		return z.unknown()
	}
	l := math.Sqrt(l2)
	a, b, c := x[0].C/l, x[1].C/l, x[2].C/l
	q := 0.25 * d * d / l
	var g [Coords]float64
	for k := range g {
		g[k] = a*x[0].G[k] + b*x[1].G[k] + c*x[2].G[k]
	}
	z.C, z.G = l+q, g
	return z.settle(rest+q, l+q+2*d)
}

// Unit sets z to x/|x|; unknown where x can be 0.
//
// The second derivative of x/|x| in a unit direction is at most 2/√3 over |x|² long. Let l be the length at the centre, d
// how far x moves and e = d/l. The rest over the tangent is at most the integral of (1-τ) 2/√3 e²/(1-τe)² over τ from 0 to
// 1, which is 2/√3 (-log(1-e) - e) and at most 0.57736 e²/(1-e).
func (z *Vec) Unit(x *Vec) *Vec {
	l2 := x[0].C*x[0].C + x[1].C*x[1].C + x[2].C*x[2].C
	d, rest := x.reach()
	l := math.Sqrt(l2)
	low := l*(1-widen) - d
	if !(l2 >= least && l2 <= most && low > 0) {
		for c := range z {
			z[c].unknown()
		}
		return z
	}
	e := 0.57736*d*d/(l*low) + rest/l
	n := [3]float64{x[0].C / l, x[1].C / l, x[2].C / l}
	var g [3][Coords]float64
	for k := range Coords {
		a, b, c := x[0].G[k], x[1].G[k], x[2].G[k]
		dot := n[0]*a + n[1]*b + n[2]*c
		g[0][k] = (a - n[0]*dot) / l
		g[1][k] = (b - n[1]*dot) / l
		g[2][k] = (c - n[2]*dot) / l
	}
	m := 1 + 12*d/l
	for c := range z {
		z[c].C, z[c].G = n[c], g[c]
		z[c].settle(e, m)
	}
	return z
}
