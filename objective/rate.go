package objective

import (
	"legwright/kin"
)

func rate(name, text string, unit Unit, has func(*kin.Family) bool) *Measure {
	return &Measure{
		Name: name, Text: text, Unit: unit, Sense: Smaller, Need: NeedRates,
		Source: "rows of the inverse Jacobian; exact over the sets by their support functions (common practice, no source)",
		Has:    has, Lost: inf(),
		Scan: func(v *View, w *Worst) {
			for _, c := range v.active[v.pose.Zone] {
				r := &v.rate[c]
				for i := 0; i < v.n && i < 6; i++ {
					if r[i] > w.Value {
						w.set(v, r[i], i, c)
					}
				}
			}
		},
	}
}

func legSpeed() *Measure {
	return rate("leg_speed", "largest actuator speed of any leg", MetrePerSecond, linearDrives)
}

func motorSpeed() *Measure {
	return rate("motor_speed", "largest actuator speed of any leg", RadianPerSecond, rotaryDrives)
}

func legPower() *Measure {
	return &Measure{
		Name: "leg_power", Unit: Watt, Sense: Smaller, Need: NeedEfforts | NeedRates,
		Text:   "bound of the actuator power: largest effort times largest rate of one leg at one pose and case",
		Source: "common practice, no source", Lost: inf(),
		Scan: func(v *View, w *Worst) {
			for _, c := range v.active[v.pose.Zone] {
				for i := 0; i < v.n && i < 6; i++ {
					if p := largest(v.lo[c][i], v.hi[c][i]) * v.rate[c][i]; p > w.Value {
						w.set(v, p, i, c)
					}
				}
			}
		},
	}
}
