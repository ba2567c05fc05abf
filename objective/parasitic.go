package objective

import (
	"math"

	"legwright/kin"
)

const parasiticSource = "J. A. Carretero, R. P. Podhorodeski, M. A. Nahon and C. M. Gosselin 2000, ASME J. Mech. Des. 122:17 (from memory)"

// tiltsAlone tells whether machines of the family tilt by their own freedoms while x, y and yaw follow.
func tiltsAlone(f *kin.Family) bool {
	return f.Has(kin.Roll) && !f.Has(kin.X) && !f.Has(kin.Y) && !f.Has(kin.Yaw)
}

func parasiticMotion() *Measure {
	return &Measure{
		Name: "parasitic_motion", Unit: Metre, Sense: Smaller, Has: tiltsAlone,
		Text:   "largest distance of the platform origin from the z axis, which tilting moves it off",
		Source: parasiticSource, Lost: inf(), Finish: math.Sqrt,
		Scale: func(*Task) float64 { return 0.01 },
		Scan: func(v *View, w *Worst) {
			if o, _ := v.machine.Place(v.stand); o.X*o.X+o.Y*o.Y > w.Value {
				w.set(v, o.X*o.X+o.Y*o.Y, -1, -1)
			}
		},
	}
}

func parasiticTurn() *Measure {
	return &Measure{
		Name: "parasitic_turn", Unit: Radian, Sense: Smaller, Has: tiltsAlone,
		Text:   "largest absolute yaw of the platform, which tilting turns it by",
		Source: parasiticSource, Lost: inf(),
		Scale: func(*Task) float64 { return 0.01 },
		Scan: func(v *View, w *Worst) {
			_, r := v.machine.Place(v.stand)
			if yaw := math.Abs(math.Atan2(r[3], r[0])); yaw > w.Value {
				w.set(v, yaw, -1, -1)
			}
		},
	}
}
