package opt_test

import (
	"context"
	"fmt"
	"math"
	"reflect"
	"runtime"
	"sync/atomic"
	"testing"
	"time"

	"legwright/opt"
	"legwright/opt/known"
)

// problemOf makes a search problem of a known one.
func problemOf(k known.Problem) opt.Problem {
	s := opt.Space{Name: k.Name}
	for i := range k.Low {
		s.Vars = append(s.Vars, opt.Var{Name: fmt.Sprint("x", i), Low: k.Low[i], High: k.High[i]})
	}
	return opt.Problem{
		Spaces: []opt.Space{s}, Goals: k.Goals,
		Evaluate: func(_, _ int, x []float64, r *opt.Result) { k.Evaluate(x, r.Goals) },
	}
}

// mixed has two spaces with all kinds of variables, limits that half of the
// designs break and evaluations that fail.
func mixed() opt.Problem {
	vars := []opt.Var{
		{Name: "length", Low: -1, High: 2},
		{Name: "teeth", Kind: opt.Ordered, Levels: 40},
		{Name: "steel", Kind: opt.Choice, Levels: 5},
		{Name: "fixed", Low: 3, High: 3},
		{Name: "only", Kind: opt.Choice, Levels: 1},
		{Name: "width", Low: 0, High: 1},
	}
	return opt.Problem{
		Spaces: []opt.Space{{Name: "first", Vars: vars}, {Name: "second", Vars: vars[:3]}},
		Goals:  3, Limits: 2,
		Evaluate: func(_, space int, x []float64, r *opt.Result) {
			steel := []float64{0.3, 0, 0.9, 0.5, 0.2}[int(x[2])]
			w := 0.5
			if space == 0 {
				w = x[5]
			}
			if w > 0.98 {
				panic("too wide")
			}
			if x[0] > 1.9 {
				r.Goals[0] = math.Inf(-1)
				return
			}
			teeth := x[1] / 39
			r.Excess[0] = x[0] + teeth - 1.5
			r.Excess[1] = 0.2 - math.Abs(x[0])
			r.Violation = max(0, r.Excess[0]) + max(0, r.Excess[1])
			r.Goals[0] = x[0]*x[0] + steel + 0.1*w
			r.Goals[1] = (x[0]-1)*(x[0]-1) + (teeth-0.7)*(teeth-0.7) + float64(space)*0.05
			r.Goals[2] = 1 - w + teeth*steel
		},
	}
}

// single has one goal with its least value 0 at x[i] = i/10.
func single() opt.Problem {
	p := problemOf(known.ZDT1(6))
	p.Goals = 1
	p.Evaluate = func(_, _ int, x []float64, r *opt.Result) {
		s := 0.0
		for i, v := range x {
			s += (v - 0.1*float64(i)) * (v - 0.1*float64(i))
		}
		r.Goals[0] = s
	}
	return p
}

func battery() map[string]opt.Problem {
	return map[string]opt.Problem{
		"ZDT1":           problemOf(known.ZDT1(30)),
		"DTLZ2":          problemOf(known.DTLZ2(3, 10)),
		"DTLZ2, 4":       problemOf(known.DTLZ2(4, 8)),
		"DTLZ2, 5":       problemOf(known.DTLZ2(5, 6)),
		"mixed, failing": mixed(),
		"one goal":       single(),
	}
}

func mustSearch(t *testing.T, p opt.Problem, s opt.Settings) *opt.Outcome {
	t.Helper()
	o, err := opt.Search(context.Background(), p, s)
	if err != nil {
		t.Fatal(err)
	}
	return o
}

