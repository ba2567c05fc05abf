package study

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
)

// front makes a front of designs with the goal values, first goal to be minimised unless more says.
func front(goals []Goal, rows ...[]float64) *Front {
	f := &Front{Goals: goals}
	for _, r := range rows {
		m := map[string]Number{}
		for j, g := range goals {
			m[g.Measure] = Number(r[j])
		}
		f.Designs = append(f.Designs, Design{Family: "6-UPS", Measures: m})
	}
	return f
}

var twoLess = []Goal{{Measure: "a", Sense: Minimise}, {Measure: "b", Sense: Minimise}}

func ids(f *Front) string {
	var out []string
	for i := range f.Designs {
		out = append(out, f.Designs[i].ID)
	}
	return strings.Join(out, " ")
}

// Hwang and Yoon 1981, fighter aircraft selection, as printed in many textbooks (from memory): six
// attributes, closeness 0.643, 0.268, 0.613, 0.312.
func TestRankFighterExample(t *testing.T) {
	goals := []Goal{{"speed", Maximise, ""}, {"range", Maximise, ""}, {"payload", Maximise, ""}, {"cost", Minimise, ""},
		{"reliability", Maximise, ""}, {"manoeuvre", Maximise, ""}}
	f := front(goals,
		[]float64{2.0, 1500, 20000, 5.5, 5, 9},
		[]float64{2.5, 2700, 18000, 6.5, 3, 5},
		[]float64{1.8, 2000, 21000, 4.5, 7, 7},
		[]float64{2.2, 1800, 20000, 5.0, 5, 5})
	Rank(f, map[string]float64{"speed": 0.2, "range": 0.1, "payload": 0.1, "cost": 0.1, "reliability": 0.2, "manoeuvre": 0.3})
	want := []float64{0.643, 0.613, 0.312, 0.268}
	for i, w := range want {
		if got := float64(f.Designs[i].Score); math.Abs(got-w) > 0.001 {
			t.Errorf("rank %d: score %.4f, want %.3f", i+1, got, w)
		}
	}
	if f.Designs[0].Measures["range"] != 1500 || f.Designs[1].Measures["range"] != 2000 {
		t.Error("order differs from the published one: 1, 3, 4, 2")
	}
}

func TestRankAgainKeepsIDs(t *testing.T) {
	f := front(twoLess, []float64{1, 9}, []float64{2, 4}, []float64{5, 1.5}, []float64{9, 1})
	Rank(f, nil)
	if ids(f) != "001 002 003 004" {
		t.Errorf("ids %s", ids(f))
	}
	before := map[string]float64{}
	for _, d := range f.Designs {
		before[d.ID] = float64(d.Measures["a"])
	}
	Rank(f, map[string]float64{"b": 10})
	if f.Designs[0].Measures["a"] != 9 && f.Designs[0].Measures["a"] != 5 {
		t.Errorf("with all weight on b the best has a = %v", f.Designs[0].Measures["a"])
	}
	if ids(f) == "001 002 003 004" {
		t.Error("other weights changed nothing")
	}
	for i, d := range f.Designs {
		if before[d.ID] != float64(d.Measures["a"]) {
			t.Errorf("%s is another design now", d.ID)
		}
		if d.Rank != i+1 {
			t.Errorf("%s has rank %d in place %d", d.ID, d.Rank, i+1)
		}
	}
	if f.Weights["a"] != 1 || f.Weights["b"] != 10 {
		t.Errorf("weights %v", f.Weights)
	}
}

// The order of the designs must not depend on the order in which they came.
func TestRankIgnoresTheOrderGiven(t *testing.T) {
	rows := [][]float64{{1, 9}, {2, 4}, {2, 4}, {5, 1.5}, {9, 1}, {3, 3}}
	want := ""
	for shift := range rows {
		f := front(twoLess, append(slices.Clone(rows[shift:]), rows[:shift]...)...)
		Rank(f, nil)
		got := ""
		for _, d := range f.Designs {
			got += fmt.Sprint(d.Measures["a"], d.Measures["b"], d.Marks, d.Score, "; ")
		}
		if want == "" {
			want = got
		}
		if got != want {
			t.Errorf("shifted by %d: %s, want %s", shift, got, want)
		}
	}
}

func TestRankOddFronts(t *testing.T) {
	Rank(front(twoLess), nil)
	one := front(twoLess, []float64{0, 0})
	Rank(one, nil)
	if d := one.Designs[0]; d.Score != 1 || !slices.Equal(d.Marks, []string{MarkRank}) {
		t.Errorf("a single design: %v %v", d.Score, d.Marks)
	}
	inf := front(twoLess, []float64{1, 2}, []float64{math.Inf(1), 1}, []float64{3, 1.5})
	Rank(inf, nil)
	for _, d := range inf.Designs {
		if unbounded(float64(d.Score)) {
			t.Errorf("score %v", d.Score)
		}
	}
}

