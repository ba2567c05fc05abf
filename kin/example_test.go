package kin_test

import (
	"fmt"
	"math"

	"legwright/kin"
)

// A six-legged platform is built, moved, and found again from its leg lengths.
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
	machine := family.Build(dimensions, &kin.Setup{Diameter: 0.06})

	pose := kin.NewPose(kin.Coords{0.05, 0, 0.02, 5 * math.Pi / 180, 0, 10 * math.Pi / 180})
	var state kin.State
	if machine.Move(&pose, &state); state.Fail != kin.Reached {
		fmt.Println("not reached")
		return
	}
	for i, length := range state.Q {
		fmt.Printf("leg %d: %.2f mm\n", i+1, 1000*length)
	}
	gap, i, j := machine.Gap(&state)
	fmt.Printf("legs %d and %d are the nearest, %.2f mm apart\n", i+1, j+1, 1000*gap)

	home := kin.Pose{R: kin.Identity()}
	found, ok := kin.Locate(machine, state.Q[:], home)
	c := found.Pose.Coords()
	fmt.Printf("located: %v, x %.3f mm, yaw %.4f deg\n", ok, 1000*c[kin.X], c[kin.Yaw]*180/math.Pi)
	// Output:
	// leg 1: 1079.33 mm
	// leg 2: 1065.84 mm
	// leg 3: 1091.75 mm
	// leg 4: 1019.66 mm
	// leg 5: 1074.80 mm
	// leg 6: 975.80 mm
	// legs 3 and 4 are the nearest, 106.33 mm apart
	// located: true, x 50.000 mm, yaw 10.0000 deg
}
