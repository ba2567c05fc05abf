package study

import (
	"encoding/json"
	"errors"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"legwright/opt"
)

// outcome is one with all that a part.json may hold.
func outcome() *opt.Outcome {
	good := opt.Design{X: []float64{0.1, 2}, Goals: []float64{1.0 / 3, -2}, Origin: "sbx", Order: 7}
	bad := opt.Design{X: []float64{0.3, 1}, Goals: []float64{math.NaN(), math.NaN()}, Excess: []float64{0.25, -1}, Violation: 0.25, Origin: "reset"}
	failed := opt.Design{X: []float64{0.3, 0}, Violation: math.Inf(1), Fault: "panic: too wide", Origin: "de2"}
	return &opt.Outcome{
		Status: opt.Stalled, Evaluations: 40, Feasible: 30, Population: 8, Polished: 3, Reference: []float64{4, 5},
		Archive: 1, Kept: []opt.Design{good}, Near: []opt.Design{bad}, Single: [][]opt.Design{{bad}, {}},
		Spaces: []opt.SpaceOutcome{{Evaluations: 40, Feasible: 30, Best: []opt.Design{good, good}, Near: []opt.Design{bad}}},
		Failed: []opt.Design{failed}, Failures: 1,
	}
}

func part() *Part {
	return &Part{Format: PartFormat, Program: "legwright 0", Brief: "abc", Seed: 1, Whole: 160, PartName: PartName{3, 4, "ff"},
		StoppedBy: "stall", Budget: 40, Outcome: NewPartOutcome(outcome()), Dimensions: []int{2}}
}

// A part reads back to the outcome it was made of, but for what an infeasible design has no use of.
func TestPartReadsBack(t *testing.T) {
	b, err := json.Marshal(part())
	if err != nil {
		t.Fatal(err)
	}
	p, err := DecodePart(b)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(p, part()) {
		t.Errorf("got %+v", p)
	}
	want, got := outcome(), p.Outcome.Outcome()
	for _, o := range []*opt.Outcome{want, got} {
		for _, l := range [][]opt.Design{o.Near, o.Single[0], o.Spaces[0].Near, o.Failed} {
			for i := range l {
				l[i].Goals = nil
				if l[i].Fault != "" {
					l[i].Violation = 0
				}
			}
		}
	}
	if !reflect.DeepEqual(got, want) {
		t.Errorf("got  %+v\nwant %+v", got, want)
	}
}

// Damage is refused with the place.
func TestDamagedPart(t *testing.T) {
	for _, c := range []struct {
		want   string
		damage func(*Part)
	}{
		{"format", func(p *Part) { p.Format = "x" }},
		{"part 5 of 4", func(p *Part) { p.Number = 5 }},
		{"part 0 of 4", func(p *Part) { p.Number = 0 }},
		{"part 3 of 900000000", func(p *Part) { p.Of = 900000000 }},
		{"outcome", func(p *Part) { p.Outcome = nil }},
		{"feasible", func(p *Part) { p.Outcome.Feasible = 90 }},
		{"a count", func(p *Part) { p.Outcome.Evaluations = math.MaxInt }},
		{"a count", func(p *Part) { p.Outcome.Evaluations, p.Outcome.Feasible, p.Outcome.Failures = 9, math.MaxInt, 2 }},
		{"a count", func(p *Part) { p.Outcome.Polished = -1 }},
		{"whole or budget", func(p *Part) { p.Whole = -1 }},
		{"outcome.spaces[0]: a count", func(p *Part) { p.Outcome.Spaces[0].Feasible = math.MaxInt }},
		{"status", func(p *Part) { p.Outcome.Status = 99 }},
		{"spaces", func(p *Part) { p.Dimensions = nil }},
		{"reference", func(p *Part) { p.Outcome.Reference = nil }},
		{"kept[0].space", func(p *Part) { p.Outcome.Kept[0].Space = 1 }},
		{"kept[0].x", func(p *Part) { p.Outcome.Kept[0].X = nil }},
		{"kept[0].goals", func(p *Part) { p.Outcome.Kept[0].Goals = []float64{1} }},
		{"near[0].excess", func(p *Part) { p.Outcome.Near[0].Violation = 0 }},
		{"single[0][0].excess", func(p *Part) { p.Outcome.Single[0][0].Excess = nil }},
		{"spaces[0].best", func(p *Part) { p.Outcome.Spaces[0].Best = p.Outcome.Spaces[0].Best[:1] }},
		{"failed[0].x", func(p *Part) { p.Outcome.Failed[0].X = nil }},
	} {
		p := part()
		c.damage(p)
		b, err := json.Marshal(p)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := DecodePart(b); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v", c.want, err)
		}
	}
}

func TestReadPart(t *testing.T) {
	root := t.TempDir()
	save := func(name string, p *Part, unfinished bool) string {
		dir := filepath.Join(root, name)
		f, err := Create(dir, Intent{})
		if err != nil {
			t.Fatal(err)
		}
		defer f.Close()
		if err := f.SaveCheckpoint([]byte(checkpoint)); err != nil {
			t.Fatal(err)
		}
		r := result()
		r.Part, r.Unfinished = p, unfinished
		if err := f.Save(r); err != nil {
			t.Fatal(err)
		}
		return dir
	}
	done := save("done", part(), false)
	if p, err := ReadPart(done); err != nil || p.Number != 3 {
		t.Errorf("%+v, %v", p, err)
	}
	for _, dir := range []string{save("half", part(), true), filepath.Join(root, "nowhere")} {
		if _, err := ReadPart(dir); !errors.Is(err, ErrNoPart) || !strings.Contains(err.Error(), dir) {
			t.Errorf("%s: %v, want ErrNoPart", dir, err)
		}
	}
	other := filepath.Join(root, "other")
	os.MkdirAll(filepath.Join(other, "letters"), 0o777)
	for _, dir := range []string{save("whole", nil, false), other} {
		if _, err := ReadPart(dir); err == nil || errors.Is(err, ErrNoPart) || !strings.Contains(err.Error(), "--part") {
			t.Errorf("%s: %v, want a refusal", dir, err)
		}
	}
	// A whole study in the place of a part leaves no part.
	f, err := Create(done, Intent{Force: true})
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	if err := f.Save(result()); err != nil {
		t.Fatal(err)
	}
	if _, err := os.Stat(filepath.Join(done, partFile)); err == nil {
		t.Error("part.json is still there")
	}
}