func TestMarks(t *testing.T) {
	f := front(twoLess, []float64{1, 9}, []float64{2, 3}, []float64{9, 1}, []float64{8, 1.5})
	for i := range f.Designs {
		f.Designs[i].Limits = []Limit{
			{Measure: "coverage", Sense: AtLeast, Bound: 1, Value: 1, Holds: true},
			{Measure: "leg_clearance", Holds: true, Margin: Number(i)},
		}
	}
	Rank(f, nil)
	got := map[float64]string{}
	for _, d := range f.Designs {
		got[float64(d.Measures["a"])] = strings.Join(d.Marks, ", ")
	}
	want := map[float64]string{1: "best a", 2: "best rank, knee", 9: "best b", 8: "most margin"}
	for a, w := range want {
		if got[a] != w {
			t.Errorf("design %v: %q, want %q", a, got[a], w)
		}
	}
}

func TestTightestPassesOverFullCoverage(t *testing.T) {
	d := Design{Limits: []Limit{
		{Measure: "coverage", Sense: AtLeast, Bound: 1, Value: 1, Holds: true},
		{Measure: "leg_clearance", Margin: 0.2, Holds: true},
		{Measure: "base_swing", Margin: 0.1, Holds: true},
	}}
	if l := d.Tightest(); l == nil || l.Measure != "base_swing" {
		t.Errorf("tightest %+v", l)
	}
	d.Limits[0].Holds, d.Limits[0].Margin = false, -0.01
	if l := d.Tightest(); l.Measure != "coverage" {
		t.Errorf("a coverage that fails is passed over: %+v", l)
	}
	if new(Design).Tightest() != nil {
		t.Error("no limits, yet a tightest one")
	}
}

func TestCheckWeights(t *testing.T) {
	f := front(twoLess)
	for _, c := range []struct {
		w    map[string]float64
		want string
	}{
		{nil, ""}, {map[string]float64{"a": 2}, ""}, {map[string]float64{"a": 0}, ""},
		{map[string]float64{"c": 2}, "weigh a, b"},
		{map[string]float64{"a": -1}, "not negative"},
		{map[string]float64{"a": math.NaN()}, "not negative"},
		{map[string]float64{"a": math.Inf(1)}, "not negative"},
		{map[string]float64{"a": 0, "b": 0}, "every weight is 0"},
	} {
		err := CheckWeights(f, c.w)
		if (err == nil) != (c.want == "") || err != nil && !strings.Contains(err.Error(), c.want) {
			t.Errorf("%v: %v, want %q", c.w, err, c.want)
		}
	}
}

func TestChoose(t *testing.T) {
	var rows [][]float64
	for i := range 50 {
		x := float64(i) / 49
		rows = append(rows, []float64{x, (1 - x) * (1 - x)})
	}
	f := front(twoLess, rows...)
	Rank(f, nil)
	chosen := Choose(f, 7)
	if len(chosen) != 7 {
		t.Fatalf("%d chosen", len(chosen))
	}
	seen := map[string]bool{}
	for i, c := range chosen {
		if i > 0 && c.Index <= chosen[i-1].Index {
			t.Error("not in the order of rank")
		}
		for _, m := range append(slices.Clone(f.Designs[c.Index].Marks), c.Near...) {
			seen[m] = true
		}
		for _, d := range chosen[:i] {
			a, b := f.Designs[c.Index].Measures, f.Designs[d.Index].Measures
			if math.Abs(float64(a["a"]-b["a"])) < twin && math.Abs(float64(a["b"]-b["b"])) < twin {
				t.Errorf("%d and %d are near-twins", c.Index, d.Index)
			}
		}
	}
	for _, m := range []string{MarkKnee, MarkRank, "best a", "best b"} {
		if !seen[m] {
			t.Errorf("%s is not shown", m)
		}
	}
}

// Two designs that hardly differ are shown once, and the mark of the other one is not lost.
func TestChooseTellsOfTwins(t *testing.T) {
	f := front(twoLess, []float64{0, 1}, []float64{0.5, 0.5}, []float64{0.501, 0.495}, []float64{1, 0})
	f.Goals = append(f.Goals, Goal{Measure: "c", Sense: Maximise})
	for i, c := range []float64{0, 0.99, 1, 0.5} {
		f.Designs[i].Measures["c"] = Number(c)
	}
	Rank(f, nil)
	chosen := Choose(f, 7)
	if len(chosen) != 3 {
		t.Errorf("%d chosen of 4 with a twin", len(chosen))
	}
	marks := ""
	for _, c := range chosen {
		marks += fmt.Sprint(f.Designs[c.Index].Marks, c.Near)
	}
	for _, m := range []string{MarkRank, MarkKnee, "best a", "best b", "best c"} {
		if !strings.Contains(marks, m) {
			t.Errorf("%s is lost: %s", m, marks)
		}
	}
}
