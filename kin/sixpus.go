package kin

import "math"

// The places of the dimensions of 6-PUS.
const (
	pusBaseRadius = iota
	pusPlatformRadius
	pusBaseHalfAngle
	pusPlatformHalfAngle
	pusHomeHeight
	pusRailAzimuth
	pusRailSlope
	pusRodLength
	pusMode
)

func sixPUS() *Family {
	f := &Family{
		Name:     "6-PUS",
		Text:     "six-legged platform with carriages: six rods of fixed length from carriages on rails, all six freedoms",
		Freedoms: []Freedom{X, Y, Z, Roll, Pitch, Yaw},
		Legs:     6,
		Rails:    true,
		Drive:    Linear,
		Picture: `Rails start where 6-UPS has its base joints: in three pairs on a circle about the base origin, centred at
azimuths 0°, 120° and 240° from +x, base_half_angle from a pair's centre line to each; platform joints in pairs
centred at 60°, 180° and 300°, joined in that order. Seen from above, a rail runs at rail_azimuth from the
outward direction through its start: counter-clockwise on legs 1, 3 and 5, clockwise on legs 2, 4 and 6. It
climbs by rail_slope from the level (90°: vertical). A carriage's coordinate is its distance along the rail
from there, where the joint between carriage and rod is on the base circle; it may be negative. rod_length runs
from that joint to the platform joint. With mode 1 the carriage is farther along its rail than the platform
joint, with mode -1 less far. home_height is the vertical distance between base circle and platform joints
at home. Rails given outright (point and direction of each) take the place of the base dimensions.`,
		Dimensions: append([]Dimension{
			{Name: "base_radius", Unit: Metre, Low: 0.3, High: 0.6, Joints: true, Text: "radius of the circle of the rails' starts about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.15, High: 0.4, Joints: true, Text: "radius of the circle of the platform joint centres about the platform origin"},
			{Name: "base_half_angle", Unit: Radian, Low: 4 * deg, High: 56 * deg, Joints: true, Text: "half the angle between the two rails of a pair at their starts, seen from the base origin"},
			{Name: "platform_half_angle", Unit: Radian, Low: 4 * deg, High: 56 * deg, Joints: true, Text: "half the angle between the two platform joints of a pair, seen from the platform origin"},
			{Name: "home_height", Unit: Metre, Low: 0.2, High: 0.6, Joints: true, Text: "height of the platform origin above the base origin at home"},
			{Name: "rail_azimuth", Unit: Radian, Low: -90 * deg, High: 90 * deg, Joints: true, Text: "azimuth of a rail from the outward direction at its start, mirrored on even legs"},
			{Name: "rail_slope", Unit: Radian, Low: -90 * deg, High: 30 * deg, Joints: true, Text: "angle by which a rail climbs from the level"},
			{Name: "rod_length", Unit: Metre, Low: 0.4, High: 0.8, Text: "distance from the carriage's joint to the platform joint"},
			workingMode("1: carriages are farther along their rails than the platform joints; -1: less far"),
		}, railRange("the base circle", -0.3, 0.3, 0.1, 0.6)...),
		Starter: Starter{
			Title:    "A six-legged platform with carriages to start from",
			Box:      Coords{0.06, 0.06, 0.04, 8 * deg, 8 * deg, 8 * deg},
			Mass:     30,
			Centre:   Vec{Z: 0.1},
			Accel:    3,
			Speed:    0.3,
			Spin:     0.5,
			Diameter: 0.02,
			Swing:    60 * deg,
		},
		Sources: []string{
			"J.-P. Merlet 2006, Parallel Robots, Springer (from memory)",
			"M. Honegger, A. Codourey and E. Burdet 1997, IEEE Int. Conf. Robotics Automation, for six carriages on rails (from memory)",
		},
		// As for 6-UPS; the mirror falls on the other legs.
		Twin: func(d []float64) []float64 {
			t := append([]float64(nil), d...)
			t[pusBaseHalfAngle] = 60*deg - d[pusBaseHalfAngle]
			t[pusPlatformHalfAngle] = 60*deg - d[pusPlatformHalfAngle]
			t[pusRailAzimuth] = -d[pusRailAzimuth]
			return t
		},
	}
	freedoms := f.Freedoms
	make6 := func(rails []Rail, platform []Vec, home Vec, homeRot Rot, d []float64, s *Setup) Machine {
		var drives []drive
		for _, r := range rails {
			drives = append(drives, newCarriage(r, Vec{}, d[pusRodLength], d[pusMode]))
		}
		return &turningRods{newRods(freedoms, drives, platform, home, homeRot, 0, s)}
	}
	f.Build = func(d []float64, s *Setup) Machine {
		a, b := pairedBase(d[pusBaseHalfAngle]), pairedPlatform(d[pusPlatformHalfAngle])
		t := *s
		if t.Length == 0 {
			t.Length = d[pusPlatformRadius]
		}
		var rails []Rail
		for i, p := range onCircle(d[pusBaseRadius], a[:]) {
			sin, cos := math.Sincos(a[i] + mirrored(i, d[pusRailAzimuth]))
			up, level := math.Sincos(d[pusRailSlope])
			rails = append(rails, Rail{Point: p, Direction: Vec{X: level * cos, Y: level * sin, Z: up}})
		}
		return make6(rails, onCircle(d[pusPlatformRadius], b[:]), Vec{Z: d[pusHomeHeight]}, Identity(), d, &t)
	}
	f.Outright = func(j *Joints, s *Setup) Machine {
		t := *s
		if t.Length == 0 {
			t.Length = meanRadius(j.Platform)
		}
		return make6(j.Rails, j.Platform, j.Home, j.HomeRot, j.Values, &t)
	}
	return f
}
