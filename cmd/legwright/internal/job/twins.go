package job

import (
	"math"

	"legwright/objective"
)

// oneOfTwins puts the twin with the smaller half-angles in a design's place where
// the two are one machine turned by half a turn, so that a table never shows
// one machine in two ways: the task must be unchanged by half a turn, both must be
// allowed, and the sampled poses must agree on every goal.
func (s *Study) oneOfTwins(a *objective.Appraisal, t *objective.Task) *objective.Appraisal {
	if !s.halfTurn {
		return a
	}
	twin := a.Plan.TwinOf(a.Values)
	if twin == nil || !less(twin, a.Values) {
		return a
	}
	b := objective.Appraise(t, a.Plan, twin)
	if !b.Feasible {
		return a
	}
	for _, g := range t.Goals {
		x, y := a.Reading(g.Measure.Name), b.Reading(g.Measure.Name)
		if x == nil || y == nil || math.Abs(x.Value-y.Value) > objective.Tolerance*math.Abs(x.Value) {
			return a
		}
	}
	return b
}

// less compares the first values that differ.
func less(a, b []float64) bool {
	for i := range a {
		if a[i] != b[i] && !(math.IsNaN(a[i]) || math.IsNaN(b[i])) {
			return a[i] < b[i]
		}
	}
	return false
}

// same tells whether two appraised designs are one and the same.
func same(a, b *objective.Appraisal) bool {
	if a.Plan != b.Plan {
		return false
	}
	for i := range a.Values {
		if math.Abs(a.Values[i]-b.Values[i]) > 1e-9*math.Abs(a.Values[i]) {
			return false
		}
	}
	return true
}
