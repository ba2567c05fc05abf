package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// lengths of all legs over the duty and home, from the joint centres alone.
func extremeLengths(task *Task, f *kin.Family, d []float64) (least, most float64) {
	frame := sizedPlan(task, f, d).build(task, d).Frame()
	least, most = math.Inf(1), 0
	poses := []kin.Coords{{}}
	for _, s := range task.Samples() {
		poses = append(poses, s.Coords)
	}
	for _, c := range poses {
		for _, l := range staticsOf(frame, c).leng {
			least, most = math.Min(least, l), math.Max(most, l)
		}
	}
	return least, most
}

// lateDuty is a duty away from home, so that home alone has the shortest or the longest leg.
func lateDuty(f *kin.Family, z float64) *Task {
	task := atHome()
	c := kin.Coords{z / 2}
	if f.Has(kin.Z) {
		c = kin.Coords{2: z}
	}
	task.Zones[0].Poses = []kin.Coords{c}
	task.Prepare()
	return task
}

// A sized actuator is as short as the shortest leg and as long as the longest, home included, each moved outward by the reserve. 1e-15 m.
func TestSizedRange(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(121)
		least, span := f.Range()
		for round := range 20 {
			task := richTask(rng, f)
			if round < 2 {
				task = lateDuty(f, []float64{0.1, -0.1}[round])
			}
			task.Actuator.Reserve = between(rng, 0, 0.02)
			task.Cases = nil
			task.Prepare()
			task = pinned(task)
			d := randomDesign(rng, f)
			short, long := extremeLengths(task, f, d)
			a := appraise(task, f, d)
			r := task.Actuator.Reserve
			near(t, "leg_min", a.Values[least], short-r, 1e-15)
			near(t, "leg_max", a.Values[least]+a.Values[span], long+r, 1e-15)
			near(t, "leg_min as a measure", value(t, a, "leg_min"), a.Values[least], 0)
			near(t, "stroke as a measure", value(t, a, "stroke"), a.Values[span], 0)
			near(t, "leg_max as a measure", value(t, a, "leg_max"), a.Values[least]+a.Values[span], 0)
			x, y := math.Inf(1), 0.0
			for _, l := range a.Legs {
				x, y = math.Min(x, l.Least), math.Max(y, l.Most)
			}
			near(t, "shortest leg", x, short, 1e-15)
			near(t, "longest leg", y, long, 1e-15)
			if c := value(t, a, "coverage"); c != 1 && a.Feasible {
				t.Errorf("coverage %g of a range sized by the duty", c)
			}
		}
	})
}

// A sized stroke takes the next stock stroke, leg_min staying; where none is long enough the design fails and says so.
func TestStockStrokes(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := richTask(seeded(122), f)
	task.Cases = nil
	task.Prepare()
	d := soundDesign(f)
	least, span := f.Range()
	free := appraise(task, f, d)
	low, need := free.Values[least], free.Values[span]
	for _, c := range []struct {
		stock []float64
		want  float64
		ok    bool
	}{
		{[]float64{need / 2, need * 1.1, need * 2}, need * 1.1, true},
		{[]float64{need * (1 + 1e-6), need * 2}, need * (1 + 1e-6), true},
		{[]float64{need, need * 2}, need, true},
		{[]float64{need * (1 - 1e-10), need * 2}, need * (1 - 1e-10), true}, // within the tolerance
		{[]float64{need * (1 - 1e-8), need * 2}, need * 2, true},
		{[]float64{need / 3, need * 0.99}, need, false},
	} {
		task.Actuator.Strokes = c.stock
		p := sizedPlan(task, f, d)
		a := Appraise(task, p, d)
		near(t, "leg_min", a.Values[least], low, 0)
		near(t, "stroke", a.Values[span], c.want, 0)
		r := screened(task, p)
		if a.Feasible != c.ok || (r.Violation == 0) != c.ok {
			t.Errorf("stock %v for %g: feasible %v, violation %g, want %v", c.stock, need, a.Feasible, r.Violation, c.ok)
		}
		if w := a.Tightest(); !c.ok && (w.Name != "stock stroke" || w.Holds) {
			t.Errorf("the tightest limit is %+v", w)
		}
	}
	// a stroke within a range is no stock stroke
	task.Actuator.Strokes = []float64{need / 2}
	p := sizedPlan(task, f, d)
	p.Specs[span] = Spec{Kind: Range, Low: need / 4, High: need * 2}
	p = NewPlan(task, f, p.Specs)
	if a, r := Appraise(task, p, p.Single()), screened(task, p); !a.Feasible || r.Violation > 0 || a.Values[span] != need {
		t.Errorf("a range of strokes: feasible %v, violation %g, stroke %g for %g", a.Feasible, r.Violation, a.Values[span], need)
	}
}

