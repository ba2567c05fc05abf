package enclose_test

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"

	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

// someVec is a vector of forms of sizes near each other.
func someVec(rng *rand.Rand, part float64) (v enclose.Vec) {
	exp := rng.IntN(6) - 3
	for c := range v {
		v[c] = someForm(rng, exp-rng.IntN(3), part)
	}
	return v
}

// bigDot is the exact dot product.
func bigDot(x, y [3]*big.Float) *big.Float {
	sum := number()
	for c := range x {
		sum.Add(sum, number().Mul(x[c], y[c]))
	}
	return sum
}

// Vectors of forms against exact vectors, as in TestHammer.
func TestVectorsHoldTheTruth(t *testing.T) {
	n := *hammer / 30
	if n == 0 {
		n = 30000
		if testing.Short() {
			n = 3000
		}
	}
	rng := rand.New(rand.NewPCG(4, 2))
	place := at{sum: number(), one: number()}
	most := map[string]float64{}
	check := func(what string, z *enclose.Form, want *big.Float) {
		t.Helper()
		if !z.Known() {
			return
		}
		s := place.used(z, want)
		most[what] = max(most[what], s)
		if s > 1 {
			t.Fatalf("%s: %g of the remainder at t = %v", what, s, place.t)
		}
	}
	v := r3.Vec{X: 0.3, Y: -1. / 3, Z: 2}
	w := [3]*big.Float{exactly(v.X), exactly(v.Y), exactly(v.Z)}
	for range n {
		part := math.Exp2(-30 * rng.Float64() * rng.Float64())
		x, y := someVec(rng, part), someVec(rng, part)
		for k := range place.t {
			place.t[k] = pick(rng)
		}
		var a, b [3]*big.Float
		for c := range a {
			a[c], b[c] = place.value(rng, &x[c]), place.value(rng, &y[c])
		}
		var f enclose.Form
		check("dot", f.Dot(&x, &y), bigDot(a, b))
		check("along", f.Along(&x, v), bigDot(a, w))
		length := number().Sqrt(bigDot(a, a))
		check("norm", f.Norm(&x), length)
		var z enclose.Vec
		z.Unit(&x)
		for c := range z {
			if length.Sign() != 0 {
				check("unit", &z[c], number().Quo(a[c], length))
			}
		}
		z = x
		z.Cross(&z, &y)
		for c := range z {
			i, j := (c+1)%3, (c+2)%3
			check("cross", &z[c], number().Sub(number().Mul(a[i], b[j]), number().Mul(a[j], b[i])))
		}
		z.Mul(&x, &y[0])
		for c := range z {
			check("mul", &z[c], number().Mul(a[c], b[0]))
		}
		z.Sub(z.AddConst(z.Add(z.Scale(&x, v.Z), &y), v), &x)
		for c := range z {
			check("sums", &z[c], number().Add(number().Add(a[c], b[c]), w[c]))
		}
	}
	for what, s := range most {
		t.Logf("%-6s %.3f of the remainder used", what, s)
		if s < 0.8 {
			t.Errorf("%s: only %g of the remainder used", what, s)
		}
	}
}

// someBox is a box of poses of half-widths up to `part` of 0.3 m and 1 rad, some of them 0.
func someBox(rng *rand.Rand, part float64) (b enclose.Box) {
	for k := range b.Low {
		span := 0.3
		if k >= 3 {
			span = 1
		}
		c, h := span*(2*rng.Float64()-1), span*part*rng.Float64()
		if rng.IntN(8) == 0 {
			h = 0
		}
		b.Low[k], b.High[k] = c-h, c+h
	}
	return b
}

// The rotation of a pose in the box, exactly, against its enclosure.
func TestRotationHoldsTheTruth(t *testing.T) {
	n := 20000
	if testing.Short() {
		n = 1000
	}
	rng := rand.New(rand.NewPCG(4, 3))
	place := at{sum: number(), one: number()}
	most := 0.
	for range n {
		b := someBox(rng, math.Exp2(-20*rng.Float64()*rng.Float64()))
		for k := range place.t {
			place.t[k] = pick(rng)
		}
		var r [9]enclose.Form
		enclose.Rotation(&b, &r)
		var sin, cos [3]*big.Float
		for k := range 3 {
			var f enclose.Form
			sin[k], cos[k] = bigSincos(number().Set(place.tangent(f.Coordinate(&b, 3+k))))
		}
		mul := func(x ...*big.Float) *big.Float {
			p := exactly(1)
			for _, y := range x {
				p.Mul(p, y)
			}
			return p
		}
		sr, sp, sy, cr, cp, cy := sin[0], sin[1], sin[2], cos[0], cos[1], cos[2]
		want := [9]*big.Float{ // ISO 9787: Rz(yaw) Ry(pitch) Rx(roll) multiplied out
			mul(cy, cp), number().Sub(mul(cy, sp, sr), mul(sy, cr)), number().Add(mul(cy, sp, cr), mul(sy, sr)),
			mul(sy, cp), number().Add(mul(sy, sp, sr), mul(cy, cr)), number().Sub(mul(sy, sp, cr), mul(cy, sr)),
			number().Neg(sp), mul(cp, sr), mul(cp, cr),
		}
		for c := range want {
			s := place.used(&r[c], want[c])
			most = max(most, s)
			if s > 1 {
				t.Fatalf("entry %d: %g of the remainder", c, s)
			}
		}
	}
	t.Logf("%.3f of the remainder used", most)
	if most < 0.8 {
		t.Errorf("only %g of the remainder used", most)
	}
}

