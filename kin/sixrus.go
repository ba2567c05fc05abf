package kin

import "math"

// The places of the dimensions of 6-RUS.
const (
	rusBaseRadius = iota
	rusPlatformRadius
	rusBaseHalfAngle
	rusPlatformHalfAngle
	rusHomeHeight
	rusCrankLength
	rusCrankAzimuth
	rusRodLength
	rusMode
)

func sixRUS() *Family {
	f := &Family{
		Name:     "6-RUS",
		Text:     "six-legged platform with rotary drives: six cranks with rods of fixed length, all six freedoms",
		Freedoms: []Freedom{X, Y, Z, Roll, Pitch, Yaw},
		Legs:     6,
		Drive:    Rotary,
		Picture: `Crank pivots stand where 6-UPS has its base joints: in three pairs on a circle about the base origin, centred
at azimuths 0°, 120° and 240° from +x, base_half_angle from a pair's centre line to each; platform joints in
pairs centred at 60°, 180° and 300°, joined in that order. Each crank turns in a vertical plane. Seen from above,
that plane lies at crank_azimuth from the outward direction through its pivot: counter-clockwise on legs 1, 3 and
5, clockwise on legs 2, 4 and 6 (0 points outward, 90° along the circle). The crank angle is 0 where the
crank lies level in that direction, and grows upward. rod_length runs from the crank's end to the platform
joint. With mode 1 the crank's angle is smaller than that of the line from pivot to platform joint: the knee lies
on the side to which angle 0 points. Angles are counted within half a turn of the angle at home, which
lies between -180° and 180°. home_height is the vertical distance between pivots and platform joints at home.`,
		Dimensions: append([]Dimension{
			{Name: "base_radius", Unit: Metre, Low: 0.25, High: 0.6, Text: "radius of the circle of the crank pivots about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.15, High: 0.4, Text: "radius of the circle of the platform joint centres about the platform origin"},
			{Name: "base_half_angle", Unit: Radian, Low: 4 * deg, High: 56 * deg, Text: "half the angle between the two pivots of a pair, seen from the base origin"},
			{Name: "platform_half_angle", Unit: Radian, Low: 4 * deg, High: 56 * deg, Text: "half the angle between the two platform joints of a pair, seen from the platform origin"},
			{Name: "home_height", Unit: Metre, Low: 0.3, High: 0.6, Text: "height of the platform origin above the base origin at home"},
			{Name: "crank_length", Unit: Metre, Low: 0.1, High: 0.25, Text: "distance from a crank's pivot to its end"},
			{Name: "crank_azimuth", Unit: Radian, Low: -90 * deg, High: 90 * deg, Text: "azimuth of a crank at angle 0 from the outward direction at its pivot, mirrored on even legs"},
			{Name: "rod_length", Unit: Metre, Low: 0.3, High: 0.7, Text: "distance from a crank's end to the platform joint"},
			workingMode("side of the knee: 1 to where the crank points at angle 0, -1 to the other side"),
		}, crankRange("crank", -90*deg, 30*deg, 30*deg, 150*deg)...),
		Starter: Starter{
			Title:    "A six-legged platform with cranks to start from",
			Box:      Coords{0.04, 0.04, 0.03, 6 * deg, 6 * deg, 6 * deg},
			Mass:     30,
			Centre:   Vec{Z: 0.1},
			Accel:    3,
			Speed:    0.3,
			Spin:     0.5,
			Diameter: 0.02,
			Swing:    60 * deg,
		},
		Sources: []string{
			"K. H. Hunt 1983, Structural kinematics of in-parallel-actuated robot-arms, ASME J. Mechanisms Transm. Autom. Des. 105:705 (from memory)",
			"J.-P. Merlet 2006, Parallel Robots, Springer (from memory)",
		},
		// As for 6-UPS; the mirror falls on the other legs.
		Twin: func(d []float64) []float64 {
			t := append([]float64(nil), d...)
			t[rusBaseHalfAngle] = 60*deg - d[rusBaseHalfAngle]
			t[rusPlatformHalfAngle] = 60*deg - d[rusPlatformHalfAngle]
			t[rusCrankAzimuth] = -d[rusCrankAzimuth]
			return t
		},
	}
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine {
		a, b := pairedBase(d[rusBaseHalfAngle]), pairedPlatform(d[rusPlatformHalfAngle])
		t := *s
		if t.Length == 0 {
			t.Length = d[rusPlatformRadius]
		}
		pivots := onCircle(d[rusBaseRadius], a[:])
		var drives []drive
		for i, p := range pivots {
			sin, cos := math.Sincos(a[i] + mirrored(i, d[rusCrankAzimuth]))
			drives = append(drives, newCrank(p, Vec{X: cos, Y: sin}, Vec{Z: 1}, d[rusCrankLength], d[rusRodLength], d[rusMode]))
		}
		return &turningRods{newRods(freedoms, drives, onCircle(d[rusPlatformRadius], b[:]), Vec{Z: d[rusHomeHeight]}, Identity(), 0, &t)}
	}
	return f
}

// mirrored is the angle on legs 1, 3 and 5 (counted from 0 here), and its opposite on the even ones.
func mirrored(i int, angle float64) float64 {
	if i%2 == 1 {
		return -angle
	}
	return angle
}
