package objective

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"
)

// sameReadings compares all readings of two appraisals relatively; factor says how a measure changes.
func sameReadings(t *testing.T, a, b *Appraisal, tol float64, factor func(name string) float64) {
	t.Helper()
	if len(a.Readings) != len(b.Readings) {
		t.Fatalf("%d and %d readings", len(a.Readings), len(b.Readings))
	}
	for i := range a.Readings {
		name := a.Readings[i].Measure.Name
		k := factor(name)
		if math.IsNaN(k) {
			continue
		}
		if x, y := k*a.Readings[i].Value, b.Readings[i].Value; !same(x, y, tol) {
			t.Errorf("%s = %.17g, want %.17g", name, y, x)
		}
	}
}

func unchanged(string) float64 { return 1 }

// listedTask is a task of pose lists, with all kinds of loads.
func listedTask(rng *rand.Rand, f *kin.Family, set func(*rand.Rand, float64) Set) *Task {
	task := richTask(rng, f)
	task.Zones = []Zone{listed(rng, f, 1, 40), listed(rng, f, 1.2, 10)}
	task.Cases = []Case{
		{Name: "all", Loads: randomLoads(rng, set), Linear: set(rng, 0.4), Angular: set(rng, 0.5)},
		{Name: "one", Loads: randomLoads(rng, set)[:1], Linear: set(rng, 0.4), Angular: set(rng, 0.5), Zones: []int{1}},
	}
	return task
}

// The order of the rows of a pose file changes no measure and no leg: bit by bit, averages included.
func TestOrderOfRows(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(41)
		for range 5 {
			task := listedTask(rng, f, anyWay)
			task.Prepare()
			d := randomDesign(rng, f)
			a := appraise(task, f, d)
			other := *task
			other.Zones = append([]Zone(nil), task.Zones...)
			ps := append([]kin.Coords(nil), task.Zones[0].Poses...)
			rng.Shuffle(len(ps), func(i, j int) { ps[i], ps[j] = ps[j], ps[i] })
			other.Zones[0].Poses = ps
			other.Prepare()
			b := appraise(&other, f, d)
			sameReadings(t, a, b, 0, unchanged)
			for i := range a.Legs {
				x, y := a.Legs[i], b.Legs[i]
				x.LeastAt, x.MostAt, y.LeastAt, y.MostAt = nil, nil, nil, nil
				if x != y {
					t.Errorf("leg %d: %v and %v", i+1, x, y)
				}
			}
			for i := range a.Readings {
				if p, q := a.Readings[i].Pose, b.Readings[i].Pose; p != nil && p.Coords != q.Coords {
					t.Errorf("%s: worst at %v and %v", a.Readings[i].Measure.Name, p.Coords, q.Coords)
				}
			}
		}
	})
}

// turnAll turns everything that is fixed to the base: joints and home, gravity, forces, sets, poses.
func turnAll(q kin.Rot, task *Task, j *kin.Joints) (*Task, *kin.Joints) {
	back := kin.Rot{q[0], q[3], q[6], q[1], q[4], q[7], q[2], q[5], q[8]}
	out := *task
	out.Gravity = q.Apply(task.Gravity)
	out.Zones = append([]Zone(nil), task.Zones...)
	for i := range out.Zones {
		z := &out.Zones[i]
		ps := make([]kin.Coords, len(z.Poses))
		for k, c := range z.Poses {
			p := kin.NewPose(c)
			r := q.Mul(&p.R)
			ps[k] = kin.Pose{P: q.Apply(p.P), R: r.Mul(&back)}.Coords()
		}
		z.Poses = ps
	}
	// half ranges of axis-parallel boxes, turned by a rotation that exchanges axes
	half := func(v kin.Vec) kin.Vec {
		v = q.Apply(v)
		return kin.Vec{X: math.Abs(v.X), Y: math.Abs(v.Y), Z: math.Abs(v.Z)}
	}
	set := func(s Set) Set { s.Half = half(s.Half); return s }
	out.Cases = append([]Case(nil), task.Cases...)
	for i := range out.Cases {
		c := &out.Cases[i]
		c.Linear, c.Angular = set(c.Linear), set(c.Angular)
		c.Loads = append([]Load(nil), c.Loads...)
		for k := range c.Loads {
			l := &c.Loads[k]
			l.Linear, l.Angular = set(l.Linear), set(l.Angular)
			l.Force, l.Moment = q.Apply(l.Force), q.Apply(l.Moment)
			l.ForceSpread, l.MomentSpread = half(l.ForceSpread), half(l.MomentSpread)
		}
	}
	g := &kin.Joints{Platform: j.Platform, Home: q.Apply(j.Home), HomeRot: q.Mul(&j.HomeRot)}
	for _, a := range j.Base {
		g.Base = append(g.Base, q.Apply(a))
	}
	return &out, g
}

// jointsOf gives the joint centres of a design.
func jointsOf(task *Task, f *kin.Family, d []float64) *kin.Joints {
	m := sizedPlan(task, f, d).build(task, d).Frame()
	return &kin.Joints{Base: m.Base, Platform: m.Platform, Home: m.Home, HomeRot: m.HomeRot}
}

