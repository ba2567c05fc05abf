package enclose_test

import (
	"flag"
	"math"
	"math/big"
	"math/rand/v2"
	"testing"

	"legwright/kin/enclose"
)

// The long run is
//
//	go test ./kin/enclose -run Hammer -hammer 10000000
//
// and takes three minutes on one core.
var hammer = flag.Int("hammer", 0, "random operations of TestHammer; 0 stands for 300000, or 20000 in short runs")

// at is a place in the box with what is exactly there.
type at struct {
	t   [enclose.Coords]float64
	sum *big.Float
	one *big.Float
}

// tangent is C + Σ G t, exactly but for 2^-bits.
func (a *at) tangent(f *enclose.Form) *big.Float {
	a.sum.SetFloat64(f.C)
	for k, t := range a.t {
		switch {
		case f.G[k] == 0 || t == 0:
		case t == 1:
			a.sum.Add(a.sum, a.one.SetFloat64(f.G[k]))
		case t == -1:
			a.sum.Sub(a.sum, a.one.SetFloat64(f.G[k]))
		default:
			a.one.SetFloat64(f.G[k])
			a.sum.Add(a.sum, number().Mul(a.one, exactly(t)))
		}
	}
	return a.sum
}

// value is a value that the form lets f have there.
func (a *at) value(rng *rand.Rand, f *enclose.Form) *big.Float {
	e := pick(rng)
	return number().Add(a.tangent(f), number().Mul(exactly(f.R), exactly(e)))
}

// used is the share of the remainder that the value needs: above 1 it escapes.
func (a *at) used(f *enclose.Form, value *big.Float) float64 {
	d := number().Sub(value, a.tangent(f))
	if d.Sign() == 0 {
		return 0
	}
	d.Abs(d)
	if f.R == 0 {
		return math.Inf(1)
	}
	escapes := d.Cmp(a.one.SetFloat64(f.R)) > 0
	x, _ := d.Quo(d, a.one).Float64()
	if escapes {
		x = max(x, math.Nextafter(1, 2))
	}
	return x
}

// pick is a number from -1 to 1, often an end or 0.
func pick(rng *rand.Rand) float64 {
	switch rng.IntN(6) {
	case 0, 1:
		return 1
	case 2, 3:
		return -1
	case 4:
		return 0
	}
	return 2*rng.Float64() - 1
}

// someForm draws a form of about the size 2^exp whose slopes and remainder are up to `part` of it.
func someForm(rng *rand.Rand, exp int, part float64) (f enclose.Form) {
	size := math.Ldexp(1+rng.Float64(), exp)
	f.C = size * float64(1-2*rng.IntN(2))
	for k := range f.G {
		switch rng.IntN(3) {
		case 0:
		case 1:
			f.G[k] = size * part * (2*rng.Float64() - 1)
		case 2:
			f.G[k] = size * part * (2*rng.Float64() - 1) * math.Exp2(-40*rng.Float64())
		}
	}
	switch rng.IntN(4) {
	case 0:
		f.R = size * part * rng.Float64()
	case 1:
		f.R = size * part * math.Exp2(-50*rng.Float64())
	}
	return f
}

// operation is an operation on forms and the same on numbers.
type operation struct {
	name  string
	forms func(z, x, y *enclose.Form)
	exact func(x, y *big.Float) *big.Float // nil where it has no answer there, of which there are none
	wide  bool                             // any size of number may enter
	angle bool                             // answers that differ by full turns are the same
}

// unary leaves y out.
func unary(f func(z, x *enclose.Form) *enclose.Form) func(z, x, y *enclose.Form) {
	return func(z, x, _ *enclose.Form) { f(z, x) }
}

const factor = 1.0 / 3

