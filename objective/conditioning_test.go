package objective

import (
	"math"
	"strconv"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// scaledJacobian is the inverse Jacobian about the tool with its angular columns over Lc.
func (s *statics) scaledJacobian(length float64) *mat.Dense {
	j := mat.DenseCopyOf(s.own)
	for k, q := range s.f.Freedoms {
		if q.Angular() {
			for i := range s.leng {
				j.Set(i, k, j.At(i, k)/length)
			}
		}
	}
	return j
}

// inverseKappa is σmin/σmax by gonum.
func inverseKappa(t testing.TB, a mat.Matrix) float64 {
	var svd mat.SVD
	if !svd.Factorize(a, mat.SVDNone) {
		t.Fatal("no singular values")
	}
	v := svd.Values(nil)
	return v[len(v)-1] / v[0]
}

// Conditioning and its mean by gonum's SVD of a Jacobian from the joint centres. 1e-9 relative, down to 1/kappa = 1e-6.
func TestConditioningBySVD(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(101)
		least := 1.0
		check := func(task *Task, d []float64) {
			task.Prepare()
			a := appraise(task, f, d)
			worst, sum := math.Inf(1), 0.0
			for _, c := range task.Zones[0].Poses {
				k := inverseKappa(t, staticsOf(a.Machine.Frame(), c).scaledJacobian(task.Length))
				worst = math.Min(worst, k)
				sum += k
			}
			least = math.Min(least, worst)
			if got := value(t, a, "conditioning"); !same(got, worst, 1e-9) {
				t.Errorf("conditioning %.15g, want %.15g", got, worst)
			}
			mean := sum / float64(len(task.Zones[0].Poses))
			if got := value(t, a, "mean_conditioning"); !same(got, mean, 1e-9) {
				t.Errorf("mean_conditioning %.15g, want %.15g", got, mean)
			}
		}
		for range 10 {
			task := richTask(rng, f)
			task.Zones, task.Cases = []Zone{listed(rng, f, 1, 10)}, nil
			check(task, randomDesign(rng, f))
		}
		// ever nearer to a singular machine: similar hexagons (C5), or a planar stage at heading 0 (C7)
		for e := 1.0; e > 2e-7; e /= 3 {
			task := richTask(rng, f)
			task.Zones, task.Cases = []Zone{{Kind: Listed, Poses: []kin.Coords{{}}}}, nil
			d := soundDesign(f)
			if i := f.Index("home_heading"); i >= 0 {
				d[i] = 2 * e
			} else {
				d[f.Index("base_half_angle")] = 30*deg - 8*e*deg
				d[f.Index("platform_half_angle")] = 30*deg - 12*e*deg
			}
			check(task, d)
		}
		if least > 2e-6 {
			t.Errorf("1/kappa came down to %g only", least)
		}
	})
}

// C1, W6 (Merlet 2006 for the objection): the cubic platform of edge L has the raw condition number
// √(max(2, 2L²)/min(2, L²/2)), which depends on the unit; with Lc = kL for k in [1/2, 1] it is 2. 1e-9
// relative for the fast method (linalg.Six), whose iteration stops early at double singular values; 1e-12 for regularity.
func TestConditioningOfTheCubicPlatform(t *testing.T) {
	var w6 struct {
		Expected struct{ Values map[string]float64 }
	}
	readCheck(t, "W_workspace_loads.json", "W6", &w6)
	f := kin.FamilyNamed("6-UPS")
	j := cubic(t)
	at := func(edge, length float64) *Appraisal {
		g := &kin.Joints{HomeRot: kin.Identity()}
		for i := range j.Base {
			g.Base = append(g.Base, kin.Vec{X: edge * j.Base[i].X, Y: edge * j.Base[i].Y, Z: edge * j.Base[i].Z})
			g.Platform = append(g.Platform, kin.Vec{X: edge * j.Platform[i].X, Y: edge * j.Platform[i].Y, Z: edge * j.Platform[i].Z})
		}
		task := atHome()
		task.Length = length
		task.Prepare()
		return appraiseJoints(task, f, g)
	}
	if len(w6.Expected.Values) != 5 {
		t.Fatalf("%d check values", len(w6.Expected.Values))
	}
	for edge, kappa := range w6.Expected.Values {
		l, err := strconv.ParseFloat(edge, 64)
		if err != nil {
			t.Fatal(err)
		}
		a := at(l, 1)
		if got := value(t, a, "conditioning"); !same(got, 1/kappa, 1e-9) {
			t.Errorf("edge %s: %.15g, want %.15g", edge, got, 1/kappa)
		}
		if got := value(t, a, "regularity"); !same(got, 1/kappa, 1e-12) {
			t.Errorf("edge %s: regularity %.15g, want %.15g", edge, got, 1/kappa)
		}
		for _, k := range []float64{0.5, 0.7, 1} {
			near(t, "conditioning in units of the edge", value(t, at(l, k*l), "conditioning"), 0.5, 1e-9)
		}
	}
}

