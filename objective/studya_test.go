package objective

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"legwright/kin"
)

const deg = math.Pi / 180

// measured finds the entry of a measure.
func measured(t testing.TB, name string) *Measure {
	for _, m := range Measures() {
		if m.Name == name {
			return m
		}
	}
	t.Fatalf("no measure %q", name)
	return nil
}

// studyA is the duty of testdata/study-a/box.yaml.
func studyA(t testing.TB) *Task {
	half := kin.Coords{0.15, 0.15, 0.10, 12 * deg, 12 * deg, 15 * deg}
	z := Zone{Name: "work", Kind: Box, High: half, Samples: 500}
	for k, h := range half {
		z.Low[k] = -h
	}
	task := &Task{
		Zones: []Zone{z},
		Cases: []Case{{Name: "running",
			Loads: []Load{{Name: "cell", Mass: 300, Centre: kin.Vec{Z: 0.25}, Inertia: [6]float64{40, 40, 60},
				Linear: Set{Kind: PerAxis, Half: kin.Vec{X: 4, Y: 4, Z: 4}}, Angular: Set{Kind: PerAxis, Half: kin.Vec{X: 3, Y: 3, Z: 3}}}},
			Linear: Set{Kind: PerAxis, Half: kin.Vec{X: 0.4, Y: 0.4, Z: 0.4}}, Angular: Set{Kind: PerAxis, Half: kin.Vec{X: 0.5, Y: 0.5, Z: 0.5}},
		}},
		Gravity:  kin.Vec{Z: -Gravity},
		Actuator: Actuator{DeadLength: 0.18, DeadRatio: 1},
		Legs:     Legs{Diameter: 0.06, EndFixity: 1},
		Rule:     LengthOfPlatform,
		Singular: 1e-6,
		Coverage: 1,
	}
	task.Goals = []Goal{{Measure: measured(t, "conditioning"), Maximise: true}, {Measure: measured(t, "leg_force")}, {Measure: measured(t, "footprint")}}
	task.Limits = []Limit{
		{Measure: measured(t, "base_swing"), Bound: 45 * deg, Origin: "joints.base_swing"},
		{Measure: measured(t, "platform_swing"), Bound: 45 * deg, Origin: "joints.platform_swing"},
		{Measure: measured(t, "leg_clearance"), AtLeast: true, Origin: "limits"},
	}
	task.Prepare()
	return task
}

// fixedA is the design whose poses the table holds.
var fixedA = []float64{0.65, 0.40, 18 * deg, 12 * deg, 0.85, 0.62, 0.40}

func fixedPlan(t *Task, values []float64) *Plan {
	specs := make([]Spec, len(values))
	for i, v := range values {
		specs[i] = Spec{Kind: Fixed, Values: []float64{v}}
	}
	return NewPlan(t, kin.FamilyNamed("6-UPS"), specs)
}

func readTable(t testing.TB, file string) (head map[string]int, rows [][]float64) {
	f, err := os.Open(file)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	all, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	head = map[string]int{}
	for i, h := range all[0] {
		head[h] = i
	}
	for _, r := range all[1:] {
		row := make([]float64, len(r))
		for i, s := range r {
			if row[i], err = strconv.ParseFloat(s, 64); err != nil {
				t.Fatal(err)
			}
		}
		rows = append(rows, row)
	}
	return head, rows
}

// Every pose of study A's fixed design against a C++ program that uses Eigen's SVD and LU
// (testdata/study-a/SOURCES.md): lengths, efforts, rates, swings, clearance, conditioning.
func TestPosesOfStudyA(t *testing.T) {
	task := studyA(t)
	a := Appraise(task, fixedPlan(task, fixedA), fixedA)
	rows := Poses(task, a)
	head, want := readTable(t, "../testdata/study-a/check_poses.csv")
	if len(rows) != len(want) {
		t.Fatalf("%d poses, want %d", len(rows), len(want))
	}
	for k, r := range rows {
		check := func(col string, got float64) {
			t.Helper()
			w := want[k][head[col]]
			if math.Abs(got-w) > 1e-9*math.Max(math.Abs(w), 1e-3) {
				t.Fatalf("pose %d: %s = %.15g, want %.15g", k, col, got, w)
			}
		}
		for i := range 6 {
			n := strconv.Itoa(i + 1)
			check("L"+n+"_m", r.Q[i])
			check("force"+n+"_N", r.Effort[i])
			check("speed"+n+"_mps", r.Rate[i])
			check("swing_base"+n+"_rad", r.BaseSwing[i])
			check("swing_plat"+n+"_rad", r.PlatformSwing[i])
		}
		check("inv_kappa", r.Conditioning)
		check("clearance_m", r.Clearance+0.06)
		ok := 0.0
		if r.Fails == "" {
			ok = 1
		}
		check("ok", ok)
	}
	if c := a.Reading("coverage").Value; c != 234.0/500 {
		t.Errorf("coverage %v, want 234/500", c)
	}
}

// The samples of the box are the yardstick's, scouts are its corners and centre.
func TestBoxSamplesOfStudyA(t *testing.T) {
	task := studyA(t)
	_, want := readTable(t, "../testdata/study-a/poses.csv")
	got := make([]kin.Coords, len(want))
	for _, s := range task.Samples() {
		got[s.Row] = s.Coords
	}
	for k, w := range want {
		for q := range got[k] {
			if math.Abs(got[k][q]-w[q]) > 1e-16 {
				t.Fatalf("pose %d: %v, want %v", k, got[k], w)
			}
		}
	}
	for _, s := range task.Samples()[:64] {
		if s.Row > 64 {
			t.Errorf("scout %d is no corner", s.Row)
		}
	}
}

func BenchmarkScreen(b *testing.B) {
	task := studyA(b)
	p := fixedPlan(task, []float64{0.4, 0.41975, 55.683 * deg, 55.7099 * deg, 1.00511, 0, 0})
	p.Specs[5], p.Specs[6] = Spec{Kind: Sized}, Spec{Kind: Sized}
	s := NewScreen(task, p)
	var r Score
	b.ReportAllocs()
	for b.Loop() {
		s.Judge(nil, &r)
	}
	if r.Violation > 0 {
		b.Fatal(r)
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/500, "ns/pose")
}
