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
	kin.Own(v.frame.Freedoms, &v.unit, &v.own)
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

// whole is σmin/σmax of the 6×6 matrix of unit actuation and constraint wrenches at the pose in work.
func (v *View) whole() float64 {
	kin.Wrenches(v.machine, &v.S, &v.unit)
	lo, hi := linalg.Singular(6, &v.unit)
	if hi == 0 {
		return 0
	}
	return lo / hi
}
