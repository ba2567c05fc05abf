package study

import (
	"bytes"
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

const deg = math.Pi / 180

// studyA is the duty and the fixed design of testdata/study-a/check_poses.csv.
func studyA(t *testing.T) (*objective.Task, *objective.Appraisal) {
	t.Helper()
	measure := func(name string) *objective.Measure {
		for _, m := range objective.Measures() {
			if m.Name == name {
				return m
			}
		}
		t.Fatalf("no measure %s", name)
		return nil
	}
	axes := func(x float64) objective.Set {
		return objective.Set{Kind: objective.PerAxis, Half: kin.Vec{X: x, Y: x, Z: x}}
	}
	half := kin.Coords{0.15, 0.15, 0.10, 12 * deg, 12 * deg, 15 * deg}
	z := objective.Zone{Name: "work", Kind: objective.Box, High: half, Samples: 500}
	for k, h := range half {
		z.Low[k] = -h
	}
	task := &objective.Task{
		Zones: []objective.Zone{z},
		Cases: []objective.Case{{Name: "running",
			Loads: []objective.Load{{Name: "cell", Mass: 300, Centre: kin.Vec{Z: 0.25}, Inertia: [6]float64{40, 40, 60},
				Linear: axes(4), Angular: axes(3)}},
			Linear: axes(0.4), Angular: axes(0.5)}},
		Gravity: kin.Vec{Z: -objective.Gravity}, Actuator: objective.Actuator{DeadLength: 0.18, DeadRatio: 1},
		Legs: objective.Legs{Diameter: 0.06, EndFixity: 1}, Rule: objective.LengthOfPlatform, Singular: 1e-6, Coverage: 1,
		Goals: []objective.Goal{{Measure: measure("conditioning"), Maximise: true}},
		Limits: []objective.Limit{
			{Measure: measure("base_swing"), Bound: 45 * deg, Origin: "joints.base_swing"},
			{Measure: measure("platform_swing"), Bound: 45 * deg, Origin: "joints.platform_swing"},
			{Measure: measure("leg_clearance"), AtLeast: true, Origin: "limits"},
		},
	}
	task.Prepare()
	values := []float64{0.65, 0.40, 18 * deg, 12 * deg, 0.85, 0.62, 0.40}
	specs := make([]objective.Spec, len(values))
	for i, v := range values {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{v}}
	}
	a := objective.Appraise(task, objective.NewPlan(task, kin.FamilyNamed("6-UPS"), specs), values)
	a.Excursions = objective.Excurse(task, a)
	return task, a
}

// table reads a CSV file by its headings.
func table(t *testing.T, b []byte) (map[string]int, [][]string) {
	t.Helper()
	rows, err := csv.NewReader(bytes.NewReader(b)).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	head := map[string]int{}
	for i, h := range rows[0] {
		head[h] = i
	}
	return head, rows[1:]
}

