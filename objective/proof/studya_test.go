package proof

import (
	"context"
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

const deg = math.Pi / 180

// studyA is the duty of testdata/study-a/box.yaml, with the box scaled.
func studyA(size float64) *objective.Task {
	half := kin.Coords{0.15, 0.15, 0.10, 12 * deg, 12 * deg, 15 * deg}
	z := objective.Zone{Name: "work", Kind: objective.Box, Samples: 500}
	for k, h := range half {
		z.Low[k], z.High[k] = -size*h, size*h
	}
	axes := func(x float64) objective.Set {
		return objective.Set{Kind: objective.PerAxis, Half: kin.Vec{X: x, Y: x, Z: x}}
	}
	return &objective.Task{
		Zones: []objective.Zone{z},
		Cases: []objective.Case{{Name: "running",
			Loads: []objective.Load{{Name: "cell", Mass: 300, Centre: kin.Vec{Z: 0.25}, Inertia: [6]float64{40, 40, 60},
				Linear: axes(4), Angular: axes(3)}},
			Linear: axes(0.4), Angular: axes(0.5),
		}},
		Gravity:  kin.Vec{Z: -objective.Gravity},
		Actuator: objective.Actuator{DeadLength: math.NaN()},
		Legs:     objective.Legs{Diameter: 0.06, EndFixity: 1},
		Rule:     objective.LengthOfPlatform,
		Singular: 1e-6,
		Coverage: 1,
	}
}

// planOf is the plan of one design.
func planOf(t *objective.Task, family string, values []float64) *objective.Plan {
	specs := make([]objective.Spec, len(values))
	for i, v := range values {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{v}}
	}
	return objective.NewPlan(t, kin.FamilyNamed(family), specs)
}

// front gives a design of the front of study A: five free dimensions, leg_min and stroke.
func front(t testing.TB, row int) []float64 {
	f, err := os.Open("../../testdata/study-a/near_true_front.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	all, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var out []float64
	for _, c := range all[1+row][:7] {
		x, err := strconv.ParseFloat(c, 64)
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, x)
	}
	out[2] *= deg
	out[3] *= deg
	return out
}

// slackened prepares a task in which the design keeps a relative distance from every limit: its stroke and limits on the
// measures are set that far beyond the worst values that the search meets.
func slackened(t testing.TB, task *objective.Task, family string, values []float64, far float64, measures ...string) *objective.Plan {
	t.Helper()
	task.Limits = nil
	for _, name := range measures {
		m := objective.MeasureNamed(name)
		l := objective.Limit{Measure: m, AtLeast: m.Sense == objective.Larger, Bound: 1, Origin: "limits"}
		task.Limits = append(task.Limits, l)
	}
	task.Prepare()
	p := planOf(task, family, values)
	s, _ := newSubject(task, p, values)
	v := newProver(context.Background(), s, Settings{Workers: 1})
	v.search(0)
	least, most := math.NaN(), math.NaN()
	k := 0
	for i := range v.out {
		o := &v.out[i]
		switch {
		case o.kind == shortest:
			least = o.Found
		case o.kind == longest:
			most = o.Found
		case o.Measure != nil:
			l := &task.Limits[k]
			k++
			scale := math.Abs(o.Found)
			if o.kind == apart {
				scale = task.Legs.Diameter
			}
			if l.Bound = o.Found + far*scale; l.AtLeast {
				l.Bound = o.Found - far*scale
			}
			if math.IsInf(l.Bound, 0) || math.IsNaN(l.Bound) {
				t.Fatalf("%s has the worst value %g", o.Name, o.Found)
			}
		}
	}
	if at, span := p.RangeOf(); at >= 0 {
		values[span] = (most - least) / (1 - 2*far)
		values[at] = least - far*values[span]
		p = planOf(task, family, values)
	}
	return p
}

var everyLimit = []string{"base_swing", "platform_swing", "leg_clearance", "conditioning", "leg_force", "leg_speed", "leg_power"}

// report logs what was proved.
func report(t testing.TB, r *Result) {
	t.Helper()
	t.Logf("%v, %d boxes", r.Answer, r.Boxes)
	for i := range r.Outcomes {
		o := &r.Outcomes[i]
		t.Logf("%-16s %v limit %.6g target %.6g found %.6g bound %.6g boxes %d left %.3g", o.Name, o.Answer, o.Limit, o.Target, o.Found, o.Bound, o.Boxes, o.Left)
	}
}