// Sizing in steps goes outward: the next shorter leg_min and the next longer stroke of the grid; a value on the grid stays (1e-9 of a step).
func TestSteps(t *testing.T) {
	s := &Spec{Kind: Steps, Low: 0.4, High: 0.6, Step: 0.01, Levels: 21}
	for _, c := range []struct{ x, below, above float64 }{
		{0.505, 0.50, 0.51}, {0.5000001, 0.50, 0.51}, {0.50, 0.50, 0.50}, {0.5 - 1e-12, 0.50, 0.50}, {0.5 + 1e-12, 0.50, 0.50},
		{0.4999999, 0.49, 0.50}, {0.3, 0.4, 0.4}, {0.7, 0.6, 0.6}, {0.4, 0.4, 0.4}, {0.6, 0.6, 0.6},
	} {
		near(t, "below", s.below(c.x), c.below, 1e-15)
		near(t, "above", s.above(c.x, nil), c.above, 1e-15)
	}
}

// dead_length: leg_min is at least dead_ratio times the stroke and the dead length; holds within 1e-9 and not beyond.
func TestDeadLength(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := richTask(seeded(123), f)
	task.Cases = nil
	task.Prepare()
	d := soundDesign(f)
	least, span := f.Range()
	free := appraise(task, f, d)
	for _, ratio := range []float64{0.3, 1, 1.5} {
		room := free.Values[least] - ratio*free.Values[span]
		for _, c := range []struct {
			more float64 // beyond the room, relative to leg_min
			ok   bool
		}{{-0.01, true}, {0, true}, {5e-10, true}, {2e-9, false}, {0.01, false}} {
			task.Actuator.DeadRatio, task.Actuator.DeadLength = ratio, room+c.more*free.Values[least]
			p := sizedPlan(task, f, d)
			a, r := Appraise(task, p, d), screened(task, p)
			if a.Feasible != c.ok || (r.Violation == 0) != c.ok {
				t.Errorf("ratio %g, dead length off by %g: feasible %v, violation %g", ratio, c.more, a.Feasible, r.Violation)
			}
		}
	}
}

// Fixed ends hold within 1e-9 of the longest leg at either end, and not beyond: the same for the search,
// the appraisal and the coverage of single poses.
func TestToleranceOfTheRange(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := richTask(seeded(124), f)
	task.Cases = nil
	task.Prepare()
	d := soundDesign(f)
	least, span := f.Range()
	free := appraise(task, f, d)
	low, high := free.Values[least], free.Values[least]+free.Values[span]
	for _, c := range []struct {
		low, high float64 // relative to the longest leg, inward
		ok        bool
	}{
		{0, 0, true}, {0.9e-9, 0, true}, {0, 0.9e-9, true}, {1.1e-9, 0, false}, {0, 1.1e-9, false}, {-1e-3, -1e-3, true}, {1e-3, 0, false},
	} {
		x, y := low+c.low*high, high-c.high*high
		p := sizedPlan(task, f, d)
		p.Specs[least], p.Specs[span] = Spec{Kind: Fixed, Values: []float64{x}}, Spec{Kind: Fixed, Values: []float64{y - x}}
		p = NewPlan(task, f, p.Specs)
		a, r := Appraise(task, p, p.Single()), screened(task, p)
		if a.Feasible != c.ok || (r.Violation == 0) != c.ok || (value(t, a, "coverage") == 1) != c.ok {
			t.Errorf("%+v: feasible %v, violation %g, coverage %g", c, a.Feasible, r.Violation, value(t, a, "coverage"))
		}
	}
}
