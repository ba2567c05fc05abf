package objective

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// grid are the values that a specification admits, ranges in n parts with the given values among them.
func (s *Spec) grid(n int, also ...float64) []float64 {
	switch s.Kind {
	case Range:
		var out []float64
		for k := range n + 1 {
			out = append(out, s.Low+(s.High-s.Low)*float64(k)/float64(n))
		}
		for _, v := range also {
			if v >= s.Low && v <= s.High {
				out = append(out, v)
			}
		}
		return out
	case Steps:
		var out []float64
		for k := range s.Levels {
			out = append(out, s.at(k))
		}
		return out
	}
	return slices.Clone(s.Values)
}

// An actuator range given as ranges, steps or choices that no goal or limit speaks of is derived: the design is feasible if and only
// if some admitted leg_min and stroke make it so, found here by trying a grid with the critical values in it. With
// limits on leg_min, stroke and leg_max the same must hold, whatever NewPlan decides to derive.
func TestDerivedRangeIsTheBest(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	rng := seeded(131)
	least, span := f.Range()
	seen := map[string]int{}
	rounds := 200
	if testing.Short() {
		rounds = 80
	}
	for round := range rounds {
		task := atHome()
		task.Zones = []Zone{ranged(f, Axes, between(rng, 0.3, 1.5), 3)}
		task.Actuator.Reserve = 0.005
		task.Actuator.DeadRatio = between(rng, 0.5, 1)
		task.Actuator.DeadLength = between(rng, 0.1, 0.5)
		task.Goals = goalsOf([]*Measure{measured(t, "conditioning")})
		for _, name := range []string{"leg_min", "stroke", "leg_max"} {
			if round%2 == 0 || rng.IntN(2) == 0 {
				continue
			}
			bound := map[string]float64{"leg_min": between(rng, 0.6, 0.9), "stroke": between(rng, 0.1, 0.5), "leg_max": between(rng, 0.9, 1.3)}[name]
			task.Limits = append(task.Limits, Limit{Measure: measured(t, name), Bound: bound, AtLeast: rng.IntN(2) == 0, Origin: "limits"})
		}
		task.Prepare()
		d := soundDesign(f)
		spec := func(low, high float64) Spec {
			switch rng.IntN(4) {
			case 0:
				return Spec{Kind: Steps, Low: low, High: high, Step: 0.02, Levels: int((high-low)/0.02) + 1}
			case 1:
				v := []float64{between(rng, low, high), between(rng, low, high), between(rng, low, high)}
				slices.Sort(v)
				return Spec{Kind: Choices, Values: v}
			case 2:
				return Spec{Kind: Fixed, Values: []float64{between(rng, low, high)}}
			}
			return Spec{Kind: Range, Low: low, High: high}
		}
		a, b := spec(0.55, between(rng, 0.6, 0.9)), spec(0.1, between(rng, 0.15, 0.5))
		short, long := extremeLengths(task, f, d)
		short, long = short-0.005, long+0.005

		// by brute force, over what the two must satisfy
		holds := func(l, s float64) bool {
			if l > short || l+s < long || l < task.Actuator.DeadRatio*s+task.Actuator.DeadLength {
				return false
			}
			for i := range task.Limits {
				v := map[string]float64{"leg_min": l, "stroke": s, "leg_max": l + s}[task.Limits[i].Measure.Name]
				if !task.Limits[i].Holds(task, v) {
					return false
				}
			}
			return true
		}
		critical := []float64{short}
		for i := range task.Limits {
			critical = append(critical, task.Limits[i].Bound)
		}
		want := false
		for _, l := range a.grid(20, critical...) {
			ss := append([]float64{long - l}, critical...)
			for _, c := range critical {
				ss = append(ss, c-l)
			}
			for _, s := range b.grid(20, ss...) {
				want = want || holds(l, s+1e-15) // rounding of long - l
			}
		}

		p := sizedPlan(task, f, d)
		p.Specs[least], p.Specs[span] = a, b
		p = NewPlan(task, f, p.Specs)
		got := false
		s := NewScreen(task, p)
		var r Score
		free := p.Free()
		try := func(x []float64) {
			s.Judge(x, &r)
			s.Confirm(&r)
			got = got || r.Violation == 0
			if r.Violation == 0 {
				if ap := Appraise(task, p, s.Values()); !ap.Feasible {
					t.Errorf("round %d: the search's design %v fails the appraisal", round, s.Values())
				}
			}
		}
		switch len(free) {
		case 0:
			try(nil)
		case 1:
			for _, x := range codes(&p.Specs[free[0]], append([]float64{long - a.grid(1)[0]}, critical...)...) {
				try([]float64{x})
			}
		case 2: // nothing derived: the grid of a search
			for _, x := range codes(&a, critical...) {
				l := x
				if a.Kind != Range {
					l = a.grid(1)[int(x)]
				}
				ss := append([]float64{long - l}, critical...)
				for _, c := range critical {
					ss = append(ss, c-l)
				}
				for _, y := range codes(&b, ss...) {
					try([]float64{x, y})
				}
			}
		}
		if got != want {
			t.Errorf("round %d: feasible %v, want %v: leg_min %+v, stroke %+v, derived %v, limits %s", round, got, want, a, b, p.Derive, texts(task.Limits))
		}
		seen[fmt.Sprint(want, p.Derive)]++
	}
	for _, k := range []string{"true true", "false true"} {
		if seen[k] < rounds/20 {
			t.Errorf("one-sided: %v", seen)
		}
	}
}

