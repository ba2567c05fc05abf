package objective

import (
	"math"

	"legwright/kin"
)

func legClearance() *Measure {
	return &Measure{
		Name: "leg_clearance", Unit: Metre, Sense: Larger, Need: NeedGap, Has: legged,
		Text:   "least distance between the axes of two legs that share no joint, less the leg diameter",
		Source: "segment distance, common practice, no source",
		Scale: func(t *Task) float64 {
			if t.Legs.Diameter > 0 {
				return t.Legs.Diameter
			}
			return 0.05
		},
		Start: inf(), Lost: -inf(),
		Scan: func(v *View, w *Worst) {
			if v.gap < w.Value {
				w.set(v, v.gap, v.gapI, -1)
				w.Mate = v.gapJ
			}
		},
	}
}

func jointSpacing() *Measure {
	return &Measure{
		Name: "joint_spacing", Unit: Metre, Sense: Larger,
		Text:   "least distance between two joint centres on one plate (joints that coincide count as one)",
		Source: "common practice, no source", Has: legged,
		Scale: func(*Task) float64 { return 0.05 },
		Design: func(d *Design) float64 {
			f := d.Machine.Frame()
			return math.Min(spacing(f.Base), spacing(f.Platform))
		},
	}
}

// spacing leaves out joints nearer than 1e-9 of the plate's size: a double joint
// reached through two azimuths differs by rounding.
func spacing(joints []kin.Vec) float64 {
	size, least := 0.0, inf()
	for _, a := range joints {
		size = math.Max(size, norm(a))
	}
	for i, a := range joints {
		for _, b := range joints[i+1:] {
			if l := norm(sub(a, b)); l > 1e-9*size && l < least {
				least = l
			}
		}
	}
	return least
}
