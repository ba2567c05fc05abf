package assembly

import (
	"math"
	"slices"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// Mode is one real solution of a forward kinematics: an assembly mode.
type Mode struct {
	Origin      kin.Vec // platform origin, base frame
	Rot         kin.Rot // platform rotation, base frame
	Residual    float64 // largest error of a given length, in its unit
	Determinant float64 // of the unit wrenches that the solver's comment names; rotations in radians, about the platform origin
}

// Pose is the mode as a pose about the home that the frame tells.
func (m *Mode) Pose(f *kin.Frame) kin.Pose {
	home := r3.Add(f.Home, f.HomeRot.Apply(f.Tool))
	return kin.Pose{P: r3.Sub(r3.Add(m.Origin, m.Rot.Apply(f.Tool)), home), R: times(&m.Rot, &f.HomeRot)}
}

// times is r·sᵀ.
func times(r, s *kin.Rot) kin.Rot {
	t := kin.Rot{s[0], s[3], s[6], s[1], s[4], s[7], s[2], s[5], s[8]}
	return r.Mul(&t)
}

// Result is what a forward kinematics has found.
type Result struct {
	Modes    []Mode // the real solutions, the highest first
	Paths    int    // solutions that a general machine of the kind has, complex ones and multiplicity counted
	Complex  int    // distinct simple solutions found, real and complex
	Infinite int    // solutions that have gone to infinity in this machine
	Singular int    // solutions that coincide or lie on a curve of solutions
	Lost     int    // solutions of which nothing is known: Modes may lack some
}

// sortModes puts the highest first, then the largest x, y and quaternion. Coordinates that
// agree to 1e-7 of the scale count as equal, so that rounding does not decide.
func sortModes(modes []Mode, scale float64) {
	key := func(m *Mode) [6]float64 {
		w := rotationVector(&m.Rot)
		k := [6]float64{m.Origin.Z / scale, m.Origin.X / scale, m.Origin.Y / scale, w.Z, w.X, w.Y}
		for i := range k {
			k[i] = math.Round(1e7 * k[i])
		}
		return k
	}
	slices.SortStableFunc(modes, func(a, b Mode) int {
		p, q := key(&a), key(&b)
		return slices.Compare(q[:], p[:])
	})
}

// rotationVector is the logarithm of r: the angle in [0, π] times the axis.
func rotationVector(r *kin.Rot) kin.Vec {
	q := quaternion(r)
	v := kin.Vec{X: q[1], Y: q[2], Z: q[3]}
	s := r3.Norm(v)
	if s == 0 {
		return v
	}
	return r3.Scale(2*math.Atan2(s, q[0])/s, v)
}

// quaternion is that of r, the real part not negative (S. W. Shepperd 1978: the
// largest of the four components is found first).
func quaternion(r *kin.Rot) [4]float64 {
	square := [4]float64{
		1 + r[0] + r[4] + r[8], 1 + r[0] - r[4] - r[8], 1 - r[0] + r[4] - r[8], 1 - r[0] - r[4] + r[8],
	}
	most := slices.IndexFunc(square[:], func(s float64) bool { return s == slices.Max(square[:]) })
	if most < 0 { // NaN
		return [4]float64{math.NaN(), math.NaN(), math.NaN(), math.NaN()}
	}
	var q [4]float64
	switch most {
	case 0:
		q = [4]float64{square[0], r[7] - r[5], r[2] - r[6], r[3] - r[1]}
	case 1:
		q = [4]float64{r[7] - r[5], square[1], r[1] + r[3], r[2] + r[6]}
	case 2:
		q = [4]float64{r[2] - r[6], r[1] + r[3], square[2], r[5] + r[7]}
	case 3:
		q = [4]float64{r[3] - r[1], r[2] + r[6], r[5] + r[7], square[3]}
	}
	s := 0.5 / math.Sqrt(square[most])
	if q[0] < 0 {
		s = -s
	}
	for i := range q {
		q[i] *= s
	}
	return q
}

// rotation is the rotation of a quaternion of any length but zero.
func rotation(q [4]float64) kin.Rot {
	w, x, y, z := q[0], q[1], q[2], q[3]
	s := 1 / (w*w + x*x + y*y + z*z)
	return kin.Rot{
		s * (w*w + x*x - y*y - z*z), 2 * s * (x*y - w*z), 2 * s * (x*z + w*y),
		2 * s * (x*y + w*z), s * (w*w - x*x + y*y - z*z), 2 * s * (y*z - w*x),
		2 * s * (x*z - w*y), 2 * s * (y*z + w*x), s * (w*w - x*x - y*y + z*z),
	}
}

// distance is the distance of two placements: of the positions, and the angle of the relative
// rotation times the length, combined as the root of the sum of squares.
func distance(p, q kin.Vec, r, s *kin.Rot, length float64) float64 {
	rel := times(r, s)
	return math.Hypot(r3.Norm(r3.Sub(p, q)), length*r3.Norm(rotationVector(&rel)))
}
