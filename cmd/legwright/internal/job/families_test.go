package job

import (
	"context"
	"math"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

const mixedBrief = briefs + "three-drives.yaml"

// What a brief says of one sort of actuator is not asked of another.
func TestActuatorsOfEachFamily(t *testing.T) {
	s := load(t, mixedBrief)
	for i, p := range s.Plans {
		a := &s.Tasks[i].Actuator
		if given := !math.IsNaN(a.DeadLength); given != (p.Family.Name == "6-UPS") {
			t.Errorf("%s: dead length %v", p.Family.Name, a.DeadLength)
		}
		want := 0.008
		if p.Family.Name == "6-RUS" {
			want = 2 * math.Pi / 180
		}
		if math.Abs(a.Reserve-want) > 1e-15 {
			t.Errorf("%s: reserve %v, want %v", p.Family.Name, a.Reserve, want)
		}
	}
	s.Brief.Actuator.Strokes = []float64{0.2, 0.3}
	for i, p := range s.Plans {
		n := len(task(s.Brief, p.Family).Actuator.Strokes)
		if (n == 0) != (p.Family.Name == "6-RUS") {
			t.Errorf("%s, plan %d: %d stock strokes", p.Family.Name, i, n)
		}
	}
}

// What is told of the families adds up, and no design of the front is better than the best that is told.
func TestFamiliesAreToldOf(t *testing.T) {
	s := load(t, mixedBrief)
	run := Settings(s.Brief)
	run.Evaluations = 900
	found, err := s.Search(context.Background(), run)
	if err != nil {
		t.Fatal(err)
	}
	f := found.Front
	if len(f.Families) != 3 || found.Status != opt.BudgetSpent {
		t.Fatalf("%v, families %+v", found.Status, f.Families)
	}
	evaluations, feasible, front := 0, 0, 0
	for i, l := range f.Families {
		if l.Name != s.Brief.Families[i].Name || l.Why == "" {
			t.Errorf("line %d: %+v", i, l)
		}
		evaluations, feasible, front = evaluations+l.Evaluations, feasible+l.Feasible, front+l.OnFront
		for _, d := range f.Designs {
			if d.Family != l.Name {
				continue
			}
			for _, g := range f.Goals {
				if v, best := d.Measures[g.Measure], l.Best[g.Measure]; v != best && (v > best) == (g.Sense == study.Maximise) {
					t.Errorf("%s: %s is %v on the front, best %v", l.Name, g.Measure, v, best)
				}
			}
		}
	}
	if evaluations != 900 || feasible != f.Feasible || front != len(f.Designs) {
		t.Errorf("%d evaluations, %d feasible, %d on the front of %d", evaluations, feasible, front, len(f.Designs))
	}
}

// A family that cannot hold a limit is told of with that limit.
func TestFamilyWithoutFeasibleDesign(t *testing.T) {
	s := load(t, mixedBrief)
	const little = 0.01 // rad of crank, far too little
	rus := &s.Brief.Families[1]
	for i := range rus.Dimensions {
		if d := &rus.Dimensions[i]; d.Name == "angle_range" {
			d.Form, d.Value = brief.Fixed, little
		}
	}
	s, err := New(s.Brief)
	if err != nil {
		t.Fatal(err)
	}
	run := Settings(s.Brief)
	run.Evaluations = 300
	found, err := s.Search(context.Background(), run)
	if err != nil {
		t.Fatal(err)
	}
	l := found.Front.Families[1]
	if l.Name != "6-RUS" || l.Feasible != 0 || l.OnFront != 0 || len(l.Best) != 0 || !strings.Contains(l.Why, "the nearest has ") {
		t.Errorf("%+v", l)
	}
}
