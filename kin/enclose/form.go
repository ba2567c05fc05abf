// Package enclose encloses functions over a box of pose coordinates to first order: a value, a slope for each
// coordinate, and a remainder that no function value escapes, rounding included.
//
// Over a box of half-width h in each direction the remainder shrinks with h², which is what lets a branch-and-bound
// come near an extreme value without its boxes piling up there (first-order Taylor models with intervals as
// remainders: M. Berz and K. Makino 1998, Reliable Computing 4:361; affine arithmetic: from memory).
//
// Operations are methods of the result, as in math/big: z.Mul(x, y) sets z to x·y and returns z, and z may be one
// of the operands. Nothing allocates.
//
// # Rounding
//
// Go rounds to nearest and may fuse a product with a sum. Let u = 2⁻⁵³; an operation, fused or not, gives its exact
// result within u of its size, or within 2⁻¹⁰⁷⁵ where it underflows. One rule covers every operation here:
//
//   - C and each G are sums of terms, and no term goes through more than 24 roundings on its way into the sum. They
//     differ from the exact coefficients by less than 25u times the sum of the sizes of their terms. Let M be that
//     sum over C and all G: the slack 32u·M covers their errors for all t, M's own rounding included.
//   - The remainder is a sum of terms at least 0, each reached through at most 24 roundings, so that the
//     computed one is more than 1-25u of it. The factor 1+32u makes it an upper bound.
//   - Underflow: 2⁻¹⁰⁰⁰ is added, more than all underflowed products together where the terms before it are below
//     2⁻⁹⁴⁷; above, the factor has room for them. Divisors and radicands outside 2⁻⁵⁰⁰ to 2⁵⁰⁰ give no
//     answer, which keeps an underflowed term from being blown up.
//   - Overflow and NaN: a coefficient that is not finite makes M infinite or NaN, and then R is +Inf.
//
// So R = (r + 2⁻⁴⁸ M)(1 + 2⁻⁴⁸) + 2⁻¹⁰⁰⁰, with 2⁻⁴⁸ = 32u, in every operation that rounds.
//
// Assumed, not proved: math.Sin, math.Cos and math.Atan2 err by less than 1e-15, absolutely for the first two within
// ±2²⁰, relatively for the last; 2⁻⁴⁸ = 3.6e-15 of the result's size 1 or more is added. Measured on 4 million
// arguments of sine and cosine: 1.7e-16. math.Acos is not used: it errs by 1e-11 near 1.
package enclose

import "math"

// Coords is the number of coordinates of a box: x, y, z, roll, pitch, yaw.
const Coords = 6

// Form encloses a function f over a box: for every point of the box, given by its normal coordinates t, each in
// [-1, 1], f(t) lies within C + Σ G[k] t[k] ± R. R is +Inf or NaN where nothing is known; no bound of such a form holds.
type Form struct {
	C float64         // at the centre, up to R
	G [Coords]float64 // slope over the half-width of each coordinate
	R float64         // remainder, at least 0
}

// Vec is a vector of forms.
type Vec [3]Form

// Box is a box of pose coordinates about home: metres, and radians of roll, pitch and yaw.
type Box struct {
	Low, High [Coords]float64
}

const (
	widen = 0x1p-48   // 32u, see Rounding
	tiny  = 0x1p-1000 // more than what underflow loses
	least = 0x1p-500  // divisors and radicands are not below it,
	most  = 0x1p500   // nor above it
)

// Normal gives the centre of the box in coordinate k and its half-width: the coordinate is centre + half·t[k] exactly,
// half being so rounded that t reaches from -1 to 1 at least.
func (b *Box) Normal(k int) (centre, half float64) {
	low, high := b.Low[k], b.High[k]
	centre = 0.5*low + 0.5*high
	return centre, max(high-centre, centre-low) * (1 + widen)
}

// Coordinate sets z to coordinate k of the box, without a remainder. It is unknown where Low is above High.
func (z *Form) Coordinate(b *Box, k int) *Form {
	c, h := b.Normal(k)
	*z = Form{C: c}
	z.G[k] = h
	if !(b.Low[k] <= b.High[k]) || math.IsInf(h, 0) {
		z.R = math.Inf(1)
	}
	return z
}

// Const sets z to a number.
func (z *Form) Const(c float64) *Form {
	*z = Form{C: c}
	if c-c != 0 {
		z.R = math.Inf(1)
	}
	return z
}

// unknown sets z to a form of which nothing is known.
func (z *Form) unknown() *Form {
	*z = Form{R: math.Inf(1)}
	return z
}

// Known tells whether the form encloses anything.
func (z *Form) Known() bool { return z.R <= math.MaxFloat64 }

// Spread is Σ|G|, up to rounding.
func (z *Form) Spread() float64 {
	g := &z.G
	return (math.Abs(g[0]) + math.Abs(g[1]) + math.Abs(g[2])) + (math.Abs(g[3]) + math.Abs(g[4]) + math.Abs(g[5]))
}

// away is an upper bound of |f(t) - C|.
func (z *Form) away() float64 { return (z.Spread() + z.R) * (1 + widen) }

// Lower is a number that f does not fall below; -Inf where nothing is known.
func (z *Form) Lower() float64 {
	x := z.C - z.away()
	x -= math.Abs(x)*(4*unit) + tiny
	if !(x >= -math.MaxFloat64) || !z.Known() {
		return math.Inf(-1)
	}
	return x
}

// Upper is a number that f does not exceed; +Inf where nothing is known.
func (z *Form) Upper() float64 {
	x := z.C + z.away()
	x += math.Abs(x)*(4*unit) + tiny
	if !(x <= math.MaxFloat64) || !z.Known() {
		return math.Inf(1)
	}
	return x
}

// unit is u, half the distance from 1 to the next number.
const unit = 0x1p-53

// Settle sets the remainder to r, widened by the rule of the package for coefficients C and G whose terms, of the sizes m
// in sum, went through 24 roundings at most, and r through as many.
func (z *Form) Settle(r, m float64) *Form { return z.settle(r, m) }

// settle is Settle.
func (z *Form) settle(r, m float64) *Form {
	z.R = (r+widen*m)*(1+widen) + tiny
	if !(z.R <= math.MaxFloat64) {
		z.R = math.Inf(1)
	}
	return z
}
