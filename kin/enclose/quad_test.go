package enclose_test

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// someQuad draws a quad as someForm does a form.
func someQuad(rng *rand.Rand, exp int, part float64) (q enclose.Quad) {
	f := someForm(rng, exp, part)
	q.Set(&f)
	for n := range q.H {
		if rng.IntN(3) > 0 {
			q.H[n] = math.Abs(f.C) * part * (2*rng.Float64() - 1) * math.Exp2(-60*rng.Float64()*rng.Float64())
		}
	}
	return q
}

// quad is C + Σ G t + Σ H tt, exactly but for 2^-bits.
func (a *at) quad(q *enclose.Quad) *big.Float {
	sum, n := exactly(q.C), 0
	for j := range a.t {
		tj := exactly(a.t[j])
		sum.Add(sum, number().Mul(exactly(q.G[j]), tj))
		for k := j; k < len(a.t); k++ {
			h := number().Mul(exactly(q.H[n]), tj)
			sum.Add(sum, h.Mul(h, exactly(a.t[k])))
			n++
		}
	}
	return sum
}

// share is how much of the remainder r a value takes that is d from what it belongs to: above 1 it escapes.
func share(d *big.Float, r float64) float64 {
	if d.Sign() == 0 {
		return 0
	}
	d.Abs(d)
	x, _ := number().Quo(d, exactly(r)).Float64()
	if d.Cmp(exactly(r)) > 0 {
		x = max(x, math.Nextafter(1, 2))
	}
	return x
}

// quadOperation is an operation on quads and the same on numbers.
type quadOperation struct {
	name  string
	quads func(z, x, y *enclose.Quad)
	exact func(x, y *big.Float) *big.Float
	wide  bool // any size of number may enter
	least float64
}

var quadOperations = []quadOperation{
	{"add", func(z, x, y *enclose.Quad) { z.Add(x, y) }, func(x, y *big.Float) *big.Float { return number().Add(x, y) }, true, 0.8},
	{"sub", func(z, x, y *enclose.Quad) { z.Sub(x, y) }, func(x, y *big.Float) *big.Float { return number().Sub(x, y) }, true, 0.8},
	{"neg", func(z, x, _ *enclose.Quad) { z.Neg(x) }, func(x, _ *big.Float) *big.Float { return number().Neg(x) }, true, 0.8},
	{"scale", func(z, x, _ *enclose.Quad) { z.Scale(x, factor) }, func(x, _ *big.Float) *big.Float { return number().Mul(x, exactly(factor)) }, true, 0.8},
	{"add a number", func(z, x, _ *enclose.Quad) { z.AddConst(x, factor) }, func(x, _ *big.Float) *big.Float { return number().Add(x, exactly(factor)) }, true, 0.8},
	{"add scaled", func(z, x, y *enclose.Quad) { z.AddScaled(x, factor, y) }, func(x, y *big.Float) *big.Float {
		return number().Add(x, number().Mul(y, exactly(factor)))
	}, true, 0.8},
	{"mul", func(z, x, y *enclose.Quad) { z.Mul(x, y) }, func(x, y *big.Float) *big.Float { return number().Mul(x, y) }, true, 0.5},
	{"sum of two", func(z, x, y *enclose.Quad) { z.Sum2(x, x, x, y) }, func(x, y *big.Float) *big.Float {
		return number().Mul(x, number().Add(x, y))
	}, true, 0.5},
	{"inv", func(z, x, _ *enclose.Quad) { z.Inv(x) }, func(x, _ *big.Float) *big.Float { return number().Quo(exactly(1), x) }, true, 0.5},
	{"sqrt", func(z, x, _ *enclose.Quad) { z.Sqrt(x) }, func(x, _ *big.Float) *big.Float { return number().Sqrt(x) }, true, 0.5},
	{"inv sqrt", func(z, x, _ *enclose.Quad) { z.InvSqrt(x) }, func(x, _ *big.Float) *big.Float {
		return number().Quo(exactly(1), number().Sqrt(x))
	}, true, 0.5},
	{"sin", func(z, x, _ *enclose.Quad) { z.Sin(x) }, func(x, _ *big.Float) *big.Float { s, _ := bigSincos(x); return s }, false, 0.5},
	{"cos", func(z, x, _ *enclose.Quad) { z.Cos(x) }, func(x, _ *big.Float) *big.Float { _, c := bigSincos(x); return c }, false, 0.5},
	{"atan2", func(z, x, y *enclose.Quad) { z.Atan2(x, y) }, bigAtan2, false, 0.5},
}

