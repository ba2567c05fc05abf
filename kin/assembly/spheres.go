package assembly

import (
	"math"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// touching is how far, over the square of the size, two points may be from being one:
// circles or spheres that touch within it have one point in common.
const touching = 1e-14

// inLine is the sine below which centres count as being in line, over the size for centres that coincide.
const inLine = 1e-12

// FiveBar finds both assembly modes of a five-bar: the points at the distances of the
// distal rods from the crank ends. The determinant is that of the unit vectors along the rods, towards the point.
// Both solutions are Singular if the rods are in line, or if the crank ends
// and the lengths coincide; they are Infinite if the crank ends alone do.
func FiveBar(ends [2][2]float64, rods [2]float64) Result {
	var c [3]kin.Vec
	for i, e := range ends {
		c[i] = kin.Vec{X: e[0], Y: e[1]}
	}
	d := r3.Sub(c[1], c[0])
	size := math.Max(r3.Norm(d), math.Max(math.Abs(rods[0]), math.Abs(rods[1])))
	out := Result{Paths: 2}
	if !(size > 0) || math.IsInf(size, 0) {
		out.Lost = 2
		return out
	}
	s := r3.Norm(d)
	if s <= inLine*size {
		together(&out, math.Abs(rods[0]-rods[1]) <= inLine*size)
		return out
	}
	u := r3.Scale(1/s, d)
	along := ((rods[0]-rods[1])*(rods[0]+rods[1])/s + s) / 2
	foot := r3.Add(c[0], r3.Scale(along, u))
	points := pair(&out, foot, kin.Vec{X: -u.Y, Y: u.X}, (rods[0]-along)*(rods[0]+along), size)
	for _, p := range points {
		n := [2]kin.Vec{r3.Unit(r3.Sub(p, c[0])), r3.Unit(r3.Sub(p, c[1]))}
		m := Mode{Origin: p, Rot: kin.Identity(), Determinant: n[0].X*n[1].Y - n[0].Y*n[1].X}
		for i := range n {
			m.Residual = math.Max(m.Residual, math.Abs(r3.Norm(r3.Sub(p, c[i]))-rods[i]))
		}
		out.Modes = append(out.Modes, m)
	}
	sortModes(out.Modes, size)
	return out
}

// Delta finds both assembly modes of a delta or a linear delta: the points at the rods'
// lengths from three centres, which are the arm ends or carriages, each less its platform joint.
// The determinant is that of the unit vectors along the rods, towards the point. Both
// solutions are Singular if the rods are in a plane, or if the centres are in line
// and the spheres share a circle; they are Infinite if the centres are in line and the spheres do not.
func Delta(centres [3]kin.Vec, rods [3]float64) Result {
	a, b := r3.Sub(centres[1], centres[0]), r3.Sub(centres[2], centres[0])
	size := math.Max(math.Max(r3.Norm(a), r3.Norm(b)), math.Max(math.Abs(rods[0]), math.Max(math.Abs(rods[1]), math.Abs(rods[2]))))
	out := Result{Paths: 2}
	if !(size > 0) || math.IsInf(size, 0) {
		out.Lost = 2
		return out
	}
	// x·a = α, x·b = β for x from the first centre: the radical planes.
	alpha := ((rods[0]-rods[1])*(rods[0]+rods[1]) + r3.Norm2(a)) / 2
	beta := ((rods[0]-rods[2])*(rods[0]+rods[2]) + r3.Norm2(b)) / 2
	n := r3.Cross(a, b)
	nn := r3.Norm2(n)
	if math.Sqrt(nn) <= inLine*size*size {
		// A circle is left if the planes are one, α b = β a, and none is empty, a = 0 with α ≠ 0.
		one := r3.Norm(r3.Sub(r3.Scale(alpha, b), r3.Scale(beta, a))) <= inLine*size*size*size
		empty := r3.Norm(a) <= inLine*size && math.Abs(alpha) > inLine*size*size ||
			r3.Norm(b) <= inLine*size && math.Abs(beta) > inLine*size*size
		together(&out, one && !empty)
		return out
	}
	x := r3.Scale(1/nn, r3.Add(r3.Scale(alpha, r3.Cross(b, n)), r3.Scale(beta, r3.Cross(n, a))))
	foot := r3.Norm(x)
	for _, p := range pair(&out, r3.Add(centres[0], x), r3.Scale(1/math.Sqrt(nn), n), (rods[0]-foot)*(rods[0]+foot), size) {
		m := Mode{Origin: p, Rot: kin.Identity()}
		jac := mat.NewDense(3, 3, nil)
		for i, c := range centres {
			s := r3.Sub(p, c)
			u := r3.Unit(s)
			jac.SetRow(i, []float64{u.X, u.Y, u.Z})
			m.Residual = math.Max(m.Residual, math.Abs(r3.Norm(s)-rods[i]))
		}
		m.Determinant = mat.Det(jac)
		out.Modes = append(out.Modes, m)
	}
	sortModes(out.Modes, size)
	return out
}

// together counts the two solutions of centres that leave a circle of them or none.
func together(out *Result, circle bool) {
	if circle {
		out.Singular = 2
	} else {
		out.Infinite = 2
	}
}

// pair counts and gives the points at ± the root of `square` along a unit vector from the foot.
func pair(out *Result, foot, along kin.Vec, square, size float64) []kin.Vec {
	switch {
	case math.Abs(square) <= touching*size*size:
		out.Singular = 2
		return []kin.Vec{foot}
	case square < 0:
		out.Complex = 2
		return nil
	}
	out.Complex = 2
	step := r3.Scale(math.Sqrt(square), along)
	return []kin.Vec{r3.Add(foot, step), r3.Sub(foot, step)}
}
