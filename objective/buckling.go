package objective

import "math"

func bucklingMargin() *Measure {
	return &Measure{
		Name: "buckling_margin", Unit: Ratio, Sense: Larger, Need: NeedEfforts,
		Text:   "least ratio of a leg's Euler load, at its length in that pose, to its push there",
		Source: "L. Euler 1757: P = π² E I / (K L)², I = π d⁴/64 (from memory)",
		Inputs: []string{"legs.rod_diameter", "legs.modulus"}, Has: linearDrives,
		Start: inf, Lost: 0,
		Scan: func(v *View, w *Worst) {
			l := &v.task.Legs
			d2 := l.RodDiameter * l.RodDiameter
			k := math.Pi * math.Pi * l.Modulus * math.Pi * d2 * d2 / 64 / (l.EndFixity * l.EndFixity)
			for _, c := range v.active[v.pose.Zone] {
				for i := 0; i < v.n && i < 6; i++ {
					push, q := v.hi[c][i], v.S.Q[i]
					if push <= 0 {
						continue
					}
					if m := k / (q * q * push); m < w.Value {
						w.set(v, m, i, c)
					}
				}
			}
		},
	}
}
