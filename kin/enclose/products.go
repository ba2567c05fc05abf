package enclose

import "math"

// products is a sum of products of forms. The parts of second degree in t are summed before their size is taken,
// so that what cancels between the products, as in a cross product, costs nothing.
type products struct {
	c    float64
	g    [Coords]float64
	diag [Coords]float64                    // of t[k]²
	off  [Coords * (Coords - 1) / 2]float64 // of t[j]t[k], j < k, row by row
	r, m float64                            // remainder and sum of the sizes of all terms
}

// add adds s·x·y, s being 1 or -1.
func (p *products) add(x, y *Form, s float64) {
	a, b := s*x.C, y.C
	p.c += a * b
	n := 0
	for j := range x.G {
		xj, yj := s*x.G[j], y.G[j]
		if xj == 0 && yj == 0 {
			n += Coords - 1 - j
			continue
		}
		p.g[j] += a*yj + b*xj
		p.diag[j] += xj * yj
		for k := j + 1; k < Coords; k++ {
			p.off[n] += xj*y.G[k] + s*x.G[k]*yj
			n++
		}
	}
	mx, my := math.Abs(a)+x.Spread(), math.Abs(b)+y.Spread()
	p.r += mx*y.R + my*x.R + x.R*y.R
	p.m += mx * my
}

// form sets z to the sum. As t[k]² lies in [0, 1], half its coefficient goes to C, and half its size to R.
func (p *products) form(z *Form) *Form {
	mid, half, off := 0., 0., 0.
	for _, d := range p.diag {
		mid += d
		half += math.Abs(d)
	}
	for _, d := range p.off {
		off += math.Abs(d)
	}
	z.C, z.G = p.c+0.5*mid, p.g
	return z.settle(p.r+0.5*half+off, p.m)
}

// Mul sets z to x·y.
func (z *Form) Mul(x, y *Form) *Form {
	var p products
	p.add(x, y, 1)
	return p.form(z)
}

// Sqr sets z to x².
func (z *Form) Sqr(x *Form) *Form {
	var p products
	p.add(x, x, 1)
	return p.form(z)
}

// Dot sets z to the dot product x·y.
func (z *Form) Dot(x, y *Vec) *Form {
	var p products
	for c := range x {
		p.add(&x[c], &y[c], 1)
	}
	return p.form(z)
}

// Cross sets z to the cross product x×y.
func (z *Vec) Cross(x, y *Vec) *Vec {
	var p [3]products
	for c := range p {
		a, b := (c+1)%3, (c+2)%3
		p[c].add(&x[a], &y[b], 1)
		p[c].add(&x[b], &y[a], -1)
	}
	for c := range p {
		p[c].form(&z[c])
	}
	return z
}
