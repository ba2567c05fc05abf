package kin

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// Posture is a solution of the forward kinematics.
type Posture struct {
	Pose        Pose // about home
	Origin      Vec  // platform origin, base frame
	Rot         Rot  // platform rotation, base frame
	Residual    float64
	Determinant float64 // of the family's own inverse Jacobian
	Steps       int
}

// The convergence rule of Locate.
const (
	locateTolerance = 1e-13 // residual over the largest actuator coordinate
	locateAccept    = 1e-10 // the same, where no further step improves it
	locateSteps     = 200
)

// Locate finds the pose whose actuator coordinates are q by Newton-Raphson from
// the pose `from`, each step halved until the residual falls (at most 20 times).
// It has converged when the largest difference of an actuator coordinate is below
// 1e-13 of the largest coordinate, or when no step improves on 1e-10 of it (of a
// crank's angle at least of 1 rad, of a carriage's coordinate at least of its rod, as both may be 0). It
// reports false after 200 steps, at a singular pose, or where it leaves reach;
// the posture is then the last one met. Where freedoms are tied, start and steps are
// settled first (see Settle), and so is the pose that is found.
func Locate(m Machine, q []float64, from Pose) (Posture, bool) {
	f := m.Frame()
	n := len(f.Freedoms)
	scale := 0.0
	for _, r := range f.Rods {
		if f.Rails == nil {
			r = 1
		}
		scale = math.Max(scale, r)
	}
	for _, v := range q {
		scale = math.Max(scale, math.Abs(v))
	}
	var (
		s    State
		own  [36]float64
		here = Settle(m, &from)
		jac  = mat.NewDense(n, n, nil)
		step = mat.NewVecDense(n, nil)
		diff = mat.NewVecDense(n, nil)
	)
	res := residual(m, &here, &s, q)
	out := func(k int, ok bool) (Posture, bool) {
		p := Posture{Pose: here, Residual: res, Steps: k}
		p.Origin, p.Rot = m.Place(&here)
		if s.Fail == Reached {
			p.Determinant = Determinant(m, &s)
		}
		return p, ok
	}
	for k := range locateSteps {
		if math.IsInf(res, 1) {
			return out(k, false)
		}
		if res <= locateTolerance*scale {
			return out(k, true)
		}
		Own(f.Freedoms, &s.J, &own)
		copy(jac.RawMatrix().Data, own[:n*n])
		for i := range n {
			diff.SetVec(i, q[i]-s.Q[i])
		}
		if err := step.SolveVec(jac, diff); err != nil {
			if c, ok := err.(mat.Condition); !ok || math.IsInf(float64(c), 1) {
				return out(k, false)
			}
		}
		cut, moved := 1.0, false
		for range 20 {
			try := advance(&here, f, step, cut)
			try = Settle(m, &try)
			var t State
			if r := residual(m, &try, &t, q); r < res {
				here, s, res, moved = try, t, r, true
				break
			}
			cut /= 2
		}
		if !moved {
			return out(k, res <= locateAccept*scale)
		}
	}
	return out(locateSteps, false)
}

// residual moves the machine to p and gives the largest difference of an actuator coordinate from q, +Inf where the pose cannot be reached.
func residual(m Machine, p *Pose, s *State, q []float64) float64 {
	m.Move(p, s)
	if s.Fail != Reached {
		return math.Inf(1)
	}
	worst := 0.0
	for i, v := range q {
		worst = math.Max(worst, math.Abs(v-s.Q[i]))
	}
	return worst
}

// advance moves the pose by a part of the step (v, Lc·ω) in the family's own freedoms; no part turns by more than half a radian.
func advance(p *Pose, f *Frame, step *mat.VecDense, part float64) Pose {
	var d Coords
	turn := 0.0
	for k, q := range f.Freedoms {
		d[q] = part * step.AtVec(k)
		if q.Angular() {
			d[q] /= f.Length
			turn = math.Max(turn, math.Abs(d[q]))
		}
	}
	if turn > 0.5 {
		for k := range d {
			d[k] *= 0.5 / turn
		}
	}
	e := Exp(Vec{X: d[Roll], Y: d[Pitch], Z: d[Yaw]})
	return Pose{P: Vec{X: p.P.X + d[X], Y: p.P.Y + d[Y], Z: p.P.Z + d[Z]}, R: e.Mul(&p.R)}
}
