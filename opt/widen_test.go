package opt

import (
	"slices"
	"testing"
)

// A few designs next to a pole do not carry the reference off; what is nearer
// than the reference leaves it.
func TestOutliersLeaveTheReference(t *testing.T) {
	r := &run{problem: &Problem{Goals: 2}, reference: []float64{0.5, 2}}
	for i := range 101 { // 0 ... 1 in the first goal, 1 ... 0 in the second
		v := float64(i) / 100
		g := &genome{goals: []float64{v, 1 - v}}
		if i < 5 {
			g.goals[1] += 1e9
		}
		r.archive.add(g, i)
	}
	r.widen()
	if want := []float64{0.95 + 0.1*0.95, 2}; !slices.Equal(r.reference, want) { // all but five of 101
		t.Errorf("reference %v, want %v", r.reference, want)
	}
}