// The pose table against a program in another language (testdata/study-a/SOURCES.md), whose rows have
// the same order. Its clearance is between axes: 60 mm of diameter are to be taken off.
func TestWritePosesOfStudyA(t *testing.T) {
	task, a := studyA(t)
	var b bytes.Buffer
	if err := WritePoses(&b, task, a); err != nil {
		t.Fatal(err)
	}
	first, _, _ := strings.Cut(b.String(), "\n")
	want := "x_mm,y_mm,z_mm,roll_deg,pitch_deg,yaw_deg"
	for i := 1; i <= 6; i++ {
		leg := ",leg" + strconv.Itoa(i)
		want += leg + "_length_mm" + leg + "_force_N" + leg + "_speed_mm_s" + leg + "_base_swing_deg" + leg + "_platform_swing_deg"
	}
	want += ",leg_clearance_mm,conditioning,ok,failed"
	if first != want {
		t.Errorf("headings\n%s\nwant\n%s", first, want)
	}
	text, err := os.ReadFile("../../../../testdata/study-a/check_poses.csv")
	if err != nil {
		t.Fatal(err)
	}
	head, rows := table(t, b.Bytes())
	otherHead, other := table(t, text)
	if len(rows) != 500 || len(other) != 500 {
		t.Fatalf("%d and %d rows", len(rows), len(other))
	}
	number := func(s string) float64 {
		v, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatal(err)
		}
		return v
	}
	column := func(ours, theirs string, factor, less float64) {
		most := 0.0
		for _, r := range other {
			most = math.Max(most, math.Abs(number(r[otherHead[theirs]])*factor))
		}
		for i, r := range rows {
			got, want := number(r[head[ours]]), number(other[i][otherHead[theirs]])*factor-less
			if math.Abs(got-want) > 1e-9*most {
				t.Fatalf("pose %d, %s: %v, want %v", i, ours, got, want)
			}
		}
	}
	column("x_mm", "x_m", 1e3, 0)
	column("yaw_deg", "yaw_rad", 1/deg, 0)
	for i := 1; i <= 6; i++ {
		n := strconv.Itoa(i)
		column("leg"+n+"_length_mm", "L"+n+"_m", 1e3, 0)
		column("leg"+n+"_force_N", "force"+n+"_N", 1, 0)
		column("leg"+n+"_speed_mm_s", "speed"+n+"_mps", 1e3, 0)
		column("leg"+n+"_base_swing_deg", "swing_base"+n+"_rad", 1/deg, 0)
		column("leg"+n+"_platform_swing_deg", "swing_plat"+n+"_rad", 1/deg, 0)
	}
	column("leg_clearance_mm", "clearance_m", 1e3, 60)
	column("conditioning", "inv_kappa", 1, 0)
	good := 0
	for i, r := range rows {
		ok := r[head["ok"]]
		if (ok == "true") != (other[i][otherHead["ok"]] == "1") || (r[head["failed"]] == "") != (ok == "true") {
			t.Errorf("pose %d: ok %s, failed %q, want %s", i, ok, r[head["failed"]], other[i][otherHead["ok"]])
		}
		if ok == "true" {
			good++
		}
	}
	if good != 234 { // SOURCES.md
		t.Errorf("%d poses are ok, want 234", good)
	}
	if x := rows[0][head["leg1_length_mm"]]; len(strings.Trim(x, "0.")) < 13 {
		t.Errorf("%s has too few digits", x)
	}
}

// The cells of a pose that no leg can follow are empty, not zero.
func TestWritePosesOutOfReach(t *testing.T) {
	task := &objective.Task{
		Zones:    []objective.Zone{{Name: "far", Kind: objective.Listed, Poses: []kin.Coords{{}, {kin.X: math.NaN()}}}},
		Actuator: objective.Actuator{DeadLength: math.NaN()}, Rule: objective.LengthOfPlatform, Singular: 1e-6, Coverage: 1,
	}
	task.Prepare()
	values := []float64{0.4, 0.1, 0.5, 90 * deg, 210 * deg, 330 * deg, 0, 0, 0, 0, 0, 0, 0.2, 0.3}
	f := kin.FamilyNamed("3-RPR")
	specs := make([]objective.Spec, len(f.Dimensions))
	for i := range specs {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{values[i]}}
	}
	a := objective.Appraise(task, objective.NewPlan(task, f, specs), values)
	var b bytes.Buffer
	if err := WritePoses(&b, task, a); err != nil {
		t.Fatal(err)
	}
	head, rows := table(t, b.Bytes())
	if _, ok := head["leg4_length_mm"]; ok {
		t.Error("a fourth leg of a 3-RPR")
	}
	if r := rows[0]; r[head["ok"]] != "true" || r[head["leg1_length_mm"]] == "" {
		t.Errorf("home: %v", r)
	}
	if r := rows[1]; r[head["ok"]] != "false" || r[head["failed"]] != "reach" || r[head["leg1_length_mm"]] != "" || r[head["conditioning"]] != "" {
		t.Errorf("out of reach: %v", r)
	}
}

