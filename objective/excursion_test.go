package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// limited is a task with a limit of every kind, none of which fails at home.
func limited(t *testing.T, f *kin.Family) (*Task, *Appraisal, []float64) {
	task, p, d := coverageTask(t, f)
	a := Appraise(task, p, d)
	return task, a, d
}

// Excursions: a little inside all limits hold, a little outside one fails, each pose judged by itself with
// an independent statement (see keeps). The end is where bisection puts it: within 1e-9 of the range's unit.
func TestExcursionsByBisection(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		task, a, d := limited(t, f)
		home := determinant(staticsOf(a.Machine.Frame(), kin.Coords{}))
		all := *task // every case counts alone from home
		all.Cases = append([]Case(nil), task.Cases...)
		for i := range all.Cases {
			all.Cases[i].Zones = nil
		}
		holds := func(q kin.Freedom, x float64) bool {
			var c kin.Coords
			c[q] = x
			return keeps(t, &all, f, d, a, &Sample{Coords: c}, home)
		}
		es := Excurse(task, a)
		if len(es) != len(f.Freedoms) {
			t.Fatalf("%d excursions of %d freedoms", len(es), len(f.Freedoms))
		}
		reasons := map[string]bool{}
		for _, e := range es {
			if !holds(e.Freedom, 0) {
				t.Fatal("home itself fails")
			}
			for _, end := range [2]float64{e.Low, e.High} {
				if math.IsInf(end, 0) || end == 0 {
					t.Errorf("%s ends at %g", e.Freedom, end)
					continue
				}
				good, bad := 0.0, end*1.01
				for holds(e.Freedom, bad) {
					t.Errorf("%s: %g still holds, the excursion ends at %g", e.Freedom, bad, end)
					return
				}
				for range 45 {
					if mid := (good + bad) / 2; holds(e.Freedom, mid) {
						good = mid
					} else {
						bad = mid
					}
				}
				near(t, e.Freedom.String(), end, good, 1e-8)
			}
			if !(e.Low < 0 && e.High > 0) {
				t.Errorf("%s from %g to %g", e.Freedom, e.Low, e.High)
			}
			reasons[e.LowFails], reasons[e.HighFails] = true, true
		}
		if reasons[""] || len(reasons) < 2 {
			t.Errorf("reasons %v", reasons)
		}
	})
}

// Where the carriages stand below the points from which they are counted, an excursion ends where stepping by the pose
// limits ends it: the last step before holds, the first one after fails. With upright rails all carriages rise
// as the platform does, so that the way up and down is the range left over: 1e-9 m.
func TestExcursionsFromBelowTheRails(t *testing.T) {
	for _, f := range kin.Families() {
		if !f.Rails {
			continue
		}
		t.Run(f.Name, func(t *testing.T) {
			d := soundDesign(f)
			d[f.Index("mode")], d[f.Index("home_height")] = -1, 0.1
			if i := f.Index("rail_slope"); i >= 0 {
				d[i] = 90 * deg
			} else {
				d[f.Index("rail_slant")] = 0
			}
			task := atHome()
			z := Zone{Name: "work", Kind: Box, Samples: 40}
			z.Low[kin.X], z.High[kin.X], z.Low[kin.Z], z.High[kin.Z] = -0.02, 0.02, -0.03, 0.05
			task.Zones = []Zone{z}
			task.Prepare()
			a := appraise(task, f, d)
			for i := range a.Legs {
				if q := a.Legs[i].Home; q >= 0 {
					t.Fatalf("home coordinate %g is not below 0", q)
				}
			}
			const step = 1e-4
			for _, e := range Excurse(task, a) {
				for _, end := range [2]float64{e.Low, e.High} {
					if math.IsInf(end, 0) || end == 0 {
						t.Errorf("%s ends at %g", e.Freedom, end)
						continue
					}
					var poses []kin.Coords
					for k := range int(math.Abs(end)/step) + 2 {
						var c kin.Coords
						c[e.Freedom] = math.Copysign(float64(k)*step, end)
						poses = append(poses, c)
					}
					for k, s := range Standings(task, a, poses) {
						if last := k == len(poses)-1; (s.Fails != "") != last {
							t.Errorf("%s ends at %g, step to %g fails %q", e.Freedom, end, poses[k][e.Freedom], s.Fails)
							break
						}
					}
				}
				if e.Freedom == kin.Z {
					low, home := a.Values[a.Plan.least], a.Legs[0].Home
					near(t, "down", e.Low, low-home, 1e-9)
					near(t, "up", e.High, low+a.Values[a.Plan.span]-home, 1e-9)
				}
			}
		})
	}
}

