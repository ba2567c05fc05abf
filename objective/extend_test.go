package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// A 3-RPR machine with equilateral plates at heading h is singular on a circle of radius ρ = √(Ra² + Rb² - 2 Ra Rb cos h) about the
// centre (H6 of testdata/reference: J. Sefrioui and C. Gosselin 1995, Mech. Mach. Theory 30:533). A round zone about (ρ/2, 45°)
// whose radius is a little above ρ/2 reaches beyond it where no sample lies: the appraisal finds a singular pose and fails the design
// with it. One of a little less is regular.
func TestSingularPosesBetweenSamples(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := soundDesign(f)
	ra, rb, h := 0.4, 0.15, 1.0
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = ra, rb, h
	rho := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(h))
	for _, c := range []struct {
		half     float64
		singular bool
	}{{0.495 * rho, false}, {0.505 * rho, true}} {
		task := atHome()
		z := Zone{Name: "disc", Kind: Ellipsoid, Samples: 9}
		for _, q := range [2]kin.Freedom{kin.X, kin.Y} {
			z.Low[q], z.High[q] = rho/math.Sqrt(8)-c.half, rho/math.Sqrt(8)+c.half
		}
		task.Zones = []Zone{z}
		task.Prepare()
		for _, s := range task.samples {
			if math.Hypot(s.Coords[kin.X], s.Coords[kin.Y]) >= rho {
				t.Fatal("a sample lies beyond the circle; the test tests nothing")
			}
		}
		a := appraise(task, f, d)
		if a.Feasible == c.singular || (a.failed != nil) != c.singular {
			t.Fatalf("half %g of %g: feasible %v, %+v", c.half, rho, a.Feasible, a.Verdicts)
		}
		if c.singular {
			if r := math.Hypot(a.failed.Coords[kin.X], a.failed.Coords[kin.Y]); r < rho*(1-1e-6) {
				t.Errorf("the singular pose lies at %.9g, the circle at %.9g", r, rho)
			}
			if last := a.Verdicts[len(a.Verdicts)-1]; last.Name != "singular poses" || last.Holds {
				t.Errorf("verdict %+v", last)
			}
		}
	}
}

// Poses of files are all that is required of them: nothing is driven beyond, nor in a task in which poses may fail.
func TestWhatIsNotRefined(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(303)
		task := richTask(rng, f)
		task.Zones = []Zone{listed(rng, f, 1, 40)}
		task.Cases = task.Cases[:1]
		task.Prepare()
		soft := richTask(rng, f)
		soft.Cases, soft.Coverage = nil, 0.5
		soft.Prepare()
		for _, task := range []*Task{task, soft} {
			if NewScreen(task, sizedPlan(task, f, soundDesign(f))).Refines() {
				t.Fatal("something is to be refined")
			}
			a := appraise(task, f, soundDesign(f))
			for i := range a.Readings {
				if p := a.Readings[i].Pose; p != nil && p.Row < 0 {
					t.Errorf("%s is met at %v, which is no sample", a.Readings[i].Measure.Name, p.Coords)
				}
			}
		}
		r := NewRefiner(task, f)
		if !r.Begin(sizedPlan(task, f, soundDesign(f)).build(task, soundDesign(f))) {
			t.Skip("home is singular")
		}
		if e, ok := r.Worst(0, Property{Leg: 0, Most: true}); !ok || e.Refined {
			t.Errorf("%+v", e)
		}
	})
}

// Driving worst values on allocates nothing.
func TestRefiningAllocatesNothing(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := refinedTask(f, Ellipsoid, 1, 200, 1)
	task.Zones = append(task.Zones, ranged(f, Box, 1, 100), ranged(f, Axes, 1, 5))
	task.Prepare()
	d := soundDesign(f)
	m := sizedPlan(task, f, d).build(task, d)
	r := NewRefiner(task, f)
	if !r.Begin(m) {
		t.Fatal("home is singular")
	}
	for _, p := range []Property{{Leg: 1, Most: true}, {Measure: MeasureNamed("conditioning")}, {Measure: MeasureNamed("leg_force")}, {Measure: MeasureNamed("platform_swing")}} {
		for zone := range task.Zones {
			if n := testing.AllocsPerRun(3, func() { r.Worst(zone, p) }); n != 0 {
				t.Errorf("%s over zone %d: %g allocations", name(p), zone, n)
			}
		}
	}
}

// A refined value is met where it is said to be: the measure of a task whose only pose is that one is the same, 1e-9 relative.
func TestRefinedValuesAreMet(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := refinedTask(f, Ellipsoid, 1, 100, 5)
	a := appraise(task, f, soundDesign(f))
	refined := 0
	for i := range a.Readings {
		r := &a.Readings[i]
		if r.Pose == nil || r.Pose.Row >= 0 {
			continue
		}
		refined++
		one := *task
		one.Zones = []Zone{{Kind: Listed, Poses: []kin.Coords{r.Pose.Coords}}}
		one.Prepare()
		if v := value(t, appraise(&one, f, soundDesign(f)), r.Measure.Name); math.Abs(v-r.Value) > 1e-9*math.Abs(r.Value) {
			t.Errorf("%s: %.12g, at its pose alone %.12g", r.Measure.Name, r.Value, v)
		}
	}
	if refined < 5 {
		t.Errorf("%d values lie between the samples", refined)
	}
}
