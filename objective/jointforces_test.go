package objective

import (
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// loadedTask has masses, forces and moments with both kinds of sets, over a box.
func loadedTask(seed uint64, f *kin.Family) *Task {
	rng := seeded(seed)
	t := richTask(rng, f)
	t.Zones = []Zone{ranged(f, Box, 0.6, 80)}
	t.Cases = []Case{
		{Name: "axes", Loads: randomLoads(rng, perAxis)},
		{Name: "ways", Loads: randomLoads(rng, anyWay)},
	}
	t.Prepare()
	return t
}

// alone tells whether the family's joints alone carry the whole wrench: those of planar machines share
// it with guides, and of the palletising arm there are only sections.
func alone(f *kin.Family) bool { return legged(f) && (f.Has(kin.Z) || f.Has(kin.Roll)) }

// resultant adds force, and moment about the point o, of a load at the point p.
func resultant(sum *[6]float64, load [6]float64, p, o kin.Vec) {
	f := kin.Vec{X: load[0], Y: load[1], Z: load[2]}
	m := crossed(sub(p, o), f)
	for k, x := range [6]float64{f.X, f.Y, f.Z, m.X + load[3], m.Y + load[4], m.Z + load[5]} {
		sum[k] += x
	}
}

// centres are the points at which the joints' loads act, by the posture that Move gives and nothing of the statics.
func centres(t *testing.T, a *Appraisal, joints []JointLoad, s *Sample) (at []kin.Vec, origin kin.Vec) {
	var st kin.State
	p := kin.Settle(a.Machine, &s.Pose)
	a.Machine.Move(&p, &st)
	fr, mounts := a.Machine.Frame(), kin.Mountings(a.Machine)
	origin, rot := a.Machine.Place(&p)
	if a.Plan.Family.Free > 0 {
		rot = kin.Identity() // the platform does not turn with the tool
	}
	for _, j := range joints {
		switch {
		case j.Leg < 0 || j.Part == "shaft":
			at = append(at, kin.Vec{})
		case j.Plate == "platform":
			x := add(origin, rot.Apply(fr.Platform[j.Leg]))
			switch j.Part {
			case "rod a":
				x = add(x, mounts[j.Leg].Side)
			case "rod b":
				x = sub(x, mounts[j.Leg].Side)
			}
			at = append(at, x)
		case j.Part == "carriage":
			at = append(at, st.End[j.Leg])
		default:
			at = append(at, fr.Base[j.Leg])
		}
	}
	return at, origin
}

// The concurrent joint forces of a case add up to its wrench on the platform, and to the opposite on the base, where
// the legs alone carry it: about the tool point, and about the base origin by the whole base's row. The
// tool of a delta with a shaft takes its moment about z by the shaft. 1e-9 of the largest force.
func TestJointForcesAddUp(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		if !alone(f) {
			t.Skip("joints and guides share the wrench")
		}
		task := loadedTask(501, f)
		a := appraise(task, f, soundDesign(f))
		for _, c := range JointForces(task, a) {
			if c.Decides < 0 || math.IsInf(c.worst, 0) {
				t.Fatalf("case %d: no joint decides", c.Case)
			}
			s := c.Joints[c.Decides].At
			at, _ := centres(t, a, c.Joints, s)
			var platform, base [6]float64
			for i, j := range c.Joints {
				switch {
				case j.Part == "whole base":
				case j.Plate == "platform":
					resultant(&platform, c.Together[i], at[i], c.Tool)
				default:
					resultant(&base, c.Together[i], at[i], kin.Vec{})
				}
			}
			whole := c.Together[len(c.Together)-1]
			var want [6]float64
			resultant(&want, c.Wrench, c.Tool, kin.Vec{})
			tol := 1e-9 * math.Max(1, c.worst)
			for k := range 6 {
				near(t, "sum on the base", base[k], whole[k], tol)
				near(t, "whole base", whole[k], -want[k], tol)
				if f.Free > 0 && k == 5 {
					continue
				}
				near(t, "sum on the platform", platform[k], c.Wrench[k], tol)
			}
		}
	})
}

// The wrench itself is one that the case may ask for: the actuators' efforts under it, by the matrix of the
// principle of virtual work, lie within those that the appraisal found for each leg, and the largest joint force
// of a prismatic leg is its largest push or pull. 1e-9 relative.
func TestJointForcesAgreeWithEfforts(t *testing.T) {
	for _, name := range []string{"6-UPS", "3-RPR", "3-RPS"} {
		t.Run(name, func(t *testing.T) {
			f := kin.FamilyNamed(name)
			task := loadedTask(502, f)
			task.Cases = task.Cases[1:]
			a := appraise(task, f, soundDesign(f))
			c := JointForces(task, a)[0]
			for i := range a.Legs {
				effort := math.Max(a.Legs[i].Push, a.Legs[i].Pull)
				j := c.Joints[i]
				if name == "3-RPS" { // the leg's own part of it is the effort
					if j.Largest < effort*(1-1e-9) {
						t.Errorf("leg %d: joint force %g below the effort %g", i+1, j.Largest, effort)
					}
					continue
				}
				near(t, "largest joint force", j.Largest, effort, 1e-9*effort)
			}
		})
	}
}

