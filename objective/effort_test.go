package objective

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// exampleTask has the platform C5 with its tool at the stiffness centre of check W1.
func exampleTask(t *testing.T) (task *Task, weight, turn float64, lateral []float64) {
	var w struct {
		Data struct {
			Centre float64 `json:"stiffness_centre_height_above_platform"`
		}
		Expected struct {
			Weight  float64   `json:"vertical W=1000 on the axis: every leg carries W/(6 sin gamma)"`
			Turn    float64   `json:"moment Mz=100: +-Mz/(6 rho cos gamma)"`
			Lateral []float64 `json:"lateral Fx=300 through the stiffness centre: f_i = s_ix Fx/(3 cos^2 gamma)"`
		}
	}
	readCheck(t, "W_workspace_loads.json", "W1", &w)
	task = atHome()
	task.Tool = kin.Vec{Z: w.Data.Centre}
	return task, w.Expected.Weight, w.Expected.Turn, w.Expected.Lateral
}

// W1 (numpy, closed form): leg forces of the C5 example under a weight, a moment about
// z and a lateral force. The check's base pairs stand at -60°, 60°, 180° and ours at 0°, 120°, 240°, so its
// x is our direction 60°. 1e-11 relative, as SOURCES.md says.
func TestLegForcesInClosedForm(t *testing.T) {
	task, weight, turn, lateral := exampleTask(t)
	f := kin.FamilyNamed("6-UPS")
	force := func(l Load) (lo, hi [6]float64) {
		task.Cases = []Case{{Loads: []Load{l}}}
		m := f.Build(exampleC5(), &kin.Setup{Tool: task.Tool, Length: 1})
		return bounds(task, m, kin.Coords{}, 0)
	}
	lo, hi := force(Load{Mass: 1000 / Gravity, Centre: kin.Vec{Z: 0.7}})
	for i := range 6 {
		near(t, "push under a weight", hi[i], weight, 1e-11*weight)
		near(t, "push under a weight", lo[i], weight, 1e-11*weight)
	}
	_, hi = force(Load{Moment: kin.Vec{Z: -100}})
	plus := 0
	for i := range 6 {
		near(t, "size of a force under a moment", math.Abs(hi[i]), turn, 1e-11*turn)
		if hi[i] > 0 {
			plus++
		}
	}
	if plus != 3 {
		t.Errorf("%d legs push under a moment about z, want 3", plus)
	}
	sin, cos := math.Sincos(60 * deg)
	_, hi = force(Load{Force: kin.Vec{X: -300 * cos, Y: -300 * sin}, At: task.Tool, Off: true})
	for i := range 6 {
		found := false
		for _, w := range lateral {
			found = found || math.Abs(hi[i]-w) <= 1e-11*139
		}
		if !found {
			t.Errorf("leg %d: %.15g under a lateral force, want one of %v", i+1, hi[i], lateral)
		}
	}
}

// A force elsewhere is the force at the tool point and the moment r × f. 1e-12 of the largest effort.
func TestForceElsewhere(t *testing.T) {
	rng := seeded(71)
	f := kin.FamilyNamed("6-UPS")
	for range 20 {
		task := richTask(rng, f)
		c := randomCoords(rng, f, 1)
		m := sizedPlan(task, f, soundDesign(f)).build(task, soundDesign(f))
		force, at := within(rng, 500), within(rng, 0.3)
		s := staticsOf(m.Frame(), c)
		moment := crossed(s.rot.Apply(sub(at, task.Tool)), force)
		task.Zones = task.Zones[:1]
		task.Cases = []Case{{Loads: []Load{{Force: force, At: at, Off: true}}}, {Loads: []Load{{Force: force, Moment: moment}}}}
		_, a := bounds(task, m, c, 0)
		_, b := bounds(task, m, c, 1)
		for i := range 6 {
			near(t, "effort", a[i], b[i], 1e-9)
		}
	}
}

// A machine that hangs has the opposite static efforts: pushes and pulls change places. 1e-12 relative.
func TestFloorAndCeiling(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	rng := seeded(72)
	task := richTask(rng, f)
	task.Zones = []Zone{listed(rng, f, 1, 30)}
	task.Cases = []Case{{Loads: []Load{{Mass: 120, Centre: within(rng, 0.3)}}}}
	task.Prepare()
	hanging := *task
	hanging.Gravity.Z *= -1
	for range 5 {
		d := randomDesign(rng, f)
		a, b := appraise(task, f, d), appraise(&hanging, f, d)
		for _, p := range [][2]string{{"push_force", "pull_force"}, {"pull_force", "push_force"}, {"leg_force", "leg_force"}} {
			if x, y := value(t, a, p[0]), value(t, b, p[1]); !same(x, y, 1e-12) {
				t.Errorf("%s = %g on the floor, %s = %g on the ceiling", p[0], x, p[1], y)
			}
		}
	}
}

