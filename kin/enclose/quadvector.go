package enclose

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Set sets z to the vector of forms.
func (z *QuadVec) Set(x *Vec) *QuadVec {
	for c := range z {
		z[c].Set(&x[c])
	}
	return z
}

// Quads sets z to the vector of quads.
func (z *Vec) Quads(x *QuadVec) *Vec {
	for c := range z {
		z[c].Quad(&x[c])
	}
	return z
}

// Arm sets z to the vector v turned as t has it.
func (z *QuadVec) Arm(t *Turn, v r3.Vec) *QuadVec {
	var a Arm
	t.Apply(v, &a)
	size := r3.Norm(v)
	for c := range z {
		q := &z[c]
		*q = Quad{C: component(a.At, c)}
		for k := range a.First {
			q.G[3+k] = component(a.First[k], c)
		}
		for k := range a.Second {
			q.H[pairsOf-len(a.Second)+k] = component(a.Second[k], c)
		}
		l, h := q.sizes()
		q.settle(t.Rest*size, math.Abs(q.C)+l+h+size)
	}
	return z
}

func component(v r3.Vec, c int) float64 { return [3]float64{v.X, v.Y, v.Z}[c] }

// Add sets z to x + y.
func (z *QuadVec) Add(x, y *QuadVec) *QuadVec {
	for c := range z {
		z[c].Add(&x[c], &y[c])
	}
	return z
}

// Sub sets z to x - y.
func (z *QuadVec) Sub(x, y *QuadVec) *QuadVec {
	for c := range z {
		z[c].Sub(&x[c], &y[c])
	}
	return z
}

// AddConst sets z to x + v.
func (z *QuadVec) AddConst(x *QuadVec, v r3.Vec) *QuadVec {
	for c := range z {
		z[c].AddConst(&x[c], component(v, c))
	}
	return z
}

// Scale sets z to a·x.
func (z *QuadVec) Scale(x *QuadVec, a float64) *QuadVec {
	for c := range z {
		z[c].Scale(&x[c], a)
	}
	return z
}

// Mul sets z to f·x.
func (z *QuadVec) Mul(x *QuadVec, f *Quad) *QuadVec {
	g := *f
	for c := range z {
		z[c].Mul(&x[c], &g)
	}
	return z
}

// Cross sets z to the cross product x×y.
func (z *QuadVec) Cross(x, y *QuadVec) *QuadVec {
	var p [3]products2
	for c := range p {
		a, b := (c+1)%3, (c+2)%3
		p[c].add(&x[a], &y[b], 1)
		p[c].add(&x[b], &y[a], -1)
	}
	for c := range p {
		p[c].quad(&z[c])
	}
	return z
}
