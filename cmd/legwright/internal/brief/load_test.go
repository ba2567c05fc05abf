package brief

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"testing"
)

func load(t *testing.T, file string) *Brief {
	t.Helper()
	b, err := Load(filepath.Join("testdata", file), known())
	if err != nil {
		t.Fatalf("%s:\n%v", file, err)
	}
	return b
}

// The values are those of the text of testdata/tilt.yaml, converted by hand.
func TestLoadTilt(t *testing.T) {
	b := load(t, "tilt.yaml")
	deg := math.Pi / 180
	dead := 0.18
	want := Actuator{DeadLength: &dead, DeadRatio: 1, Reserve: 0.01, Strokes: []float64{0.2, 0.25, 0.3},
		Push: 5000, Pull: 3000, Stiffness: 30e6, Error: 10e-6}
	if !reflect.DeepEqual(b.Actuator, want) {
		t.Errorf("actuator %+v, want %+v", b.Actuator, want)
	}
	f := b.Families[0]
	if len(b.Families) != 1 || f.Name != "6-UPS" || len(f.Dimensions) != 7 {
		t.Fatalf("families %+v", b.Families)
	}
	if d := f.Dimensions[0]; d.Form != Stepped || d.Low != 0.4 || d.High != 1.2 || d.Step != 0.005 {
		t.Errorf("base_radius %+v", d)
	}
	if d := f.Dimensions[2]; d.Form != Ranged || d.Low != 4*deg || d.High != 56*deg {
		t.Errorf("base_half_angle %+v", d)
	}
	if f.Dimensions[5].Form != Sized || f.Dimensions[6].Form != Sized {
		t.Errorf("leg_min and stroke %+v", f.Dimensions[5:])
	}
	z := b.Duty.Zones
	if len(z) != 4 || z[0].Samples != 500 || z[2].Samples != 500 || len(z[0].Ranges) != 6 {
		t.Errorf("zones %+v", z)
	}
	if want := []Range{{"z", 2, -0.2, 0}, {"yaw", 5, -30 * deg, 30 * deg}}; !reflect.DeepEqual(z[1].Ranges, want) {
		t.Errorf("service %+v, want %+v", z[1].Ranges, want)
	}
	if want := [][6]float64{{0.01, 0, -0.005, deg, 0, 0}, {0, 0.02, 0.005, 0, -2.5 * deg, 10 * deg}}; !reflect.DeepEqual(z[3].Poses, want) {
		t.Errorf("recorded %+v, want %+v", z[3].Poses, want)
	}
	cell := b.Duty.Cases[0].Loads[0]
	if cell.Mass != 300 || cell.Inertia != [6]float64{40, 40, 60} || cell.Acceleration.Linear != (Set{Kind: BallSet, Radius: 4}) {
		t.Errorf("cell %+v", cell)
	}
	if b.Gravity != [3]float64{0, 0, -9.80665} || b.Tool != [3]float64{0, 0, 0.25} {
		t.Errorf("gravity %v, tool %v", b.Gravity, b.Tool)
	}
	if l := b.Limits[0]; l.Measure != "coverage" || !l.AtLeast || l.Bound != 1 {
		t.Errorf("limit %+v", l)
	}
	if b.CharacteristicLength != (Length{"value", 0.3}) || b.Joints.Axis.Kind != "home_leg" {
		t.Errorf("length %+v, axis %+v", b.CharacteristicLength, b.Joints.Axis)
	}
}

func TestDefaults(t *testing.T) {
	b, err := Parse("least.yaml", []byte(`
family: 3-RPR
dimensions: {base_radius: 1 m, platform_radius: 300 mm, home_heading: 30 deg, leg_min: sized, stroke: sized}
duty: {zones: [{box: {x: 10 mm}}]}
goals: [{maximise: conditioning}]
`), known())
	if err != nil {
		t.Fatal(err)
	}
	want := &Brief{
		Families:             b.Families,
		Mount:                "floor",
		Gravity:              [3]float64{0, 0, -9.80665},
		Actuator:             Actuator{DeadRatio: 1},
		Joints:               Joints{Axis: Axis{Kind: "home_leg"}},
		Legs:                 Legs{EndFixity: 1},
		CharacteristicLength: Length{Kind: "duty"},
		SingularBelow:        1e-6,
		Duty:                 Duty{Zones: []Zone{{Name: "zone 1", Shape: Box, Samples: 500, Ranges: []Range{{"x", 0, -0.01, 0.01}}}}},
		Goals:                b.Goals,
		Ranking:              Ranking{map[string]float64{"conditioning": 1}},
		Search:               Search{Evaluations: 20000, Seed: 1, Front: 200},
		places:               b.places,
	}
	if !reflect.DeepEqual(b, want) {
		t.Errorf("got  %+v\nwant %+v", b, want)
	}
}

func TestFormatsAgree(t *testing.T) {
	want := load(t, "whole.yaml")
	for _, file := range []string{"whole.toml", "whole.json"} {
		got := load(t, file)
		for path := range want.places.at {
			if at, ok := got.places.at[path]; !ok || at.Line == 0 || at.Column == 0 {
				t.Errorf("%s: no place for %s", file, path)
			}
		}
		got.places, want.places = places{}, places{}
		if !reflect.DeepEqual(got, want) {
			t.Errorf("%s gives another brief:\n%+v\n%+v", file, got, want)
		}
		want = load(t, "whole.yaml")
	}
}

func TestBriefPrintsAsJSON(t *testing.T) {
	want := load(t, "whole.yaml")
	text, err := json.Marshal(want)
	if err != nil {
		t.Fatal(err)
	}
	var got Brief
	if err := json.Unmarshal(text, &got); err != nil {
		t.Fatal(err)
	}
	want.places = places{}
	if !reflect.DeepEqual(&got, want) {
		t.Errorf("read back from JSON:\n%+v\n%+v", &got, want)
	}
}

func TestBriefFault(t *testing.T) {
	b := load(t, "whole.yaml")
	text, err := os.ReadFile("testdata/whole.yaml")
	if err != nil {
		t.Fatal(err)
	}
	for path, key := range map[string]string{
		"goals[1]":                       "minimise: footprint",
		"duty.zones[1]":                  "{name: service",
		"duty.zones[0].box.roll":         "roll: 12",
		"limits[2].at_most":              "at_most: 2.4",
		b.DimensionPath("6-RUS", "mode"): "mode:",
		"actuator.none":                  "actuator:",
	} {
		at := b.Fault(path, "is odd", "write another").At
		if want := place("testdata/whole.yaml", text, key); at != want {
			t.Errorf("%s: at %v, want %v", path, at, want)
		}
	}
}
