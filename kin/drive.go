package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// drive moves the end c(q) of a rod of fixed length, whose other end is the
// platform joint P: a crank, c = at + length (cos q e1 + sin q e2), or a carriage on
// a rail, c = at + q e1. The loop |P - c(q)| = rod has two solutions, the working
// modes; its derivative is u·dP = u·c'(q) dq with u the unit vector along the rod.
type drive struct {
	crank      bool
	at         Vec     // pivot, or where the rail's coordinate is 0
	e1, e2, e3 Vec     // orthonormal; e1 the crank at home or the rail, e3 the pivot axis or the short side of a parallelogram
	length     float64 // of the crank; 1 for a carriage: |c'(q)|
	rod        float64
	mode       float64 // 1 or -1
	zero       float64 // crank angle at home, in (-π, π]

	invRod float64
	k, k0  float64 // crank: e1·w cos + e2·w sin = k w² + k0 closes the loop, w from the pivot to the platform joint
	rod2   float64
}

// newCrank is a crank that turns from e1 towards e2, both unit vectors at right
// angles. With mode 1 the angle of the crank is smaller than that of the line from
// pivot to platform joint, so that (crank × rod)·(e1 × e2) has the sign of mode.
func newCrank(pivot, e1, e2 Vec, length, rod, mode float64) drive {
	return drive{
		crank: true, at: pivot, e1: e1, e2: e2, e3: r3.Cross(e1, e2), length: length, rod: rod, mode: sign(mode),
		invRod: 1 / rod, k: 1 / (2 * length), k0: (length*length - rod*rod) / (2 * length),
	}
}

// newCarriage is a carriage on a rail. With mode 1 it is farther along the rail than
// the platform joint, with mode -1 less far. short is the direction of the
// short sides of a parallelogram of rods; it does not matter for a single rod.
func newCarriage(r Rail, short Vec, rod, mode float64) drive {
	return drive{
		at: r.Point, e1: unit(r.Direction), e3: short, length: 1, rod: rod, mode: sign(mode),
		invRod: 1 / rod, rod2: rod * rod,
	}
}

// sign is -1 for negative numbers and 1 for all others.
func sign(x float64) float64 {
	if x < 0 {
		return -1
	}
	return 1
}

// closure is a solution of the loop.
type closure struct {
	q    float64
	rate float64 // 1/(u·c'(q))
	end  Vec     // c(q), base frame
	u    Vec     // unit vector along the rod, base frame
	own  Vec     // the same in the drive's own frame: (along, across, axis) of a crank, base axes for a carriage
	room float64 // square of the distance by which the loop closes; not positive, or NaN, where it does not
}

// close solves the loop for a platform joint that lies w off the point `at`. It
// reports false where the rod is too short or too long. The very edge of reach,
// where the drive cannot move the rod's end along the rod, counts as out of reach.
// Crank angles lie within half a turn of the angle at home.
func (d *drive) close(w *Vec, o *closure) bool {
	w2 := w.X*w.X + w.Y*w.Y + w.Z*w.Z
	a := w.X*d.e1.X + w.Y*d.e1.Y + w.Z*d.e1.Z
	if !d.crank {
		o.room = d.rod2 - (w2 - a*a)
		if !(o.room > 0) {
			return false
		}
		h := d.mode * math.Sqrt(o.room)
		q := a + h
		o.q, o.rate = q, -d.rod/h
		x, y, z := q*d.e1.X, q*d.e1.Y, q*d.e1.Z
		o.end = Vec{X: d.at.X + x, Y: d.at.Y + y, Z: d.at.Z + z}
		o.u = Vec{X: (w.X - x) * d.invRod, Y: (w.Y - y) * d.invRod, Z: (w.Z - z) * d.invRod}
		o.own = o.u
		return true
	}
	b := w.X*d.e2.X + w.Y*d.e2.Y + w.Z*d.e2.Z
	c := d.k*w2 + d.k0
	rho2 := a*a + b*b
	o.room = rho2 - c*c
	if !(o.room > 0) {
		return false
	}
	h := d.mode * math.Sqrt(o.room)
	inv := 1 / rho2
	cos, sin := (a*c+b*h)*inv, (b*c-a*h)*inv
	o.q, o.rate = d.zero+math.Atan2(sin, cos), d.rod/(d.length*h)
	cos, sin = d.length*cos, d.length*sin
	x, y, z := cos*d.e1.X+sin*d.e2.X, cos*d.e1.Y+sin*d.e2.Y, cos*d.e1.Z+sin*d.e2.Z
	o.end = Vec{X: d.at.X + x, Y: d.at.Y + y, Z: d.at.Z + z}
	o.u = Vec{X: (w.X - x) * d.invRod, Y: (w.Y - y) * d.invRod, Z: (w.Z - z) * d.invRod}
	o.own = Vec{X: (c - d.length) * d.invRod, Y: h * d.invRod, Z: (w.X*d.e3.X + w.Y*d.e3.Y + w.Z*d.e3.Z) * d.invRod}
	return true
}

// settle makes the posture o, found at home, the one from which crank angles are
// counted without a jump: e1 and e2 turn with the crank.
func (d *drive) settle(o *closure) {
	if !d.crank {
		return
	}
	d.zero = o.q
	if d.zero <= -math.Pi { // the same angle
		d.zero = math.Pi
	}
	d.e1 = r3.Scale(1/d.length, r3.Sub(o.end, d.at))
	d.e2 = r3.Cross(d.e3, d.e1)
}
