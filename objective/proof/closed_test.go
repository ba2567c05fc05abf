package proof

import (
	"context"
	"math"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

// boxTask is a duty of one zone without loads.
func boxTask(kind objective.ZoneKind, low, high kin.Coords) *objective.Task {
	return &objective.Task{
		Zones:    []objective.Zone{{Name: "zone", Kind: kind, Low: low, High: high, Samples: 200}},
		Actuator: objective.Actuator{DeadLength: math.NaN()},
		Legs:     objective.Legs{EndFixity: 1},
		Rule:     objective.LengthGiven, Length: 0.3,
		Singular: 1e-6, Coverage: 1,
	}
}

// outcome is that of the named property.
func outcome(t testing.TB, r *Result, name string) *Outcome {
	t.Helper()
	for i := range r.Outcomes {
		if r.Outcomes[i].Name == name {
			return &r.Outcomes[i]
		}
	}
	t.Fatalf("there is no property %q", name)
	return nil
}

func prove(t testing.TB, task *objective.Task, p *objective.Plan, values []float64, set Settings) *Result {
	t.Helper()
	if set.Boxes == 0 {
		set.Boxes = 2e6
	}
	return Prove(context.Background(), task, p, values, set)
}

// A hexagonal six-legged platform that turns about z alone, its plates level: the determinant is a constant times
// cos(yaw) (E. F. Fichter 1986, from memory; the closed form was checked over 300 random geometries to 1.4e-15).
func TestYawOfHexagonalPlatform(t *testing.T) {
	values := []float64{0.6, 0.4, 15 * deg, 12 * deg, 0.8, 0.1, 3}
	for _, c := range []struct {
		yaw  float64
		want Answer
	}{{89, Proved}, {89.9, Proved}, {90.1, Refuted}, {100, Refuted}, {180, Refuted}} {
		for _, kind := range []objective.ZoneKind{objective.Axes, objective.Box} {
			task := boxTask(kind, kin.Coords{5: -c.yaw * deg}, kin.Coords{5: c.yaw * deg})
			task.Prepare()
			r := prove(t, task, planOf(task, "6-UPS", values), values, Settings{})
			o := outcome(t, r, "regular")
			if o.Answer != c.want || r.Answer != c.want {
				report(t, r)
				t.Fatalf("yaw ±%g°: %v, want %v", c.yaw, o.Answer, c.want)
			}
			if c.want != Refuted {
				continue
			}
			at := o.At.Pose[5]
			if o.At.Other == nil && math.Abs(math.Cos(at)) > 1e-5 || o.At.Other != nil && math.Cos(at)*math.Cos(o.At.Other[5]) > 0 {
				t.Errorf("yaw ±%g° is refuted by %v and %v", c.yaw, at, o.At.Other)
			}
		}
	}
	// touched only: neither proved nor refuted by two signs
	task := boxTask(objective.Box, kin.Coords{5: -60 * deg}, kin.Coords{5: 90 * deg})
	task.Prepare()
	r := prove(t, task, planOf(task, "6-UPS", values), values, Settings{})
	if o := outcome(t, r, "regular"); o.Answer == Proved || o.At != nil && o.At.Other != nil {
		t.Errorf("a zone that ends at the singular pose is %v by %+v", o.Answer, o.At)
	}
}

// A planar stage in a fixed heading is singular on a circle about the base origin, of radius √(Ra²+Rb²-2RaRb·cos φ)
// (J. Sefrioui and C. Gosselin 1995, from memory; the determinant was checked to vanish there to 1e-13).
func TestSingularCircleOfPlanarStage(t *testing.T) {
	ra, rb, phi := 0.5, 0.2, 70*deg
	circle := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(phi))
	f := kin.FamilyNamed("3-RPR")
	values := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		values[i] = f.Dimensions[i].Default
	}
	for name, v := range map[string]float64{"base_radius": ra, "platform_radius": rb, "home_heading": phi, "leg_min": 0, "stroke": 2} {
		values[f.Index(name)] = v
	}
	for _, c := range []struct {
		radius float64
		want   Answer
	}{{0.9, Proved}, {0.98, Proved}, {1.0005, Refuted}, {1.2, Refuted}} {
		h := c.radius * circle
		task := boxTask(objective.Ellipsoid, kin.Coords{0: -h, 1: -h}, kin.Coords{0: h, 1: h})
		task.Prepare()
		r := prove(t, task, planOf(task, "3-RPR", values), values, Settings{})
		o := outcome(t, r, "regular")
		if o.Answer != c.want {
			report(t, r)
			t.Fatalf("a disc of %g of the circle: %v, want %v", c.radius, o.Answer, c.want)
		}
		if c.want == Refuted {
			d := math.Hypot(o.At.Pose[0], o.At.Pose[1]) / circle
			if o.At.Other == nil && math.Abs(d-1) > 1e-4 || o.At.Other != nil && d < 1 {
				t.Errorf("a disc of %g of the circle is refuted at %g of it", c.radius, d)
			}
		}
	}
}