// A turned vector, exactly, against its expansion to second degree: what is left over is within Turn.Rest,
// and comes near it; without the second degree, within Turn.Bend.
func TestTurnHoldsTheTruth(t *testing.T) {
	n := 20000
	if testing.Short() {
		n = 1000
	}
	rng := rand.New(rand.NewPCG(4, 5))
	most := [2]float64{}
	for range n {
		b := someBox(rng, math.Exp2(-6*rng.Float64()))
		var (
			turn enclose.Turn
			arm  enclose.Arm
			at   [3]float64
			q    [3]*big.Float
		)
		own := [3]bool{rng.IntN(4) > 0, rng.IntN(4) > 0, rng.IntN(4) > 0}
		turn.Set(&b, own)
		for k := range q {
			q[k] = number()
			if own[k] {
				c, h := b.Normal(3 + k)
				at[k] = pick(rng)
				q[k].Add(exactly(c), number().Mul(exactly(h), exactly(at[k])))
			}
		}
		v := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
		turn.Apply(v, &arm)
		// roll about x, then pitch about y, then yaw about z
		w := [3]*big.Float{exactly(v.X), exactly(v.Y), exactly(v.Z)}
		for k := range 3 {
			sin, cos := bigSincos(q[k])
			i, j := (k+1)%3, (k+2)%3
			y := number().Sub(number().Mul(cos, w[i]), number().Mul(sin, w[j]))
			w[j] = number().Add(number().Mul(sin, w[i]), number().Mul(cos, w[j]))
			w[i] = y
		}
		// far from the rounding of these plain sums, the boxes being large
		left := r3.Vec{}
		for c, f := range []*float64{&left.X, &left.Y, &left.Z} {
			*f, _ = w[c].Float64()
		}
		left = r3.Sub(left, arm.At)
		for k, x := range at {
			left = r3.Sub(left, r3.Scale(x, arm.First[k]))
		}
		most[0] = max(most[0], r3.Norm(left)/(turn.Bend*r3.Norm(v)))
		for k, m := range [6][2]int{{0, 0}, {0, 1}, {0, 2}, {1, 1}, {1, 2}, {2, 2}} {
			left = r3.Sub(left, r3.Scale(at[m[0]]*at[m[1]], arm.Second[k]))
		}
		most[1] = max(most[1], r3.Norm(left)/(turn.Rest*r3.Norm(v)))
	}
	t.Logf("%.3f of what may be left used", most)
	for _, s := range most {
		if s > 1 || s < 0.8 {
			t.Errorf("%.3f of what may be left used", most)
		}
	}
}

// Ends of a box lie within the range of its coordinates.
func TestCoordinateCoversTheBox(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 4))
	for range 100000 {
		a := (2*rng.Float64() - 1) * math.Ldexp(1, rng.IntN(2000)-1000)
		b := a + rng.Float64()*math.Abs(a)*math.Ldexp(1, -rng.IntN(60))
		box := enclose.Box{}
		box.Low[2], box.High[2] = a, b
		var z enclose.Form
		z.Coordinate(&box, 2)
		low, high := new(big.Float).SetPrec(2200).SetFloat64(z.C), new(big.Float).SetPrec(2200).SetFloat64(z.C)
		low.Sub(low, big.NewFloat(z.G[2]))
		high.Add(high, big.NewFloat(z.G[2]))
		if z.R != 0 || low.Cmp(big.NewFloat(a)) > 0 || high.Cmp(big.NewFloat(b)) < 0 {
			t.Fatalf("[%g, %g] is given as %+v", a, b, z)
		}
	}
}

// What is not known is said to be unknown, and stays so.
func TestUnknown(t *testing.T) {
	var one, wide, nan, huge enclose.Form
	one.Const(1)
	wide = enclose.Form{C: 0.5, G: [6]float64{0.4, 0.2}}
	nan.Const(math.NaN())
	huge.Const(math.MaxFloat64)
	for what, f := range map[string]*enclose.Form{
		"1/0":       new(enclose.Form).Inv(&wide),
		"√-0.1":     new(enclose.Form).Sqrt(&wide),
		"acos 1.1":  new(enclose.Form).Acos(&wide),
		"atan2 0,0": new(enclose.Form).Atan2(&wide, &wide),
		"NaN":       &nan,
		"overflow":  new(enclose.Form).Mul(&huge, &huge),
		"sum":       new(enclose.Form).Add(&huge, &huge),
	} {
		z := func() *enclose.Form { return new(enclose.Form) }
		for _, g := range []*enclose.Form{
			f, z().Add(f, &one), z().Sub(&one, f), z().Neg(f), z().Mul(f, &one), z().Mul(&one, f), z().Mul(f, new(enclose.Form).Const(0)), z().Sqr(f),
			z().Inv(f), z().Div(&one, f), z().Sqrt(f), z().Sin(f), z().Acos(f), z().Atan2(f, &one), z().Atan2(&one, f), z().Scale(f, 0), z().AddConst(f, 1),
			z().AddScaled(&one, 0, f), z().Norm(&enclose.Vec{one, *f, one}),
			&new(enclose.Vec).Unit(&enclose.Vec{one, *f, one})[0], &new(enclose.Vec).Cross(&enclose.Vec{one, one, one}, &enclose.Vec{one, *f, one})[0],
		} {
			if g.Known() || !math.IsInf(g.Lower(), -1) || !math.IsInf(g.Upper(), 1) {
				t.Errorf("%s gives %+v", what, *g)
			}
		}
	}
}