// Power balance: what the actuators give, Σ effort · rate, is the wrench on the twist, for random
// wrenches and twists (principle of virtual work). Rates by J of kin.State from the package's own walk. 1e-10 relative.
func TestPowerBalance(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(73)
		for range 40 {
			task := richTask(rng, f)
			task.Zones = task.Zones[:1]
			loads := randomLoads(rng, func(r *rand.Rand, _ float64) Set { return Set{} })
			for i := range loads {
				loads[i].ForceSpread, loads[i].MomentSpread = kin.Vec{}, kin.Vec{}
			}
			task.Cases = []Case{{Loads: loads}}
			c := randomCoords(rng, f, 1)
			m := sizedPlan(task, f, soundDesign(f)).build(task, randomDesign(rng, f))
			lo, hi := bounds(task, m, c, 0)
			w := staticsOf(m.Frame(), c).wrench(task, loads, make([]scene, len(loads)))
			var twist [6]float64
			for _, q := range f.Freedoms {
				twist[q] = between(rng, -1, 1)
			}
			var s kin.State
			p := kin.NewPose(c)
			m.Move(&p, &s)
			power, want, size := 0.0, 0.0, 0.0
			for i := range f.Legs {
				if lo[i] != hi[i] {
					t.Errorf("efforts %g to %g without any set", lo[i], hi[i])
				}
				rate := 0.0
				for k, v := range twist {
					if k >= 3 {
						v *= task.Length
					}
					rate += s.J[6*i+k] * v
				}
				power += hi[i] * rate
				size += math.Abs(hi[i] * rate)
			}
			for k := range w {
				want += w[k] * twist[k]
			}
			near(t, "power", power, want, 1e-10*size)
		}
	})
}

// Rates are exact over the sets of speeds: the row sums of gonum's product by hand, and random
// speeds never pass them. 1e-13 relative.
func TestRatesAreExactOverSets(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(74)
		for round := range 40 {
			set := []func(*rand.Rand, float64) Set{anyWay, perAxis}[round%2]
			task := richTask(rng, f)
			task.Zones = task.Zones[:1]
			task.Cases = []Case{{Linear: set(rng, 0.5), Angular: set(rng, 0.8)}}
			c := randomCoords(rng, f, 1)
			m := sizedPlan(task, f, soundDesign(f)).build(task, randomDesign(rng, f))
			v := newView(task)
			v.begin(m)
			v.at(&Sample{Coords: c, Pose: kin.NewPose(c)}, 0, NeedRates)
			jac := staticsOf(m.Frame(), c).jac
			rate := func(lin, ang kin.Vec, i int) float64 {
				return mat.Dot(jac.RowView(i), mat.NewVecDense(6, []float64{lin.X, lin.Y, lin.Z, ang.X, ang.Y, ang.Z}))
			}
			cs := &task.Cases[0]
			for i := range f.Legs {
				lin := kin.Vec{X: jac.At(i, 0), Y: jac.At(i, 1), Z: jac.At(i, 2)}
				ang := kin.Vec{X: jac.At(i, 3), Y: jac.At(i, 4), Z: jac.At(i, 5)}
				got := v.rate[0][i]
				near(t, "rate", got, rate(push(&cs.Linear, lin), push(&cs.Angular, ang), i), 1e-13*got)
				for range 20 {
					if r := math.Abs(rate(draw(rng, &cs.Linear), draw(rng, &cs.Angular), i)); r > got*(1+1e-13) {
						t.Fatalf("a speed of the sets asks for %g, more than %g", r, got)
					}
				}
			}
		}
	})
}

// G2 (Euler, Timoshenko and Gere; beam finite elements agree within 1.5e-6): buckling loads of a steel rod of 20 mm
// and 1 m, four end conditions, as the margin over a push of 1 N at the planar isotropic stage whose
// legs are 1 m long. 1e-9 relative, as printed.
func TestEulerLoads(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := soundDesign(f)
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = 2/math.Sqrt(3), 1/math.Sqrt(3), 60*deg
	for _, c := range []struct{ k, load float64 }{{1, 16278.295257}, {0.5, 65113.181029}, {0.6991556596, 33301.298364}, {2, 4069.573814}} {
		task := atHome()
		task.Legs = Legs{RodDiameter: 0.02, Modulus: 210e9, EndFixity: c.k}
		arm := 1 / math.Sqrt(3) // legs are tangential to the platform's circle: a moment of 3 arm loads each with 1 N
		task.Cases = []Case{{Loads: []Load{{Moment: kin.Vec{Z: -3 * arm}}}}, {Loads: []Load{{Moment: kin.Vec{Z: 3 * arm}}}}}
		task.Prepare()
		a := appraise(task, f, d)
		near(t, "leg", a.Legs[0].Home, 1, 1e-14)
		near(t, "push", value(t, a, "push_force"), 1, 1e-12)
		near(t, "pull", value(t, a, "pull_force"), 1, 1e-12)
		if got := value(t, a, "buckling_margin"); !same(got, c.load, 1e-9) {
			t.Errorf("K = %g: %.12g N, want %.12g N", c.k, got, c.load)
		}
	}
}
