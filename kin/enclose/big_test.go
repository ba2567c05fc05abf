package enclose_test

import (
	"math/big"
	"testing"
)

// bits is the precision of the exact side of the tests.
const bits = 224

func number() *big.Float           { return new(big.Float).SetPrec(bits) }
func exactly(x float64) *big.Float { return number().SetFloat64(x) }

// less than 2^-bits of 1: where a series stops.
func negligible(x *big.Float) bool { return x.Sign() == 0 || x.MantExp(nil) < -bits }

// bigSincos sums the series of sine and cosine at x/16 and doubles the angle four times.
func bigSincos(x *big.Float) (sin, cos *big.Float) {
	const halvings = 4
	y := number().SetMantExp(x, -halvings)
	sin, cos = number().Set(y), exactly(1)
	term := number().Set(y)
	for k := int64(2); !negligible(term); k++ {
		// term is y^(k-1)/(k-1)!
		term.Mul(term, y)
		term.Quo(term, number().SetInt64(k))
		sum := sin
		if k&1 == 0 {
			sum = cos
		}
		if k&2 != 0 {
			sum.Sub(sum, term)
		} else {
			sum.Add(sum, term)
		}
	}
	for range halvings {
		s := number().Mul(sin, cos)
		c := number().Mul(cos, cos)
		sin = s.Add(s, s)
		c.Add(c, c)
		cos = c.Sub(c, exactly(1))
	}
	return sin, cos
}

// bigAtan halves the angle until the series converges fast: atan x = 2 atan(x/(1+√(1+x²))).
func bigAtan(x *big.Float) *big.Float {
	y := number().Set(x)
	halvings := 0
	for y.Sign() != 0 && y.MantExp(nil) > -4 {
		r := number().Mul(y, y)
		r.Add(r, exactly(1))
		r.Sqrt(r)
		r.Add(r, exactly(1))
		y.Quo(y, r)
		halvings++
	}
	y2 := number().Mul(y, y)
	sum, power := number().Set(y), number().Set(y)
	for k := int64(3); !negligible(power); k += 2 {
		power.Mul(power, y2)
		power.Neg(power)
		sum.Add(sum, number().Quo(power, number().SetInt64(k)))
	}
	return sum.SetMantExp(sum, halvings)
}

// pi by J. Machin's formula of 1706 (from memory).
var pi = func() *big.Float {
	a := bigAtan(number().Quo(exactly(1), exactly(5)))
	b := bigAtan(number().Quo(exactly(1), exactly(239)))
	a.Mul(a, exactly(16))
	return a.Sub(a, b.Mul(b, exactly(4)))
}()

// bigAtan2 is the angle of the point (x, y) in (-π, π].
func bigAtan2(y, x *big.Float) *big.Float {
	if number().Abs(y).Cmp(number().Abs(x)) > 0 { // ±π/2 less the angle from the y axis
		half := number().Quo(pi, exactly(2))
		a := bigAtan(number().Quo(x, y))
		if y.Sign() < 0 {
			half.Neg(half)
		}
		return half.Sub(half, a)
	}
	a := bigAtan(number().Quo(y, x))
	if x.Sign() > 0 {
		return a
	}
	if y.Sign() < 0 {
		return a.Sub(a, pi)
	}
	return a.Add(a, pi)
}

// bigAcos is 2 atan √((1-x)/(1+x)).
func bigAcos(x *big.Float) *big.Float {
	a := number().Sub(exactly(1), x)
	a.Quo(a, number().Add(exactly(1), x))
	a = bigAtan(a.Sqrt(a))
	return a.Add(a, a)
}

// The exact side against published digits (OEIS A000796 for π, A049469 for sin 1, A049470 for cos 1, A003881 for atan 1,
// from memory) to 60 digits or what is quoted.
func TestExactSide(t *testing.T) {
	parse := func(s string) *big.Float {
		x, _, err := big.ParseFloat(s, 10, bits, big.ToNearestEven)
		if err != nil {
			t.Fatal(err)
		}
		return x
	}
	check := func(what string, got *big.Float, digits string, tol float64) {
		t.Helper()
		d := number().Sub(got, parse(digits))
		if d.Abs(d).Cmp(exactly(tol)) > 0 {
			t.Errorf("%s is %s, not %s", what, got.Text('g', 50), digits)
		}
	}
	check("π", pi, "3.14159265358979323846264338327950288419716939937510582097494459", 1e-60)
	sin, cos := bigSincos(exactly(1))
	check("sin 1", sin, "0.841470984807896506652502321630298999622563060798371", 1e-50)
	check("cos 1", cos, "0.540302305868139717400936607442976603732310420617922", 1e-50)
	check("atan 1", bigAtan(exactly(1)), "0.785398163397448309615660845819875721049292349843776", 1e-50)
	third := number().Quo(pi, exactly(3))
	check("3 acos 1/2 - π", number().Sub(bigAcos(exactly(0.5)), third), "0", 1e-62)
	for _, x := range []float64{-3.1, -2, -0.7, 1e-9, 0.3, 1.4, 3} {
		s, c := bigSincos(exactly(x))
		check("the angle of its sine and cosine", number().Sub(bigAtan2(s, c), exactly(x)), "0", 1e-60)
		check("the sum of their squares", number().Add(number().Mul(s, s), number().Mul(c, c)), "1", 1e-60)
	}
}
