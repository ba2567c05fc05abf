package objective

import (
	"math"

	"legwright/kin"
)

func bucklingMargin() *Measure {
	return &Measure{
		Name: "buckling_margin", Unit: Ratio, Sense: Larger, Need: NeedEfforts,
		Text:   "least ratio of the Euler load of a leg, at its length in that pose, or of its rod, to its push there",
		Source: "L. Euler 1757: P = π² E I / (K L)², I = π d⁴/64 (from memory)",
		Inputs: []string{"legs.rod_diameter", "legs.modulus"}, Has: legged,
		Start: inf(), Lost: 0,
		Scan: func(v *View, w *Worst) {
			k := v.task.Legs.Euler()
			for _, c := range v.active[v.pose.Zone] {
				for i := 0; i < v.n && i < 6; i++ {
					push, q := v.push(c, i), v.rod(i)
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

// Euler is the Euler load of a rod times the square of its length, N·m².
func (l *Legs) Euler() float64 {
	d2 := l.RodDiameter * l.RodDiameter
	return math.Pi * math.Pi * l.Modulus * math.Pi * d2 * d2 / 64 / (l.EndFixity * l.EndFixity)
}

// push is the largest push in leg i's rod in case c: the effort of a prismatic leg, else the effort over the
// rate at which the drive moves along the rod.
func (v *View) push(c, i int) float64 {
	if v.frame.Rods == nil {
		return v.hi[c][i]
	}
	r, u := (*[6]float64)(v.S.J[6*i:6*i+6]), &v.S.Rod[i]
	g := r[0]*u.X + r[1]*u.Y + r[2]*u.Z
	return math.Max(v.hi[c][i]*g, v.lo[c][i]*g)
}

// legged tells whether the family has legs: prismatic ones, or rods.
func legged(f *kin.Family) bool {
	for _, d := range [4]string{"leg_min", "rod_length", "rod", "distal"} {
		if f.Index(d) >= 0 {
			return true
		}
	}
	return false
}
