package objective

import (
	"math"
	"strings"
	"testing"

	"legwright/kin"
)

// partTask is a duty of which a machine of the family cannot reach all: a box wider than its workspace.
func partTask(t *testing.T, f *kin.Family) (*Task, *Plan) {
	t.Helper()
	for scale := 1.0; scale < 40; scale *= 1.1 {
		task := richTask(seeded(191), f)
		task.Zones = []Zone{ranged(f, Box, scale, 120)}
		task.Cases = []Case{{Name: "all", Loads: randomLoads(seeded(192), perAxis)[:1], Linear: Set{Kind: AnyWay, Radius: 0.3}}}
		task.Coverage = 0.7
		task.Singular = 0.02
		task.Prepare()
		p := sizedPlan(task, f, soundDesign(f))
		if c := value(t, Appraise(task, p, p.Single()), "coverage"); c < 0.9 {
			if c < 0.75 {
				t.Fatalf("coverage %g", c)
			}
			return task, p
		}
	}
	t.Fatal("no box is too wide")
	return nil, nil
}

// survivors is the same duty with the poses alone that keep every limit, all of which must then do so.
func survivors(task *Task, a *Appraisal) *Task {
	alone := *task
	alone.Coverage, alone.CoverageGoal = 1, false
	z := Zone{Name: "kept", Kind: Listed}
	for _, r := range Poses(task, a) {
		if r.Fails == "" {
			z.Poses = append(z.Poses, r.Sample.Coords)
		}
	}
	alone.Zones = []Zone{z}
	alone.Prepare()
	return &alone
}

// Where a share of the poses is enough, a design whose duty is partly out of reach is feasible whatever rating or limit it
// has besides, as long as enough poses keep it, and its figures are those of the poses that do: of a duty with these poses
// alone, bit by bit. A limit halfway between the worst and the mildest pose fails some more.
func TestSoftCoverage(t *testing.T) {
	for _, name := range []string{"delta", "linear-delta", "3-RRR", "6-UPS"} {
		t.Run(name, func(t *testing.T) {
			f := kin.FamilyNamed(name)
			task, p := partTask(t, f)
			first := Appraise(task, p, p.Single())
			if !first.Feasible || value(t, first, "coverage") >= 1 {
				t.Fatalf("feasible %v, coverage %g", first.Feasible, value(t, first, "coverage"))
			}
			tried, cut := 0, 0
			for _, m := range every(task, f) {
				if !m.perPose() {
					continue
				}
				worst := value(t, first, m.Name)
				if math.IsInf(worst, 0) {
					t.Errorf("%s is %g over poses that can be reached", m.Name, worst)
					continue
				}
				for _, part := range []float64{1, 0.9} { // of the worst value: held by all that counts, and by fewer
					bound := worst * part
					if m.Sense == Larger {
						bound = worst + (1-part)*math.Abs(worst)
					}
					task.Limits = []Limit{{Measure: m, AtLeast: m.Sense == Larger, Bound: bound, Origin: "actuator"}}
					task.Goals = goalsOf([]*Measure{m, effortOf(t, f), measured(t, "mean_conditioning")})
					a, r := Appraise(task, p, p.Single()), screened(task, p)
					sameGoals(t, task, r, a)
					if c := value(t, a, "coverage"); a.Feasible != (c >= task.Coverage) || !a.Feasible && part == 1 {
						t.Errorf("%s of %g: feasible %v with coverage %g", m.Name, bound, a.Feasible, c)
					}
					tried++
					if value(t, a, "coverage") < value(t, first, "coverage") {
						cut++
					}
					if !strings.Contains(strings.Join(a.Notes, "\n"), "do not count") {
						t.Errorf("no note tells which poses count: %q", a.Notes)
					}
					if value(t, a, "coverage") == 0 {
						continue
					}
					alone := survivors(task, a)
					b := Appraise(alone, p, p.Single())
					if !b.Feasible {
						t.Errorf("%s: the poses that count fail by themselves: %+v", m.Name, b.Verdicts)
					}
					for _, r := range a.Readings {
						if n := r.Measure.Name; n == "coverage" || r.Measure.Mean || r.Measure.Scouts { // not the same volume, nor scouts
							continue
						}
						rounding := 0.0
						if r.Measure.Name == "leg_clearance" { // pairs of legs are compared in another order
							rounding = 1e-15
						}
						if got := value(t, b, r.Measure.Name); got != r.Value && !(math.Abs(got-r.Value) <= rounding) {
							t.Errorf("%s with a limit on %s: %.17g, by the poses that count alone %.17g", r.Measure.Name, m.Name, r.Value, got)
						}
					}
					for i, l := range a.Legs {
						k := b.Legs[i]
						if l.Push != k.Push || l.Pull != k.Pull || l.Speed != k.Speed || l.Least != k.Least || l.Most != k.Most {
							t.Errorf("leg %d: %+v, alone %+v", i, l, k)
						}
					}
				}
			}
			if tried < 10 || cut < tried/4 {
				t.Errorf("%d limits, of which %d cut coverage, test little", tried, cut)
			}
		})
	}
}

// A design no pose of which counts is refused, however little coverage is asked for: it has no figures.
func TestSoftCoverageOfNothing(t *testing.T) {
	f := kin.FamilyNamed("delta")
	task, p := partTask(t, f)
	task.Coverage, task.CoverageGoal = 0, true
	task.Limits = []Limit{{Measure: measured(t, "motor_torque"), Bound: 1e-9, Origin: "actuator.torque"}}
	task.Goals = goalsOf([]*Measure{measured(t, "motor_torque"), measured(t, "coverage")})
	a, r := Appraise(task, p, p.Single()), screened(task, p)
	if a.Feasible || r.Violation != 1 || value(t, a, "coverage") != 0 || !math.IsInf(value(t, a, "motor_torque"), 1) {
		t.Errorf("feasible %v, violation %g, %+v", a.Feasible, r.Violation, a.Verdicts)
	}
}
