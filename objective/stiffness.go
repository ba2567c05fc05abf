package objective

import (
	"math"

	"legwright/kin/linalg"
)

// compliance is that of leg i at its actuator: the actuator itself, and in series the
// rod and the leg's joints, whose force is the actuator's effort itself in a prismatic leg, else the
// effort times the linear part of the row of J. A parallelogram counts as one rod. Families without legs
// have neither rods nor such joints.
func (v *View) compliance(i int) float64 {
	t := v.task
	if v.legless {
		return 1 / t.Actuator.Stiffness
	}
	axial := 0.0
	if r := t.Legs.RodDiameter; r > 0 && t.Legs.Modulus > 0 {
		axial = v.rod(i) / (t.Legs.Modulus * math.Pi * r * r / 4)
	}
	if t.Joints.Stiffness > 0 {
		axial += 1 / t.Joints.Stiffness
	}
	if v.frame.Rods == nil {
		return 1/t.Actuator.Stiffness + axial
	}
	r := (*[6]float64)(v.S.J[6*i : 6*i+6])
	return 1/t.Actuator.Stiffness + axial*(r[0]*r[0]+r[1]*r[1]+r[2]*r[2])
}

// rod is the length of leg i's rod, or of the whole leg if it is prismatic.
func (v *View) rod(i int) float64 {
	if v.frame.Rods == nil {
		return v.S.Q[i]
	}
	return v.frame.Rods[i]
}

// softest is the largest eigenvalue of a 3×3 block of the compliance at the tool
// point, rows from first on: the sum over the legs of c·x xᵀ.
func (v *View) softest(first int, unit float64) float64 {
	if v.sign == 0 {
		return inf()
	}
	var a [6]float64
	for i := range v.n {
		c := v.compliance(i) * unit * unit
		x, y, z := v.x[6*first+i], v.x[6*first+6+i], v.x[6*first+12+i]
		a[0] += c * x * x
		a[1] += c * y * y
		a[2] += c * z * z
		a[3] += c * x * y
		a[4] += c * x * z
		a[5] += c * y * z
	}
	return linalg.Sym3Largest(&a)
}

func stiffness() *Measure {
	return &Measure{
		Name: "stiffness", Unit: NewtonPerMetre, Sense: Larger, Need: NeedMatrix,
		Text:   "least stiffness of the tool point against a force, in its softest direction",
		Source: "C. Gosselin 1990, IEEE Trans. Robotics Automation 6:377 (from memory)",
		Inputs: []string{"actuator.stiffness"},
		Start:  inf(), Lost: 0,
		Scan: func(v *View, w *Worst) {
			if k := 1 / v.softest(0, 1); k < w.Value {
				w.set(v, k, -1, -1)
			}
		},
	}
}

func turnStiffness() *Measure {
	return &Measure{
		Name: "turn_stiffness", Unit: NewtonMetrePerRadian, Sense: Larger, Need: NeedMatrix,
		Text:   "least stiffness of the platform against a moment, in its softest direction",
		Source: "C. Gosselin 1990, IEEE Trans. Robotics Automation 6:377 (from memory)",
		Inputs: []string{"actuator.stiffness"}, Has: turns,
		Start: inf(), Lost: 0,
		Scan: func(v *View, w *Worst) {
			if k := 1 / v.softest(3, v.invLc); k < w.Value {
				w.set(v, k, -1, -1)
			}
		},
	}
}
