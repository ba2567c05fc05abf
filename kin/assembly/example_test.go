package assembly_test

import (
	"fmt"
	"math"

	"legwright/kin"
	"legwright/kin/assembly"
)

// All postures of a six-legged platform with the leg lengths of a pose near home.
func Example() {
	family := kin.FamilyNamed("6-UPS")
	dimensions := make([]float64, len(family.Dimensions))
	for name, value := range map[string]float64{
		"base_radius":         0.75,
		"platform_radius":     0.40,
		"base_half_angle":     10 * math.Pi / 180,
		"platform_half_angle": 12 * math.Pi / 180,
		"home_height":         0.90,
	} {
		dimensions[family.Index(name)] = value
	}
	machine := family.Build(dimensions, &kin.Setup{})
	pose := kin.NewPose(kin.Coords{0.05, 0, 0.02, 5 * math.Pi / 180, 0, 10 * math.Pi / 180})
	var state kin.State
	machine.Move(&pose, &state)

	found, _ := assembly.Modes(machine.Frame(), nil, state.Q[:], 0)
	fmt.Printf("%d of %d solutions are finite, %d at infinity, %d lost\n", found.Complex, found.Paths, found.Infinite, found.Lost)
	fmt.Printf("%d assembly modes\n", len(found.Modes))
	k := assembly.Reached(machine, found.Modes, state.Q[:])
	c := found.Modes[k].Pose(machine.Frame()).Coords()
	fmt.Printf("reached from home: mode %d, x %.3f mm, yaw %.4f deg\n", k, 1000*c[kin.X], c[kin.Yaw]*180/math.Pi)
	fmt.Printf("the nearest other mode is %.3f m away\n", assembly.Separation(machine, found.Modes)[k])
	// Output:
	// 28 of 40 solutions are finite, 12 at infinity, 0 lost
	// 8 assembly modes
	// reached from home: mode 0, x 50.000 mm, yaw 10.0000 deg
	// the nearest other mode is 0.778 m away
}

// The planar machine with six modes of C. Innocenti and V. Parenti-Castelli (1992).
func ExampleThreePlanar() {
	base := [3][2]float64{{0, 0}, {15.91, 0}, {0, 10}}
	platform := [3][2]float64{{0, 0}, {17.04, 0}, {13.23637323943662, 16.096708466836507}}
	for _, m := range assembly.ThreePlanar(base, platform, [3]float64{14.98, 15.38, 12}).Modes {
		fmt.Printf("%8.4f %8.4f %8.3f deg\n", m.Origin.X, m.Origin.Y, math.Atan2(m.Rot[3], m.Rot[0])*180/math.Pi)
	}
	// Output:
	//  14.9201  -1.3379   57.413 deg
	//  14.6739  -3.0126  122.206 deg
	//  -5.4957 -13.9355   -2.712 deg
	//  -8.7266  12.1757  -56.549 deg
	// -13.4199  -6.6562   33.557 deg
	// -14.8961   1.5830   14.055 deg
}
