package opt_test

import (
	"crypto/sha256"
	"fmt"
	"math"
	"runtime"
	"slices"
	"testing"

	"legwright/opt"
	"legwright/opt/known"
)

// pair offers a known problem as two spaces; the first is worse by shift in
// every goal.
func pair(k known.Problem, shift float64) opt.Problem {
	p := problemOf(k)
	p.Spaces = append(p.Spaces, p.Spaces[0])
	p.Evaluate = func(_, space int, x []float64, r *opt.Result) {
		k.Evaluate(x, r.Goals)
		if space == 0 {
			for i := range r.Goals {
				r.Goals[i] += shift
			}
		}
	}
	return p
}

// A space that is clearly worse keeps little more than its even start and the
// least share, and the front is what the better one finds alone with what it got.
func TestBudgetMovesToTheBetterSpace(t *testing.T) {
	for _, c := range []struct {
		k   known.Problem
		ref []float64
	}{
		{known.ZDT1(30), []float64{1.1, 1.1}},
		{known.DTLZ2(3, 10), []float64{1.1, 1.1, 1.1}},
	} {
		s := opt.Settings{Evaluations: 6000, Front: 100, Reference: c.ref, Seed: 1}
		o := mustSearch(t, pair(c.k, 0.5), s)
		worse, better := &o.Spaces[0], &o.Spaces[1]
		if worse.Evaluations+better.Evaluations != 6000 {
			t.Errorf("%s: %d and %d evaluations of 6000", c.k.Name, worse.Evaluations, better.Evaluations)
		}
		if least := int((0.25*0.5 + 0.75*0.05) * 6000); worse.Evaluations < least-100 || worse.Evaluations > 6000/4 {
			t.Errorf("%s: the worse space got %d evaluations, want about %d", c.k.Name, worse.Evaluations, least)
		}
		if worse.Front != 0 || better.Front != len(o.Front) {
			t.Errorf("%s: %d and %d on a front of %d", c.k.Name, worse.Front, better.Front, len(o.Front))
		}
		s.Evaluations = better.Evaluations
		alone := mustSearch(t, problemOf(c.k), s)
		if o.Hypervolume < 0.99*alone.Hypervolume {
			t.Errorf("%s: hypervolume %.4f, alone with %d evaluations %.4f", c.k.Name, o.Hypervolume, s.Evaluations, alone.Hypervolume)
		}
	}
}

// Two spaces that are the same share about evenly.
func TestEqualSpacesShareEvenly(t *testing.T) {
	for _, k := range []known.Problem{known.DTLZ2(3, 10), known.DTLZ7(3, 20)} {
		for seed := range uint64(3) {
			o := mustSearch(t, pair(k, 0), opt.Settings{Evaluations: 4000, Seed: seed})
			if n := o.Spaces[0].Evaluations; n < 1600 || n > 2400 {
				t.Errorf("%s, seed %d: %d of 4000 evaluations", k.Name, seed, n)
			}
		}
	}
}

// late is a pair of which the better space has no feasible design until long
// after the other one has a front: the sum of all variables but the first may
// be no more than most.
func late(n int, most float64) opt.Problem {
	p := pair(known.ZDT1(n), 0.5)
	p.Limits = 1
	inner := p.Evaluate
	p.Evaluate = func(w, space int, x []float64, r *opt.Result) {
		if inner(w, space, x, r); space == 1 {
			sum := 0.0
			for _, v := range x[1:] {
				sum += v
			}
			r.Excess[0] = sum - most
			r.Violation = max(0, r.Excess[0])
		}
	}
	return p
}

// A space that comes nearer to its first feasible design is not given up,
// although the other one has the front for a long time.
func TestLateSpaceIsWaitedFor(t *testing.T) {
	for _, n := range []int{12, 20} {
		p := late(n, 0.4)
		inner := p.Evaluate
		count, first := 0, 0
		p.Evaluate = func(w, space int, x []float64, r *opt.Result) {
			count++
			if inner(w, space, x, r); space == 1 && r.Violation == 0 && first == 0 {
				first = count
			}
		}
		o := mustSearch(t, p, opt.Settings{Evaluations: 6000, Seed: 1, Workers: 1})
		t.Logf("%d variables: first feasible design after %d evaluations; %d and %d in all", n, first, o.Spaces[0].Evaluations, o.Spaces[1].Evaluations)
		if first < 1000 || o.Spaces[1].Front == 0 {
			t.Errorf("%d variables: feasible after %d evaluations, %d of %d on the front", n, first, o.Spaces[1].Front, len(o.Front))
		}
	}
}

