package opt_test

import (
	"fmt"
	"testing"

	"legwright/opt"
	"legwright/opt/known"
)

// confirmed is a problem whose Evaluate flatters: goals are better by up to a tenth, and designs with x[1] above 0.9 pass that Confirm
// turns down.
func confirmed() opt.Problem {
	p := problemOf(known.ZDT1(6))
	truth := p.Evaluate
	p.Evaluate = func(w, space int, x []float64, r *opt.Result) {
		truth(w, space, x, r)
		for k := range r.Goals {
			r.Goals[k] -= 0.1 * x[2]
		}
	}
	p.Confirm = func(w, space int, x []float64, r *opt.Result) {
		truth(w, space, x, r)
		if x[1] > 0.9 {
			r.Violation = x[1]
		}
	}
	return p
}

// Designs of the front carry what Confirm made of them, whatever the number of workers.
func TestConfirm(t *testing.T) {
	p := confirmed()
	s := opt.Settings{Evaluations: 3000, Seed: 2, Workers: 1}
	one := mustSearch(t, p, s)
	s.Workers = 4
	if !same(mustSearch(t, p, s), one) {
		t.Error("four workers find another front")
	}
	truth := problemOf(known.ZDT1(6))
	for _, d := range one.Front {
		r := opt.Result{Goals: make([]float64, p.Goals), Excess: make([]float64, p.Limits)}
		truth.Evaluate(0, d.Space, d.X, &r)
		for k, v := range d.Goals {
			if v != r.Goals[k] {
				t.Fatalf("goal %d is %v, confirmed %v", k, v, r.Goals[k])
			}
		}
		if d.X[1] > 0.9 {
			t.Errorf("a design that was turned down is on the front: %v", d.X)
		}
	}
	if len(one.Front) < 20 {
		t.Errorf("%d designs on the front", len(one.Front))
	}
}

// A run that recalls all its results ends as the one that made them: what was confirmed is not confirmed again.
func TestConfirmedResultsAreRecalled(t *testing.T) {
	type entry struct {
		goals, excess []float64
		violation     float64
	}
	p := confirmed()
	log := map[string]entry{}
	s := opt.Settings{Evaluations: 2000, Seed: 4, Workers: 2, Polish: 0.1}
	s.Record = func(space int, x []float64, r *opt.Result) {
		log[fmt.Sprint(x)] = entry{append([]float64(nil), r.Goals...), append([]float64(nil), r.Excess...), r.Violation}
	}
	want := mustSearch(t, p, s)
	s.Record = nil
	p.Evaluate = func(_, _ int, x []float64, r *opt.Result) {
		e := log[fmt.Sprint(x)]
		copy(r.Goals, e.goals)
		copy(r.Excess, e.excess)
		r.Violation, r.Recalled = e.violation, true
	}
	p.Confirm = func(int, int, []float64, *opt.Result) { panic("confirmed twice") }
	if !same(mustSearch(t, p, s), want) {
		t.Error("the replay ends elsewhere")
	}
}
