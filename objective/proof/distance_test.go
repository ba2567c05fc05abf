package proof

import (
	"math"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

// How far a hexagonal platform is from singular as it yaws: one coordinate, on which a fine row of poses finds the least ratio of the
// singular values. What is proved lies below it, and not far below.
func TestDistanceFromSingular(t *testing.T) {
	values := []float64{0.6, 0.4, 15 * deg, 12 * deg, 0.8, 0.1, 3}
	task := boxTask(objective.Box, kin.Coords{5: -60 * deg}, kin.Coords{5: 60 * deg})
	task.Prepare()
	r := prove(t, task, planOf(task, "6-UPS", values), values, Settings{})
	o := outcome(t, r, "regular")
	v := newProber(mustSubject(task, "6-UPS", values))
	least := math.Inf(1)
	for k := range 2001 {
		v.at(kin.Coords{5: (-60 + 0.06*float64(k)) * deg}, 0)
		ratio, _ := v.Singular()
		least = math.Min(least, ratio)
	}
	if o.Answer != Proved || !(o.Bound <= least && o.Bound > 0.1*least) {
		t.Errorf("%v: a ratio of %g is proved, and %g is met", o.Answer, o.Bound, least)
	}
}