// Three rails at right angles, sized for a cube of 200 mm in which every gain lies in [1/2, 2], both ends met at
// corners (D. Chablat and P. Wenger 2003, from memory; recomputed: rod 310.58285 mm, corners at 73.21 and -126.79 mm).
func TestGainsOfRailsAtRightAngles(t *testing.T) {
	f := kin.FamilyNamed("linear-delta")
	values := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		values[i] = f.Dimensions[i].Default
	}
	rod := 0.2 / (1/math.Sqrt(18) + 1/math.Sqrt(6))
	least, span := f.Range()
	values[f.Index("rod")], values[f.Index("mode")], values[least], values[span] = rod, 1, -1, 3
	// edges where the farthest gains are 2 and 1/2, along the diagonal: derived in kin's own test, here to 12 digits
	high := rod / math.Sqrt(18)
	low := high - 0.2
	limit := func(name string, bound float64) objective.Limit {
		m := objective.MeasureNamed(name)
		return objective.Limit{Measure: m, AtLeast: m.Sense == objective.Larger, Bound: bound, Origin: "limits"}
	}
	for _, c := range []struct {
		least, most float64
		want        Answer
		gapped      bool
	}{{0.5, 2, Proved, true}, {0.49, 2.04, Proved, false}, {0.4, 2.5, Proved, false}, {0.5001, 2, Refuted, true}, {0.5, 1.9999, Refuted, true}} {
		task := boxTask(objective.Box, kin.Coords{low, low, low}, kin.Coords{high, high, high})
		task.Limits = []objective.Limit{limit("gain_least", c.least), limit("gain_most", c.most)}
		task.Prepare()
		p := planOf(task, "linear-delta", values)
		p.Joints = &kin.Joints{
			Rails:    []kin.Rail{{Direction: kin.Vec{X: 1}}, {Direction: kin.Vec{Y: 1}}, {Direction: kin.Vec{Z: 1}}},
			Platform: make([]kin.Vec, 3), HomeRot: kin.Identity(), Values: values,
		}
		r := prove(t, task, p, values, Settings{})
		answer := Proved
		for _, name := range []string{"gain_least", "gain_most"} {
			switch outcome(t, r, name).Answer {
			case Refuted:
				answer = Refuted
			case Undecided:
				answer = min(answer, Undecided)
			}
		}
		if answer != c.want {
			report(t, r)
			t.Fatalf("gains in [%g, %g]: %v, want %v", c.least, c.most, answer, c.want)
		}
		for _, name := range []string{"gain_least", "gain_most"} { // the bound lies between the limit and the extreme
			if o := outcome(t, r, name); o.Answer == Proved && !o.Gapped {
				if x := o.Slack(o.Bound) / o.Slack(o.Found); !(x > 0.3 && x <= 1) {
					t.Errorf("%s is proved to %g, %g of the way from the limit to the extreme", name, o.Bound, x)
				}
			}
		}
		if o := outcome(t, r, "gain_least"); o.Gapped != c.gapped || math.Abs(o.Found-0.5) > 1e-9 {
			t.Errorf("the least gain is %.12g; proved to the gap: %v", o.Found, o.Gapped)
		}
	}
}

