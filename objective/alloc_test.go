package objective

import (
	"slices"
	"testing"

	"legwright/kin"
)

// Judging allocates for the machine, never for a pose: fifty poses more in two zones, no more allocations. Every measure is
// a goal, and a limit that holds.
func TestPosesAllocateNothing(t *testing.T) {
	if testing.Short() {
		t.Skip("judges hundreds of poses of every family; the walk's own test stays")
	}
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		judge := func(soft bool, samples int) float64 {
			task := richTask(seeded(31), f)
			task.Zones = []Zone{ranged(f, Box, 0.8, samples), ranged(f, Ellipsoid, 1, samples)}
			task.Cases = task.Cases[:1] // few corners, which deflection tries all
			all := slices.DeleteFunc(every(task, f), func(m *Measure) bool { return m.Name == "mode_separation" })
			task.Goals = goalsOf(all)
			for _, m := range all {
				if m.Scan != nil && !m.Mean {
					task.Limits = append(task.Limits, Limit{Measure: m, AtLeast: true, Bound: -1e300, Origin: "limits"})
				}
			}
			if soft {
				task.CoverageGoal, task.Coverage = true, 0
			}
			task.Prepare()
			s := NewScreen(task, sizedPlan(task, f, soundDesign(f)))
			var r Score
			s.Judge(nil, &r)
			if slices.Contains(prismatic, f.Name) && r.Violation > 0 {
				t.Fatalf("refused before all poses were seen: %v", r.Excess)
			}
			return testing.AllocsPerRun(4, func() { s.Judge(nil, &r) })
		}
		for _, soft := range []bool{false, true} {
			few, many := judge(soft, 66), judge(soft, 116)
			if many > few+5 { // the runtime may allocate a little by itself
				t.Errorf("soft %v: %g allocations with few poses, %g with many", soft, few, many)
			}
		}
	})
}

// The walk itself allocates nothing at all, whichever measure is followed but the distance of assembly modes.
func TestWalkAllocatesNothing(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task := richTask(seeded(32), f)
		task.Zones, task.Cases = task.Zones[1:], task.Cases[:1]
		task.Cases[0].Loads = randomLoads(seeded(33), anyWay)
		task.Prepare()
		v := newView(task)
		v.begin(sizedPlan(task, f, soundDesign(f)).build(task, soundDesign(f)))
		for _, m := range every(task, f) {
			if m.Scan == nil || m.Name == "mode_separation" { // solvers of the forward kinematics allocate
				continue
			}
			ts := []tracker{{m: m}}
			n := testing.AllocsPerRun(4, func() {
				ts[0].reset()
				v.walk(0, len(task.samples), m.Need, ts)
			})
			if n != 0 {
				t.Errorf("%s: %g allocations in a walk over %d poses", m.Name, n, len(task.samples))
			}
		}
	})
}
