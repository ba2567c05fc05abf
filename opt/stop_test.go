package opt_test

import (
	"context"
	"math"
	"reflect"
	"slices"
	"testing"
	"time"

	"legwright/opt"
	"legwright/opt/known"
)

// A search that time ends is the one that StopAt ends at its evaluations, but
// for the status; whatever barrier it is, polish and exhausted spaces included.
func TestTimeStopIsReproduced(t *testing.T) {
	small := mixed()
	small.Spaces = append(small.Spaces, opt.Space{Name: "tiny", Vars: []opt.Var{
		{Kind: opt.Choice, Levels: 2}, {Kind: opt.Ordered, Levels: 30}, {Kind: opt.Choice, Levels: 3}}})
	evaluate := small.Evaluate
	small.Evaluate = func(w, space int, x []float64, r *opt.Result) {
		if space == 2 { // levels of its own; let it lead, so that it is asked until it is empty
			r.Goals[0], r.Goals[1], r.Goals[2] = x[0]-5, x[1]-40, x[2]-5
			return
		}
		evaluate(w, space, x, r)
	}
	stopped := 0
	for name, p := range map[string]opt.Problem{"mixed": mixed(), "single": single(), "tiny": small, "zdt1": problemOf(known.ZDT1(8))} {
		for i := range 8 {
			s := opt.Settings{Evaluations: 4000, Seed: 5, Workers: 1 + i%3, Polish: 0.2, Time: time.Duration(1<<i) * 200 * time.Microsecond}
			o := mustSearch(t, p, s)
			if o.Status != opt.TimeSpent {
				continue
			}
			stopped++
			s.Time, s.StopAt, s.Workers = 0, o.Evaluations, 2
			again := mustSearch(t, p, s)
			if again.Status != opt.Stopped || again.Evaluations != o.Evaluations {
				t.Errorf("%s: status %v after %d evaluations, want %v after %d", name, again.Status, again.Evaluations, opt.Stopped, o.Evaluations)
			}
			again.Status, again.Grown = o.Status, o.Grown
			if !same(again, o) {
				t.Errorf("%s: other outcome than that of time after %d evaluations", name, o.Evaluations)
				va, vb := reflect.ValueOf(plain(again)), reflect.ValueOf(plain(o))
				for f := range va.NumField() {
					if !reflect.DeepEqual(va.Field(f).Interface(), vb.Field(f).Interface()) {
						t.Logf("%s: %v\n want %v", va.Type().Field(f).Name, va.Field(f), vb.Field(f))
					}
				}
			}
		}
	}
	if stopped < 10 {
		t.Errorf("time ended %d of 32 searches; the test tests nothing", stopped)
	}
}

// same compares outcomes bit by bit: NaN equals NaN.
func same(a, b *opt.Outcome) bool { return reflect.DeepEqual(plain(a), plain(b)) }

// plain has numbers in place of NaN.
func plain(o *opt.Outcome) opt.Outcome {
	c := *o
	lists := [][]opt.Design{c.Front, c.Kept, c.Near, c.Failed}
	lists = append(lists, c.Single...)
	for _, s := range c.Spaces {
		lists = append(lists, s.Near, s.Best)
	}
	for _, l := range lists {
		for i := range l {
			for k, v := range l[i].Goals {
				if math.IsNaN(v) {
					l[i].Goals[k] = -12345
				}
			}
		}
	}
	return c
}

// Any StopAt is met exactly, whatever it is, and a bad one is refused.
func TestStopAt(t *testing.T) {
	for _, at := range []int{120, 121, 127, 700, 1403, 1999, 2000} {
		o := mustSearch(t, mixed(), opt.Settings{Evaluations: 2000, StopAt: at, Seed: 3})
		want := opt.Stopped
		if at == 2000 {
			want = opt.BudgetSpent
		}
		if o.Evaluations != at || o.Status != want {
			t.Errorf("stopped after %d with %v, want %d", o.Evaluations, o.Status, at)
		}
	}
	for _, at := range []int{-1, 3, 2001} {
		if _, err := opt.Search(context.Background(), mixed(), opt.Settings{Evaluations: 2000, StopAt: at}); err == nil {
			t.Errorf("StopAt %d is taken", at)
		}
	}
}

