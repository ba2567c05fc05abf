package objective

import (
	"legwright/kin"
)

const effortSource = "principle of virtual work, transpose of the inverse Jacobian; exact over the sets by their support functions (common practice, no source)"

// effort is a measure of the efforts of single legs: part gives what counts of the least and the greatest effort.
func effort(name, text string, unit Unit, has func(*kin.Family) bool, part func(lo, hi float64) float64) *Measure {
	return &Measure{
		Name: name, Text: text, Unit: unit, Sense: Smaller, Need: NeedEfforts,
		Source: effortSource, Has: has, Lost: inf(),
		Scan: func(v *View, w *Worst) {
			for _, c := range v.active[v.pose.Zone] {
				lo, hi := &v.lo[c], &v.hi[c]
				for i := 0; i < v.n && i < 6; i++ {
					if f := part(lo[i], hi[i]); f > w.Value {
						w.set(v, f, i, c)
					}
				}
			}
		},
	}
}

// largest is the larger of a push and a pull.
func largest(lo, hi float64) float64 {
	if -lo > hi {
		return -lo
	}
	return hi
}

func legForce() *Measure {
	return effort("leg_force", "largest absolute actuator force of any leg", Newton, linearDrives, largest)
}

func motorTorque() *Measure {
	return effort("motor_torque", "largest absolute actuator torque of any leg", NewtonMetre, rotaryDrives, largest)
}

func pushForce() *Measure {
	return effort("push_force", "largest push of any leg (the leg in compression)", Newton, linearDrives,
		func(_, hi float64) float64 { return hi })
}

func pullForce() *Measure {
	return effort("pull_force", "largest pull of any leg (the leg in tension)", Newton, linearDrives,
		func(lo, _ float64) float64 { return -lo })
}
