package job

import (
	"math"
	"testing"
)

const mixedBrief = briefs + "three-drives.yaml"

// What a brief says of one sort of actuator is not asked of another.
func TestActuatorsOfEachFamily(t *testing.T) {
	s := load(t, mixedBrief)
	for i, p := range s.Plans {
		a := &s.Tasks[i].Actuator
		if given := !math.IsNaN(a.DeadLength); given != (p.Family.Name == "6-UPS") {
			t.Errorf("%s: dead length %v", p.Family.Name, a.DeadLength)
		}
		want := 0.008
		if p.Family.Name == "6-RUS" {
			want = 2 * math.Pi / 180
		}
		if math.Abs(a.Reserve-want) > 1e-15 {
			t.Errorf("%s: reserve %v, want %v", p.Family.Name, a.Reserve, want)
		}
	}
	s.Brief.Actuator.Strokes = []float64{0.2, 0.3}
	for i, p := range s.Plans {
		n := len(task(s.Brief, p.Family).Actuator.Strokes)
		if (n == 0) != (p.Family.Name == "6-RUS") {
			t.Errorf("%s, plan %d: %d stock strokes", p.Family.Name, i, n)
		}
	}
}
