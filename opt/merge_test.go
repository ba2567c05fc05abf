package opt_test

import (
	"math"
	"slices"
	"testing"

	"legwright/opt"
	"legwright/opt/known"
)

// Merged parts have a front that covers at least what the best part covers,
// sums that are sums, and no regard for the order of the parts.
func TestMerge(t *testing.T) {
	for name, p := range battery() {
		var parts []*opt.Outcome
		evaluations, feasible, failures := 0, 0, 0
		for seed := range 4 {
			o := mustSearch(t, p, opt.Settings{Evaluations: 600, Seed: uint64(seed), Archive: true, Front: 40})
			parts = append(parts, o)
			evaluations += o.Evaluations
			feasible += o.Feasible
			failures += o.Failures
		}
		m := opt.Merge(parts, 40, nil)
		if m.Evaluations != evaluations || m.Feasible != feasible || m.Failures != failures || len(m.Front) > 40 {
			t.Errorf("%s: %d evaluations, %d feasible, %d failures, %d designs", name, m.Evaluations, m.Feasible, m.Failures, len(m.Front))
		}
		onFront := 0
		for _, s := range m.Spaces {
			evaluations -= s.Evaluations
			onFront += s.Front
		}
		if evaluations != 0 || onFront != len(m.Front) {
			t.Errorf("%s: the spaces do not add up", name)
		}
		for k, v := range m.Reference {
			for _, q := range parts {
				if q.Reference[k] > v {
					t.Errorf("%s: reference %v is nearer than a part's %v", name, m.Reference, q.Reference)
				}
			}
		}
		slack := 1e-3 // what the choice of the front may lose
		if p.Goals > 4 {
			slack = 0.03
		}
		for i, q := range parts {
			var pts [][]float64
			for _, d := range q.Front {
				pts = append(pts, d.Goals)
			}
			if v := opt.Hypervolume(pts, m.Reference); v > m.Hypervolume*(1+slack) {
				t.Errorf("%s: part %d covers %v, all parts %v", name, i, v, m.Hypervolume)
			}
		}
		slices.Reverse(parts)
		if r := opt.Merge(parts, 40, nil); !same(r, m) {
			t.Errorf("%s: the order of the parts shows", name)
		}
	}
}

// One part alone is what it was, and a given reference is kept.
func TestMergeOfOne(t *testing.T) {
	o := mustSearch(t, mixed(), opt.Settings{Evaluations: 3000, Seed: 4, Archive: true})
	m := opt.Merge([]*opt.Outcome{o}, 200, nil)
	if !slices.EqualFunc(m.Front, o.Front, func(a, b opt.Design) bool { return slices.Equal(a.X, b.X) && slices.Equal(a.Goals, b.Goals) }) {
		t.Error("another front than its only part's")
	}
	if m.Hypervolume != o.Hypervolume || m.Status != o.Status {
		t.Errorf("hypervolume %v, status %v", m.Hypervolume, m.Status)
	}
	ref := []float64{9, 9, 9}
	if m := opt.Merge([]*opt.Outcome{o, o}, 200, ref); !slices.Equal(m.Reference, ref) {
		t.Errorf("reference %v", m.Reference)
	}
}

// Four parts of a quarter of the budget find a front whose true hypervolume is
// known nearly as well as one search with all of it: R^3 - pi/6 on DTLZ2.
func TestMergeLosesLittle(t *testing.T) {
	p, ref := problemOf(known.DTLZ2(3, 10)), []float64{1.1, 1.1, 1.1}
	var parts []*opt.Outcome
	for seed := range 4 {
		parts = append(parts, mustSearch(t, p, opt.Settings{Evaluations: 2500, Seed: uint64(seed), Archive: true, Front: 100, Reference: ref}))
	}
	truth := 1.1*1.1*1.1 - math.Pi/6
	if m := opt.Merge(parts, 100, ref); m.Hypervolume < 0.92*truth || m.Hypervolume > truth {
		t.Errorf("%v of %v", m.Hypervolume, truth)
	}
}
