package proof

import (
	"context"
	"math"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

// A zone that only touches the singular set is undecided, however small the boxes that are left at the touching point: their
// share of the volume is below anything that a sum of shares can tell. The disc touches the singular circle of the planar stage
// (see TestSingularCircleOfPlanarStage) from inside. The record shows the rest, and is taken for that.
func TestTouchingIsUndecided(t *testing.T) {
	ra, rb, phi := 0.5, 0.2, 70*deg
	circle := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(phi))
	f := kin.FamilyNamed("3-RPR")
	values := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		values[i] = f.Dimensions[i].Default
	}
	for name, v := range map[string]float64{"base_radius": ra, "platform_radius": rb, "home_heading": phi, "leg_min": 1e-4, "stroke": 2} {
		values[f.Index(name)] = v
	}
	for _, set := range []Settings{{Boxes: 2000}, {Boxes: 20000}} {
		for _, angle := range []float64{0.4, 1.1, 2.3} {
			r, sin, cos := 0.1, math.Sin(angle), math.Cos(angle)
			x, y := (circle-r)*cos, (circle-r)*sin
			task := boxTask(objective.Ellipsoid, kin.Coords{kin.X: x - r, kin.Y: y - r}, kin.Coords{kin.X: x + r, kin.Y: y + r})
			task.Singular = 0
			task.Prepare()
			plan := planOf(task, "3-RPR", values)
			res := prove(t, task, plan, values, set)
			if o := outcome(t, res, "regular"); o.Answer == Proved || res.Answer == Proved {
				report(t, res)
				t.Fatalf("a disc that touches the singular circle at %g rad: %v", angle, o.Answer)
			}
			rec, err := res.Record()
			if err != nil {
				t.Fatal(err)
			}
			if _, err := Check(context.Background(), task, plan, values, rec, Settings{}); err != nil {
				t.Errorf("its record is refused: %v", err)
			}
		}
	}
}

// What a certificate must not get past the check: nothing claimed, targets that no proof sets, gaps that say nothing.
func TestForgedRecordsAreRefused(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	values := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		values[i] = f.Dimensions[i].Default
	}
	for name, v := range map[string]float64{"base_radius": 0.4, "platform_radius": 0.12, "home_heading": 70 * deg, "leg_min": 0.01, "stroke": 2} {
		values[f.Index(name)] = v
	}
	task := boxTask(objective.Box, kin.Coords{kin.X: -0.05, kin.Y: -0.05, kin.Yaw: -0.2}, kin.Coords{kin.X: 0.05, kin.Y: 0.05, kin.Yaw: 0.2})
	task.Limits = append(task.Limits, objective.Limit{Measure: objective.MeasureNamed("base_swing"), Bound: 10 * deg, Origin: "joints.base_swing"})
	task.Prepare()
	plan := planOf(task, "3-RPR", values)
	res := prove(t, task, plan, values, Settings{})
	if outcome(t, res, "base_swing").Answer != Refuted {
		report(t, res)
		t.Fatal("a swing beyond its limit is not refuted")
	}
	good, err := res.Record()
	if err != nil {
		t.Fatal(err)
	}
	place := -1
	for i, p := range Properties(task, plan, values) {
		if p.Name == "base_swing" {
			place = i
		}
	}
	swing := func(target float64) *Record {
		r := *good
		r.Claims = append(append([]Claim(nil), good.Claims...), Claim{"base_swing", place, target})
		r.Trees = append([]Branch(nil), good.Trees...)
		for i := range r.Trees {
			r.Trees[i].Claims = append(append([]int(nil), r.Trees[i].Claims...), len(r.Claims)-1)
		}
		return &r
	}
	for name, rec := range map[string]*Record{
		"nothing":            {Gap: good.Gap},
		"a negative swing":   swing(-3),
		"a stricter swing":   swing(9 * deg),
		"a looser swing":     swing(90 * deg),
		"a gap beyond sense": {Gap: 1, Claims: good.Claims, Trees: good.Trees},
	} {
		if _, err := Check(context.Background(), task, plan, values, rec, Settings{}); err == nil {
			t.Errorf("%s is taken", name)
		}
	}
	if _, err := Check(context.Background(), task, plan, values, good, Settings{}); err != nil {
		t.Errorf("the record itself is refused: %v", err)
	}
}