// Without anything that could fail an excursion has no bound: a planar stage far wider than its
// singular circle (H6) is needed, so the singular test is off and no range is given. With H6's circle the
// excursion along x ends there, at √(Ra² + Rb² - 2 Ra Rb cos φ), 1e-9.
func TestUnboundedExcursion(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := soundDesign(f)
	ra, rb, phi := 0.5, 0.2, 50*deg
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = ra, rb, phi
	least, span := f.Range()
	d[least], d[span] = 0, 100
	task := atHome()
	task.Singular = 1e-9
	task.Prepare()
	p := fixedRange(task, f, d)
	es := Excurse(task, Appraise(task, p, d))
	radius := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(phi))
	near(t, "singular circle", es[0].High, radius, 1e-8)
	near(t, "singular circle", es[0].Low, -radius, 1e-8)
	if es[0].HighFails != "singular" {
		t.Errorf("fails %q", es[0].HighFails)
	}

	six := kin.FamilyNamed("6-UPS")
	d = soundDesign(six)
	least, span = six.Range()
	d[least], d[span] = 0, 1000
	p = fixedRange(task, six, d)
	z := Excurse(task, Appraise(task, p, d))[2]
	if !math.IsInf(z.High, 1) || z.HighFails != "" {
		t.Errorf("upwards to %g, fails %q", z.High, z.HighFails)
	}
	near(t, "downwards to where the plates meet", z.Low, -d[six.Index("home_height")], 1e-6)
}

// fixedRange leaves nothing to be sized.
func fixedRange(t *Task, f *kin.Family, d []float64) *Plan {
	p := sizedPlan(t, f, d)
	least, span := f.Range()
	p.Specs[least], p.Specs[span] = Spec{Kind: Fixed, Values: []float64{d[least]}}, Spec{Kind: Fixed, Values: []float64{d[span]}}
	return NewPlan(t, f, p.Specs)
}

// Where home itself fails no excursion is possible, and the reason is home's.
func TestExcursionFromABadHome(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := richTask(seeded(151), f)
	task.Limits = []Limit{{Measure: measured(t, "leg_clearance"), AtLeast: true, Bound: 9, Origin: "limits"}}
	task.Prepare()
	for _, e := range Excurse(task, appraise(task, f, soundDesign(f))) {
		if e.Low != 0 || e.High != 0 || e.LowFails != "leg_clearance" || e.HighFails != "leg_clearance" {
			t.Errorf("%+v", e)
		}
	}
}

// Poses come by zone and in the order of generation or of the file, whatever order they are walked in.
func TestOrderOfPoses(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(152)
		task := richTask(rng, f)
		task.Prepare()
		a := appraise(task, f, soundDesign(f))
		var want []Sample
		for i := range task.Zones {
			want = append(want, sampleZone(&task.Zones[i], i)...)
		}
		rows := Poses(task, a)
		if len(rows) != len(want) {
			t.Fatalf("%d rows of %d poses", len(rows), len(want))
		}
		for i, r := range rows {
			if *r.Sample != want[i] {
				t.Fatalf("row %d is %v, want %v", i, r.Sample, want[i])
			}
		}
		// a row tells the worst of its pose: over all rows they are the measures
		worst := map[string]float64{"conditioning": math.Inf(1), "leg_clearance": math.Inf(1)}
		for _, r := range rows {
			for i := range f.Legs {
				worst["leg_force"] = math.Max(worst["leg_force"], r.Effort[i])
				worst["leg_speed"] = math.Max(worst["leg_speed"], r.Rate[i])
				worst["base_swing"] = math.Max(worst["base_swing"], r.BaseSwing[i])
				worst["platform_swing"] = math.Max(worst["platform_swing"], r.PlatformSwing[i])
			}
			worst["leg_clearance"] = math.Min(worst["leg_clearance"], r.Clearance)
			worst["conditioning"] = math.Min(worst["conditioning"], r.Conditioning)
		}
		sampled := appraise(pinned(task), f, soundDesign(f))
		for name, w := range worst {
			near(t, name, w, value(t, sampled, name), 0)
		}
	})
}
