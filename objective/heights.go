package objective

import (
	"math"

	"legwright/kin"
)

// Heights are how high the platform stands above the base origin, along z of the base frame: over the sampled poses
// that count (Task.Coverage) and those that decide worst values, and where all actuators are at one end of their range.
type Heights struct {
	Home             float64 // platform origin
	Lowest, Highest  float64 // platform origin over the duty; infinite where no pose counts
	LowestAt, HighAt *Sample
	Under, Over      float64 // lowest and highest platform joint centre over the duty

	Ends [2]End // all actuators at the least, at the most of their range
}

// End is the posture with all actuators at one end of their range.
type End struct {
	Height float64 // platform origin; NaN if the machine cannot take it
	Level  bool    // straight above home and not tilted, within 1e-9 of the machine's size and 1e-9 rad
	Fails  string  // why it cannot take it
}

// Collapsed is the lower of the two ends, or nil where that is not known: the machine can take only one of them, which is
// not below the duty's lowest height.
func (h *Heights) Collapsed() *End {
	a, b := &h.Ends[0], &h.Ends[1]
	if a.Fails != "" {
		a, b = b, a
	}
	switch {
	case a.Fails != "":
		return nil
	case b.Fails != "":
		known := h.Lowest <= h.Highest // some pose counts
		if known && (h.Lowest > 0 && a.Height < h.Lowest || h.Highest < 0 && a.Height > h.Highest) {
			return a
		}
		return nil
	case math.Abs(b.Height) < math.Abs(a.Height):
		return b
	}
	return a
}

// PlatformHeights finds the heights of an appraised design.
func PlatformHeights(t *Task, a *Appraisal) Heights {
	v := newView(t)
	v.serve(a.Plan.Family)
	v.begin(a.Machine)
	d := Design{Family: a.Plan.Family, Values: a.Values, Machine: a.Machine}
	l := newPoseLimits(t, v, a.Plan, &d)
	f := a.Machine.Frame()
	h := Heights{Home: f.Home.Z, Lowest: inf(), Highest: -inf(), Under: inf(), Over: -inf()}
	look := func(s *Sample) {
		if !v.at(s, -1, 0) {
			return
		}
		origin, rot := a.Machine.Place(v.stand)
		if origin.Z < h.Lowest {
			h.Lowest, h.LowestAt = origin.Z, s
		}
		if origin.Z > h.Highest {
			h.Highest, h.HighAt = origin.Z, s
		}
		for _, b := range f.Platform {
			z := origin.Z + rot.Apply(b).Z
			h.Under, h.Over = math.Min(h.Under, z), math.Max(h.Over, z)
		}
	}
	for k := range t.samples {
		if s := &t.samples[k]; !t.soft() || l.fails(s) == "" {
			look(s)
		}
	}
	for _, s := range a.deciding() {
		look(s)
	}
	for i := range h.Ends {
		h.Ends[i] = a.end(v, float64(i))
	}
	return h
}

// endSteps is the number of steps in which actuators are led from home to an end of their range.
const endSteps = 50

// end leads all actuators from home to the part (0 or 1) of their range, keeping to the posture of home. Actuators
// without a range stay.
func (a *Appraisal) end(v *View, part float64) End {
	e := End{Height: math.NaN()}
	p := a.Plan
	switch {
	case p.least < 0:
		e.Fails = "the actuators have no range in common"
		return e
	case !a.Plan.Family.Has(kin.Z):
		e.Fails = "the platform moves in its plane alone"
		return e
	case v.homeSign == 0:
		e.Fails = "home is singular or out of reach"
		return e
	}
	to := a.Values[p.least] + part*a.Values[p.span]
	q := make([]float64, v.n)
	at := kin.NewPose(kin.Coords{})
	var here kin.Posture
	for k := range endSteps {
		x := float64(k+1) / endSteps
		for i := range q {
			q[i] = v.homeQ[i]
			if i < v.n-v.free {
				q[i] = (1-x)*v.homeQ[i] + x*to
			}
		}
		var ok bool
		if here, ok = kin.Locate(a.Machine, q, at); !ok || here.Determinant*float64(v.homeSign) <= 0 {
			e.Fails = "no posture on the way there, or a singular one"
			return e
		}
		at = here.Pose
	}
	f := a.Machine.Frame()
	off := sub(here.Origin, f.Home)
	off.Z = 0
	w := 0.0
	for i := range here.Rot {
		w = math.Max(w, math.Abs(here.Rot[i]-f.HomeRot[i]))
	}
	e.Height, e.Level = here.Origin.Z, norm(off) <= 1e-9*(norm(f.Home)+enclosing(f.Base)) && w <= 1e-9
	return e
}
