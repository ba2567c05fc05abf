package opt_test

import (
	"context"
	"slices"
	"testing"

	"legwright/opt"
	"legwright/opt/known"
)

// A search that begins with the front of another one is at least as good from its first sample on, within the start's share of
// its budget, and says what is wrong with a start of another problem.
func TestStartFromAnEarlierFront(t *testing.T) {
	p := problemOf(known.ZDT1(12))
	first, err := opt.Search(context.Background(), p, opt.Settings{Evaluations: 4000, Seed: 1, Front: 60, Reference: []float64{1.1, 1.1}})
	if err != nil {
		t.Fatal(err)
	}
	var start []opt.Start
	for _, d := range first.Front {
		start = append(start, opt.Start{Space: d.Space, X: d.X})
	}
	set := opt.Settings{Evaluations: 200, Seed: 2, Front: 60, Reference: []float64{1.1, 1.1}, Start: start}
	next, err := opt.Search(context.Background(), p, set)
	if err != nil {
		t.Fatal(err)
	}
	if next.Hypervolume < first.Hypervolume {
		t.Errorf("hypervolume %v after a start from %v", next.Hypervolume, first.Hypervolume)
	}
	set.Workers = 3
	again, _ := opt.Search(context.Background(), p, set)
	same := slices.EqualFunc(again.Front, next.Front, func(a, b opt.Design) bool { return slices.Equal(a.X, b.X) })
	if !same {
		t.Error("another number of workers leads to another front")
	}
	set.Start = []opt.Start{{Space: 1, X: start[0].X}}
	if _, err := opt.Search(context.Background(), p, set); err == nil {
		t.Error("a start of a space that the problem lacks is taken")
	}
}
