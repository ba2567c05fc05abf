package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// A pose that the sampling lacks decides where it is the worst, at once and among the scouts, and belongs to its zone's cases.
func TestFurtherPosesDecide(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	task := &Task{
		Zones:    []Zone{{Name: "work", Kind: Listed, Poses: []kin.Coords{{}, {kin.X: 0.01}}}},
		Actuator: Actuator{DeadLength: math.NaN()},
		Rule:     LengthGiven, Length: 0.2, Singular: 1e-6, Coverage: 1,
	}
	task.Prepare()
	var specs []Spec
	for _, d := range f.Dimensions {
		specs = append(specs, Spec{Kind: Fixed, Values: []float64{d.Low/2 + d.High/2}})
	}
	p := NewPlan(task, f, specs)
	far := Further{Zone: 0, Coords: kin.Coords{kin.X: 0.05, kin.Yaw: 0.2}}
	wide := task.With([]Further{far})
	if len(wide.Samples()) != 3 || len(task.Samples()) != 2 {
		t.Fatalf("%d and %d poses", len(wide.Samples()), len(task.Samples()))
	}
	values := p.Single()
	a, b := Appraise(task, p, values), Appraise(wide, p, values)
	if got := b.Reading("conditioning"); got.Pose.Coords != far.Coords || !(got.Value < a.Reading("conditioning").Value) {
		t.Errorf("conditioning %v at %v, without the pose %v", got.Value, got.Pose.Coords, a.Reading("conditioning").Value)
	}
	if wide.scouts != task.scouts+1 || wide.samples[0].Coords != far.Coords {
		t.Error("the pose is no scout")
	}
}
