package opt

import (
	"math/rand/v2"
	"testing"
)

// The search over a set says what comparing one point after another says, ties
// and points that are equal included.
func TestRelatedComparesAll(t *testing.T) {
	r := rand.New(rand.NewPCG(9, 9))
	for m := 1; m <= 6; m++ {
		for it := range 300 {
			pts := randomSet(r, 1+r.IntN(12), m, it%2 == 0)
			p := randomSet(r, 1, m, it%2 == 0)[0]
			var set []float64
			for _, q := range pts {
				set = append(set, q...)
			}
			from := r.IntN(len(pts))
			at, relation := len(pts), 0
			for i := len(pts) - 1; i >= from; i-- {
				if c := compare(pts[i], p); c != 0 {
					at, relation = i, c
				}
			}
			if a, b := related(set, p, from); a != at || b != relation {
				t.Fatalf("%v from %d against %v: %d, %d; want %d, %d", pts, from, p, a, b, at, relation)
			}
		}
	}
}
