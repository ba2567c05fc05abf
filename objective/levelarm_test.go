package objective

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"
)

// Torques of the level-keeping arm by its forward kinematics (E7, standard): a motor's torque is the wrench on the twist
// that it gives the tool point alone. Column: about z at the axis; upper arm and forearm: square to
// the link, in the plane of the arm; tool: about z at the platform origin. 1e-11 of the largest.
func TestTorquesOfTheLevelArm(t *testing.T) {
	f := kin.FamilyNamed("level-arm")
	rng := seeded(211)
	tried := 0
	for range 200 {
		task := richTask(rng, f)
		task.Zones = task.Zones[:1]
		loads := randomLoads(rng, func(*rand.Rand, float64) Set { return Set{} })
		for i := range loads {
			loads[i].ForceSpread, loads[i].MomentSpread = kin.Vec{}, kin.Vec{}
		}
		task.Cases = []Case{{Loads: loads}}
		d := randomDesign(rng, f)
		m := sizedPlan(task, f, d).build(task, d)
		c := randomCoords(rng, f, 1.5)
		p := kin.NewPose(c)
		var s kin.State
		if m.Move(&p, &s); s.Fail != kin.Reached {
			continue
		}
		tried++
		origin, rot := m.Place(&p)
		w := (&statics{f: m.Frame(), rot: rot}).wrench(task, loads, make([]scene, len(loads)))
		tool := rot.Apply(task.Tool)
		x, y := origin.X+tool.X, origin.Y+tool.Y
		sin, cos := math.Sincos(s.Q[0])
		link := func(length, angle float64) float64 {
			sn, cn := math.Sincos(angle)
			return length * (-sn*(cos*w[0]+sin*w[1]) + cn*w[2])
		}
		want := []float64{
			-y*w[0] + x*w[1] + w[5],
			link(d[f.Index("upper_arm")], s.Q[1]),
			link(d[f.Index("forearm")], s.Q[2]),
			-tool.Y*w[0] + tool.X*w[1] + w[5],
		}
		scale := 0.0
		for _, q := range want {
			scale = math.Max(scale, math.Abs(q))
		}
		lo, hi := bounds(task, m, c, 0)
		for i := range want {
			near(t, "torque", hi[i], want[i], 1e-11*scale)
			near(t, "torque", lo[i], want[i], 1e-11*scale)
		}
	}
	if tried < 50 {
		t.Errorf("only %d designs reach their pose", tried)
	}
}

// The footprint holds the circle that the shoulder describes as the column turns, and excursions end somewhere
// although an arm on the axis has no base of any width.
func TestPlanOfTheLevelArm(t *testing.T) {
	f := kin.FamilyNamed("level-arm")
	task := richTask(seeded(212), f)
	task.Zones = []Zone{{Name: "home", Kind: Listed, Poses: []kin.Coords{{}}}}
	task.Cases = nil
	task.Tool = kin.Vec{}
	task.Prepare()
	d := soundDesign(f)
	for _, offset := range []float64{0, 0.125} {
		d[f.Index("base_offset")] = offset
		a := appraise(task, f, d)
		near(t, "footprint", value(t, a, "footprint"), 2*offset, 1e-15)
		for _, e := range Excurse(task, a) {
			switch e.Freedom {
			case kin.Yaw:
				if !math.IsInf(e.High, 1) {
					t.Errorf("yaw ends at %g: %s", e.High, e.HighFails)
				}
			case kin.X, kin.Z:
				if !(e.High > 0.05 && e.High < 2) || e.HighFails != "reach" && e.HighFails != "parallelogram" && e.HighFails != "upper arm" && e.HighFails != "forearm" {
					t.Errorf("%s ends at %g: %q", e.Freedom, e.High, e.HighFails)
				}
			}
		}
	}
}
