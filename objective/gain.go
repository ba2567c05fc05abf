package objective

import (
	"math"

	"legwright/kin"
	"legwright/kin/linalg"
)

const gainSource = "velocity amplification, D. Chablat and P. Wenger 2003, IEEE Trans. Robotics Automation 19:403 (from memory)"

// oneKind tells whether all freedoms of the family are translations, or all rotations.
func oneKind(f *kin.Family) bool {
	for _, q := range f.Freedoms {
		if q.Angular() != f.Freedoms[0].Angular() {
			return false
		}
	}
	return true
}

// extremes are the extreme singular values of the family's own inverse Jacobian at the pose in work.
func (v *View) extremes() (lo, hi float64) {
	kin.Own(v.frame.Freedoms, &v.S.J, &v.own)
	return linalg.Singular(v.n, &v.own)
}

func gainLeast() *Measure {
	return &Measure{
		Name: "gain_least", Unit: Ratio, Rotary: MetrePerRadian, Sense: Larger, Need: NeedMatrix,
		Text:   "least platform speed per unit of actuator speed, in the slowest direction (families with one kind of freedom)",
		Source: gainSource, Has: oneKind, Start: inf(), Lost: 0,
		Scan: func(v *View, w *Worst) {
			if _, hi := v.extremes(); 1/hi < w.Value {
				w.set(v, 1/hi, -1, -1)
			}
		},
	}
}

func gainMost() *Measure {
	return &Measure{
		Name: "gain_most", Unit: Ratio, Rotary: MetrePerRadian, Sense: Smaller, Need: NeedMatrix,
		Text:   "largest platform speed per unit of actuator speed, in the fastest direction (families with one kind of freedom)",
		Source: gainSource, Has: oneKind, Lost: inf(),
		Scan: func(v *View, w *Worst) {
			lo, _ := v.extremes()
			if g := 1 / math.Max(lo, 0); g > w.Value {
				w.set(v, g, -1, -1)
			}
		},
	}
}