// Turning base, gravity, loads and duty together changes nothing but what is measured in plan or
// along z. Quarter turns exchange the axes of boxes; other turns need sets that are the same
// every way. Relative 1e-9: poses go through their angles.
func TestTurningEverything(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(42)
		for range 5 {
			boxes, balls := listedTask(rng, f, perAxis), listedTask(rng, f, anyWay)
			for _, c := range balls.Cases { // the spreads of forces are boxes
				for i := range c.Loads {
					c.Loads[i].ForceSpread, c.Loads[i].MomentSpread = kin.Vec{}, kin.Vec{}
				}
			}
			w := kin.Vec{Z: between(rng, -3, 3)}
			quarter := kin.Exp(kin.Vec{Z: math.Pi / 2})
			if f.Has(kin.Roll) {
				w = within(rng, 1.5)
				quarter = kin.Rot{0, 0, 1, 1, 0, 0, 0, 1, 0} // x to y to z to x
			}
			plan := func(name string) float64 {
				if name == "home_height" || name == "footprint" && f.Has(kin.Roll) {
					return math.NaN()
				}
				return 1
			}
			for _, c := range []struct {
				task *Task
				q    kin.Rot
			}{{boxes, quarter}, {balls, kin.Exp(w)}} {
				j := jointsOf(c.task, f, randomDesign(rng, f))
				turned, g := turnAll(c.q, c.task, j)
				c.task.Prepare()
				turned.Prepare()
				sameReadings(t, appraiseJoints(c.task, f, j), appraiseJoints(turned, f, g), 1e-9, plan)
			}
		}
	})
}

// Legs in another order give the same values. Relative 1e-11, for the conditioning of the algebra.
func TestRenumberingLegs(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(43)
		for range 5 {
			task := listedTask(rng, f, perAxis)
			task.Prepare()
			j := jointsOf(task, f, randomDesign(rng, f))
			g := &kin.Joints{Home: j.Home, HomeRot: j.HomeRot}
			for _, i := range rng.Perm(f.Legs) {
				g.Base, g.Platform = append(g.Base, j.Base[i]), append(g.Platform, j.Platform[i])
			}
			sameReadings(t, appraiseJoints(task, f, j), appraiseJoints(task, f, g), 1e-11, unchanged)
		}
	})
}

// A machine k times as large under forces of the same size, moments k times as large: dimensional
// analysis (computed by hand) says how each measure changes. Relative 1e-11.
func TestScalingLengths(t *testing.T) {
	const k = 1.7
	powers := map[string]float64{
		"coverage": 0, "conditioning": 0, "mean_conditioning": 0, "regularity": 0,
		"leg_force": 0, "push_force": 0, "pull_force": 0, "base_swing": 0, "platform_swing": 0, "angle_error": 0,
		"leg_speed": 1, "leg_power": 1, "position_error": 1, "leg_clearance": 1, "joint_spacing": 1,
		"footprint": 1, "mode_separation": 1, "stroke": 1, "leg_min": 1, "leg_max": 1, "home_height": 1, "buckling_margin": 1,
		"stiffness": 0, "deflection": 0, "turn_stiffness": 2,
	}
	long := func(v kin.Vec) kin.Vec { return kin.Vec{X: k * v.X, Y: k * v.Y, Z: k * v.Z} }
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(44)
		for range 5 {
			task := listedTask(rng, f, perAxis)
			j := jointsOf(task, f, randomDesign(rng, f))
			big := *task
			big.Tool, big.Length = long(task.Tool), k*task.Length
			big.Actuator.Reserve, big.Actuator.Error = k*task.Actuator.Reserve, k*task.Actuator.Error
			big.Legs.Diameter, big.Legs.RodDiameter, big.Legs.Modulus = k*task.Legs.Diameter, k*task.Legs.RodDiameter, task.Legs.Modulus/k
			big.Zones = append([]Zone(nil), task.Zones...)
			for i := range big.Zones {
				var ps []kin.Coords
				for _, c := range task.Zones[i].Poses {
					ps = append(ps, kin.Coords{k * c[0], k * c[1], k * c[2], c[3], c[4], c[5]})
				}
				big.Zones[i].Poses = ps
			}
			big.Cases = append([]Case(nil), task.Cases...)
			for i := range big.Cases {
				c := &big.Cases[i]
				c.Linear = scaled(c.Linear, k)
				c.Loads = append([]Load(nil), c.Loads...)
				for n := range c.Loads {
					l := &c.Loads[n]
					l.Centre, l.At, l.Moment, l.MomentSpread = long(l.Centre), long(l.At), long(l.Moment), long(l.MomentSpread)
					l.Angular = scaled(l.Angular, 1/k)
					for q := range l.Inertia {
						l.Inertia[q] *= k * k
					}
				}
			}
			g := &kin.Joints{Home: long(j.Home), HomeRot: j.HomeRot}
			for i := range j.Base {
				g.Base, g.Platform = append(g.Base, long(j.Base[i])), append(g.Platform, long(j.Platform[i]))
			}
			task.Prepare()
			big.Prepare()
			sameReadings(t, appraiseJoints(task, f, j), appraiseJoints(&big, f, g), 1e-11, func(name string) float64 {
				p, ok := powers[name]
				if !ok {
					t.Fatalf("%s: unknown power of length", name)
				}
				return math.Pow(k, p)
			})
		}
	})
}
