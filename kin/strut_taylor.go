package kin

import (
	"math"

	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

// Prismatic legs are enclosed by hand: each entry is expanded to second degree in the box's normal coordinates t, the
// parts of second degree are summed over the whole formula before their sizes are, and what is of third degree is bounded
// at large. With s from base to platform joint, l its length at the centre, δ the part of l by which it moves at most, and
// n = s/|s|:
//
//   - turned vectors: see enclose.Turn;
//   - n: the derivatives of second and third degree of s/|s| in a unit direction are at most 2/√3 and 3 long, over
//     |s|² and |s|³. In integral form the rests of Taylor's series are at most δ²/√3/(1-δ) and δ³/2/(1-δ);
//   - |s|: its derivative of third degree is at most 2/√3 over |s|², and the rest at most 0.19246 l δ³/(1-δ). Besides, |s|
//     exceeds its tangent by 0 to l δ²/2, as the whole ball of radius δl shows.
//
// The bounds of the derivatives follow from the series of log(1+ζ), ζ being the move over s in the plane of both. A
// symmetric bilinear map is at most as large as its quadratic form (S. Banach 1938, from memory).
//
// Rounding: no coefficient goes through more than 500 roundings, of terms no larger than its scale times
// (|tool point| + |r| + |base joint| + move)/l, which has what cancels in s. Each form gets 2⁻⁴³ of that, and
// the rounding of turned vectors, sines and cosines included, is in enclose.Turn's bounds.

// strutRound is the part of a scale that rounding may take.
const strutRound = 0x1p-43

// strutTaylor is the expansion of one leg.
type strutTaylor struct {
	u, v  enclose.Arm // r, from the tool point to the platform joint, and the platform's mounting axis
	s, n  Vec         // at the centre
	lever Vec         // r/Lc at the centre
	q, iq float64     // length at the centre and its inverse

	// coefficients of first degree
	along [6]float64 // of s along n, over the length
	move  [6]Vec     // of n
	arm   [6]Vec     // of r/Lc
	axis  [6]Vec     // of the mounting axis

	length, lift poly    // lift: only what lifts the joint along n, not what swings the leg
	row          [6]poly // n and (r×n)/Lc
	base, plat   poly    // n on the mounting axes
	tip          [3]poly // platform joint
}

// start expands the leg to first degree.
func (t *strutTaylor) start(l *strut, invLc float64, x *strutBox) {
	x.turn.Apply(l.b, &t.u)
	x.turn.Apply(l.ub, &t.v)
	tip := r3.Add(x.at, t.u.At)
	t.s = r3.Sub(tip, l.a)
	t.q = lengthOf(t.s)
	t.iq = 1 / t.q
	n := r3.Scale(t.iq, t.s)
	t.lever = r3.Scale(invLc, t.u.At)
	m := r3.Cross(t.lever, n)
	t.n = n
	t.length.at = t.q
	t.row[0].at, t.row[1].at, t.row[2].at = n.X, n.Y, n.Z
	t.row[3].at, t.row[4].at, t.row[5].at = m.X, m.Y, m.Z
	t.base.at, t.plat.at = r3.Dot(n, l.ua), r3.Dot(n, t.v.At)
	t.tip[0].at, t.tip[1].at, t.tip[2].at = tip.X, tip.Y, tip.Z
	for _, f := range x.moving[:x.n] {
		var h Vec // of s
		switch f {
		case X:
			h.X = x.half[X]
		case Y:
			h.Y = x.half[Y]
		case Z:
			h.Z = x.half[Z]
		default:
			h = t.u.First[f-Roll]
			t.arm[f], t.axis[f] = r3.Scale(invLc, h), t.v.First[f-Roll]
		}
		a := r3.Dot(n, h)
		w := r3.Scale(t.iq, r3.Sub(h, r3.Scale(a, n)))
		m := r3.Add(r3.Cross(t.lever, w), r3.Cross(t.arm[f], n))
		t.length.slope[f], t.along[f], t.move[f] = a, a*t.iq, w
		t.row[0].slope[f], t.row[1].slope[f], t.row[2].slope[f] = w.X, w.Y, w.Z
		t.row[3].slope[f], t.row[4].slope[f], t.row[5].slope[f] = m.X, m.Y, m.Z
		t.base.slope[f] = r3.Dot(w, l.ua)
		t.plat.slope[f] = r3.Dot(w, t.v.At) + r3.Dot(n, t.axis[f])
		t.tip[0].slope[f], t.tip[1].slope[f], t.tip[2].slope[f] = h.X, h.Y, h.Z
	}
}

// second adds the parts of second degree.
func (t *strutTaylor) second(l *strut, invLc float64, x *strutBox) {
	n := t.n
	for j, f := range x.moving[:x.n] {
		for _, g := range x.moving[j:x.n] {
			square := f == g
			part := 1.0
			if square {
				part = 0.5
			}
			wf, wg := t.move[f], t.move[g]
			bend := part * r3.Dot(wf, wg)
			af, ag := part*t.along[f], part*t.along[g]
			// w, m and v are of n, (r×n)/Lc and n on the platform's axis
			w := Vec{
				X: -af*wg.X - ag*wf.X - bend*n.X,
				Y: -af*wg.Y - ag*wf.Y - bend*n.Y,
				Z: -af*wg.Z - ag*wf.Z - bend*n.Z,
			}
			var m Vec
			v, stretch := 0., bend*t.q
			if f >= Roll { // and so is g
				k := secondDegree[f-Roll][g-Roll]
				h := t.u.Second[k]
				a := r3.Dot(n, h)
				w = r3.Add(w, r3.Scale(t.iq, r3.Sub(h, r3.Scale(a, n))))
				m, v = r3.Scale(invLc, r3.Cross(h, n)), r3.Dot(t.v.Second[k], n)
				stretch += a
				t.lift.add(a, square)
				t.tip[0].add(h.X, square)
				t.tip[1].add(h.Y, square)
				t.tip[2].add(h.Z, square)
			}
			if g >= Roll {
				m = r3.Add(m, r3.Scale(part, r3.Add(r3.Cross(t.arm[f], wg), r3.Cross(t.arm[g], wf))))
				v += part * (r3.Dot(t.axis[f], wg) + r3.Dot(t.axis[g], wf))
			}
			m = r3.Add(m, r3.Cross(t.lever, w))
			t.length.add(stretch, square)
			t.row[0].add(w.X, square)
			t.row[1].add(w.Y, square)
			t.row[2].add(w.Z, square)
			t.row[3].add(m.X, square)
			t.row[4].add(m.Y, square)
			t.row[5].add(m.Z, square)
			t.base.add(r3.Dot(w, l.ua), square)
			t.plat.add(r3.Dot(w, t.v.At)+v, square)
		}
	}
}

// secondDegree are the places of enclose.Arm.Second.
var secondDegree = [3][3]int{{0, 1, 2}, {1, 3, 4}, {2, 4, 5}}

// strutRest bounds what a leg's expansion leaves out: after the first degree those that end in 2, after the second
// those that end in 3.
type strutRest struct {
	s2, s3 float64 // of r and the platform joint, m
	n2, n3 float64 // of n
	m2, m3 float64 // of (r×n)/Lc
	v2, v3 float64 // of n on the platform's axis
	length float64 // of the length, after the second degree
	convex float64 // a quarter of l δ²: half of what the length exceeds its tangent by

	round, metre, moment float64 // of rounding: of n, of s, of (r×n)/Lc
}

// set fills r; false where the leg's length can be 0.
func (r *strutRest) set(t *strutTaylor, l *strut, invLc float64, x *strutBox) bool {
	b, v := lengthOf(l.b), lengthOf(l.ub)
	r.s2, r.s3 = x.turn.Bend*b, x.turn.Rest*b
	// how far s, r and the axis move to first degree, and s in all
	s1 := firstReach(&t.u, Vec{X: x.half[X], Y: x.half[Y], Z: x.half[Z]})
	u1, v1 := firstReach(&t.u, Vec{}), firstReach(&t.v, Vec{})
	size := lengthOf(x.at) + b + lengthOf(l.a) + s1
	r.metre = strutRound * size
	d := s1 + r.s2 + r.metre
	low := t.q*(1-strutRound) - d
	if !(low > 0 && t.q <= math.MaxFloat64) {
		return false
	}
	r.round = r.metre * t.iq
	r.moment = 2 * (b + t.q) * invLc * r.round

	e := d * t.iq // δ
	g := d / low  // δ/(1-δ)
	n1, s2 := s1*t.iq, r.s2*t.iq
	r.n2 = s2 + 0.57736*e*g
	r.n3 = r.s3*t.iq + 1.1548*(n1+0.5*s2)*s2 + 0.5*e*e*g
	n1 += r.n2 // n in all
	r.m2 = (b*r.n2 + u1*n1 + r.s2) * invLc
	r.m3 = (b*r.n3 + u1*r.n2 + r.s2*n1 + r.s3) * invLc
	r.v2 = v*(r.n2+x.turn.Bend) + v1*n1
	r.v3 = v*(r.n3+x.turn.Bend*n1+x.turn.Rest) + v1*r.n2
	r.length = r.s3 + (s1+0.5*r.s2)*s2 + 0.19246*d*e*g
	r.convex = 0.25 * d * e
	return true
}

// firstReach is how far an arm's first degree, and a shift besides, move it at most.
func firstReach(u *enclose.Arm, shift Vec) float64 {
	for k := range u.First {
		h := &u.First[k]
		shift.X += math.Abs(h.X)
		shift.Y += math.Abs(h.Y)
		shift.Z += math.Abs(h.Z)
	}
	return lengthOf(shift)
}

// lengthOf is the length of a vector of ordinary size, without the care of math.Hypot.
func lengthOf(v Vec) float64 { return math.Sqrt(r3.Norm2(v)) }