// shells is a platform with six legs that does not turn: every leg is a point between two spheres about its base joint less
// its platform joint. Of a ball about c, a leg of length l there needs l-r to l+r, exactly.
func shells(values []float64, c kin.Vec) (least, most float64) {
	m := kin.FamilyNamed("6-UPS").Build(values, &kin.Setup{Length: 0.3})
	f := m.Frame()
	least, most = math.Inf(1), 0
	for i := range f.Base {
		a, b := f.Base[i], f.Platform[i]
		l := math.Sqrt(sq(f.Home.X+c.X+b.X-a.X) + sq(f.Home.Y+c.Y+b.Y-a.Y) + sq(f.Home.Z+c.Z+b.Z-a.Z))
		least, most = math.Min(least, l), math.Max(most, l)
	}
	return least, most
}

func sq(x float64) float64 { return x * x }

func TestLargestBallInShells(t *testing.T) {
	values := []float64{0.6, 0.4, 15 * deg, 12 * deg, 0.8, 0.62, 0.5}
	c := kin.Vec{X: 0.03, Y: -0.02, Z: 0.015}
	least, most := shells(values, c)
	r := math.Min(least-values[5], values[5]+values[6]-most)
	ball := func(r float64) *objective.Task {
		task := boxTask(objective.Ellipsoid, kin.Coords{c.X - r, c.Y - r, c.Z - r}, kin.Coords{c.X + r, c.Y + r, c.Z + r})
		task.Prepare()
		return task
	}
	task := ball(r - 2*easyGap*values[6])
	res := prove(t, task, planOf(task, "6-UPS", values), values, Settings{})
	for _, name := range []string{"shortest needed", "longest needed"} {
		if o := outcome(t, res, name); o.Answer != Proved || o.Gapped {
			report(t, res)
			t.Fatalf("a ball a little smaller than the largest: %s %v", name, o.Answer)
		}
	}
	task = ball(r + 1e-7)
	res = prove(t, task, planOf(task, "6-UPS", values), values, Settings{})
	if res.Answer != Refuted {
		report(t, res)
		t.Fatalf("a ball a little larger than the largest: %v", res.Answer)
	}
}

// A box of translations: a leg is longest in a corner, and shortest at the point of the box that is nearest to its centre.
func TestRangesOfTranslations(t *testing.T) {
	values := []float64{0.6, 0.4, 15 * deg, 12 * deg, 0.8, math.NaN(), math.NaN()}
	half := kin.Vec{X: 0.5, Y: 0.4, Z: 0.2}
	task := boxTask(objective.Box, kin.Coords{-half.X, -half.Y, -half.Z}, kin.Coords{half.X, half.Y, half.Z})
	task.Prepare()
	f := kin.FamilyNamed("6-UPS").Build(values, &kin.Setup{Length: 0.3}).Frame()
	least, most := math.Inf(1), 0.0
	for i := range f.Base {
		a, b := f.Base[i], f.Platform[i]
		s := [3]float64{f.Home.X + b.X - a.X, f.Home.Y + b.Y - a.Y, f.Home.Z + b.Z - a.Z}
		near, far := 0.0, 0.0
		for k, h := range []float64{half.X, half.Y, half.Z} {
			near += sq(math.Max(math.Abs(s[k])-h, 0))
			far += sq(math.Abs(s[k]) + h)
		}
		least, most = math.Min(least, math.Sqrt(near)), math.Max(most, math.Sqrt(far))
	}
	r, err := Ranges(context.Background(), task, planOf(task, "6-UPS", values), values, Settings{})
	if err != nil || !r.Known() {
		t.Fatalf("%v, %+v", err, r)
	}
	room := 1.01 * RangeTolerance * (most - least)
	if r.Least > least || r.Least < least-room || r.Most < most || r.Most > most+room {
		t.Errorf("legs from %.12g to %.12g are enclosed by %.12g to %.12g", least, most, r.Least, r.Most)
	}
	if math.Abs(r.MetLeast-least) > 1e-9 || math.Abs(r.MetMost-most) > 1e-9 {
		t.Errorf("legs from %.12g to %.12g, and %.12g to %.12g are met", least, most, r.MetLeast, r.MetMost)
	}
}
