package objective

import "math"

// worstShift is the largest norm of three rows of x times an error vector of ±e
// in every actuator: exact over the 2ⁿ⁻¹ sign patterns, in Gray-code order.
func (v *View) worstShift(first int, unit float64) float64 {
	if v.sign == 0 {
		return inf()
	}
	e := v.task.Actuator.Error * unit
	var s [3]float64
	for i := range v.n {
		for k := range s {
			s[k] += e * v.x[6*(first+k)+i]
		}
	}
	var sign [6]bool
	worst := 0.0
	for n := 1; ; n++ {
		worst = math.Max(worst, s[0]*s[0]+s[1]*s[1]+s[2]*s[2])
		if n == 1<<(v.n-1) {
			return math.Sqrt(worst)
		}
		i := 0
		for n>>i&1 == 0 {
			i++
		}
		d := -2 * e
		if sign[i] {
			d = -d
		}
		sign[i] = !sign[i]
		for k := range s {
			s[k] += d * v.x[6*(first+k)+i]
		}
	}
}

func positionError() *Measure {
	return &Measure{
		Name: "position_error", Unit: Metre, Sense: Smaller, Need: NeedMatrix,
		Text:   "largest displacement of the tool point when every actuator is off by ±actuator.error",
		Source: "first order, exact over the signs (common practice, no source)",
		Inputs: []string{"actuator.error"}, Lost: inf(),
		Scan: func(v *View, w *Worst) {
			if s := v.worstShift(0, 1); s > w.Value {
				w.set(v, s, -1, -1)
			}
		},
	}
}

func angleError() *Measure {
	return &Measure{
		Name: "angle_error", Unit: Radian, Sense: Smaller, Need: NeedMatrix,
		Text:   "largest rotation of the platform when every actuator is off by ±actuator.error",
		Source: "first order, exact over the signs (common practice, no source)",
		Inputs: []string{"actuator.error"}, Has: turns, Lost: inf(),
		Scan: func(v *View, w *Worst) {
			if s := v.worstShift(3, v.invLc); s > w.Value {
				w.set(v, s, -1, -1)
			}
		},
	}
}
