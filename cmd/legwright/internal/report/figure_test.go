package report

import (
	"math"
	"slices"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

func TestColumnDecimals(t *testing.T) {
	mm := scale{kind: units.Length}
	for _, c := range []struct {
		why    string
		values []float64
		want   []string
	}{
		{"four digits of the largest", []float64{1.5304, 0.0982}, []string{"1530", "98"}},
		{"more where they hardly differ", []float64{1.53041, 1.53043}, []string{"1530.41", "1530.43"}},
		{"rounding is no difference", []float64{1.0611, 1.0611 + 1e-15}, []string{"1061", "1061"}},
		{"no minus before zero", []float64{-1e-9, 0.5}, []string{"0.0", "500.0"}},
		{"all zero", []float64{0, 0}, []string{"0", "0"}},
		{"unbounded and absent", []float64{math.Inf(1), math.NaN(), 0.25}, []string{"inf", "", "250.0"}},
	} {
		if got := mm.apart(c.values); !slices.Equal(got, c.want) {
			t.Errorf("%s: got %q, want %q", c.why, got, c.want)
		}
	}
}

func TestMargin(t *testing.T) {
	inf := study.Number(math.Inf(1))
	for _, c := range []struct {
		why  string
		l    study.Limit
		want string
	}{
		{"share of the bound", study.Limit{Measure: "base_swing", Unit: "rad", Bound: 1, Value: 0.75, Margin: 0.25, Holds: true}, "+25 %"},
		{"fails", study.Limit{Measure: "base_swing", Unit: "rad", Bound: 1, Value: 1.5, Margin: -0.5}, "-50 %"},
		{"hardly any room", study.Limit{Measure: "dead length", Unit: "m", Bound: 1, Value: 1, Margin: 2e-9, Holds: true}, "0 %"},
		{"fails by little", study.Limit{Measure: "dead length", Unit: "m", Bound: 1, Value: 1, Margin: -2.1e-7}, "-0.00002 %"},
		{"bound 0, at least", study.Limit{Measure: "leg_clearance", Unit: "m", Sense: study.AtLeast, Value: 0.0042, Margin: 0.1, Holds: true}, "+4.20 mm"},
		{"bound 0, at most", study.Limit{Measure: "parasitic_motion", Unit: "m", Sense: study.AtMost, Value: 0.0042, Margin: -0.1}, "-4.20 mm"},
		{"bound 0, touching", study.Limit{Measure: "leg_clearance", Unit: "m", Sense: study.AtLeast, Holds: true}, "0 mm"},
		{"no bound, fails", study.Limit{Measure: "push_force", Unit: "N", Bound: 5, Value: inf, Margin: -inf, Unbounded: true}, "none"},
		{"no bound, holds", study.Limit{Measure: "leg_clearance", Unit: "m", Value: inf, Margin: inf, Unbounded: true, Holds: true}, "unbounded"},
	} {
		if got := margin(&c.l); got != c.want {
			t.Errorf("%s: got %q, want %q", c.why, got, c.want)
		}
	}
}

func TestStepsNeedAKneeAndTwoGoals(t *testing.T) {
	f := lensTable()
	f.Goals = f.Goals[:1]
	study.Rank(f, nil)
	s := Page{}.sheet()
	s.steps(f)
	if s.b.Len() != 0 {
		t.Errorf("one goal leaves nothing to trade, yet: %s", s.b.String())
	}
}

// Every sentence about a step must be true of the two designs that it names.
func TestStepsTellTheTruth(t *testing.T) {
	f := lensTable()
	from := f.Marked(study.MarkKnee)
	all := stepsFrom(f, from)
	if len(all) != len(f.Designs)-1 {
		t.Fatalf("%d steps to %d others", len(all), len(f.Designs)-1)
	}
	for a := range f.Goals {
		for b := range f.Goals {
			st := nearest(all, a, b)
			if st == nil || a == b {
				continue
			}
			for j, g := range f.Goals {
				u, v := f.Designs[from].Measures[g.Measure], f.Designs[st.to].Measures[g.Measure]
				better := v > u == (g.Sense == study.Maximise) && u != v
				switch {
				case j == a && !better:
					t.Errorf("%s does not gain: %v to %v", g.Measure, u, v)
				case j == b && better:
					t.Errorf("%s does not cost: %v to %v", g.Measure, u, v)
				}
			}
		}
	}
}
