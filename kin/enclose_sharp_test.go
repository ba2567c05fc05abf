package kin_test

import (
	"math"
	"testing"

	"legwright/kin"
	"legwright/kin/enclose"
)

// remainders is the sum of the remainders of each part of an enclosure.
func remainders(e *kin.Enclosure) map[string]float64 {
	out := map[string]float64{}
	add := func(what string, forms ...enclose.Form) {
		for i := range forms {
			out[what] += forms[i].R
		}
	}
	add("Q", e.Q[:]...)
	add("J", e.J[:]...)
	add("BaseChord", e.BaseChord[:]...)
	add("PlatformChord", e.PlatformChord[:]...)
	add("Wrenches", e.Wrenches[:]...)
	add("P", e.P[:]...)
	add("R", e.R[:]...)
	add("T", e.T[:]...)
	for i := range e.Links {
		add("Links", e.Links[i].From[:]...)
		add("Links", e.Links[i].To[:]...)
	}
	return out
}

// about is the box of a part of the family's starter box about the pose.
func about(f *kin.Family, c kin.Coords, part float64) (b enclose.Box) {
	for q := range kin.Freedom(6) {
		half := 0.
		if f.Has(q) {
			half = part * f.Starter.Box[q]
		}
		b.Low[q], b.High[q] = c[q]-half, c[q]+half
	}
	return b
}

// Remainders are of second order: they fall by four, and a little less where third orders matter, as boxes are halved.
func TestEnclosuresAreOfFirstOrder(t *testing.T) {
	const floor = 1e-9
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(8)
			for range 20 {
				tr := postured(t, rng, f, anySetup(rng), 1)
				m := encloser(t, f, tr.m)
				var e kin.Enclosure
				c := tr.p.Coords()
				var last map[string]float64
				for _, part := range []float64{1. / 64, 1. / 128, 1. / 256} {
					b := about(f, c, part)
					m.Enclose(&b, &e)
					if e.Reach != kin.AllReach {
						last = nil
						continue
					}
					now := remainders(&e)
					for what, r := range now {
						if was, ok := last[what]; ok && was > floor && !(was >= 3.5*r) {
							t.Errorf("%s: remainder %g at twice the size, %g now", what, was, r)
						}
					}
					last = now
				}
			}
		})
	}
}

// Remainders are not merely sound: on boxes of a tenth of the starter box postures use most of what
// they allow, on average over machines.
func TestEnclosuresAreSharp(t *testing.T) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(5)
			allowed, used := [2]float64{}, [2]float64{}
			for range 20 {
				tr := postured(t, rng, f, anySetup(rng), 1)
				m := encloser(t, f, tr.m)
				var e kin.Enclosure
				b := about(f, tr.p.Coords(), 0.1)
				m.Enclose(&b, &e)
				if e.Reach != kin.AllReach {
					continue
				}
				var q [6]float64
				var j [36]float64
				for range 300 {
					c := inBox(rng, f, &b)
					s, t := moved(t, m, kin.NewPose(c)), normal(&b, &c)
					for i := range f.Legs {
						off := at(&e.Q[i], &t) - s.Q[i]
						q[i] = math.Max(q[i], math.Abs(off-2*math.Pi*math.Round(off/(2*math.Pi))))
					}
					for i := range 6 * f.Legs {
						j[i] = math.Max(j[i], math.Abs(at(&e.J[i], &t)-s.J[i]))
					}
				}
				for i := range f.Legs {
					allowed[0], used[0] = allowed[0]+e.Q[i].R, used[0]+q[i]
				}
				for i := range 6 * f.Legs {
					allowed[1], used[1] = allowed[1]+e.J[i].R, used[1]+j[i]
				}
			}
			share := [2]float64{used[0] / allowed[0], used[1] / allowed[1]}
			t.Logf("used: %.2f of the remainders of Q, %.2f of those of J", share[0], share[1])
			if share[0] < 0.45 || share[1] < 0.45 {
				t.Errorf("used: only %.2f of the remainders of Q, %.2f of those of J", share[0], share[1])
			}
		})
	}
}

// Where Move finds a dimension that is no finite number, nothing is known of a box.
func TestEnclosureOfDimensionsThatAreNoNumbers(t *testing.T) {
	for _, f := range kin.Families() {
		wrong := 0
		for i := range f.Dimensions {
			for _, v := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
				d := sound(f)
				d[i] = v
				m := f.Build(d, offCentre())
				var (
					s kin.State
					e kin.Enclosure
					b = about(f, kin.Coords{}, 0.01)
					p = atHome()
				)
				m.Move(&p, &s)
				encloser(t, f, m).Enclose(&b, &e)
				if s.Fail == kin.Reached {
					continue
				}
				wrong++
				if e.Reach == kin.AllReach {
					t.Errorf("%s: all reached with %s %g, where Move fails", f.Name, f.Dimensions[i].Name, v)
				}
			}
		}
		if wrong < 6 {
			t.Errorf("%s: Move failed only %d times", f.Name, wrong)
		}
	}
}
