package objective

import (
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// goalsOf makes every measure a goal, in its own sense.
func goalsOf(ms []*Measure) (goals []Goal) {
	for _, m := range ms {
		goals = append(goals, Goal{Measure: m, Maximise: m.Sense == Larger})
	}
	return goals
}

// screened judges the same design as appraise.
func screened(t *Task, p *Plan) *Score {
	var r Score
	s := NewScreen(t, p)
	s.Judge(nil, &r)
	s.Confirm(&r)
	return &r
}

// sameGoals compares a feasible score with the appraisal, bit by bit, and the feasibility of both.
func sameGoals(t *testing.T, task *Task, r *Score, a *Appraisal) {
	t.Helper()
	if (r.Violation == 0) != a.Feasible {
		t.Fatalf("screen: violation %g, excess %v; appraisal: feasible %v, %+v", r.Violation, r.Excess, a.Feasible, a.Verdicts)
	}
	if !a.Feasible {
		return
	}
	for i, g := range task.Goals {
		want := value(t, a, g.Measure.Name)
		if g.Maximise {
			want = -want
		}
		if want = math.Max(-beyond, math.Min(beyond, want)); r.Goals[i] != want {
			t.Errorf("%s: the screen has %.17g, the appraisal %.17g", g.Measure.Name, r.Goals[i], want)
		}
	}
}

// effortOf is leg_force or motor_torque.
func effortOf(t *testing.T, f *kin.Family) *Measure {
	if f.Drive == kin.Rotary {
		return measured(t, "motor_torque")
	}
	return measured(t, "leg_force")
}

// A search and an appraisal give the same numbers: every measure as the only goal and all together.
func TestScreenAgreesWithAppraisal(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(21)
		feasible := 0
		for range 4 {
			task := richTask(rng, f)
			task.Prepare()
			d := randomDesign(rng, f)
			p := sizedPlan(task, f, d)
			a := Appraise(task, p, d)
			if a.Feasible {
				feasible++
			}
			all := every(task, f)
			for _, m := range all {
				if m.Name == "coverage" {
					continue // as a goal it changes what is feasible
				}
				task.Goals = goalsOf([]*Measure{m})
				sameGoals(t, task, screened(task, p), a)
			}
			task.Goals = goalsOf(all)
			sameGoals(t, task, screened(task, p), a)
		}
		if feasible == 0 && slices.Contains(prismatic, f.Name) {
			t.Error("no design was feasible")
		}
	})
}

