package opt_test

import (
	"math"
	"slices"
	"testing"

	"legwright/opt"
)

// tail is a front that early designs show half of: the second half lies behind
// a bend that takes most of the budget. f1 = t, f2 = 1/(1+9t) along it.
func tail() opt.Problem {
	return opt.Problem{
		Spaces: []opt.Space{{Name: "tail", Vars: []opt.Var{{Name: "t", Low: 0, High: 1}, {Name: "u", Low: 0, High: 1}, {Name: "v", Low: 0, High: 1}}}},
		Goals:  2, Limits: 1,
		Evaluate: func(_, _ int, x []float64, r *opt.Result) {
			t := x[0]
			off := math.Abs(x[1]-t*t) + math.Abs(x[2]-t)
			r.Goals[0], r.Goals[1] = t+off, 1/(1+9*t)+off
			r.Excess[0] = off - 0.6 + 0.5*t // the farther along, the narrower
			r.Violation = max(0, r.Excess[0])
		},
	}
}

// The reference follows the front: at the end it leaves out a twentieth of the
// archive in each goal, and no less. One that is given stays.
func TestReferenceFollowsTheFront(t *testing.T) {
	for seed := range uint64(6) {
		o := mustSearch(t, tail(), opt.Settings{Evaluations: 3000, Seed: seed, Archive: true})
		for k, at := range o.Reference {
			out := 0
			for _, d := range o.Kept {
				if d.Goals[k] >= at {
					out++
				}
			}
			if 20*out > len(o.Kept) {
				t.Errorf("seed %d: %d of %d designs are beyond the reference in goal %d", seed, out, len(o.Kept), k)
			}
		}
		for i, p := range o.History[1:] {
			if p.Hypervolume < o.History[i].Hypervolume*(1-1e-9) {
				t.Errorf("seed %d: the hypervolume falls from %g to %g", seed, o.History[i].Hypervolume, p.Hypervolume)
			}
		}
	}
	ref := []float64{0.5, 0.5}
	if o := mustSearch(t, tail(), opt.Settings{Evaluations: 500, Reference: ref}); !slices.Equal(o.Reference, ref) {
		t.Errorf("reference %v, want %v", o.Reference, ref)
	}
}
