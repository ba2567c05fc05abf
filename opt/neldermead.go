package opt

import (
	"context"
	"math"

	"gonum.org/v1/gonum/optimize"
)

// job is one Nelder-Mead run of the polish.
type job struct {
	aim
	budget int
	made   []*genome // evaluated, in order
}

// run minimises the achievement function over the real variables of the
// start; the others keep their values.
func (j *job) run(r *run) {
	d := r.islands[j.start.space].dom
	low, high, x0 := make([]float64, len(d.real)), make([]float64, len(d.real)), make([]float64, len(d.real))
	for k, i := range d.real {
		low[k], high[k], x0[k] = d.low[i], d.high[i], j.start.x[i]
	}
	nelderMead(r.ctx, func(x []float64) float64 {
		if len(j.made) == j.budget {
			return math.Inf(1)
		}
		g := newGenome(d, j.start.space, r.problem.Goals, r.problem.Limits)
		g.origin = originPolish
		copy(g.x, j.start.x)
		for k, i := range d.real {
			g.x[i] = x[k]
		}
		r.ev.one(g, r.snapshot)
		if !g.done {
			return math.Inf(1)
		}
		j.made = append(j.made, g)
		return j.rate(g)
	}, low, high, x0, j.rate(j.start), j.budget)
}

// rate orders designs: feasible ones by achievement, then by violation.
func (j *job) rate(g *genome) float64 {
	const unfit = 1e9 // beyond any achievement of scaled goals
	if g.feasible() {
		return min(j.value(g.goals), unfit)
	}
	return unfit * (1 + g.violation)
}

// nelderMead minimises f over a box with gonum's Nelder-Mead (Nelder, Mead
// 1965; parameters of Gao, Han 2012), starting from x0 where f is f0, with at
// most budget evaluations. It returns the best point and value. The simplex
// moves in u, x = mid + half sin u, so it never leaves the box; a start on a
// bound is set off a little, since the sine is level there. NaN counts as
// +Inf: the simplex would take it for convergence.
func nelderMead(ctx context.Context, f func(x []float64) float64, low, high, x0 []float64, f0 float64, budget int) ([]float64, float64) {
	const (
		size = 0.1  // of the first simplex, in u
		edge = 0.05 // least distance of the start from a bound, in u
	)
	n := len(x0)
	x := make([]float64, n)
	place := func(u []float64) []float64 {
		for k, v := range u {
			half := (high[k] - low[k]) / 2
			x[k] = min(max(low[k]+half+float64(half*math.Sin(v)), low[k]), high[k])
		}
		return x
	}
	u0 := make([]float64, n)
	moved := false
	for k, v := range x0 {
		half := (high[k] - low[k]) / 2
		at := math.Asin(min(max((v-low[k]-half)/half, -1), 1))
		u0[k] = min(max(at, edge-math.Pi/2), math.Pi/2-edge)
		moved = moved || u0[k] != at
	}
	best, bestX := f0, append([]float64(nil), x0...)
	problem := optimize.Problem{
		Func: func(u []float64) float64 {
			v := f(place(u))
			if math.IsNaN(v) {
				v = math.Inf(1)
			}
			if v < best {
				best = v
				copy(bestX, x)
			}
			return v
		},
		Status: func() (optimize.Status, error) {
			if err := ctx.Err(); err != nil {
				return optimize.Failure, err
			}
			return optimize.NotTerminated, nil
		},
	}
	settings := &optimize.Settings{
		FuncEvaluations: budget,
		Converger:       &optimize.FunctionConverge{Absolute: 1e-14, Iterations: 20 * (n + 1)},
	}
	if !moved && !math.IsInf(f0, 0) && !math.IsNaN(f0) {
		settings.InitValues = &optimize.Location{F: f0}
	}
	// The result is what f saw; an error only says that the run ended early.
	_, _ = optimize.Minimize(problem, u0, settings, &optimize.NelderMead{SimplexSize: size})
	return bestX, best
}
