package assembly

import (
	"math"
	"slices"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// Modes finds all assembly modes of a machine with the actuator coordinates q by the
// solver of its kind. Ends are the rods' ends at the drives in the base frame. They may be nil
// for prismatic legs, which end at their base joints, and for carriages, whose rails
// the frame tells; of cranks they are wanted. It reports false if they
// are, and for machines whose legs are not rods from a drive to the platform.
//
// All postures count, whatever the working mode in which the machine is built: a
// pose of another one has other actuator coordinates when the machine moves to it. So has a 3-RPS in
// postures that do not follow from its tilt and height as they do at home.
func Modes(f *kin.Frame, ends []kin.Vec, q []float64, seed uint64) (Result, bool) {
	if ends == nil {
		ends = f.Base
		if f.Rails != nil {
			ends = nil
			for i, r := range f.Rails {
				ends = append(ends, r3.Add(f.Base[i], r3.Scale(q[i], r)))
			}
		} else if f.Rods != nil {
			return Result{}, false
		}
	}
	length := f.Rods
	if length == nil {
		length = q
	}
	is := func(own ...kin.Freedom) bool { return slices.Equal(f.Freedoms, own) }
	switch {
	case len(f.Freedoms) == 6:
		return SixLegs([6]kin.Vec(ends), [6]kin.Vec(f.Platform), [6]float64(length), seed), true
	case f.Tied:
		var hinge [3]kin.Vec
		for i, b := range f.Base {
			hinge[i] = kin.Vec{X: -b.Y, Y: b.X}
		}
		return ThreeRPS([3]kin.Vec(ends), hinge, [3]kin.Vec(f.Platform), [3]float64(length), seed), true
	case is(kin.X, kin.Y, kin.Yaw):
		var a, b [3][2]float64
		for i := range 3 {
			a[i] = [2]float64{ends[i].X, ends[i].Y}
			b[i] = [2]float64{f.Platform[i].X, f.Platform[i].Y}
		}
		return ThreePlanar(a, b, [3]float64(length)), true
	case is(kin.X, kin.Y):
		return turned(FiveBar([2][2]float64{{ends[0].X, ends[0].Y}, {ends[1].X, ends[1].Y}}, [2]float64(length)), &f.HomeRot), true
	case is(kin.X, kin.Y, kin.Z):
		return turned(delta(f, ends, length), &f.HomeRot), true
	case is(kin.X, kin.Y, kin.Z, kin.Yaw) && length[0] > 0: // a delta whose tool the fourth drive turns
		turn := kin.RPY(0, 0, q[3])
		rot := turn.Mul(&f.HomeRot)
		return turned(delta(f, ends, length), &rot), true
	}
	return Result{}, false
}

// delta brings the first three rods' ends together at the platform origin.
func delta(f *kin.Frame, ends []kin.Vec, length []float64) Result {
	var centres [3]kin.Vec
	for i := range centres {
		centres[i] = r3.Sub(ends[i], f.HomeRot.Apply(f.Platform[i]))
	}
	return Delta(centres, [3]float64(length))
}

// turned gives all modes the rotation, which their solver has left out.
func turned(r Result, rot *kin.Rot) Result {
	for i := range r.Modes {
		r.Modes[i].Rot = *rot
	}
	return r
}

// Holds tells whether the machine, as it is built, has the actuator coordinates q in the mode. A
// full turn of a crank does not count; the tolerance is 1e-9 of the machine's size, and 1e-9 rad of cranks.
func Holds(m kin.Machine, mode *Mode, q []float64) bool {
	f := m.Frame()
	p := mode.Pose(f)
	var s kin.State
	m.Move(&p, &s)
	if s.Fail != kin.Reached {
		return false
	}
	crank := f.Rods != nil && f.Rails == nil
	for i, want := range q {
		miss, size := s.Q[i]-want, 1.0
		if crank {
			miss = math.Remainder(miss, 2*math.Pi)
		} else if size = math.Abs(want); f.Rods != nil {
			size += f.Rods[i]
		}
		if !(math.Abs(miss) <= 1e-9*size) {
			return false
		}
	}
	return true
}