// The torque of a crank is the moment about its hinge that its pivot feels, and the force of a carriage's drive is
// the joint's force along the rail: for every leg in the moment that is shown. 1e-9 relative.
func TestPivotsFeelTheTorque(t *testing.T) {
	for _, name := range []string{"6-RUS", "6-PUS", "delta", "linear-delta", "3-RRR", "five-bar"} {
		t.Run(name, func(t *testing.T) {
			f := kin.FamilyNamed(name)
			task := loadedTask(503, f)
			a := appraise(task, f, soundDesign(f))
			fr, mounts := a.Machine.Frame(), kin.Mountings(a.Machine)
			for _, c := range JointForces(task, a) {
				s := c.Joints[c.Decides].At
				v := newView(task)
				v.serve(f)
				v.begin(a.Machine)
				v.keep = 0
				if !v.at(s, 0, NeedMatrix) {
					t.Fatal("pose is lost")
				}
				for i := range fr.Legs() {
					effort := 0.0
					for q := range 6 {
						w := c.Wrench[q]
						if q > 2 {
							w /= fr.Length
						}
						effort += v.x[6*q+i] * w
					}
					l := c.Together[i]
					felt := -(l[3]*mounts[i].Hinge.X + l[4]*mounts[i].Hinge.Y + l[5]*mounts[i].Hinge.Z)
					if fr.Rails != nil {
						felt = -(l[0]*fr.Rails[i].X + l[1]*fr.Rails[i].Y + l[2]*fr.Rails[i].Z)
					}
					near(t, "effort", felt, effort, 1e-9*math.Max(1, math.Abs(effort)))
				}
			}
		})
	}
}

// Random wrenches of the sets stay within the extremes of every joint, and no force is larger than the
// largest. Where a joint's force has one direction this is exact; where it has more, a force found by climbing
// is not beaten by 600 random corners either.
func TestNoForceBeyondTheLargest(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task := loadedTask(504, f)
		a := appraise(task, f, soundDesign(f))
		loads := JointForces(task, a)
		rng := seeded(505)
		v := newView(task)
		v.serve(f)
		v.begin(a.Machine)
		s := newEquilibrium(f, a.Machine)
		for range 600 {
			p := &task.samples[rng.IntN(len(task.samples))]
			v.keep = 0
			if !v.at(p, 0, NeedMatrix) || !s.at(v) {
				t.Fatal("pose is lost")
			}
			for c := range task.Cases {
				var w spread
				w.at(&v.demands[c], v.stand, task.Gravity, v.invLc)
				var row [6]float64
				for q := range row {
					row[q] = between(rng, -1, 1)
				}
				x := w.attain(&row)
				if lo, hi := w.extremes(&row); math.Abs(dot6(&row, &x)-hi) > 1e-9*math.Max(math.Abs(lo), math.Abs(hi)) {
					t.Fatalf("attains %g of [%g, %g]", dot6(&row, &x), lo, hi)
				}
				for i := range s.out {
					j, r := &loads[c].Joints[i], s.out[i].of(&x)
					for k := range 6 {
						if k > 2 && !j.Moments {
							break
						}
						slack := 1e-9 * math.Max(1, math.Max(math.Abs(j.Least[k]), math.Abs(j.Most[k])))
						if r[k] < j.Least[k]-slack || r[k] > j.Most[k]+slack {
							t.Fatalf("%s %s %d: component %d is %g, outside [%g, %g]", j.Plate, j.Part, j.Leg, k, r[k], j.Least[k], j.Most[k])
						}
					}
					if n := math.Sqrt(r[0]*r[0] + r[1]*r[1] + r[2]*r[2]); n > j.Largest*(1+1e-9) {
						t.Fatalf("%s %s %d: force %g beyond the largest, %g", j.Plate, j.Part, j.Leg, n, j.Largest)
					}
				}
			}
		}
	})
}

// A weight of W on the axis of C5's level platform: every joint carries W/6 along z (check W1's closed form
// over six equal legs), up on the platform and down on the base. 1e-9 N.
func TestJointForcesUnderAWeight(t *testing.T) {
	task, weight, _, _ := exampleTask(t)
	f := kin.FamilyNamed("6-UPS")
	task.Zones = []Zone{{Kind: Listed, Poses: []kin.Coords{{}}}}
	task.Cases = []Case{{Loads: []Load{{Mass: 1000 / Gravity, Centre: kin.Vec{Z: 0.7}}}}}
	task.Prepare()
	a := appraise(task, f, exampleC5())
	c := JointForces(task, a)[0]
	for _, j := range c.Joints[:12] {
		want := -1000.0 / 6
		if j.Plate == "platform" {
			want = 1000.0 / 6
		}
		near(t, "z of a joint", j.Least[2], want, 1e-9)
		near(t, "z of a joint", j.Most[2], want, 1e-9)
		near(t, "resultant", j.Largest, weight, 1e-9)
	}
	near(t, "whole base", c.Joints[12].Most[2], -1000, 1e-9)
}

// A soft task leaves out the poses that do not count, and a case the zones in which it does not occur.
func TestJointForcesOverWhatCounts(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := loadedTask(506, f)
	task.Zones = append(task.Zones, ranged(f, Box, 1.2, 80))
	task.Cases[1].Zones = []int{0}
	task.Coverage = 0.5
	task.Prepare()
	d := soundDesign(f)
	a := appraise(task, f, d)
	loads := JointForces(task, a)
	for _, j := range loads[1].Joints {
		if j.At.Zone != 0 {
			t.Errorf("case 2 decided in zone %d", j.At.Zone)
		}
	}
	if !slices.ContainsFunc(loads[0].Joints, func(j JointLoad) bool { return j.At.Zone == 1 }) {
		t.Error("no joint of case 1 is decided in the larger zone")
	}
	task.Limits = []Limit{{Measure: MeasureNamed("leg_force"), Bound: loads[0].worst * 0.8, Origin: "limits"}}
	b := appraise(task, f, d)
	for _, c := range JointForces(task, b) {
		if c.worst > 0.8*loads[0].worst*(1+1e-9) {
			t.Errorf("case %d: %g at a pose that does not count", c.Case, c.worst)
		}
	}
}
