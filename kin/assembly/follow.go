package assembly

import (
	"math"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// The step control of Follow, in parts of the whole way.
const (
	followFirst  = 0.05
	followLeast  = 1e-7 // below it the way is blocked
	followMost   = 0.1
	followSteps  = 5   // Newton steps of a correction at most
	followStray  = 0.2 // how far the correction may move, over the length of the step
	followChange = 4   // factor by which the determinant may change in a step
)

// Follow drives a machine from the pose `from`, where its actuator coordinates are q0, to q1
// with all coordinates in proportion, and gives the pose in which it arrives. It
// reports false, with the last pose, if the way leads to a singular posture, where the determinant of
// the family's inverse Jacobian would change its sign, or out of reach; and at once
// if q0 does not belong to `from`.
//
// A step is predicted by the inverse Jacobian and corrected by kin.Locate. It is made shorter
// until the correction is a fifth of it at most and the determinant keeps its sign and
// within a factor of 4 its size, so that no branch is taken for another.
func Follow(m kin.Machine, from kin.Pose, q0, q1 []float64) (kin.Pose, bool) {
	f := m.Frame()
	n := len(f.Freedoms)
	if len(q0) != n || len(q1) != n {
		panic("assembly: Follow wants one actuator coordinate for each freedom")
	}
	start, ok := kin.Locate(m, q0, from)
	if settled := kin.Settle(m, &from); !ok || start.Determinant == 0 || Distance(f, &start.Pose, &settled) > nearby*f.Length {
		return from, false
	}
	var (
		here = start
		q    = make([]float64, n)
		u, h = 0.0, followFirst
	)
	for u < 1 {
		last := u+h >= 1
		if last {
			h = 1 - u
		}
		for i := range q {
			q[i] = q0[i] + (u+h)*(q1[i]-q0[i])
			if last {
				q[i] = q1[i]
			}
		}
		next, ok := advance(m, &here, q)
		if !ok {
			if h /= 2; h < followLeast {
				return here.Pose, false
			}
			continue
		}
		here = next
		u += h
		h = math.Min(2*h, followMost)
		if last {
			break
		}
	}
	return here.Pose, true
}

// advance is the posture with the coordinates q on the branch of a posture nearby.
func advance(m kin.Machine, here *kin.Posture, q []float64) (kin.Posture, bool) {
	f := m.Frame()
	n := len(f.Freedoms)
	var (
		s   kin.State
		own [36]float64
	)
	m.Move(&here.Pose, &s)
	if s.Fail != kin.Reached {
		return kin.Posture{}, false
	}
	kin.Own(f.Freedoms, &s.J, &own)
	diff, step := mat.NewVecDense(n, nil), mat.NewVecDense(n, nil)
	for i := range n {
		diff.SetVec(i, q[i]-s.Q[i])
	}
	if !solved(step, mat.NewDense(n, n, own[:n*n]), diff) {
		return kin.Posture{}, false
	}
	var d kin.Coords
	for k, q := range f.Freedoms {
		d[q] = step.AtVec(k)
		if q.Angular() {
			d[q] /= f.Length
		}
	}
	turn := kin.Exp(kin.Vec{X: d[kin.Roll], Y: d[kin.Pitch], Z: d[kin.Yaw]})
	guess := kin.Pose{P: r3.Add(here.Pose.P, kin.Vec{X: d[kin.X], Y: d[kin.Y], Z: d[kin.Z]}), R: turn.Mul(&here.Pose.R)}
	guess = kin.Settle(m, &guess)
	next, ok := kin.Locate(m, q, guess)
	if !ok || next.Steps > followSteps {
		return next, false
	}
	ratio := next.Determinant / here.Determinant
	if !(ratio > 1./followChange && ratio < followChange) {
		return next, false
	}
	moved := Distance(f, &guess, &here.Pose)
	return next, Distance(f, &next.Pose, &guess) <= followStray*moved+1e-12*f.Length
}

// Distance is how far two poses are apart: the root of the sum of squares of the tool point's
// distance and of the angle between them times the characteristic length.
func Distance(f *kin.Frame, a, b *kin.Pose) float64 {
	return distance(a.P, b.P, &a.R, &b.R, f.Length)
}

// Separation is for each mode the distance to the nearest other one (see Distance); +Inf where there is none.
func Separation(m kin.Machine, modes []Mode) []float64 {
	f := m.Frame()
	poses := make([]kin.Pose, len(modes))
	for i := range modes {
		poses[i] = modes[i].Pose(f)
	}
	out := make([]float64, len(modes))
	for i := range out {
		out[i] = math.Inf(1)
		for j := range poses {
			if j != i {
				out[i] = math.Min(out[i], Distance(f, &poses[i], &poses[j]))
			}
		}
	}
	return out
}

// Reached is the place among the modes, which have the actuator coordinates q, of the one
// in which the machine arrives when it is driven there from home: -1 if it is none of
// them or the way is blocked (see Follow).
func Reached(m kin.Machine, modes []Mode, q []float64) int {
	var s kin.State
	home := kin.Pose{R: kin.Identity()}
	m.Move(&home, &s)
	if s.Fail != kin.Reached {
		return -1
	}
	f := m.Frame()
	p, ok := Follow(m, home, s.Q[:len(f.Freedoms)], q)
	if !ok {
		return -1
	}
	for i := range modes {
		if at := modes[i].Pose(f); Distance(f, &p, &at) < nearby*f.Length {
			return i
		}
	}
	return -1
}
