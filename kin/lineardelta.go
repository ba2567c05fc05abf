package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The places of the dimensions of linear-delta.
const (
	linearRailRadius = iota
	linearPlatformRadius
	linearRailSlant
	linearRod
	linearRodSpacing
	linearHomeHeight
	linearAzimuth // three of them
	linearMode    = linearAzimuth + 3
)

func linearDelta() *Family {
	f := &Family{
		Name:     "linear-delta",
		Text:     "three carriages on rails with parallelograms of rods carry a platform that never turns: x, y and z",
		Freedoms: []Freedom{X, Y, Z},
		Legs:     3,
		Rails:    true,
		Drive:    Linear,
		Picture: `Rails start on a circle of rail_radius about the base origin at the leg azimuths (90°, 210° and 330° from +x
unless leg_azimuths says otherwise) and run upward; with a rail_slant they lean towards the axis on their way to the
platform (90°: level, straight at the axis). A carriage's coordinate is its distance along the rail from the
start; it may be negative. A parallelogram of two rods, rod_spacing apart along the circle, runs from the
carriage to the platform joint on platform_radius at the same azimuth. With mode 1 the carriage is farther
along its rail than the platform joint (on upright rails: above it), with mode -1 less far. home_height is
the height of the platform joints above the rails' starts at home. Swing is that of the rods out of the plane
square to the parallelogram's short sides, the same at both ends, whatever joints.axis says. Rails given
outright (point and direction of each) take the place of the dimensions that place them; the short sides of
their parallelograms lie level and square to the rail (of an upright rail: square to the line from the axis too).`,
		Dimensions: []Dimension{
			{Name: "rail_radius", Unit: Metre, Low: 0.15, High: 0.4, Joints: true, Text: "radius of the circle of the rails' starts about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.03, High: 0.1, Zero: true, Joints: true, Text: "radius of the circle of the platform joint centres about the platform origin; may be 0"},
			{Name: "rail_slant", Unit: Radian, Low: 0, High: 40 * deg, Joints: true, Text: "angle of a rail from the vertical, leaning to the axis"},
			{Name: "rod", Unit: Metre, Low: 0.3, High: 0.7, Text: "length of the rods from carriage to platform joint"},
			{Name: "rod_spacing", Unit: Metre, Low: 0.03, High: 0.12, Optional: true, Default: 0.06, Text: "distance between the two rods of a parallelogram"},
			{Name: "home_height", Unit: Metre, Low: 0.1, High: 0.5, Joints: true, Text: "height of the platform origin above the base origin at home"},
		},
		Starter: Starter{
			Title:    "A delta with carriages to start from",
			Box:      Coords{X: 0.08, Y: 0.08, Z: 0.1},
			Mass:     2,
			Centre:   Vec{Z: -0.03},
			Accel:    10,
			Speed:    1,
			Diameter: 0.01,
			Swing:    45 * deg,
		},
		Sources: []string{
			"R. Clavel 1988, DELTA, a fast robot with parallel geometry, Int. Symp. Industrial Robots, Lausanne (from memory)",
			"D. Chablat and P. Wenger 2003, IEEE Trans. Robotics Automation 19:403, for three rails at right angles (from memory)",
		},
	}
	f.Dimensions = append(f.Dimensions, legAzimuths()...)
	f.Dimensions = append(f.Dimensions, workingMode("1: carriages are farther along their rails than the platform joints; -1: less far"))
	f.Dimensions = append(f.Dimensions, railRange("its start", -0.2, 0.6, 0.1, 0.6)...)
	freedoms := f.Freedoms
	make3 := func(rails []Rail, platform []Vec, home Vec, homeRot Rot, d []float64, s *Setup) Machine {
		var drives []drive
		for _, r := range rails {
			drives = append(drives, newCarriage(r, shortSide(r), d[linearRod], d[linearMode]))
		}
		return newShifting(freedoms, drives, platform, home, homeRot, true, d[linearRodSpacing]/2, s)
	}
	f.Build = func(d []float64, s *Setup) Machine {
		azimuths := d[linearAzimuth : linearAzimuth+3]
		level, up := math.Sincos(d[linearRailSlant])
		var rails []Rail
		for i, p := range onCircle(d[linearRailRadius], azimuths) {
			sin, cos := math.Sincos(azimuths[i])
			rails = append(rails, Rail{Point: p, Direction: Vec{X: -level * cos, Y: -level * sin, Z: up}})
		}
		return make3(rails, onCircle(d[linearPlatformRadius], azimuths), Vec{Z: d[linearHomeHeight]}, Identity(), d, s)
	}
	f.Outright = func(j *Joints, s *Setup) Machine {
		return make3(j.Rails, j.Platform, j.Home, j.HomeRot, j.Values, s)
	}
	return f
}

// shortSide is the direction of the short sides of the parallelogram on a rail: level
// and square to the rail; of an upright rail, square to the line from the axis too, and
// along y on the axis itself.
func shortSide(r Rail) Vec {
	z := Vec{Z: 1}
	side := r3.Cross(z, unit(r.Direction))
	if r3.Norm(side) < 1e-12 {
		side = r3.Cross(z, r.Point)
	}
	if r3.Norm(side) == 0 {
		return Vec{Y: 1}
	}
	return unit(side)
}