// The same with limits of which each holds or not as a coin falls, hard, soft and with coverage as a goal.
func TestScreenAgreesOnLimits(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(22)
		seen := map[bool]int{}
		rounds := 60
		if testing.Short() {
			rounds = 5
		}
		for k := range rounds {
			task := richTask(rng, f)
			task.Zones[0].Samples = 70
			task.Actuator.DeadLength = between(rng, 0, 0.1)
			task.Actuator.Stiffness, task.Legs.RodDiameter = 0, 0.03 // deflection with its corners is slow
			task.Prepare()
			d := soundDesign(f)
			if k%2 == 0 {
				d = randomDesign(rng, f)
			}
			p := sizedPlan(task, f, d)
			first := Appraise(task, p, d)
			task.Goals = []Goal{{Measure: measured(t, "conditioning"), Maximise: true}, {Measure: effortOf(t, f)}}
			for _, r := range first.Readings {
				if r.Measure.Name == "coverage" || math.IsInf(r.Value, 0) || rng.IntN(3) > 0 {
					continue
				}
				l := Limit{Measure: r.Measure, Bound: r.Value, AtLeast: r.Measure.Sense == Larger, Origin: "limits"}
				if r.Measure.Sense == Either {
					l.AtLeast = rng.IntN(2) == 0
				}
				if rng.IntN(8) == 0 {
					l.Bound *= between(rng, 0.8, 1.2)
				} else { // the value itself holds, with room for climbs of the screen that end a little lower than those of the appraisal
					room := 1e-3 * math.Abs(r.Value)
					if l.AtLeast {
						room = -room
					}
					l.Bound += room
				}
				if r.Measure.Name == "base_swing" || r.Measure.Name == "platform_swing" {
					l.Origin = "joints." + r.Measure.Name
				}
				task.Limits = append(task.Limits, l)
			}
			least, span := f.Range()
			if rng.IntN(3) == 0 && least >= 0 { // fixed ends of the actuator range instead of sized ones
				p.Specs[least] = Spec{Kind: Fixed, Values: []float64{first.Values[least] - between(rng, -0.01, 0.05)}}
				p.Specs[span] = Spec{Kind: Fixed, Values: []float64{first.Values[span] + between(rng, -0.02, 0.1)}}
				p = NewPlan(task, f, p.Specs)
			}
			switch k % 3 {
			case 1:
				task.Coverage = between(rng, 0.5, 1)
			case 2:
				task.CoverageGoal, task.Coverage = true, 0
				task.Goals = append(task.Goals, Goal{Measure: measured(t, "coverage"), Maximise: true})
			}
			values := p.Single()
			a := Appraise(task, p, values)
			seen[a.Feasible]++
			s := NewScreen(task, p)
			var r Score
			s.Judge(nil, &r)
			s.Confirm(&r)
			sameGoals(t, task, &r, a)
			if a.Feasible {
				for i, x := range s.Values() {
					if x != a.Values[i] {
						t.Errorf("%s: %g and %g", f.Dimensions[i].Name, x, a.Values[i])
					}
				}
			}
			if t.Failed() {
				return
			}
		}
		if slices.Contains(prismatic, f.Name) && (seen[true] < rounds/12 || seen[false] < rounds/12) {
			t.Errorf("feasible %d, not %d: one-sided", seen[true], seen[false])
		}
	})
}

// A score is the same whatever the screen judged before.
func TestScreenHasNoMemory(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(23)
		task := richTask(rng, f)
		task.Goals = goalsOf(every(task, f)[1:])
		task.Prepare()
		p := sizedPlan(task, f, soundDesign(f))
		free := []int{0, 1, 2}
		for _, i := range free {
			p.Specs[i] = Spec{Kind: Range, Low: f.Dimensions[i].Low, High: f.Dimensions[i].High}
		}
		s := NewScreen(task, p)
		var again Score
		for range 8 {
			x := make([]float64, len(free))
			for k, i := range free {
				x[k] = between(rng, f.Dimensions[i].Low, f.Dimensions[i].High)
			}
			s.Judge(x, &again)
			s.Confirm(&again)
			var fresh Score
			n := NewScreen(task, p)
			n.Judge(x, &fresh)
			n.Confirm(&fresh)
			if again.Violation != fresh.Violation {
				t.Fatalf("violation %g, by a fresh screen %g", again.Violation, fresh.Violation)
			}
			for i := range fresh.Goals {
				if again.Goals[i] != fresh.Goals[i] {
					t.Fatalf("%s: %g, by a fresh screen %g", task.Goals[i].Measure.Name, again.Goals[i], fresh.Goals[i])
				}
			}
		}
	})
}

// A machine that has no posture at any pose, home included, is refused: base and
// platform joints of a planar stage coincide.
func TestNoPostureAnywhere(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := soundDesign(f)
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = 0.3, 0.3, 0
	task := richTask(seeded(24), f)
	task.Zones = []Zone{{Name: "home", Kind: Listed, Poses: []kin.Coords{{}}}}
	for i := range task.Cases {
		task.Cases[i].Zones = nil
	}
	task.Goals = goalsOf([]*Measure{measured(t, "conditioning"), measured(t, "leg_force")})
	task.Prepare()
	p := sizedPlan(task, f, d)
	a := Appraise(task, p, d)
	r := screened(task, p)
	if a.Feasible || !(r.Violation > 0) {
		t.Errorf("feasible %v, violation %g", a.Feasible, r.Violation)
	}
	if c := value(t, a, "coverage"); c != 0 {
		t.Errorf("coverage %g", c)
	}
}
