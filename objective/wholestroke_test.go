package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// strokesOf follows a design whose actuators have the range [low, high].
func strokesOf(t *testing.T, f *kin.Family, values []float64, low, high float64) (*WholeStroke, kin.Machine) {
	t.Helper()
	task := atHome()
	task.Prepare()
	d := append([]float64(nil), values...)
	least, span := f.Range()
	d[least], d[span] = low, high-low
	p := sizedPlan(task, f, d)
	p.Specs[least], p.Specs[span] = Spec{Kind: Fixed, Values: []float64{low}}, Spec{Kind: Fixed, Values: []float64{high - low}}
	w, ok := Strokes(task, p, d)
	if !ok {
		t.Fatal("no strokes")
	}
	return w, p.build(task, d)
}

// Every way ends at a pose whose inverse kinematics gives the actuator coordinates of the share that was gone: 1e-9 of
// the longest. Small strokes about home meet no singularity, in any family whose actuators are alike there.
func TestWaysKeepTheirActuators(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		if least, _ := f.Range(); least < 0 {
			t.Skip("no range")
		}
		task := atHome()
		task.Prepare()
		a := appraise(task, f, soundDesign(f))
		low, high := a.Legs[0].Home, a.Legs[0].Home
		for _, l := range a.Legs[:len(a.Legs)-f.Free] {
			low, high = math.Min(low, l.Home), math.Max(high, l.Home)
		}
		even := high-low < 0.01 // else some actuators go far even with small strokes
		for _, part := range []float64{0.006, 0.2} {
			w, m := strokesOf(t, f, soundDesign(f), low-part, high+part)
			n := len(m.Frame().Base) - f.Free
			if len(w.Runs) != 1<<n+2*n || w.Both != 1<<n {
				t.Fatalf("%d ways of %d actuators", len(w.Runs), n)
			}
			for i := range w.Runs {
				o := &w.Runs[i]
				var s kin.State
				p := kin.Settle(m, &o.Last.Pose)
				if m.Move(&p, &s); s.Fail != kin.Reached {
					t.Fatalf("way %d ends out of reach", i)
				}
				for k, e := range o.Ends {
					end := a.Legs[k].Home
					switch e {
					case -1:
						end = w.Low
					case 1:
						end = w.High
					}
					want := a.Legs[k].Home + o.Share*(end-a.Legs[k].Home)
					if d := math.Remainder(s.Q[k]-want, 2*math.Pi); math.Abs(d) > 1e-9 {
						t.Errorf("way %v, share %g: actuator %d at %.12g, want %.12g", o.Ends, o.Share, k+1, s.Q[k], want)
					}
				}
				if even && part < 0.1 && o.Share != 1 {
					t.Errorf("way %v ends at %g: %q", o.Ends, o.Share, o.Stops)
				}
				if (o.Share == 1) != (o.Stops == "") {
					t.Errorf("way %v ends at %g: %q", o.Ends, o.Share, o.Stops)
				}
			}
		}
	})
}

// A 3-RPR machine with equilateral plates turned by h at its centre is singular where h is 0 or 180° and nowhere
// else while all legs are equally long, as they are while all run together (at the centre the leg lines are tangents of
// one circle, of radius proportional to sin h; C. Gosselin and J. Wang 1997, from memory). Their length there is base_radius -
// platform_radius at 0 and the sum at 180°. Home at 60°: shortened beyond the difference the way ends at the length R - r, share (L0 -
// (R - r)) / (L0 - low), 1e-9; kept above it, it does not.
func TestWaysOfATriangle(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := soundDesign(f)
	R, r := 0.5, 0.2
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = R, r, math.Pi/3
	home := math.Sqrt(R*R + r*r - 2*R*r*math.Cos(math.Pi/3))
	for _, c := range []struct {
		low  float64
		ends bool
	}{{R - r - 0.05, true}, {R - r + 0.01, false}} {
		w, _ := strokesOf(t, f, d, c.low, home+0.02)
		parked := &w.Runs[0]
		if parked.Singular() != c.ends {
			t.Fatalf("parked %+v", parked)
		}
		if c.ends {
			near(t, "share", parked.Share, (home-(R-r))/(home-c.low), 1e-9)
			if both, _ := w.Crossing(); both < 1 || w.Nearest() < 0 {
				t.Error("none is counted")
			}
		}
	}
}

// A six-legged machine with short strokes meets none: every combination is followed to its end, and the
// determinant there has home's sign.
func TestWaysOfSixLegs(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	d := soundDesign(f)
	task := atHome()
	task.Prepare()
	q := appraise(task, f, d).Legs[0].Home
	w, m := strokesOf(t, f, d, q-0.04, q+0.04)
	if both, alone := w.Crossing(); both+alone != 0 || len(w.Runs) != 76 {
		t.Fatalf("%d and %d of %d ways meet a singularity", both, alone, len(w.Runs))
	}
	var s kin.State
	home := kin.NewPose(kin.Coords{})
	m.Move(&home, &s)
	sign := math.Copysign(1, kin.Determinant(m, &s))
	for i := range w.Runs {
		if m.Move(&w.Runs[i].Last.Pose, &s); kin.Determinant(m, &s)*sign <= 0 {
			t.Errorf("way %v ends behind a singularity", w.Runs[i].Ends)
		}
	}
	// all legs equally long lift the platform straight up or down
	for _, k := range []int{0, w.Both - 1} {
		near(t, "tilt", w.Runs[k].Tilt, 0, 1e-9)
	}
}