// A search ends soon after its front has ceased to grow, not before, and the
// same way for any number of workers.
func TestStall(t *testing.T) {
	// The true hypervolume of ZDT1 is nearly reached after 6000 evaluations.
	p, ref := problemOf(known.ZDT1(8)), []float64{1.1, 1.1}
	rule := opt.Stall{Evaluations: 2000, Gain: 0.001}
	o := mustSearch(t, p, opt.Settings{Evaluations: 40000, Reference: ref, Stall: rule})
	if o.Status != opt.Stalled || o.Evaluations < 2000 || o.Evaluations > 20000 {
		t.Fatalf("%v after %d evaluations", o.Status, o.Evaluations)
	}
	if truth := 1.1*1.1 - 1.0/3; o.Hypervolume < 0.99*truth {
		t.Errorf("stalled at %v of %v", o.Hypervolume, truth)
	}
	again := mustSearch(t, p, opt.Settings{Evaluations: 40000, Reference: ref, Stall: rule, Workers: 3})
	if !same(o, again) {
		t.Error("depends on the number of workers")
	}
	at := mustSearch(t, p, opt.Settings{Evaluations: 40000, Reference: ref, StopAt: o.Evaluations})
	if at.Status, at.Grown = o.Status, o.Grown; !same(o, at) {
		t.Error("StopAt does not reproduce it")
	}
	// No feasible design has no hypervolume that could stall.
	none := opt.Problem{Goals: 1, Limits: 1, Spaces: p.Spaces, Evaluate: func(_, _ int, x []float64, r *opt.Result) { r.Excess[0], r.Violation = 1, 1 }}
	if o := mustSearch(t, none, opt.Settings{Evaluations: 3000, Stall: opt.Stall{Evaluations: 100, Gain: 0.1}}); o.Status != opt.NoFeasible {
		t.Errorf("without feasible designs: %v", o.Status)
	}
	for _, bad := range []opt.Stall{{Evaluations: -1}, {Evaluations: 10}, {Evaluations: 10, Gain: 1}, {Evaluations: 10, Gain: math.NaN()}} {
		if _, err := opt.Search(context.Background(), none, opt.Settings{Evaluations: 3000, Stall: bad}); err == nil {
			t.Errorf("%+v is taken", bad)
		}
	}
}

// What Record saw, given back by Evaluate in place of the evaluation, leads the
// search to the same bits without one evaluation; and Record sees all of it
// again only if it is not marked.
func TestRecordAndRecall(t *testing.T) {
	type entry struct {
		space     int
		x         []float64
		goals     []float64
		excess    []float64
		violation float64
		fault     string
	}
	for name, p := range battery() {
		var log []entry
		s := opt.Settings{Evaluations: 1500, Seed: 2, Archive: true}
		s.Record = func(space int, x []float64, r *opt.Result) {
			log = append(log, entry{space, slices.Clone(x), slices.Clone(r.Goals), slices.Clone(r.Excess), r.Violation, r.Fault})
		}
		want := mustSearch(t, p, s)
		if len(log) != want.Evaluations {
			t.Fatalf("%s: %d recorded of %d", name, len(log), want.Evaluations)
		}
		replay := p
		replay.Evaluate = func(_, space int, x []float64, r *opt.Result) {
			for i := range log {
				if e := &log[i]; e.space == space && slices.Equal(e.x, x) {
					copy(r.Goals, e.goals)
					copy(r.Excess, e.excess)
					r.Violation, r.Fault, r.Recalled = e.violation, e.fault, true
					return
				}
			}
			panic("not recorded")
		}
		more := 0
		s.Record = func(int, []float64, *opt.Result) { more++ }
		s.Workers = 3
		got := mustSearch(t, replay, s)
		if more != 0 {
			t.Errorf("%s: %d recalled designs are recorded again", name, more)
		}
		if !same(got, want) {
			t.Errorf("%s: the replay ends elsewhere", name)
		}
	}
}
