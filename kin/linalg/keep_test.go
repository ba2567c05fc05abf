package linalg

import (
	"math"
	"testing"
)

// The least ratio over the poses of a machine is the same to the last bit with a
// running keep as without, in either order of the poses.
func TestKeepGivesTheSameMinimum(t *testing.T) {
	const poses = 100
	early, total := 0, 0
	for _, size := range []float64{0.01, 0.3, 2} {
		js := legMatrices(40, poses, size)
		for ; len(js) > 0; js = js[poses:] {
			want := math.Inf(1)
			var exact [poses]float64
			for i := range poses {
				exact[i] = Ratio2Six(&js[i], 2)
				want = min(want, exact[i])
			}
			forward, backward := 2.0, 2.0
			for i := range poses {
				got := Ratio2Six(&js[i], forward)
				if got != exact[i] {
					early++
					// A bound from below, above keep.
					if got <= forward || got > exact[i]*(1+1e-9) {
						t.Errorf("keep %v gives %v for the ratio %v", forward, got, exact[i])
					}
				}
				total++
				forward = min(forward, got)
				backward = min(backward, Ratio2Six(&js[poses-1-i], backward))
			}
			if forward != want || backward != want {
				t.Errorf("size %g: least ratio %v, with keep %v and %v", size, want, forward, backward)
			}
		}
	}
	if early < total/2 {
		t.Errorf("only %d of %d ratios returned early", early, total)
	}
}

func TestKeepAboveOneIsExact(t *testing.T) {
	for _, j := range legMatrices(5, 20, 1) {
		want := Ratio2Six(&j, math.Inf(1))
		for _, keep := range []float64{1.0001, 2, math.NaN()} {
			if got := Ratio2Six(&j, keep); got != want {
				t.Errorf("keep %v: %v, want %v", keep, got, want)
			}
		}
	}
}
