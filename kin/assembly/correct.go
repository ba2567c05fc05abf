package assembly

import (
	"math"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// The real corrector's rules.
const (
	correctSteps = 30
	accepted     = 1e-10 // largest residual of a mode, over the machine's size
)

// correct improves a placement by Newton's method on the six lengths until its
// residual falls no more, and tells whether it is then a solution.
func (h *hexapod) correct(origin kin.Vec, rot kin.Rot) (Mode, bool) {
	var (
		best = Mode{Residual: math.Inf(1)}
		jac  = mat.NewDense(6, 6, nil)
		diff = mat.NewVecDense(6, nil)
		step = mat.NewVecDense(6, nil)
	)
	for range correctSteps {
		worst := 0.0
		for i := range 6 {
			r := rot.Apply(h.platform[i])
			s := r3.Sub(r3.Add(origin, r), h.base[i])
			l := r3.Norm(s)
			n := r3.Scale(1/l, s)
			m := r3.Cross(r, n)
			jac.SetRow(i, []float64{n.X, n.Y, n.Z, m.X, m.Y, m.Z})
			diff.SetVec(i, h.length[i]-l)
			worst = math.Max(worst, math.Abs(h.length[i]-l))
		}
		if !(worst < best.Residual) {
			break
		}
		best = Mode{Origin: origin, Rot: rot, Residual: worst, Determinant: mat.Det(jac)}
		if !solved(step, jac, diff) {
			break
		}
		v := step.RawVector().Data
		origin = r3.Add(origin, kin.Vec{X: v[0], Y: v[1], Z: v[2]})
		turn := kin.Exp(kin.Vec{X: v[3], Y: v[4], Z: v[5]})
		rot = turn.Mul(&rot)
	}
	return best, best.Residual <= accepted*h.size
}

// solved solves jac·step = diff and tells whether it could be done at all, however ill-conditioned.
func solved(step *mat.VecDense, jac *mat.Dense, diff *mat.VecDense) bool {
	err := step.SolveVec(jac, diff)
	c, ill := err.(mat.Condition)
	return err == nil || ill && !math.IsInf(float64(c), 1)
}
