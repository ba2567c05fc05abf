package study

import (
	"math"
	"reflect"
	"testing"
)

// drives is an invented front of two families, with a third that is beaten and a fourth that fails.
func drives() (*Front, []FamilyFound) {
	f := &Front{Format: Format, Goals: []Goal{
		{Measure: "conditioning", Sense: Maximise},
		{Measure: "leg_power", Sense: Minimise, Unit: "W"},
		{Measure: "footprint", Sense: Minimise, Unit: "m"},
	}}
	design := func(family string, conditioning, power, footprint float64) Design {
		return Design{Family: family, Measures: map[string]Number{
			"conditioning": Number(conditioning), "leg_power": Number(power), "footprint": Number(footprint)}}
	}
	f.Designs = []Design{
		design("6-UPS", 0.4, 200, 1), design("6-UPS", 0.5, 250, 1.2), design("6-UPS", 0.3, 180, 1.1), design("6-PUS", 0.35, 220, 0.8),
	}
	near := design("6-RUS", 0.1, math.Inf(1), 1)
	near.Limits = []Limit{
		{Measure: "coverage", Sense: AtLeast, Bound: 1, Value: 0.9, Margin: -0.1},
		{Measure: "leg_clearance", Unit: "m", Sense: AtLeast, Bound: 0.01, Value: 0.009, Margin: -0.1},
		{Measure: "base_swing", Unit: "rad", Sense: AtMost, Bound: Number(math.Pi / 6), Value: Number(math.Pi / 4), Margin: -0.5},
		{Measure: "platform_swing", Unit: "rad", Sense: AtMost, Bound: 1, Value: 0.5, Holds: true, Margin: 0.5},
	}
	return f, []FamilyFound{
		{Name: "6-UPS", Evaluations: 500, Feasible: 300, Best: []Design{f.Designs[1], f.Designs[2], design("6-UPS", 0.2, 300, 0.7)}},
		{Name: "6-PUS", Evaluations: 300, Feasible: 100, Best: []Design{f.Designs[3]}},
		{Name: "3-RPS", Evaluations: 120, Feasible: 7, Best: []Design{design("3-RPS", 0.3, 180, 1.4)}},
		{Name: "6-RUS", Evaluations: 80, Nearest: &near},
	}
}

func TestCompareFamilies(t *testing.T) {
	f, found := drives()
	f.Compare(found)
	want := []FamilyLine{
		{Name: "6-UPS", Evaluations: 500, Feasible: 300, OnFront: 3, Share: 0.75,
			Best: map[string]Number{"conditioning": 0.5, "leg_power": 180, "footprint": 0.7},
			Why:  "3 of the 4 designs of the front; leads in conditioning and footprint, level with the best in leg_power"},
		{Name: "6-PUS", Evaluations: 300, Feasible: 100, OnFront: 1, Share: 0.25,
			Best: map[string]Number{"conditioning": 0.35, "leg_power": 220, "footprint": 0.8},
			Why:  "1 of the 4 designs of the front; leads in no goal, its designs are compromises"},
		{Name: "3-RPS", Evaluations: 120, Feasible: 7,
			Best: map[string]Number{"conditioning": 0.3, "leg_power": 180, "footprint": 1.4},
			Why:  "every one of its designs is beaten; at its best it is behind the front by 40 % in conditioning and 100 % in footprint; as good as the front in leg_power"},
		{Name: "6-RUS", Evaluations: 80, Best: map[string]Number{},
			Why: "none of its 80 designs holds every limit; the nearest has base_swing 45 deg, at most 30 deg is wanted, and breaks 1 more"},
	}
	for i := range want {
		if !reflect.DeepEqual(f.Families[i], want[i]) {
			t.Errorf("got\n%+v\nwant\n%+v", f.Families[i], want[i])
		}
	}
}

// A family whose nearest design has no posture somewhere is told of without numbers that mean nothing.
func TestCompareWithoutPosture(t *testing.T) {
	f, found := drives()
	found[3].Nearest.Limits[1].Value = Number(math.Inf(-1))
	f.Compare(found)
	if want := "none of its 80 designs holds every limit; the nearest has no posture, or a singular one, at some required pose"; f.Families[3].Why != want {
		t.Errorf("got %q", f.Families[3].Why)
	}
}

// The lines pass through the file, an unbounded best as null.
func TestFamiliesReadBack(t *testing.T) {
	f, found := drives()
	found[2].Best[0].Measures["leg_power"] = Number(math.Inf(1))
	f.Compare(found)
	Rank(f, nil)
	text, err := Encode(f)
	if err != nil {
		t.Fatal(err)
	}
	back, err := Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(back.Families, f.Families) {
		t.Errorf("got\n%+v\nwant\n%+v", back.Families, f.Families)
	}
	if l := &back.Families[2]; !l.Unbounded["leg_power"] || !math.IsInf(float64(l.Best["leg_power"]), 1) {
		t.Errorf("unbounded best: %+v", l)
	}
	back.Families[1].Name = ""
	if text, err = Encode(back); err != nil {
		t.Fatal(err)
	}
	if _, err = Decode(text); err == nil {
		t.Error("a family without a name is read")
	}
}

// A brief with one family has no such lines.
func TestOneFamilyIsNotCompared(t *testing.T) {
	f, found := drives()
	f.Compare(found[:1])
	if f.Families != nil {
		t.Errorf("%+v", f.Families)
	}
}
