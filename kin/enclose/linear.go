package enclose

import "math"

// Add sets z to x + y.
func (z *Form) Add(x, y *Form) *Form {
	z.C = x.C + y.C
	for k := range z.G {
		z.G[k] = x.G[k] + y.G[k]
	}
	return z.settle(x.R+y.R, math.Abs(z.C)+z.Spread())
}

// Sub sets z to x - y.
func (z *Form) Sub(x, y *Form) *Form {
	z.C = x.C - y.C
	for k := range z.G {
		z.G[k] = x.G[k] - y.G[k]
	}
	return z.settle(x.R+y.R, math.Abs(z.C)+z.Spread())
}

// Neg sets z to -x.
func (z *Form) Neg(x *Form) *Form {
	z.C, z.R = -x.C, x.R
	for k := range z.G {
		z.G[k] = -x.G[k]
	}
	return z
}

// Scale sets z to a·x.
func (z *Form) Scale(x *Form, a float64) *Form {
	z.C = a * x.C
	for k := range z.G {
		z.G[k] = a * x.G[k]
	}
	return z.settle(math.Abs(a)*x.R, math.Abs(z.C)+z.Spread())
}

// AddConst sets z to x + a.
func (z *Form) AddConst(x *Form, a float64) *Form {
	z.C, z.G = x.C+a, x.G
	return z.settle(x.R, math.Abs(z.C))
}

// AddScaled sets z to x + a·y.
func (z *Form) AddScaled(x *Form, a float64, y *Form) *Form {
	m := math.Abs(a) * (math.Abs(y.C) + y.Spread())
	r := x.R + math.Abs(a)*y.R
	z.C = x.C + a*y.C
	for k := range z.G {
		z.G[k] = x.G[k] + a*y.G[k]
	}
	return z.settle(r, m+(math.Abs(z.C)+z.Spread()))
}
