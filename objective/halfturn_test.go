package objective

import (
	"testing"

	"legwright/kin"
)

// twinTask is a duty of ± ranges with everything on the axis.
func twinTask(kind ZoneKind) *Task {
	f := kin.FamilyNamed("6-UPS")
	task := richTask(seeded(51), f)
	task.Tool = kin.Vec{Z: 0.1}
	z := ranged(f, kind, 1, 65)
	if kind == Listed {
		for _, s := range sampleZone(&Zone{Kind: Box, Low: z.Low, High: z.High, Samples: 100}, 0) {
			z.Poses = append(z.Poses, s.Coords, turnedBack(s.Coords))
		}
	}
	task.Zones = []Zone{z}
	task.Cases = []Case{{Name: "run",
		Loads: []Load{{Mass: 100, Centre: kin.Vec{Z: 0.2}, Inertia: [6]float64{3, 4, 5, 1, 0, 0},
			Linear: perAxis(seeded(52), 4), Angular: anyWay(seeded(53), 3), AtTool: true},
			{Force: kin.Vec{Z: -300}, ForceSpread: kin.Vec{X: 100, Y: 50, Z: 20}, Moment: kin.Vec{Z: 20}, At: kin.Vec{Z: -0.1}, Off: true}},
		Linear: perAxis(seeded(54), 0.4), Angular: anyWay(seeded(55), 0.5)}}
	return task
}

// kin.Family.Twin is the machine turned by half a turn. A duty of ± ranges with loads on the axis
// sees no difference (1e-11 relative); one that is off the axis does.
func TestTwins(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	rng := seeded(56)
	for _, kind := range []ZoneKind{Box, Axes, Listed} {
		task := twinTask(kind)
		task.Prepare()
		if !task.HalfTurn() {
			t.Error("half a turn should leave the task unchanged")
		}
		for range 5 {
			d := randomDesign(rng, f)
			sameReadings(t, appraise(task, f, d), appraise(task, f, f.Twin(d)), 1e-11, unchanged)
		}
	}
}

// Everything that is not its own image after half a turn shows: HalfTurn says so, and leg forces differ by more than 0.1 %.
func TestTwinsOffTheAxis(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	d := soundDesign(f)
	for name, off := range map[string]func(*Task){
		"mass centre":     func(t *Task) { t.Cases[0].Loads[0].Centre.X = 0.2 },
		"product xz":      func(t *Task) { t.Cases[0].Loads[0].Inertia[4] = 2 },
		"product yz":      func(t *Task) { t.Cases[0].Loads[0].Inertia[5] = -2 },
		"force":           func(t *Task) { t.Cases[0].Loads[1].Force.Y = 300 },
		"moment":          func(t *Task) { t.Cases[0].Loads[1].Moment.X = 90 },
		"point of attack": func(t *Task) { t.Cases[0].Loads[1].At.Y = 0.3 },
		"tool":            func(t *Task) { t.Tool.X = 0.2 },
		"gravity":         func(t *Task) { t.Gravity.Y = 3 },
		"zone":            func(t *Task) { t.Zones[0].Low[kin.Pitch] = 0 },
	} {
		task := twinTask(Box)
		off(task)
		task.Prepare()
		if task.HalfTurn() {
			t.Errorf("%s: half a turn should change the task", name)
		}
		x, y := value(t, appraise(task, f, d), "leg_force"), value(t, appraise(task, f, f.Twin(d)), "leg_force")
		if same(x, y, 1e-3) {
			t.Errorf("%s: twins have the leg forces %g and %g", name, x, y)
		}
	}
}

// TwinOf gives no twin that the plan does not allow.
func TestTwinWithinThePlan(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := twinTask(Box)
	d := soundDesign(f)
	d[f.Index("base_half_angle")] = 20 * deg
	d[f.Index("platform_half_angle")] = 30 * deg
	for _, c := range []struct {
		spec Spec
		ok   bool
	}{
		{Spec{Kind: Range, Low: 4 * deg, High: 56 * deg}, true},
		{Spec{Kind: Range, Low: 4 * deg, High: 39 * deg}, false},
		{Spec{Kind: Steps, Low: 4 * deg, Step: 2 * deg, Levels: 19}, true}, // 4 to 40: the twin is the last
		{Spec{Kind: Steps, Low: 4 * deg, Step: 2 * deg, Levels: 18}, false},
		{Spec{Kind: Steps, Low: 4 * deg, Step: 5 * deg, Levels: 19}, false},
		{Spec{Kind: Choices, Values: []float64{20 * deg, 40 * deg}}, true},
		{Spec{Kind: Choices, Values: []float64{20 * deg, 41 * deg}}, false},
		{Spec{Kind: Fixed, Values: []float64{20 * deg}}, false},
	} {
		p := sizedPlan(task, f, d)
		p.Specs[f.Index("base_half_angle")] = c.spec
		twin := p.TwinOf(d)
		if (twin != nil) != c.ok {
			t.Errorf("%+v: twin %v", c.spec, twin)
		}
		if twin != nil {
			near(t, "base_half_angle", twin[f.Index("base_half_angle")], 40*deg, 1e-15)
		}
	}
}
