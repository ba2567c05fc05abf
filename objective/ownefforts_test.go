package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// A machine and a duty that are their own mirror images in the plane y = 0 push and pull alike with mirrored legs, 1 and 6,
// 2 and 5, 3 and 4, between the samples too, which are no mirror images. Climbs end within 1e-6 of the value.
func TestMirroredLegsPushAlike(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := atHome()
	z := Zone{Name: "work", Kind: Ellipsoid, Samples: 150}
	for q, half := range [6]float64{0.12, 0.15, 0.1, 0.3, 0.2, 0.3} {
		z.Low[q], z.High[q] = -half, half
	}
	task.Zones = []Zone{z}
	task.Cases = []Case{{Name: "running", Loads: []Load{{Mass: 80, Centre: kin.Vec{X: 0.05, Z: 0.2}, Linear: Set{Kind: AnyWay, Radius: 4}}}}}
	task.Prepare()
	a := appraise(task, f, soundDesign(f))
	moved := false
	sampled := appraise(pinned(task), f, soundDesign(f))
	for i := range 3 {
		l, m := a.Legs[i], a.Legs[5-i]
		near(t, "push", l.Push, m.Push, 1e-6*l.Push)
		near(t, "pull", l.Pull, m.Pull, 1e-6*l.Pull)
		moved = moved || l.Push > sampled.Legs[i].Push*(1+1e-6) || math.Abs(sampled.Legs[i].Push-sampled.Legs[5-i].Push) > 1e-3*l.Push
	}
	if !moved {
		t.Error("the samples are as good: the test shows nothing")
	}
}
