package job

import (
	"math"

	"legwright/cmd/legwright/internal/brief"
	"legwright/kin"
	"legwright/objective"
)

// Study is a brief made ready to be worked on.
type Study struct {
	Brief *brief.Brief
	Tasks []*objective.Task // one for each family of the brief; they differ in what depends on the kind of actuator
	Plans []*objective.Plan

	halfTurn bool // half a turn about z leaves the task unchanged
	foreign  bool // the design that is appraised is of a family that the brief does not name
}

// New makes the study of a brief. Faults that only show with the kinematics are brief.Faults.
func New(b *brief.Brief) (*Study, error) {
	s := &Study{Brief: b}
	faults := append(impossible(b), unfounded(b)...)
	for i := range b.Families {
		f := kin.FamilyNamed(b.Families[i].Name)
		t := task(b, f)
		s.Tasks = append(s.Tasks, t)
		s.Plans = append(s.Plans, objective.NewPlan(t, f, specs(f, &b.Families[i])))
		faults = append(faults, singularEverywhere(b, &b.Families[i])...)
	}
	if err := faults.Err(); err != nil {
		return nil, err
	}
	for _, t := range s.Tasks {
		t.Prepare()
	}
	s.halfTurn = s.Tasks[0].HalfTurn()
	return s, nil
}

// task is everything of the brief but the dimensions, as it concerns a family.
func task(b *brief.Brief, f *kin.Family) *objective.Task {
	t := &objective.Task{
		Tool:     vec(b.Tool),
		Gravity:  vec(b.Gravity),
		Actuator: actuator(&b.Actuator, f),
		Joints:   objective.Joints{Axis: axis(&b.Joints.Axis), Stiffness: b.Joints.Stiffness},
		Legs: objective.Legs{Diameter: b.Legs.Diameter, RodDiameter: b.Legs.RodDiameter,
			Crank: b.Legs.CrankDiameter, Modulus: b.Legs.Modulus, EndFixity: b.Legs.EndFixity},
		Singular: b.SingularBelow,
		Coverage: 1,
	}
	switch b.CharacteristicLength.Kind {
	case "value":
		t.Rule, t.Length = objective.LengthGiven, b.CharacteristicLength.Value
	case "platform_radius":
		t.Rule = objective.LengthOfPlatform
	}
	at := map[string]int{}
	for i := range b.Duty.Zones {
		z := &b.Duty.Zones[i]
		at[z.Name] = i
		t.Zones = append(t.Zones, zone(z))
	}
	for i := range b.Duty.Cases {
		t.Cases = append(t.Cases, loadCase(&b.Duty.Cases[i], at))
	}
	limited := false
	for _, l := range b.Limits {
		if l.Measure == "coverage" {
			t.Coverage, limited = l.Bound, true
			continue
		}
		t.Limits = append(t.Limits, objective.Limit{Measure: objective.MeasureNamed(l.Measure), AtLeast: l.AtLeast, Bound: l.Bound, Origin: "limits"})
	}
	for _, g := range b.Goals {
		t.Goals = append(t.Goals, objective.Goal{Measure: objective.MeasureNamed(g.Measure), Maximise: g.Sense == brief.Maximise})
		if g.Measure == "coverage" {
			t.CoverageGoal = true
			if !limited {
				t.Coverage = 0
			}
		}
	}
	most := func(name, origin string, bound float64) {
		if m := objective.MeasureNamed(name); bound > 0 && (m.Has == nil || m.Has(f)) {
			t.Limits = append(t.Limits, objective.Limit{Measure: m, Bound: bound, Origin: origin})
		}
	}
	most("base_swing", "joints.base_swing", b.Joints.BaseSwing)
	most("platform_swing", "joints.platform_swing", b.Joints.PlatformSwing)
	most("push_force", "actuator.push", b.Actuator.Push)
	most("pull_force", "actuator.pull", b.Actuator.Pull)
	most("motor_torque", "actuator.torque", b.Actuator.Torque)
	most("leg_speed", "actuator.speed", b.Actuator.Speed)
	most("motor_speed", "actuator.speed", b.Actuator.TurnSpeed)
	most("leg_power", "actuator.power", b.Actuator.Power)
	return t
}

// actuator is what the brief says of a family's own sort of actuator: cranks have no stroke in mm, and
// only legs that draw in have a dead length.
func actuator(a *brief.Actuator, f *kin.Family) objective.Actuator {
	out := objective.Actuator{
		DeadLength: math.NaN(), DeadRatio: a.DeadRatio, Reserve: a.Reserve,
		Strokes: a.Strokes, Stiffness: a.Stiffness, Error: a.Error,
	}
	if a.DeadLength != nil && drawsIn(f) {
		out.DeadLength = *a.DeadLength
	}
	if f.Drive == kin.Rotary {
		out.Strokes = nil
		out.Reserve, out.Stiffness, out.Error = a.TurnReserve, a.TurnStiffness, a.TurnError
	}
	return out
}

// drawsIn tells whether the legs of a family change their length.
func drawsIn(f *kin.Family) bool { return f.Index("leg_min") >= 0 }

func axis(a *brief.Axis) kin.Axis {
	switch a.Kind {
	case "plate":
		return kin.Axis{Kind: kin.AxisPlate}
	case "vector":
		return kin.Axis{Kind: kin.AxisVector, Vec: vec(a.Vector)}
	}
	return kin.Axis{Kind: kin.AxisHomeLeg}
}

func zone(z *brief.Zone) objective.Zone {
	out := objective.Zone{Name: z.Name, Samples: z.Samples}
	for _, r := range z.Ranges {
		out.Low[r.Index], out.High[r.Index] = r.Low, r.High
	}
	switch z.Shape {
	case brief.Box:
		out.Kind = objective.Box
	case brief.Axes:
		out.Kind = objective.Axes
		out.Samples = max(2, z.Samples/max(1, z.Moving())) // shared over the coordinates that move
	case brief.Ellipsoid:
		out.Kind = objective.Ellipsoid
	case brief.Recorded:
		out.Kind = objective.Listed
		for _, p := range z.Poses {
			out.Poses = append(out.Poses, kin.Coords(p))
		}
	}
	return out
}

func loadCase(c *brief.Case, zones map[string]int) objective.Case {
	out := objective.Case{Name: c.Name, Linear: set(&c.Speeds.Linear), Angular: set(&c.Speeds.Angular)}
	for _, z := range c.Zones {
		out.Zones = append(out.Zones, zones[z])
	}
	for i := range c.Loads {
		l := &c.Loads[i]
		o := objective.Load{
			Name: l.Name, Mass: l.Mass, Centre: vec(l.Centre), Inertia: l.Inertia,
			Linear: set(&l.Acceleration.Linear), Angular: set(&l.Acceleration.Angular), AtTool: l.Acceleration.AtTool,
			Force: vec(l.Force), ForceSpread: vec(l.ForceSpread),
			Moment: vec(l.Moment), MomentSpread: vec(l.MomentSpread),
		}
		if l.At != nil {
			o.At, o.Off = vec(*l.At), true
		}
		out.Loads = append(out.Loads, o)
	}
	return out
}

func set(s *brief.Set) objective.Set {
	switch s.Kind {
	case brief.BallSet:
		return objective.Set{Kind: objective.AnyWay, Radius: s.Radius}
	case brief.BoxSet:
		return objective.Set{Kind: objective.PerAxis, Half: vec(s.Half)}
	}
	return objective.Set{}
}

func vec(a [3]float64) kin.Vec { return kin.Vec{X: a[0], Y: a[1], Z: a[2]} }