// Every evaluation is counted, none beyond the budget, and every design is
// inside its space.
func TestBudgetAndBounds(t *testing.T) {
	for name, p := range battery() {
		for _, budget := range []int{9, 50, 333, 700} {
			var calls atomic.Int64
			inner := p.Evaluate
			q := p
			q.Evaluate = func(worker, space int, x []float64, r *opt.Result) {
				calls.Add(1)
				if worker < 0 || worker > 2 {
					t.Errorf("%s: worker %d of 3", name, worker)
				}
				for i, v := range p.Spaces[space].Vars {
					low, high := v.Low, v.High
					if v.Kind != opt.Real {
						low, high = 0, float64(v.Levels-1)
						if x[i] != math.Trunc(x[i]) {
							t.Errorf("%s: %s is %v, not an index", name, v.Name, x[i])
						}
					}
					if !(low <= x[i] && x[i] <= high) {
						t.Errorf("%s: %s is %v, outside [%v, %v]", name, v.Name, x[i], low, high)
					}
				}
				inner(worker, space, x, r)
			}
			o := mustSearch(t, q, opt.Settings{Evaluations: budget, Workers: 3, Front: 30, Seed: 5})
			if int(calls.Load()) != budget || o.Evaluations != budget {
				t.Errorf("%s: budget %d, %d calls, %d counted", name, budget, calls.Load(), o.Evaluations)
			}
			if len(o.Front) > 30 || len(o.Front) > o.Archive {
				t.Errorf("%s: front of %d out of %d", name, len(o.Front), o.Archive)
			}
			if last := o.History[len(o.History)-1]; last.Evaluations != budget {
				t.Errorf("%s: history ends at %d", name, last.Evaluations)
			}
		}
	}
}

// No design of a front beats another, and its hypervolume is what it says.
func TestFrontIsAFront(t *testing.T) {
	for name, p := range battery() {
		o := mustSearch(t, p, opt.Settings{Evaluations: 900, Front: 40, Seed: 2})
		var pts [][]float64
		for i, d := range o.Front {
			r := opt.Result{Goals: make([]float64, p.Goals), Excess: make([]float64, p.Limits)}
			p.Evaluate(0, d.Space, d.X, &r)
			if !reflect.DeepEqual(r.Goals, d.Goals) || r.Violation != 0 || d.Violation != 0 {
				t.Errorf("%s: design %d does not evaluate to what it says", name, i)
			}
			for j, e := range o.Front {
				beaten := i != j
				for k := range d.Goals {
					beaten = beaten && e.Goals[k] <= d.Goals[k]
				}
				if beaten {
					t.Errorf("%s: design %d beats or equals design %d", name, j, i)
				}
			}
			pts = append(pts, d.Goals)
		}
		if len(pts) == 0 {
			t.Errorf("%s: no front", name)
		}
		if hv := opt.Hypervolume(pts, o.Reference); hv != o.Hypervolume || hv <= 0 {
			t.Errorf("%s: hypervolume %v, of the front %v", name, o.Hypervolume, hv)
		}
	}
}

// The number of workers and of processors never changes a bit.
func TestWorkersDoNotMatter(t *testing.T) {
	for name, p := range battery() {
		s := opt.Settings{Evaluations: 800, Front: 50, Seed: 11, Polish: 0.2}
		var want *opt.Outcome
		ways := [][2]int{{1, 1}, {2, 2}, {8, 3}, {1, 4}, {2, 1}, {8, 2}}
		if testing.Short() {
			ways = ways[:3]
		}
		for _, c := range ways {
			old := runtime.GOMAXPROCS(c[1])
			s.Workers = c[0]
			o := mustSearch(t, p, s)
			runtime.GOMAXPROCS(old)
			if want == nil {
				want = o
			} else if a, b := fmt.Sprintf("%#v", o), fmt.Sprintf("%#v", want); a != b {
				t.Errorf("%s: %d workers on %d processors differ from one on one", name, c[0], c[1])
			}
		}
		s.Seed = 12
		if o := mustSearch(t, p, s); p.Goals > 1 && reflect.DeepEqual(o.Front, want.Front) {
			t.Errorf("%s: another seed, the same front", name)
		}
	}
}

