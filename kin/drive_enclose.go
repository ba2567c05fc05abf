package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// loop encloses the posture of one leg of a drive and a rod.
type loop struct {
	w    enclose.QuadVec // given: from drive.at to the platform joint
	room enclose.Quad    // square of the rod's part along which the drive moves its end: positive where the loop closes
	edge float64         // what rounding can make of it
	q    enclose.Quad
	end  enclose.QuadVec // of the crank, or the carriage, from drive.at
	rod  enclose.QuadVec // along the rod, as long as it
	rate enclose.QuadVec // u/(u·c'(q)), u the unit vector along the rod
	dot  enclose.Quad    // of u and the mounting axis of the joint at the drive
	sine enclose.Quad    // of u and e3
}

// rounding is more than the relative error of rooms in plain arithmetic, a drive's unit vectors being so up to rounding; a
// 16th of it is more than the latter alone.
const rounding = 0x1p-44

// enclose closes the loop over the box.
func (l *rodLeg) enclose(o *loop) {
	if l.crank {
		l.turn(o)
	} else {
		l.slide(o)
	}
}

// turn is enclose for cranks. With g, h and c the parts of the rod along the crank, across it and along its axis,
// the cosine rule gives 2 length g = w² - length² - rod², and c is that of w: h² = rod² - g² - c² has each of them
// once. The crank's angle is that of w less that of (length + g, h), the same point seen from the crank.
func (l *rodLeg) turn(o *loop) {
	var a, b, g, c, h, seen, inv, cos, sin enclose.Quad
	g.Dot(&o.w, &o.w)
	_, far := g.Bounds()
	o.edge = rounding * (far + l.length*l.length + l.rod*l.rod)
	g.AddConst(g.Scale(&g, l.k), l.k0-l.length)
	c.Along(&o.w, l.e3)
	o.room.AddConst(o.room.Neg(o.room.Sum2(&g, &g, &c, &c)), l.rod*l.rod)
	o.room.R += o.edge / 16
	h.Scale(h.Sqrt(&o.room), l.mode)

	a.Along(&o.w, l.e1)
	b.Along(&o.w, l.e2)
	seen.AddConst(&g, l.length)
	seen.Atan2(&h, &seen)
	o.q.Sub(o.q.Atan2(&b, &a), &seen)
	if turns := math.Round(o.q.C / (2 * math.Pi)); turns != 0 {
		o.q.AddConst(&o.q, -2*math.Pi*turns)
	}
	cos.Cos(&o.q)
	sin.Sin(&o.q)
	o.q.AddConst(&o.q, l.zero)

	for i, e := range [3][2]float64{{l.e1.X, l.e2.X}, {l.e1.Y, l.e2.Y}, {l.e1.Z, l.e2.Z}} {
		z := &o.end[i]
		z.Scale(&cos, l.length*e[0])
		z.AddScaled(z, l.length*e[1], &sin)
	}
	o.rod.Sub(&o.w, &o.end)
	inv.Scale(inv.InvSqrt(&o.room), l.mode/l.length)
	o.rate.Mul(&o.rod, &inv)

	o.dot.Scale(&g, l.invRod*l.ua.X)
	o.dot.AddScaled(&o.dot, l.invRod*l.ua.Y, &h)
	o.dot.AddScaled(&o.dot, l.invRod*l.ua.Z, &c)
	o.sine.Scale(&c, l.invRod)
}

// slide is enclose for carriages. The rod is w less what it has along the rail, and h along the rail.
func (l *rodLeg) slide(o *loop) {
	var a, h, x, y, inv enclose.Quad
	f1, f2 := square(l.e1)
	x.Along(&o.w, f1)
	y.Along(&o.w, f2)
	a.Along(&o.w, l.e1)
	low, high := a.Bounds()
	far := max(-low, high) + l.rod
	o.edge = rounding * far * far
	o.room.AddConst(o.room.Neg(o.room.Sum2(&x, &x, &y, &y)), l.rod*l.rod)
	o.room.R += o.edge / 16
	h.Scale(h.Sqrt(&o.room), l.mode)
	o.q.Add(&a, &h)

	inv.Scale(inv.InvSqrt(&o.room), l.mode)
	for i, e := range [3][3]float64{{f1.X, f2.X, l.e1.X}, {f1.Y, f2.Y, l.e1.Y}, {f1.Z, f2.Z, l.e1.Z}} {
		z := &o.rod[i]
		z.Scale(&x, e[0])
		z.AddScaled(z, e[1], &y)
		o.rate[i].Mul(z, &inv)
		o.rate[i].AddConst(o.rate[i].Neg(&o.rate[i]), e[2])
		z.AddScaled(z, -e[2], &h)
		o.end[i].Scale(&o.q, e[2])
	}
	o.dot.Scale(o.dot.Along(&o.rod, l.ua), l.invRod)

	// The short sides of a parallelogram are square to the rail, up to rounding.
	o.sine.Scale(&x, r3.Dot(f1, l.e3))
	o.sine.AddScaled(&o.sine, r3.Dot(f2, l.e3), &y)
	o.sine.AddScaled(&o.sine, -r3.Dot(l.e1, l.e3), &h)
	o.sine.Scale(&o.sine, l.invRod)
}

// square gives two unit vectors square to the unit vector e and to each other.
func square(e Vec) (f1, f2 Vec) {
	x, y, z := math.Abs(e.X), math.Abs(e.Y), math.Abs(e.Z)
	switch {
	case x <= y && x <= z:
		f1 = Vec{Y: e.Z, Z: -e.Y}
	case y <= z:
		f1 = Vec{X: -e.Z, Z: e.X}
	default:
		f1 = Vec{X: e.Y, Y: -e.X}
	}
	f1 = unit(f1)
	return f1, r3.Cross(e, f1)
}

// wrap moves the angle z by full turns so that at the centre of the box it is within half a turn of mid.
func wrap(z *enclose.Form, mid float64) {
	if turns := math.Round((z.C - mid) / (2 * math.Pi)); turns != 0 {
		z.AddConst(z, -2*math.Pi*turns)
	}
}