// codes are search variables for a specification: values of a range, numbers of steps and choices.
func codes(s *Spec, also ...float64) []float64 {
	g := s.grid(20, also...)
	if s.Kind != Range {
		for k := range g {
			g[k] = float64(k)
		}
	}
	return g
}

func texts(ls []Limit) (out string) {
	for _, l := range ls {
		out += fmt.Sprintf("%s at least %v %g; ", l.Measure.Name, l.AtLeast, l.Bound)
	}
	return out
}

// Free dimensions: what is searched and not derived, in order; goals on the range and coverage below 1 stop the deriving.
func TestWhatIsDerived(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	least, span := f.Range()
	for _, c := range []struct {
		what   string
		change func(*Task)
		free   int
	}{
		{"no goal on the range", func(*Task) {}, 1},
		{"stroke as a goal", func(task *Task) { task.Goals = []Goal{{Measure: measured(t, "stroke")}} }, 3},
		{"leg_max as a goal", func(task *Task) { task.Goals = []Goal{{Measure: measured(t, "leg_max")}} }, 3},
		{"coverage below 1", func(task *Task) { task.Coverage = 0.9 }, 3},
		{"a limit that deriving serves best", func(task *Task) {
			task.Limits = []Limit{{Measure: measured(t, "stroke"), Bound: 0.3}, {Measure: measured(t, "leg_min"), AtLeast: true, Bound: 0.3}}
		}, 1},
		{"a limit against deriving", func(task *Task) { task.Limits = []Limit{{Measure: measured(t, "leg_min"), Bound: 0.6}} }, 3},
	} {
		task := atHome()
		c.change(task)
		task.Prepare()
		specs := sizedPlan(task, f, soundDesign(f)).Specs
		specs[0] = Spec{Kind: Range, Low: 0.4, High: 1}
		specs[least], specs[span] = Spec{Kind: Range, Low: 0.4, High: 0.8}, Spec{Kind: Steps, Low: 0.2, Step: 0.1, Levels: 3}
		p := NewPlan(task, f, specs)
		if got := p.Free(); len(got) != c.free {
			t.Errorf("%s: free %v, want %d", c.what, got, c.free)
		}
		d := make([]float64, len(specs))
		p.Values([]float64{0.7, 0.5, 2}[:c.free], d)
		near(t, "base_radius", d[0], 0.7, 0)
		if c.free == 3 {
			near(t, "leg_min", d[least], 0.5, 0)
			near(t, "stroke", d[span], 0.4, 1e-15)
		} else if !math.IsNaN(d[least]) || !math.IsNaN(d[span]) {
			t.Errorf("%s: %v before the duty has sized it", c.what, d)
		}
	}
}
