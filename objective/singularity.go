package objective

import (
	"math"

	"legwright/kin"
	"legwright/kin/linalg"
)

// nearSingular is the conditioning below which the kind of the nearest singularity is named.
const nearSingular = 0.05

// kind names the singularity that the pose in work is nearest to (C. Gosselin and
// J. Angeles 1990, IEEE Trans. Robotics Automation 6:281; S. Joshi and L.-W. Tsai
// 2002; from memory). Serial (inverse): a crank and its rod are in line, the
// platform loses a freedom. Actuator (direct): the legs' forces become dependent,
// the platform gains one that the actuators do not hold. Constraint: the actuation
// and constraint wrenches together become dependent, the legs' own forces do not.
func (v *View) kind() string {
	serial := v.machine.Serial(&v.S)
	whole := v.whole() // leaves the unit wrenches in v.unit
	if v.frame.Tied {  // the wrenches' power in the platform's own freedoms is in J
		kin.Own(v.frame.Freedoms, &v.S.J, &v.own)
	} else {
		kin.Own(v.frame.Freedoms, &v.unit, &v.own)
	}
	lo, hi := linalg.Singular(v.n, &v.own)
	actuator := lo / hi
	switch least := math.Min(serial, math.Min(actuator, whole)); {
	case serial == least:
		return "serial"
	case whole < actuator/10:
		return "constraint"
	}
	return "actuator"
}

// kindAt is the kind at a sample, "" where it has no posture.
func (v *View) kindAt(s *Sample) string {
	v.keep = 0
	if !v.at(s, 0, NeedMatrix) {
		return ""
	}
	return v.kind()
}

// kindText says what a kind of singularity means.
func kindText(kind string) string {
	switch kind {
	case "serial":
		return "serial (a crank and its rod are nearly in line, or a rod is nearly square to its rail: the platform loses a freedom)"
	case "constraint":
		return "constraint (the joints' own forces hardly hold the platform, whatever the actuators do)"
	}
	return "actuator (the legs' forces hardly hold the platform in some direction, though the actuators are locked)"
}

// whole is σmin/σmax of the 6×6 matrix of unit actuation and constraint wrenches at the pose in work.
func (v *View) whole() float64 {
	kin.Wrenches(v.machine, &v.S, &v.unit)
	lo, hi := linalg.Singular(6, &v.unit)
	if hi == 0 {
		return 0
	}
	return lo / hi
}
