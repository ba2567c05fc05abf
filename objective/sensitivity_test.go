package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// aimed is a task whose goals are measures of every kind.
func aimed(f *kin.Family, seed uint64) *Task {
	task := richTask(seeded(seed), f)
	for _, name := range []string{"conditioning", "leg_force", "motor_torque", "leg_speed", "stroke", "stiffness", "footprint", "mean_conditioning"} {
		if m := MeasureNamed(name); m.Has == nil || m.Has(f) {
			task.Goals = append(task.Goals, Goal{Measure: m, Maximise: m.Sense == Larger})
		}
	}
	task.Prepare()
	return task
}

// The goals of a moved design are those of its appraisal, bit by bit.
func TestSensitivitiesAreThoseOfAppraisals(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task := aimed(f, 9)
		p := sizedPlan(task, f, soundDesign(f))
		a := Appraise(task, p, p.Single())
		seen := 0
		for _, s := range Sensitivities(task, p, a.Values) {
			dim := &f.Dimensions[s.Dimension]
			if dim.Unit == kin.Sign || p.derived(s.Dimension) {
				t.Errorf("%s is moved", dim.Name)
			}
			for _, m := range []Moved{s.Down, s.Up} {
				d := append([]float64(nil), a.Values...)
				d[s.Dimension] += m.By
				if x := a.Values[s.Dimension]; x != 0 {
					near(t, dim.Name+" moved", math.Abs(m.By), 0.01*math.Abs(x), 1e-15)
				}
				b := Appraise(task, p, d)
				for i, g := range task.Goals {
					if r := b.Reading(g.Measure.Name); r == nil || r.Value != m.Goals[i] {
						t.Errorf("%s %+g: %s is %v, appraised %+v", dim.Name, m.By, g.Measure.Name, m.Goals[i], r)
					}
				}
				if b.Feasible != (m.Fails == "") {
					t.Errorf("%s %+g: feasible %v, but %q", dim.Name, m.By, b.Feasible, m.Fails)
				}
				seen++
			}
		}
		if seen < 6 {
			t.Errorf("%d moves", seen)
		}
	})
}

// The stroke of a scaled machine: all its lengths together change conditioning by nothing. The central differences
// with respect to the lengths of 6-UPS at home alone add up to 0 where the characteristic length is the
// platform's radius, by Euler's theorem on homogeneous functions, but for terms of the second order, 1e-3.
func TestSensitivitiesAddUp(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := &Task{Zones: []Zone{{Kind: Listed, Poses: []kin.Coords{{}}}}, Rule: LengthOfPlatform, Coverage: 1, Singular: 1e-6,
		Actuator: Actuator{DeadLength: math.NaN()}, Goals: []Goal{{Measure: MeasureNamed("conditioning"), Maximise: true}}}
	task.Prepare()
	values := soundDesign(f)
	p := sizedPlan(task, f, values)
	a := Appraise(task, p, p.Single())
	sum, most := 0.0, 0.0
	for _, s := range Sensitivities(task, p, a.Values) {
		if f.Dimensions[s.Dimension].Unit == kin.Metre {
			d := (s.Up.Goals[0] - s.Down.Goals[0]) / (2 * nudge) / a.Reading("conditioning").Value
			sum += d
			most = math.Max(most, math.Abs(d))
		}
	}
	near(t, "sum of the relative sensitivities", sum, 0, 1e-3)
	if most < 0.1 {
		t.Errorf("the largest is %v", most)
	}
}

// Steps move by one step and choices to the neighbours, none beyond the ends.
func TestSensitivitiesOfStepsAndChoices(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := aimed(f, 11)
	p := sizedPlan(task, f, soundDesign(f))
	p.Specs[0] = Spec{Kind: Steps, Low: 0.4, High: 0.6, Step: 0.05, Levels: 5}
	p.Specs[1] = Spec{Kind: Choices, Values: []float64{0.2, 0.25, 0.35}}
	d := Appraise(task, p, soundDesign(f)).Values
	for _, c := range []struct{ step, choice, down, up, less, more float64 }{
		{0.5, 0.25, -0.05, 0.05, -0.05, 0.1},
		{0.4, 0.2, 0, 0.05, 0, 0.05},
		{0.6, 0.35, -0.05, 0, -0.1, 0},
	} {
		d[0], d[1] = c.step, c.choice
		s := Sensitivities(task, p, d)
		near(t, "step down", s[0].Down.By, c.down, 1e-15)
		near(t, "step up", s[0].Up.By, c.up, 1e-15)
		near(t, "choice below", s[1].Down.By, c.less, 1e-15)
		near(t, "choice above", s[1].Up.By, c.more, 1e-15)
		if (c.down == 0) != (s[0].Down.Goals == nil) {
			t.Error("goals of a move that was not made")
		}
	}
}

// A dimension beyond which poses are out of reach says so.
func TestSensitivityOutOfReach(t *testing.T) {
	f := kin.FamilyNamed("five-bar")
	task := &Task{Zones: []Zone{{Kind: Listed, Poses: []kin.Coords{{}, {kin.Y: 0.05}}}}, Rule: LengthGiven, Length: 1, Coverage: 1, Singular: 1e-9,
		Actuator: Actuator{DeadLength: math.NaN()}, Goals: []Goal{{Measure: MeasureNamed("conditioning"), Maximise: true}}}
	task.Prepare()
	values := soundDesign(f)
	reach := values[f.Index("proximal")] + values[f.Index("distal")]
	half := values[f.Index("spacing")] / 2
	values[f.Index("home_y")] = math.Sqrt(reach*reach-half*half) - 0.051
	p := sizedPlan(task, f, values)
	a := Appraise(task, p, p.Single())
	if !a.Feasible {
		t.Fatal("does not reach")
	}
	for _, s := range Sensitivities(task, p, a.Values) {
		if f.Dimensions[s.Dimension].Name == "home_y" && (s.Up.Fails != "reach" || s.Up.Goals[0] != 0) {
			t.Errorf("%+v", s.Up)
		}
	}
}
