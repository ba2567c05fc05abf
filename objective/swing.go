package objective

import "math"

// swingOf is the angle between two unit vectors whose squared distance is c.
func swingOf(c float64) float64 {
	return 2 * math.Atan2(math.Sqrt(c), math.Sqrt(math.Max(4-c, 0)))
}

func swing(name, text string, chords func(v *View) *[6]float64) *Measure {
	return &Measure{
		Name: name, Text: text, Unit: Radian, Sense: Smaller,
		Source: "angle of two unit vectors by their difference and sum, W. Kahan (from memory)",
		Start:  0, Lost: 4, Finish: swingOf, Has: legged,
		Scan: func(v *View, w *Worst) {
			c := chords(v)
			for i := 0; i < v.n && i < 6; i++ {
				if c[i] > w.Value {
					w.set(v, c[i], i, -1)
				}
			}
		},
	}
}

func baseSwing() *Measure {
	return swing("base_swing", "largest angle of a base joint from its mounting axis, in base axes",
		func(v *View) *[6]float64 { return &v.S.BaseChord })
}

func platformSwing() *Measure {
	return swing("platform_swing", "largest angle of a platform joint from its mounting axis, in platform axes",
		func(v *View) *[6]float64 { return &v.S.PlatformChord })
}