// C3 (Pittens and Podhorodeski 1993): legs at 45° and Lc their lines' distance ρ from the axis give the
// best condition number of threefold symmetric platforms, √2, about the stiffness centre; any other Lc or height a worse one.
// 1e-9 (linalg.Six at double singular values); regularity by the readable method 1e-12.
func TestBestThreefoldPlatform(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	rng := seeded(103)
	for range 20 {
		ra, rb := between(rng, 0.4, 1.2), between(rng, 0.2, 0.8)
		alpha, beta := between(rng, 4*deg, 26*deg), between(rng, 4*deg, 26*deg)
		gap := 60*deg - alpha - beta // from a base joint's azimuth to its platform joint's
		plan := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(gap))
		rho := ra * rb * math.Sin(gap) / plan
		foot := (ra*ra - ra*rb*math.Cos(gap)) / (plan * plan) // of the axis on the leg line, as a part of the way up
		kappa := func(height, length float64) float64 {
			task := atHome()
			task.Length, task.Tool.Z = length, (foot-1)*height
			task.Prepare()
			a := appraise(task, f, []float64{ra, rb, alpha, beta, height, 0, 0})
			if r := value(t, a, "regularity"); length == rho && height == plan {
				near(t, "regularity", r, math.Sqrt2/2, 1e-12)
			}
			return 1 / value(t, a, "conditioning")
		}
		near(t, "condition number", kappa(plan, rho), math.Sqrt2, 1e-9)
		if k := kappa(plan*between(rng, 1.01, 1.5), rho); k <= math.Sqrt2 {
			t.Errorf("a steeper platform has the condition number %g", k)
		}
		if k := kappa(plan, rho*between(rng, 0.5, 0.99)); k <= math.Sqrt2 {
			t.Errorf("another characteristic length gives the condition number %g", k)
		}
	}
}

// C8 (Chablat, Wenger, Caro and Angeles 2002): a planar stage with legs tangential to the platform's circle, cos φ = Rb/Ra, has conditioning
// 1 with Lc = √2 Rb. Its 6×6 wrenches (Joshi and Tsai 2002) have the singular values √(3/2) of the legs and 1 of the
// constraints: regularity √(2/3). 1e-12.
func TestIsotropicStage(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := soundDesign(f)
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = 2, 1, 60*deg
	task := atHome()
	task.Length = math.Sqrt2
	task.Prepare()
	a := appraise(task, f, d)
	near(t, "conditioning", value(t, a, "conditioning"), 1, 1e-12)
	near(t, "regularity", value(t, a, "regularity"), math.Sqrt(2.0/3), 1e-12)
}

// Regularity is conditioning for six prismatic legs (1e-12 relative), whatever Lc; for a planar
// stage it is σmin/σmax of the own Jacobian with three unit constraints beside it, by gonum.
func TestRegularity(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(104)
		for range 20 {
			c := randomCoords(rng, f, 1)
			task := richTask(rng, f)
			task.Length = between(rng, 0.1, 2)
			task.Zones, task.Cases = []Zone{{Kind: Listed, Poses: []kin.Coords{c}}}, nil
			task.Prepare()
			a := appraise(task, f, randomDesign(rng, f))
			n := f.Legs
			six := mat.NewDense(6, 6, nil)
			six.Slice(0, n, 0, n).(*mat.Dense).Copy(staticsOf(a.Machine.Frame(), c).scaledJacobian(task.Length))
			for i := n; i < 6; i++ {
				six.Set(i, i, 1)
			}
			want := inverseKappa(t, six)
			if got := value(t, a, "regularity"); !same(got, want, 1e-10) {
				t.Errorf("regularity %.15g, want %.15g", got, want)
			}
			if k := value(t, a, "conditioning"); n == 6 && !same(k, want, 1e-10) {
				t.Errorf("regularity %.15g, conditioning %.15g", want, k)
			}
		}
	})
}

// The rules for the characteristic length: given, of the platform, largest speeds of any case, else largest ranges, else 1 m. 1e-15.
func TestCharacteristicLength(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	box := Zone{Kind: Box, Low: kin.Coords{2: -0.1, 5: -0.5}, High: kin.Coords{2: 0.3, 5: 0.2}, Samples: 10}
	fast := Case{Linear: Set{Kind: PerAxis, Half: kin.Vec{X: 0.2, Y: 0.6}}, Angular: Set{Kind: AnyWay, Radius: 0.1}}
	turning := Case{Linear: Set{Kind: AnyWay, Radius: 0.3}, Angular: Set{Kind: PerAxis, Half: kin.Vec{Z: 0.4}}}
	for _, c := range []struct {
		what string
		task Task
		want float64
	}{
		{"given", Task{Rule: LengthGiven, Length: 0.37, Cases: []Case{fast}}, 0.37},
		{"platform", Task{Rule: LengthOfPlatform, Length: 0.37}, 0.44},
		{"speeds of any case", Task{Cases: []Case{fast, turning}}, 0.6 / 0.4},
		{"ranges", Task{Cases: []Case{{Linear: turning.Linear}}}, 0.3 / 0.5},
	} {
		c.task.Zones = []Zone{box}
		c.task.Prepare()
		d := soundDesign(f)
		d[f.Index("platform_radius")] = 0.44
		near(t, c.what, sizedPlan(&c.task, f, d).build(&c.task, d).Frame().Length, c.want, 1e-15)
	}
	shift := Task{Zones: []Zone{{Kind: Box, High: kin.Coords{0.1}, Samples: 3}}}
	shift.Prepare()
	near(t, "no turn", shift.Length, 1, 0)
}