func TestSingleGoalFindsTheLeast(t *testing.T) {
	o := mustSearch(t, single(), opt.Settings{Evaluations: 3000, Seed: 1})
	if len(o.Front) != 1 || o.Front[0].Goals[0] > 1e-4 {
		t.Errorf("front %v, want one design of nearly 0", o.Front)
	}
}

func TestCancelReturnsWhatWasFound(t *testing.T) {
	for _, workers := range []int{1, 4} {
		p := problemOf(known.ZDT1(30))
		inner := p.Evaluate
		p.Evaluate = func(w, s int, x []float64, r *opt.Result) {
			time.Sleep(200 * time.Microsecond)
			inner(w, s, x, r)
		}
		ctx, stop := context.WithCancel(context.Background())
		s := opt.Settings{Evaluations: 1 << 30, Workers: workers, Progress: func(p opt.Progress) {
			if p.Evaluations > 200 {
				stop()
			}
		}}
		o, err := opt.Search(ctx, p, s)
		stop()
		if err != nil || o.Status != opt.Interrupted || len(o.Front) == 0 || o.Evaluations > 400 {
			t.Errorf("%d workers: %v, %v, front of %d after %d evaluations", workers, err, o.Status, len(o.Front), o.Evaluations)
		}
		ctx, stop = context.WithCancel(context.Background())
		stop()
		if o, err = opt.Search(ctx, p, s); err != nil || o.Status != opt.Interrupted || o.Evaluations != 0 {
			t.Errorf("cancelled before: %v, %+v", err, o)
		}
	}
}

func TestFailuresAreKeptApart(t *testing.T) {
	o := mustSearch(t, mixed(), opt.Settings{Evaluations: 2000, Seed: 3})
	if o.Status != opt.BudgetSpent || o.Failures == 0 || len(o.Failed) == 0 {
		t.Fatalf("%v, %d failures, %d shown", o.Status, o.Failures, len(o.Failed))
	}
	texts := map[string]bool{}
	for _, d := range o.Failed {
		texts[d.Fault] = true
		if !math.IsInf(d.Violation, 1) {
			t.Errorf("failed design with violation %v", d.Violation)
		}
	}
	if !texts["panic: too wide"] || !texts["goal 0 is -Inf"] {
		t.Errorf("reasons %v", texts)
	}
	for _, d := range append(o.Near, o.Front...) {
		if d.Fault != "" {
			t.Errorf("failed design shown as %v", d)
		}
	}
}

// A small discrete space is tried out completely, no design twice.
func TestDiscreteSpaceIsExhausted(t *testing.T) {
	seen := map[[2]float64]int{}
	p := opt.Problem{
		Spaces: []opt.Space{{Vars: []opt.Var{{Kind: opt.Ordered, Levels: 7}, {Kind: opt.Choice, Levels: 5}}}},
		Goals:  2,
		Evaluate: func(_, _ int, x []float64, r *opt.Result) {
			seen[[2]float64{x[0], x[1]}]++
			r.Goals[0], r.Goals[1] = x[0]+math.Mod(3*x[1], 5), 6-x[0]
		},
	}
	o := mustSearch(t, p, opt.Settings{Evaluations: 1000, Workers: 1})
	if o.Status != opt.Exhausted || o.Evaluations != 35 || len(seen) != 35 {
		t.Errorf("%v after %d evaluations of %d designs", o.Status, o.Evaluations, len(seen))
	}
	if len(o.Front) != 7 { // x1 = 0 for every x0
		t.Errorf("front of %d, want 7", len(o.Front))
	}
}

