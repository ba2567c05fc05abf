package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// keeps judges one pose by itself: range, singularity and limits from the joint centres and from
// measures of a task that holds this pose alone.
func keeps(t *testing.T, task *Task, f *kin.Family, d []float64, a *Appraisal, s *Sample, home float64) bool {
	t.Helper()
	frame := a.Machine.Frame()
	least, span := f.Range()
	for _, l := range staticsOf(frame, s.Coords).leng {
		if l < a.Values[least]+task.Actuator.Reserve-1e-9 || l > a.Values[least]+a.Values[span]-task.Actuator.Reserve+1e-9 {
			return false
		}
	}
	j := staticsOf(frame, s.Coords)
	if inverseKappa(t, j.scaledJacobian(task.Length)) < task.Singular || determinant(j)*home < 0 {
		return false
	}
	one := *task
	one.Limits, one.Goals, one.Coverage = nil, nil, 1
	one.Zones = []Zone{{Kind: Listed, Poses: []kin.Coords{s.Coords}}}
	one.Cases = nil
	for _, c := range task.Cases {
		if c.In(s.Zone) {
			c.Zones = nil
			one.Cases = append(one.Cases, c)
		}
	}
	one.Prepare()
	b := appraise(&one, f, d)
	for i := range task.Limits {
		l := &task.Limits[i]
		if l.Measure.Scan == nil || l.Measure.Mean {
			continue
		}
		if !l.Holds(task, value(t, b, l.Measure.Name)) {
			return false
		}
	}
	return true
}

// coverageTask has limits between what home and what the duty asks for, so that each may fail at some poses, and a range that is too short for some.
func coverageTask(t *testing.T, f *kin.Family) (*Task, *Plan, []float64) {
	rng := seeded(141)
	task := richTask(rng, f)
	task.Zones[0].Samples = 80
	task.Actuator.Stiffness = 0 // deflection is slow
	task.Prepare()
	d := soundDesign(f)
	first := appraise(task, f, d)
	alone := *task // home by itself, in every case
	alone.Zones, alone.Cases = []Zone{{Kind: Listed, Poses: []kin.Coords{{}}}}, append([]Case(nil), task.Cases...)
	for i := range alone.Cases {
		alone.Cases[i].Zones = nil
	}
	alone.Prepare()
	home := appraise(&alone, f, d)
	for _, name := range []string{"leg_force", "leg_speed", "base_swing", "conditioning", "leg_clearance", "position_error"} {
		m := measured(t, name)
		origin := "limits"
		if name == "base_swing" {
			origin = "joints.base_swing"
		}
		task.Limits = append(task.Limits, Limit{Measure: m, AtLeast: m.Sense == Larger, Bound: 0.3*value(t, home, name) + 0.7*value(t, first, name), Origin: origin})
	}
	least, span := f.Range()
	p := sizedPlan(task, f, d)
	p.Specs[least] = Spec{Kind: Fixed, Values: []float64{first.Values[least] + 0.03*first.Values[span]}}
	p.Specs[span] = Spec{Kind: Fixed, Values: []float64{first.Values[span] * 0.95}}
	p = NewPlan(task, f, p.Specs)
	return task, p, p.Single()
}

// determinant of the own inverse Jacobian, by its LU.
func determinant(s *statics) float64 {
	n := len(s.leng)
	det := 1.0
	a := make([][]float64, n)
	for i := range a {
		a[i] = append([]float64(nil), s.own.RawRowView(i)...)
	}
	for k := range n {
		best := k
		for i := k; i < n; i++ {
			if math.Abs(a[i][k]) > math.Abs(a[best][k]) {
				best = i
			}
		}
		if best != k {
			a[k], a[best] = a[best], a[k]
			det = -det
		}
		det *= a[k][k]
		for i := k + 1; i < n; i++ {
			r := a[i][k] / a[k][k]
			for j := k; j < n; j++ {
				a[i][j] -= r * a[k][j]
			}
		}
	}
	return det
}

