package objective

import (
	"math"

	"legwright/kin"
)

func conditioning() *Measure {
	return &Measure{
		Name: "conditioning", Unit: Ratio, Sense: Larger, Most: 1, Need: NeedMatrix,
		Text:   "least ratio of the smallest to the largest singular value of the inverse Jacobian, angular columns divided by the characteristic length (1/kappa)",
		Source: "J. K. Salisbury and J. J. Craig 1982, IJRR 1(1):4; C. Gosselin and J. Angeles 1991, ASME J. Mech. Des. 113:220 (from memory)",
		Start:  math.Inf(1), Lost: 0, Finish: math.Sqrt,
		Scan: func(v *View, w *Worst) {
			if v.ratio2 < w.Value {
				w.set(v, v.ratio2, -1, -1)
			}
		},
	}
}

func meanConditioning() *Measure {
	return &Measure{
		Name: "mean_conditioning", Unit: Ratio, Sense: Larger, Most: 1, Need: NeedMatrix | NeedExact, Mean: true,
		Text:   "conditioning averaged over the volume samples of box and ellipsoid zones and all poses of files, over all poses where there are none of these (global conditioning index)",
		Source: "C. Gosselin and J. Angeles 1991, ASME J. Mech. Des. 113:220 (from memory)",
		Scan: func(v *View, w *Worst) {
			if v.pose.Volume {
				w.Sum += math.Sqrt(v.ratio2)
				w.Count++
			}
		},
	}
}

func regularity() *Measure {
	return &Measure{
		Name: "regularity", Unit: Ratio, Sense: Larger, Most: 1, Need: NeedMatrix,
		Text:   "least ratio of the smallest to the largest singular value of the 6×6 matrix of unit actuation and constraint wrenches",
		Source: "S. A. Joshi and L.-W. Tsai 2002, ASME J. Mech. Des. 124:254 (from memory)",
		Start:  math.Inf(1), Lost: 0,
		Scan: func(v *View, w *Worst) {
			if r := v.whole(); r < w.Value {
				w.set(v, r, -1, -1)
			}
		},
	}
}

// turns tells whether machines of the family have a rotational freedom.
func turns(f *kin.Family) bool {
	for _, q := range f.Freedoms {
		if q.Angular() {
			return true
		}
	}
	return false
}

// linearDrives and rotaryDrives choose families by their actuators.
func linearDrives(f *kin.Family) bool { return f.Drive == kin.Linear }
func rotaryDrives(f *kin.Family) bool { return f.Drive == kin.Rotary }
