package enclose

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Turn is the rotation of the box's poses, Rz(yaw) Ry(pitch) Rx(roll), to second degree in the normal coordinates: for
// leg kinds that sum the parts of second degree before they take their size, which is sharper than a Form for each
// entry. Matrices are row by row.
type Turn struct {
	At     [9]float64    // at the centre
	First  [3][9]float64 // coefficients of the normal roll, pitch, yaw
	Second [6][9]float64 // of roll², roll·pitch, roll·yaw, pitch², pitch·yaw, yaw²

	// Bounds of the norm of what is left after At and First, and after Second, with the rounding
	// of all that is above. +Inf where nothing is known.
	Bend, Rest float64
}

// Set sets t for the box. Rotations whose flag in own is not set are left out.
//
// Every derivative of a product of rotations about fixed axes has the norm 1 at most, so that the parts of the degrees 2
// and 3 are at most ρ²/2 and ρ³/6, ρ being the sum of the three half-widths.
func (t *Turn) Set(b *Box, own [3]bool) {
	var c, h [3]float64
	for k := range c {
		if own[k] {
			c[k], h[k] = b.Normal(3 + k)
		}
	}
	sr, cr := math.Sincos(c[0])
	sp, cp := math.Sincos(c[1])
	sy, cy := math.Sincos(c[2])
	// The columns are x, a·sr + b·cr and a·cr - b·sr, and pitch turns x into -a and a into x.
	x, a := r3.Vec{X: cy * cp, Y: sy * cp, Z: -sp}, r3.Vec{X: cy * sp, Y: sy * sp, Z: cp}
	y := r3.Vec{X: a.X*sr - sy*cr, Y: a.Y*sr + cy*cr, Z: a.Z * sr}
	z := r3.Vec{X: a.X*cr + sy*sr, Y: a.Y*cr - cy*sr, Z: a.Z * cr}
	columns(&t.At, 1, x, y, z)

	none := r3.Vec{}
	columns(&t.First[0], h[0], none, z, r3.Scale(-1, y))
	columns(&t.First[1], h[1], r3.Scale(-1, a), r3.Scale(sr, x), r3.Scale(cr, x))
	yawed(&t.First[2], h[2], &t.At)

	columns(&t.Second[0], -0.5*h[0]*h[0], none, y, z)
	columns(&t.Second[1], h[0]*h[1], none, r3.Scale(cr, x), r3.Scale(-sr, x))
	yawed(&t.Second[2], h[2], &t.First[0])
	columns(&t.Second[3], -0.5*h[1]*h[1], x, r3.Scale(sr, a), r3.Scale(cr, a))
	yawed(&t.Second[4], h[2], &t.First[1])
	yawed(&t.Second[5], 0.5*h[2], &t.First[2])

	rho := h[0] + h[1] + h[2]
	round := 8 * widen * (1 + rho + rho*rho)
	t.Bend = (rho*rho/2 + round) * (1 + widen)
	t.Rest = (rho*rho*rho/6 + round) * (1 + widen)
	if far := max(math.Abs(c[0]), math.Abs(c[1]), math.Abs(c[2])); !(far < beyond && t.Rest <= math.MaxFloat64) {
		t.Bend, t.Rest = math.Inf(1), math.Inf(1)
	}
}

// columns fills a matrix with s times its columns.
func columns(m *[9]float64, s float64, x, y, z r3.Vec) {
	*m = [9]float64{s * x.X, s * y.X, s * z.X, s * x.Y, s * y.Y, s * z.Y, s * x.Z, s * y.Z, s * z.Z}
}

// yawed is s times the derivative of the matrix r by yaw, if yaw comes last in it.
func yawed(m *[9]float64, s float64, r *[9]float64) {
	*m = [9]float64{-s * r[3], -s * r[4], -s * r[5], s * r[0], s * r[1], s * r[2], 0, 0, 0}
}

// Arm is a turned vector to second degree, as Turn has the rotation. What is left over is at most
// Turn.Rest times the vector's length.
type Arm struct {
	At     r3.Vec
	First  [3]r3.Vec
	Second [6]r3.Vec
}

// Apply sets a to the turned vector v.
func (t *Turn) Apply(v r3.Vec, a *Arm) {
	a.At = apply(&t.At, v)
	for k := range a.First {
		a.First[k] = apply(&t.First[k], v)
	}
	for k := range a.Second {
		a.Second[k] = apply(&t.Second[k], v)
	}
}

func apply(m *[9]float64, v r3.Vec) r3.Vec {
	return r3.Vec{
		X: m[0]*v.X + m[1]*v.Y + m[2]*v.Z,
		Y: m[3]*v.X + m[4]*v.Y + m[5]*v.Z,
		Z: m[6]*v.X + m[7]*v.Y + m[8]*v.Z,
	}
}