// Coverage is the share of poses at which range, singularity and every limit on a measure that has a
// value per pose hold, each pose judged by itself. Exact counts; the pose table agrees row by row.
func TestCoverageByBruteForce(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		task, p, d := coverageTask(t, f)
		a := Appraise(task, p, d)
		home := determinant(staticsOf(a.Machine.Frame(), kin.Coords{}))
		good := 0
		kept := map[[2]int]bool{} // by zone and row
		for i := range task.samples {
			s := &task.samples[i]
			if keeps(t, task, f, d, a, s, home) {
				good++
				kept[[2]int{s.Zone, s.Row}] = true
			}
		}
		want := float64(good) / float64(len(task.samples))
		if want < 0.1 || want > 0.9 {
			t.Fatalf("a coverage of %g tests little", want)
		}
		near(t, "coverage", value(t, a, "coverage"), want, 0)
		why := map[string]int{}
		for _, r := range Poses(task, a) {
			why[r.Fails]++
			if (r.Fails == "") != kept[[2]int{r.Sample.Zone, r.Sample.Row}] {
				t.Errorf("pose %v fails %q", r.Sample.Coords, r.Fails)
			}
		}
		if len(why) < 4 {
			t.Errorf("few reasons: %v", why)
		}
		if a.Feasible {
			t.Error("feasible with poses that fail")
		}

		// as a goal, and as a share that is enough or not
		task.CoverageGoal, task.Coverage = true, 0
		soft := *task
		soft.Goals = []Goal{{Measure: measured(t, "coverage"), Maximise: true}}
		soft.Limits = nil
		for _, l := range task.Limits { // other limits stay hard
			if l.Origin != "limits" {
				soft.Limits = append(soft.Limits, l)
			}
		}
		b, r := Appraise(&soft, p, d), screened(&soft, p)
		share := value(t, b, "coverage")
		if !b.Feasible || r.Violation > 0 || r.Goals[0] != -share || share <= want {
			t.Errorf("as a goal: feasible %v, violation %g, goal %g, coverage %g", b.Feasible, r.Violation, r.Goals[0], share)
		}
		soft.CoverageGoal, soft.Goals = false, nil
		for _, c := range []struct {
			bound float64
			ok    bool
		}{{share, true}, {share - 0.01, true}, {share + 1e-6, false}, {1, false}} {
			soft.Coverage = c.bound
			if b, r := Appraise(&soft, p, d), screened(&soft, p); b.Feasible != c.ok || (r.Violation == 0) != c.ok {
				t.Errorf("coverage %g of at least %g: feasible %v, violation %g", share, c.bound, b.Feasible, r.Violation)
			}
		}
	})
}

// A platform that must turn through ±90° meets the singularity of C5 (Fichter 1986). The corners 80° and 100° are
// both regular; the determinant's sign tells, even where no pose is near it. At 60° nothing is wrong.
func TestSignChange(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	for _, c := range []struct {
		low, high float64
		singular  int
	}{{0, 60, 0}, {80, 100, 1}, {0, 180, 1}, {-100, 0, 1}, {100, 170, 2}} {
		task := atHome()
		task.Zones = []Zone{{Kind: Axes, Low: kin.Coords{5: c.low * deg}, High: kin.Coords{5: c.high * deg}, Samples: 2}}
		task.Goals = goalsOf([]*Measure{measured(t, "conditioning")})
		task.Prepare()
		d := exampleC5()
		p := sizedPlan(task, f, d)
		a, r := Appraise(task, p, d), screened(task, p)
		if ok := c.singular == 0; a.Feasible != ok || (r.Violation == 0) != ok {
			t.Errorf("yaw %g to %g: feasible %v, violation %g", c.low, c.high, a.Feasible, r.Violation)
		}
		near(t, "coverage", value(t, a, "coverage"), 1-float64(c.singular)/2, 0)
	}
}

// A home that is singular makes every pose so: similar hexagons (C5), a planar stage at heading 0 (C7).
func TestSingularHome(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		task := richTask(seeded(142), f)
		task.Goals = goalsOf([]*Measure{measured(t, "leg_force")})
		task.Prepare()
		d := soundDesign(f)
		if i := f.Index("home_heading"); i >= 0 {
			d[i] = 0
		} else {
			d[f.Index("base_half_angle")], d[f.Index("platform_half_angle")] = 20*deg, 40*deg
		}
		p := sizedPlan(task, f, d)
		a, r := Appraise(task, p, d), screened(task, p)
		if a.Feasible || !(r.Violation > 0) || value(t, a, "coverage") != 0 {
			t.Errorf("feasible %v, violation %g, coverage %g", a.Feasible, r.Violation, value(t, a, "coverage"))
		}
		if len(a.Notes) == 0 {
			t.Error("no note says that home is singular")
		}
		for _, e := range Excurse(task, a) {
			if e.Low != 0 || e.High != 0 || e.LowFails != "singular" || e.HighFails != "singular" {
				t.Errorf("excursion %+v from a singular home", e)
			}
		}
	})
}
