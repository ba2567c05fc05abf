package kin

import "math"

// angleSteps is the number of marks for one unit of the tangent of half the angle.
const angleSteps = 16

// angleMark is a direction whose angle is known.
type angleMark struct{ cos, sin, angle float64 }

// angleMarks are the directions whose half angles have the tangents k/angleSteps, up to 120° on both sides.
var angleMarks = func() (m [2*28 + 1]angleMark) {
	for k := range m {
		t := float64(k-len(m)/2) / angleSteps
		m[k] = angleMark{cos: (1 - t*t) / (1 + t*t), sin: 2 * t / (1 + t*t), angle: 2 * math.Atan(t)}
	}
	return m
}()

// angles writes those of the first n unit vectors (cos, sin), in [-π, π]. It is math.Atan2
// without the branches that a crank turning to and fro makes the processor guess
// wrong: the angle of the nearest mark and that between the two, whose sine is at most 1/16
// (the series of the arcsine to x¹¹ then errs by less than 1e-17). Beyond 120° the conversion of the tangent
// to an integer may overflow, in ways that differ between processors.
func angles(n int, cos, sin, out *[6]float64) {
	for i := range cos {
		if i >= n {
			break
		}
		c, s := cos[i], sin[i]
		k := uint(int(angleSteps*s/(1+c) + (float64(len(angleMarks)/2) + 0.5)))
		if !(c > -0.5) || k >= uint(len(angleMarks)) {
			out[i] = math.Atan2(s, c)
			continue
		}
		m := &angleMarks[k]
		x := s*m.cos - c*m.sin
		z := x * x
		out[i] = m.angle + (x + x*z*(1./6+z*(3./40+z*(15./336+z*(105./3456+z*(945./42240))))))
	}
}
