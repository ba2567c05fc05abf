package enclose

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// pairsOf is the number of products t[j]t[k] with j ≤ k.
const pairsOf = Coords * (Coords + 1) / 2

// Quad is a form of second degree: for every point of the box f(t) lies within
//
//	C + Σ G[k] t[k] + Σ H[jk] t[j]t[k] ± R,   j ≤ k, row by row.
//
// A chain of operations on quads that ends in a Form takes the size of the part of second degree once, at the end,
// after all that cancels in it has done so; its remainder comes out nearly as small as one of second order can be, at
// two or three times the cost. The rule of rounding is that of forms, H being coefficients too. (Taylor models of second
// degree: M. Berz and K. Makino 1998, as the package.)
type Quad struct {
	C float64
	G [Coords]float64
	H [pairsOf]float64
	R float64
}

// QuadVec is a vector of quads.
type QuadVec [3]Quad

// Set sets z to the form.
func (z *Quad) Set(x *Form) *Quad {
	*z = Quad{C: x.C, G: x.G, R: x.R}
	return z
}

// Const sets z to a number.
func (z *Quad) Const(c float64) *Quad {
	var f Form
	return z.Set(f.Const(c))
}

// Quad sets z to the quad with its part of second degree in the remainder: t[k]² lies in [0, 1], so that half its
// coefficient goes to C.
func (z *Form) Quad(x *Quad) *Form {
	mid, rest, n := 0., 0., 0
	for j := range x.G {
		mid += x.H[n]
		rest += 0.5 * math.Abs(x.H[n])
		n++
		for range Coords - 1 - j {
			rest += math.Abs(x.H[n])
			n++
		}
	}
	z.C, z.G = x.C+0.5*mid, x.G
	return z.settle(x.R+rest, math.Abs(x.C)+rest)
}

// sizes are those of the parts of first and of second degree, up to rounding.
func (z *Quad) sizes() (l, q float64) {
	g, h := &z.G, &z.H
	l = (math.Abs(g[0]) + math.Abs(g[1]) + math.Abs(g[2])) + (math.Abs(g[3]) + math.Abs(g[4]) + math.Abs(g[5]))
	var a, b, c float64 // three sums at a time
	for k := range pairsOf / 3 {
		a += math.Abs(h[k])
		b += math.Abs(h[k+pairsOf/3])
		c += math.Abs(h[k+2*(pairsOf/3)])
	}
	return l, a + b + c
}

// settle is that of forms.
func (z *Quad) settle(r, m float64) *Quad {
	z.R = (r+widen*m)*(1+widen) + tiny
	if !(z.R <= math.MaxFloat64) {
		z.R = math.Inf(1)
	}
	return z
}

// unknown sets z to a quad of which nothing is known.
func (z *Quad) unknown() *Quad {
	*z = Quad{R: math.Inf(1)}
	return z
}

// Bounds are numbers between which f lies; infinite where nothing is known.
func (z *Quad) Bounds() (low, high float64) {
	var f Form
	f.Quad(z)
	return f.Lower(), f.Upper()
}

// Neg sets z to -x.
func (z *Quad) Neg(x *Quad) *Quad {
	z.C, z.R = -x.C, x.R
	for k := range z.G {
		z.G[k] = -x.G[k]
	}
	for k := range z.H {
		z.H[k] = -x.H[k]
	}
	return z
}

// AddConst sets z to x + a.
func (z *Quad) AddConst(x *Quad, a float64) *Quad {
	z.C, z.G, z.H = x.C+a, x.G, x.H
	return z.settle(x.R, math.Abs(z.C))
}

// Scale sets z to a·x.
func (z *Quad) Scale(x *Quad, a float64) *Quad {
	z.C = a * x.C
	for k := range z.G {
		z.G[k] = a * x.G[k]
	}
	for k := range z.H {
		z.H[k] = a * x.H[k]
	}
	l, q := z.sizes()
	return z.settle(math.Abs(a)*x.R, math.Abs(z.C)+l+q)
}

// Add sets z to x + y.
func (z *Quad) Add(x, y *Quad) *Quad { return z.AddScaled(x, 1, y) }

// Sub sets z to x - y.
func (z *Quad) Sub(x, y *Quad) *Quad { return z.AddScaled(x, -1, y) }

// AddScaled sets z to x + a·y.
func (z *Quad) AddScaled(x *Quad, a float64, y *Quad) *Quad {
	l, q := y.sizes()
	s := math.Abs(a)
	m, r := s*(math.Abs(y.C)+l+q), x.R+s*y.R
	z.C = x.C + a*y.C
	for k := range z.G {
		z.G[k] = x.G[k] + a*y.G[k]
	}
	for k := range z.H {
		z.H[k] = x.H[k] + a*y.H[k]
	}
	l, q = z.sizes()
	return z.settle(r, m+(math.Abs(z.C)+l+q))
}

// products2 is a sum of products of quads.
type products2 struct {
	c    float64
	g    [Coords]float64
	h    [pairsOf]float64
	r, m float64
}

// add adds s·x·y, s being 1 or -1.
func (p *products2) add(x, y *Quad, s float64) {
	a, b := s*x.C, y.C
	lx, qx := x.sizes()
	ly, qy := y.sizes()
	p.c += a * b
	b *= s
	n := 0
	for j := range x.G {
		xj, yj := s*x.G[j], s*y.G[j]
		p.g[j] += a*y.G[j] + b*x.G[j]
		p.h[n] += xj*y.G[j] + (a*y.H[n] + b*x.H[n])
		n++
		for k := j + 1; k < Coords; k++ {
			p.h[n] += (xj*y.G[k] + x.G[k]*yj) + (a*y.H[n] + b*x.H[n])
			n++
		}
	}
	mx, my := math.Abs(a)+lx+qx, math.Abs(b)+ly+qy
	p.r += (lx*qy + qx*ly + qx*qy) + (mx*y.R + my*x.R + x.R*y.R)
	p.m += mx * my
}

// quad sets z to the sum.
func (p *products2) quad(z *Quad) *Quad {
	z.C, z.G, z.H = p.c, p.g, p.h
	return z.settle(p.r, p.m)
}

// Mul sets z to x·y.
func (z *Quad) Mul(x, y *Quad) *Quad {
	var p products2
	p.add(x, y, 1)
	return p.quad(z)
}

// Sum2 sets z to a·x + b·y.
func (z *Quad) Sum2(a, x, b, y *Quad) *Quad {
	var p products2
	p.add(a, x, 1)
	p.add(b, y, 1)
	return p.quad(z)
}

// Dot sets z to the dot product x·y.
func (z *Quad) Dot(x, y *QuadVec) *Quad {
	var p products2
	for c := range x {
		p.add(&x[c], &y[c], 1)
	}
	return p.quad(z)
}

// Along sets z to the dot product of x with a vector of numbers.
func (z *Quad) Along(x *QuadVec, v r3.Vec) *Quad {
	r, m := 0., 0.
	for c := range x {
		l, q := x[c].sizes()
		a := math.Abs(component(v, c))
		r += a * x[c].R
		m += a * (math.Abs(x[c].C) + l + q)
	}
	y0, y1, y2 := &x[0], &x[1], &x[2]
	z.C = v.X*y0.C + v.Y*y1.C + v.Z*y2.C
	for k := range z.G {
		z.G[k] = v.X*y0.G[k] + v.Y*y1.G[k] + v.Z*y2.G[k]
	}
	for k := range z.H {
		z.H[k] = v.X*y0.H[k] + v.Y*y1.H[k] + v.Z*y2.H[k]
	}
	return z.settle(r, m)
}
