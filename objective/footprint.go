package objective

import (
	"math"

	"legwright/kin"
)

func footprint() *Measure {
	return &Measure{
		Name: "footprint", Unit: Metre, Sense: Smaller,
		Text:   "diameter of the smallest circle in plan that holds the base joints, and what cranks sweep and rails take within the actuator range",
		Source: "smallest enclosing circle, E. Welzl 1991 (from memory)",
		Design: func(d *Design) float64 {
			plan := d.Machine.Frame().Base
			low, high := 0.0, 0.0 // a family without a range has stops of its own
			if least, span := d.Family.Range(); least >= 0 {
				low, high = d.Values[least], d.Values[least]+d.Values[span]
			}
			swept := kin.Sweep(d.Machine, low, high)
			if len(swept) > 0 && math.IsNaN(high) {
				return high // known when the range is sized
			}
			return enclosing(append(append([]kin.Vec(nil), plan...), swept...))
		},
	}
}