var operations = []operation{
	{name: "add", wide: true, forms: func(z, x, y *enclose.Form) { z.Add(x, y) }, exact: func(x, y *big.Float) *big.Float { return number().Add(x, y) }},
	{name: "sub", wide: true, forms: func(z, x, y *enclose.Form) { z.Sub(x, y) }, exact: func(x, y *big.Float) *big.Float { return number().Sub(x, y) }},
	{name: "neg", wide: true, forms: unary((*enclose.Form).Neg), exact: func(x, _ *big.Float) *big.Float { return number().Neg(x) }},
	{name: "scale", wide: true, forms: func(z, x, _ *enclose.Form) { z.Scale(x, factor) }, exact: func(x, _ *big.Float) *big.Float { return number().Mul(x, exactly(factor)) }},
	{name: "add a number", wide: true, forms: func(z, x, _ *enclose.Form) { z.AddConst(x, factor) }, exact: func(x, _ *big.Float) *big.Float { return number().Add(x, exactly(factor)) }},
	{name: "add scaled", wide: true, forms: func(z, x, y *enclose.Form) { z.AddScaled(x, factor, y) }, exact: func(x, y *big.Float) *big.Float {
		return number().Add(x, number().Mul(y, exactly(factor)))
	}},
	{name: "mul", wide: true, forms: func(z, x, y *enclose.Form) { z.Mul(x, y) }, exact: func(x, y *big.Float) *big.Float { return number().Mul(x, y) }},
	{name: "sqr", wide: true, forms: unary((*enclose.Form).Sqr), exact: func(x, _ *big.Float) *big.Float { return number().Mul(x, x) }},
	{name: "inv", wide: true, forms: unary((*enclose.Form).Inv), exact: func(x, _ *big.Float) *big.Float { return number().Quo(exactly(1), x) }},
	{name: "div", wide: true, forms: func(z, x, y *enclose.Form) { z.Div(x, y) }, exact: func(x, y *big.Float) *big.Float { return number().Quo(x, y) }},
	{name: "sqrt", wide: true, forms: unary((*enclose.Form).Sqrt), exact: func(x, _ *big.Float) *big.Float { return number().Sqrt(x) }},
	{name: "sin", forms: unary((*enclose.Form).Sin), exact: func(x, _ *big.Float) *big.Float { s, _ := bigSincos(x); return s }},
	{name: "cos", forms: unary((*enclose.Form).Cos), exact: func(x, _ *big.Float) *big.Float { _, c := bigSincos(x); return c }},
	{name: "acos", forms: unary((*enclose.Form).Acos), exact: func(x, _ *big.Float) *big.Float { return bigAcos(x) }},
	{name: "atan2", angle: true, forms: func(z, x, y *enclose.Form) { z.Atan2(x, y) }, exact: bigAtan2},
}

// No true value lies outside, whatever enters: operands with slopes and remainders from nothing to their own size, of
// sizes near 1, of any size and where numbers underflow, at corners and inside. What goes in and what comes out
// is evaluated exactly. The share of the remainder that is used comes near 1 for every operation but those that only
// round, which shows that remainders are not merely huge.
func TestHammer(t *testing.T) {
	n := *hammer
	if n == 0 {
		n = 300000
		if testing.Short() {
			n = 20000
		}
	}
	rng := rand.New(rand.NewPCG(4, 1))
	place := at{sum: number(), one: number()}
	var most, known [32]float64
	for i := range n {
		o := i % len(operations)
		op := &operations[o]
		exp := rng.IntN(6) - 3
		if op.wide {
			switch rng.IntN(8) {
			case 0:
				exp = rng.IntN(1000) - 500
			case 1:
				exp = rng.IntN(2000) - 1000
			}
		}
		part := math.Exp2(-30 * rng.Float64() * rng.Float64())
		x, y := someForm(rng, exp, part), someForm(rng, exp+rng.IntN(5)-2, part)
		switch {
		case op.name == "acos":
			x.C = math.Mod(x.C, 1)
		case op.name == "sqrt":
			x.C = math.Abs(x.C)
		}
		for k := range place.t {
			place.t[k] = pick(rng)
		}
		u, v := place.value(rng, &x), place.value(rng, &y)
		var z enclose.Form
		switch rng.IntN(3) { // the result may be an operand
		case 0:
			op.forms(&z, &x, &y)
		case 1:
			z = x
			op.forms(&z, &z, &y)
		case 2:
			z = y
			op.forms(&z, &x, &z)
		}
		if !z.Known() {
			continue
		}
		known[o]++
		want := op.exact(u, v)
		if op.angle {
			want = sameTurn(want, place.tangent(&z))
		}
		s := place.used(&z, want)
		most[o] = max(most[o], s)
		if s > 1 {
			t.Fatalf("%s: %g of the remainder at t = %v\nx = %+v\ny = %+v\nz = %+v", op.name, s, place.t, x, y, z)
		}
		if w, _ := want.Float64(); w < z.Lower() || w > z.Upper() {
			t.Fatalf("%s: %g not from %g to %g", op.name, w, z.Lower(), z.Upper())
		}
	}
	for o, op := range operations {
		share := known[o] / float64(n/len(operations))
		t.Logf("%-12s %5.1f %% known, %.3f of the remainder used", op.name, 100*share, most[o])
		if share < 0.3 || most[o] < 0.8 {
			t.Errorf("%s: %.0f %% known, only %.3f of the remainder used", op.name, 100*share, most[o])
		}
	}
}

// sameTurn adds full turns to the angle a to come near b.
func sameTurn(a, b *big.Float) *big.Float {
	turn := number().Add(pi, pi)
	for {
		d := number().Sub(a, b)
		switch {
		case d.Cmp(pi) > 0:
			a = number().Sub(a, turn)
		case d.Neg(d).Cmp(pi) > 0:
			a = number().Add(a, turn)
		default:
			return a
		}
	}
}