// A space that comes no nearer to a feasible design is left to the least share.
func TestHopelessSpaceIsLeft(t *testing.T) {
	o := mustSearch(t, late(12, -1), opt.Settings{Evaluations: 6000, Seed: 1})
	if n := o.Spaces[1].Evaluations; n > 2200 || o.Spaces[1].Feasible != 0 || o.Spaces[0].Front != len(o.Front) {
		t.Errorf("%d of 6000 evaluations for a space without feasible designs", n)
	}
}

// A space without another design to try leaves its share to the others.
func TestExhaustedSpaceHandsItsShareOn(t *testing.T) {
	p := problemOf(known.ZDT1(5))
	k := known.ZDT1(5)
	p.Spaces = append(p.Spaces, opt.Space{Vars: []opt.Var{{Kind: opt.Choice, Levels: 3}}})
	p.Evaluate = func(_, space int, x []float64, r *opt.Result) {
		if space == 1 {
			r.Goals[0], r.Goals[1] = 0.1*x[0], 0.1
			return
		}
		k.Evaluate(x, r.Goals)
	}
	o := mustSearch(t, p, opt.Settings{Evaluations: 1000, Seed: 1})
	if o.Status != opt.BudgetSpent || o.Spaces[0].Evaluations != 997 || o.Spaces[1].Evaluations != 3 {
		t.Errorf("%v, %d and %d evaluations", o.Status, o.Spaces[0].Evaluations, o.Spaces[1].Evaluations)
	}
}

// What is told of a space is what its evaluations were.
func TestSpacesTellWhatHappened(t *testing.T) {
	p := mixed()
	inner := p.Evaluate
	var count, feasible [2]int
	best := [2][]float64{slices.Repeat([]float64{math.Inf(1)}, 3), slices.Repeat([]float64{math.Inf(1)}, 3)}
	least := [2]float64{math.Inf(1), math.Inf(1)}
	p.Evaluate = func(w, space int, x []float64, r *opt.Result) {
		count[space]++
		inner(w, space, x, r)
		if r.Violation > 0 {
			least[space] = min(least[space], r.Violation)
		} else if !math.IsInf(r.Goals[0], 0) {
			feasible[space]++
			for k, v := range r.Goals {
				best[space][k] = min(best[space][k], v)
			}
		}
	}
	o := mustSearch(t, p, opt.Settings{Evaluations: 1500, Seed: 3, Workers: 1, Front: 20})
	front := 0
	for i, s := range o.Spaces {
		if s.Evaluations != count[i] || s.Feasible != feasible[i] {
			t.Errorf("space %d: %d evaluations, %d feasible; counted %d and %d", i, s.Evaluations, s.Feasible, count[i], feasible[i])
		}
		for k, d := range s.Best {
			if d.Goals[k] != best[i][k] || d.Space != i || d.Violation != 0 {
				t.Errorf("space %d, goal %d: best %v, counted %v", i, k, d.Goals[k], best[i][k])
			}
		}
		if len(s.Near) != 10 || s.Near[0].Violation != least[i] || s.Near[0].Space != i {
			t.Errorf("space %d: nearest %v, counted %v", i, s.Near[0].Violation, least[i])
		}
		front += s.Front
	}
	if front != len(o.Front) {
		t.Errorf("%d on the front, spaces say %d", len(o.Front), front)
	}
	if o.Evaluations != o.Spaces[0].Evaluations+o.Spaces[1].Evaluations {
		t.Errorf("%d evaluations, spaces say %d and %d", o.Evaluations, o.Spaces[0].Evaluations, o.Spaces[1].Evaluations)
	}
}

// Searches of one space are what they were before spaces shared the budget by
// merit, but for the children that models make in spaces of few real variables,
// which came later: hashes of runs of the program as it was.
func TestOneSpaceIsUnchanged(t *testing.T) {
	if runtime.GOARCH != "amd64" {
		t.Skip("last bits differ where products are fused")
	}
	first := mixed()
	first.Spaces = first.Spaces[:1]
	for _, c := range []struct {
		name  string
		p     opt.Problem
		front int
		want  string
	}{
		{"ZDT1", problemOf(known.ZDT1(30)), 40, "e46fddd8f98555271cb9a86d4937a1c6"},
		{"DTLZ2", problemOf(known.DTLZ2(3, 10)), 40, "1f8f7b02d1d96e1be9a682161037625d"},
		{"mixed", first, 0, "b48d1bb6c1bd030496254d3700d27d78"},
		{"one goal", single(), 0, "2a52a99fa9b302a35ce95cf15f1d526b"},
	} {
		o := mustSearch(t, c.p, opt.Settings{Evaluations: 1500, Front: c.front, Seed: 3})
		got := fmt.Sprintf("%.16x", sha256.Sum256(fmt.Appendf(nil, "%v %v %v %v %v %v %v",
			o.Front, o.History, o.Near, o.Single, o.Evaluations, o.Grown, o.Reference)))
		if got != c.want {
			t.Errorf("%s: %s, was %s", c.name, got, c.want)
		}
	}
}
