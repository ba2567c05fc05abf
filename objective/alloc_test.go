package objective

import (
	"testing"

	"legwright/kin"
)

// Judging allocates for the machine, never for a pose: two hundred poses more, no more allocations.
func TestPosesAllocateNothing(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		judge := func(m *Measure, soft bool, samples int) float64 {
			task := richTask(seeded(31), f)
			task.Zones[0].Samples, task.Zones[2].Samples = samples, samples
			task.Cases[0].Loads[0].Angular = Set{} // fewer corners for deflection
			task.Goals = goalsOf([]*Measure{m})
			if m.Scan != nil && !m.Mean {
				task.Limits = []Limit{{Measure: m, AtLeast: true, Bound: -1e300, Origin: "limits"}}
			}
			if soft {
				task.Coverage = 0.5
			}
			task.CoverageGoal = m.Name == "coverage"
			task.Prepare()
			s := NewScreen(task, sizedPlan(task, f, soundDesign(f)))
			var r Score
			s.Judge(nil, &r)
			if r.Violation > 0 {
				t.Fatalf("%s: %v", m.Name, r.Excess)
			}
			return testing.AllocsPerRun(2, func() { s.Judge(nil, &r) })
		}
		for _, m := range every(richTask(seeded(31), f), f) {
			for _, soft := range []bool{false, true} {
				few, many := judge(m, soft, 70), judge(m, soft, 210)
				if few != many {
					t.Errorf("%s, soft %v: %g allocations with few poses, %g with many", m.Name, soft, few, many)
				}
			}
		}
	})
}

// The walk itself allocates nothing at all, with every measure at once.
func TestWalkAllocatesNothing(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		task := richTask(seeded(32), f)
		task.Cases[0].Loads[0].Angular = Set{}
		task.Prepare()
		v := newView(task)
		v.begin(sizedPlan(task, f, soundDesign(f)).build(task, soundDesign(f)))
		var ts []tracker
		need := Need(0)
		for _, m := range every(task, f) {
			if m.Scan != nil {
				ts = append(ts, tracker{m: m})
				need |= m.Need
			}
		}
		n := testing.AllocsPerRun(2, func() {
			for i := range ts {
				ts[i].reset()
			}
			v.walk(0, len(task.samples), need, ts)
		})
		if n != 0 {
			t.Errorf("%g allocations in a walk over %d poses", n, len(task.samples))
		}
	})
}