func TestFromAppraisal(t *testing.T) {
	task, a := studyA(t)
	d := FromAppraisal(task, a)
	if d.Family != "6-UPS" || d.Feasible || d.Poses != 500 {
		t.Errorf("%s, feasible %v, %d poses", d.Family, d.Feasible, d.Poses)
	}
	if d.Dimensions["base_radius"] != 0.65 || d.Dimensions["stroke"] != 0.4 || len(d.Dimensions) != 7 {
		t.Errorf("dimensions %v", d.Dimensions)
	}
	if math.Abs(float64(d.Measures["coverage"])-234.0/500) > 1e-15 {
		t.Errorf("coverage %v", d.Measures["coverage"])
	}
	// The worst of check_poses.csv by column: the largest force_max_N and the least inv_kappa.
	text, err := os.ReadFile("../../../../testdata/study-a/check_poses.csv")
	if err != nil {
		t.Fatal(err)
	}
	head, rows := table(t, text)
	get := func(r []string, name string) float64 {
		v, _ := strconv.ParseFloat(r[head[name]], 64)
		return v
	}
	at := 0
	for i, r := range rows {
		if get(r, "force_max_N") > get(rows[at], "force_max_N") {
			at = i
		}
	}
	if got, want := float64(d.Measures["leg_force"]), get(rows[at], "force_max_N"); math.Abs(got/want-1) > 1e-9 {
		t.Errorf("leg_force %v, want %v", got, want)
	}
	w := d.Worst["leg_force"]
	if w.Case != "running" || w.Zone != "work" || w.Pose == nil || w.Leg < 1 || w.Leg > 6 {
		t.Fatalf("worst leg_force %+v", w)
	}
	found := false // mirror images are equally bad, so any row will do that has this force at this pose
	for _, r := range rows {
		same := true
		for k, c := range [6]float64{w.Pose.X, w.Pose.Y, w.Pose.Z, w.Pose.Roll, w.Pose.Pitch, w.Pose.Yaw} {
			same = same && math.Abs(c-get(r, []string{"x_m", "y_m", "z_m", "roll_rad", "pitch_rad", "yaw_rad"}[k])) < 1e-12
		}
		force := get(r, "force"+strconv.Itoa(w.Leg)+"_N")
		found = found || same && math.Abs(force/get(rows[at], "force_max_N")-1) < 1e-9
	}
	if !found {
		t.Errorf("no row has the worst leg_force for leg %d at %+v", w.Leg, w.Pose)
	}
	if len(d.Legs) != 6 || len(d.Excursions) != 6 || len(d.Joints.Base) != 6 || len(d.Joints.Platform) != 6 {
		t.Errorf("%d legs, %d excursions, %d and %d joints", len(d.Legs), len(d.Excursions), len(d.Joints.Base), len(d.Joints.Platform))
	}
	push := Number(0)
	for _, l := range d.Legs {
		push = max(push, l.Push, l.Pull)
	}
	if push != d.Measures["leg_force"] {
		t.Errorf("the legs push %v, the measure says %v", push, d.Measures["leg_force"])
	}
	for _, l := range d.Limits {
		if l.Measure == "leg_clearance" && (l.Unit != "m" || l.Sense != AtLeast || !l.Holds) {
			t.Errorf("%+v", l)
		}
	}
	b, err := Encode(d)
	if err != nil || !bytes.Contains(b, []byte(`"case": "running"`)) {
		t.Errorf("as JSON: %v", err)
	}
}

// A leg without a bound is null with a word beside it.
func TestUnboundedFields(t *testing.T) {
	inf := math.Inf(1)
	l := legOf(&objective.Leg{Push: inf, Pull: 1})
	if !l.Unbounded["push"] || l.Unbounded["pull"] {
		t.Errorf("leg %v", l.Unbounded)
	}
	v := limitOf(&objective.Verdict{Name: "push_force", Unit: objective.Newton, Value: inf, Bound: 5, Margin: -inf})
	if b, _ := Encode(v); !v.Unbounded || !bytes.Contains(b, []byte(`"value": null`)) {
		t.Errorf("limit %s", b)
	}
	e := excursionOf(&objective.Excursion{Freedom: kin.Yaw, Low: -inf, High: 1, HighFails: "singular"})
	if !e.Unbounded["low"] || e.Unbounded["high"] || e.Coordinate != "yaw" {
		t.Errorf("excursion %+v", e)
	}
}

// Every measure and dimension has a unit that its record can be read back by.
func TestKindsOfTheRegistries(t *testing.T) {
	for _, m := range objective.Measures() {
		k := MeasureKind("", m.Name)
		if m.Unit != objective.Ratio && k.Bare() {
			t.Errorf("%s has no unit", m.Name)
		}
		if KindOf(k.SI()) != k {
			t.Errorf("%s: unit %q is read as %v, not %v", m.Name, k.SI(), KindOf(k.SI()), k)
		}
	}
	for _, f := range kin.Families() {
		for _, d := range f.Dimensions {
			if k := DimensionKind(f.Name, d.Name); k.Bare() != (d.Unit == kin.Sign) {
				t.Errorf("%s %s: %v", f.Name, d.Name, k)
			}
		}
	}
}
