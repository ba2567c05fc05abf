package handover

import (
	"math"
	"sync"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

// starterTask is the family's starter duty as a task: a box, its mass with accelerations, and a second case.
func starterTask(f *kin.Family) *objective.Task {
	z := objective.Zone{Name: "work", Kind: objective.Box, Samples: 100}
	for _, q := range f.Freedoms {
		z.Low[q], z.High[q] = -f.Starter.Box[q], f.Starter.Box[q]
	}
	t := &objective.Task{
		Zones: []objective.Zone{z},
		Cases: []objective.Case{
			{Name: "running", Loads: []objective.Load{{
				Name: "payload", Mass: f.Starter.Mass, Centre: f.Starter.Centre,
				Linear: objective.Set{Kind: objective.AnyWay, Radius: f.Starter.Accel}}},
				Linear: objective.Set{Kind: objective.AnyWay, Radius: f.Starter.Speed}},
			{Name: "pushed", Loads: []objective.Load{{Force: kin.Vec{X: 50, Z: 10}, ForceSpread: kin.Vec{Y: 20}}}},
		},
		Gravity:  kin.Vec{Z: -objective.Gravity},
		Actuator: objective.Actuator{DeadLength: math.NaN(), DeadRatio: 1, Reserve: 0.01},
		Legs:     objective.Legs{Diameter: f.Starter.Diameter},
		Singular: 1e-6,
		Coverage: 1,
	}
	t.Prepare()
	return t
}

// appraised is a regular design within the family's usual ranges, part of the way up each, its actuators sized.
func appraised(f *kin.Family, task *objective.Task, part float64) *objective.Appraisal {
	return appraisedWith(f, task, part, "", 0)
}

// appraisedWith is the same with one dimension set otherwise.
func appraisedWith(f *kin.Family, task *objective.Task, part float64, dimension string, value float64) *objective.Appraisal {
	values := make([]float64, len(f.Dimensions))
	specs := make([]objective.Spec, len(values))
	least, span := f.Range()
	for i, d := range f.Dimensions {
		values[i] = d.Low + part*(d.High-d.Low)
		if d.Unit == kin.Sign {
			values[i] = d.Default
		}
		if d.Name == dimension {
			values[i] = value
		}
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: values[i : i+1]}
		if i == least || i == span {
			specs[i] = objective.Spec{Kind: objective.Sized}
		}
	}
	return objective.Appraise(task, objective.NewPlan(task, f, specs), values)
}

// wicked is a title that tries everything that a sheet must not let through.
var wicked = Title{Program: "legwright 0.1.0", Design: "007", Hash: "0123456789abcdef",
	Brief: "=HYPERLINK(\"x\") </text><script>alert(1)</script> & 100 %%c ^J \\U+0041 ;=1+1 \u202e\n0\nEOF Ä €"}

// made is a design of every family with its sheets, made once for all tests; they do not change it.
var made = sync.OnceValue(func() (out []handed) {
	for _, f := range kin.Families() {
		task := starterTask(f)
		a := appraised(f, task, 0.3)
		out = append(out, handed{f.Name, &design{task: task, a: a, title: wicked, plan: newModel(a)}, Files(task, a, wicked)})
	}
	return out
})

type handed struct {
	family string
	d      *design
	files  map[string][]byte
}

// everyFamily runs check on a design of every family.
func everyFamily(t *testing.T, check func(t *testing.T, d *design, files map[string][]byte)) {
	for _, h := range made() {
		t.Run(h.family, func(t *testing.T) { check(t, h.d, h.files) })
	}
}