func TestNearMisses(t *testing.T) {
	p := opt.Problem{
		Spaces: []opt.Space{{Vars: []opt.Var{{Low: 0, High: 1}, {Low: 0, High: 1}}}},
		Goals:  2, Limits: 3,
		Evaluate: func(_, _ int, x []float64, r *opt.Result) {
			r.Excess[0], r.Excess[1], r.Excess[2] = x[0]-0.3, 0.5-x[0], -1
			if x[1] < 0.5 {
				r.Excess[2] = 0.01
			}
			for _, e := range r.Excess {
				r.Violation += max(0, e)
			}
		},
	}
	o := mustSearch(t, p, opt.Settings{Evaluations: 1500, Seed: 4})
	if o.Status != opt.NoFeasible || o.Feasible != 0 || len(o.Front) != 0 || o.Reference != nil {
		t.Fatalf("%v, %d feasible", o.Status, o.Feasible)
	}
	if len(o.Near) != 50 {
		t.Errorf("%d near misses, want 50", len(o.Near))
	}
	for i, d := range o.Near {
		if i > 0 && d.Violation < o.Near[i-1].Violation {
			t.Errorf("near miss %d out of order", i)
		}
	}
	if v := o.Near[0].Violation; v < 0.2-1e-12 || v > 0.2005 { // 0.3 < x < 0.5 misses both by 0.2 in all
		t.Errorf("least violation %v, want 0.2", v)
	}
	for l, want := range []float64{0.2, 0.2, math.NaN()} {
		list := o.Single[l]
		if l == 2 {
			if len(list) != 0 {
				t.Errorf("limit 2 alone: %d designs, none can be", len(list))
			}
			continue
		}
		if len(list) == 0 || len(list) > 10 || math.Abs(list[0].Excess[l]-want) > 0.01 {
			t.Errorf("limit %d alone: %d designs", l, len(list))
			continue
		}
		for i, d := range list {
			for j, e := range d.Excess {
				if (e > 0) != (j == l) || i > 0 && d.Excess[l] < list[i-1].Excess[l] {
					t.Errorf("limit %d alone: design %d has excess %v", l, i, d.Excess)
				}
			}
		}
	}
}

func TestBadInputIsRefused(t *testing.T) {
	good := problemOf(known.ZDT1(3))
	for _, c := range []struct {
		why   string
		spoil func(p *opt.Problem, s *opt.Settings)
	}{
		{"opt: Problem.Evaluate is nil; give a function", func(p *opt.Problem, _ *opt.Settings) { p.Evaluate = nil }},
		{"opt: Problem.Goals is 0; at least 1 is needed", func(p *opt.Problem, _ *opt.Settings) { p.Goals = 0 }},
		{"opt: Problem.Spaces is empty; give at least one space", func(p *opt.Problem, _ *opt.Settings) { p.Spaces = nil }},
		{"opt: Problem.Spaces[0].Vars[0] (a) runs from 2 to 1; both must be finite with Low <= High", func(p *opt.Problem, _ *opt.Settings) {
			p.Spaces = []opt.Space{{Vars: []opt.Var{{Name: "a", Low: 2, High: 1}}}}
		}},
		{"opt: Problem.Spaces[0].Vars[0] (b) has 0 levels; at least 1 is needed", func(p *opt.Problem, _ *opt.Settings) {
			p.Spaces = []opt.Space{{Vars: []opt.Var{{Name: "b", Kind: opt.Choice}}}}
		}},
		{"opt: Settings.Evaluations is 3; at least 4 are needed for 1 space(s)", func(_ *opt.Problem, s *opt.Settings) { s.Evaluations = 3 }},
		{"opt: Settings.Workers is -1; write at least 1, or 0 for the default", func(_ *opt.Problem, s *opt.Settings) { s.Workers = -1 }},
		{"opt: Settings.Reference has 1 values; one per goal, 2, are needed", func(_ *opt.Problem, s *opt.Settings) { s.Reference = []float64{1} }},
		{"opt: Settings.Polish is 1; write a share below 1, 0 for the default or -1 for none", func(_ *opt.Problem, s *opt.Settings) { s.Polish = 1 }},
	} {
		p, s := good, opt.Settings{Evaluations: 100}
		c.spoil(&p, &s)
		if _, err := opt.Search(context.Background(), p, s); err == nil || err.Error() != c.why {
			t.Errorf("got %v, want %s", err, c.why)
		}
	}
}