// No true value lies outside a quad, nor outside the form that it ends in: TestHammer, one degree higher.
func TestQuadHammer(t *testing.T) {
	n := *hammer
	if n == 0 {
		n = 300000
		if testing.Short() {
			n = 20000
		}
	}
	rng := rand.New(rand.NewPCG(4, 2))
	place := at{sum: number(), one: number()}
	var most, known [32]float64
	for i := range n {
		o := i % len(quadOperations)
		op := &quadOperations[o]
		exp := rng.IntN(6) - 3
		if op.wide {
			switch rng.IntN(8) {
			case 0:
				exp = rng.IntN(220) - 110
			case 1:
				exp = rng.IntN(2000) - 1000
			}
		}
		part := math.Exp2(-30*rng.Float64()*rng.Float64()) / float64(1+rng.IntN(8))
		x, y := someQuad(rng, exp, part), someQuad(rng, exp+rng.IntN(5)-2, part)
		if op.name == "sqrt" || op.name == "inv sqrt" {
			x.C = math.Abs(x.C)
		}
		for k := range place.t {
			place.t[k] = pick(rng)
		}
		u := number().Add(place.quad(&x), number().Mul(exactly(x.R), exactly(pick(rng))))
		v := number().Add(place.quad(&y), number().Mul(exactly(y.R), exactly(pick(rng))))
		var z enclose.Quad
		switch rng.IntN(3) { // the result may be an operand
		case 0:
			op.quads(&z, &x, &y)
		case 1:
			z = x
			op.quads(&z, &z, &y)
		case 2:
			z = y
			op.quads(&z, &x, &z)
		}
		if !(z.R <= math.MaxFloat64) {
			continue
		}
		known[o]++
		want := op.exact(u, v)
		if op.name == "atan2" {
			want = sameTurn(want, place.quad(&z))
		}
		s := share(number().Sub(want, place.quad(&z)), z.R)
		most[o] = max(most[o], s)
		if s > 1 {
			t.Fatalf("%s: %g of the remainder at t = %v\nx = %+v\ny = %+v\nz = %+v", op.name, s, place.t, x, y, z)
		}
		var f enclose.Form
		if s := place.used(f.Quad(&z), want); s > 1 && f.Known() {
			t.Fatalf("%s: %g of the remainder of the form at t = %v\nz = %+v\nform %+v", op.name, s, place.t, z, f)
		}
	}
	for o, op := range quadOperations {
		share := known[o] / float64(n/len(quadOperations))
		t.Logf("%-12s %5.1f %% known, %.3f of the remainder used", op.name, 100*share, most[o])
		if share < 0.2 || most[o] < op.least {
			t.Errorf("%s: %.0f %% known, only %.3f of the remainder used", op.name, 100*share, most[o])
		}
	}
}

// Vectors of quads are their components' sums and products, and a turned vector is what Turn says.
func TestQuadVectors(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 3))
	place := at{sum: number(), one: number()}
	for range 2000 {
		part := math.Exp2(-20 * rng.Float64())
		var x, y, z enclose.QuadVec
		var u, v [3]*big.Float
		for k := range place.t {
			place.t[k] = pick(rng)
		}
		for c := range x {
			x[c], y[c] = someQuad(rng, 0, part), someQuad(rng, 0, part)
			u[c] = number().Add(place.quad(&x[c]), number().Mul(exactly(x[c].R), exactly(pick(rng))))
			v[c] = number().Add(place.quad(&y[c]), number().Mul(exactly(y[c].R), exactly(pick(rng))))
		}
		check := func(what string, q *enclose.Quad, want *big.Float) {
			t.Helper()
			if s := share(number().Sub(want, place.quad(q)), q.R); s > 1 {
				t.Fatalf("%s: %g of the remainder", what, s)
			}
		}
		var dot enclose.Quad
		check("dot", dot.Dot(&x, &y), bigDot(u, v))
		fixed := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
		f := [3]*big.Float{exactly(fixed.X), exactly(fixed.Y), exactly(fixed.Z)}
		check("along", dot.Along(&x, fixed), bigDot(u, f))
		z.Cross(&x, &y)
		for c := range z {
			a, b := (c+1)%3, (c+2)%3
			check("cross", &z[c], number().Sub(number().Mul(u[a], v[b]), number().Mul(u[b], v[a])))
		}
		z.Sub(z.Add(z.Scale(&x, factor), &y), &x)
		for c := range z {
			w := number().Mul(u[c], exactly(factor))
			w.Add(w, v[c])
			check("sums", &z[c], w.Sub(w, u[c]))
		}
		z.AddConst(z.Mul(&x, &y[1]), fixed)
		for c := range z {
			w := number().Mul(u[c], v[1])
			check("mul", &z[c], w.Add(w, f[c]))
		}

		// roll about x, then pitch about y, then yaw about z
		b := someBox(rng, part)
		var turn enclose.Turn
		turn.Set(&b, [3]bool{true, true, true})
		w := f
		for k := range 3 {
			var q enclose.Form
			sin, cos := bigSincos(number().Set(place.tangent(q.Coordinate(&b, 3+k))))
			i, j := (k+1)%3, (k+2)%3
			w[i], w[j] = number().Sub(number().Mul(cos, w[i]), number().Mul(sin, w[j])), number().Add(number().Mul(sin, w[i]), number().Mul(cos, w[j]))
		}
		z.Arm(&turn, fixed)
		for c := range z {
			check("arm", &z[c], w[c])
		}
	}
}
