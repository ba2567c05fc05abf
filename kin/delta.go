package kin

import "math"

// The places of the dimensions of delta.
const (
	deltaShoulderRadius = iota
	deltaPlatformRadius
	deltaArm
	deltaRod
	deltaRodSpacing
	deltaHomeHeight
	deltaAzimuth // three of them
	deltaMode    = deltaAzimuth + 3
)

const deltaPicture = `Shoulders stand on a circle of shoulder_radius about the base origin at the leg azimuths (90°, 210° and 330° from
+x unless leg_azimuths says otherwise). Each arm turns in the vertical plane through its shoulder and the axis; its
angle is 0 where it points outward and level, and grows away from the base towards the platform (which is
downward on a machine that hangs, mount: ceiling). A parallelogram of two rods, rod_spacing apart, runs from
the arm's end to the platform joint on platform_radius at the same azimuth. With mode 1 the knee is out (the arm's
angle is smaller than that of the line from shoulder to platform joint), with mode -1 in. Angles are counted
within half a turn of the angle at home, which lies between -180° and 180°. home_height is the distance from
the shoulders' plane to that of the platform joints at home. Swing is that of the rods out of the plane in which
their arm turns, the same at both ends, whatever joints.axis says.`

func delta() *Family {
	f := &Family{
		Name:       "delta",
		Text:       "three rotary arms with parallelograms of rods carry a platform that never turns: x, y and z",
		Freedoms:   []Freedom{X, Y, Z},
		Legs:       3,
		Drive:      Rotary,
		Picture:    deltaPicture,
		Dimensions: append(deltaDimensions(), crankRange("arm", -70*deg, 30*deg, 30*deg, 120*deg)...),
		Starter: Starter{
			Title:    "A delta to start from",
			Box:      Coords{X: 0.1, Y: 0.1, Z: 0.05},
			Mass:     1,
			Centre:   Vec{Z: 0.03},
			Accel:    20,
			Speed:    2,
			Diameter: 0.01,
			Swing:    45 * deg,
		},
		Sources: []string{
			"R. Clavel 1988, DELTA, a fast robot with parallel geometry, Int. Symp. Industrial Robots, Lausanne (from memory)",
			"A. Codourey 1998, Dynamic modeling of parallel robots, Int. J. Robotics Research 17(12):1325 (from memory)",
		},
	}
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine { return newDelta(freedoms, d, s) }
	return f
}

// deltaDimensions are those that deltas with rotary arms have in common, but for the arms' range.
func deltaDimensions() []Dimension {
	d := []Dimension{
		{Name: "shoulder_radius", Unit: Metre, Low: 0.08, High: 0.25, Text: "radius of the circle of the shoulders (arm pivots) about the base origin"},
		{Name: "platform_radius", Unit: Metre, Low: 0.03, High: 0.1, Zero: true, Text: "radius of the circle of the platform joint centres about the platform origin; may be 0"},
		{Name: "arm", Unit: Metre, Low: 0.15, High: 0.35, Text: "length of an arm from shoulder to knee"},
		{Name: "rod", Unit: Metre, Low: 0.35, High: 0.9, Text: "length of the rods from knee to platform joint"},
		{Name: "rod_spacing", Unit: Metre, Low: 0.03, High: 0.12, Optional: true, Default: 0.06, Text: "distance between the two rods of a parallelogram"},
		{Name: "home_height", Unit: Metre, Low: 0.3, High: 0.8, Text: "distance of the platform origin from the base origin at home"},
	}
	return append(append(d, legAzimuths()...), workingMode("side of the knees: 1 out, -1 in"))
}

// newDelta builds the translating part: arms, rods and the platform that they carry.
func newDelta(freedoms []Freedom, d []float64, s *Setup) *shiftingRods {
	azimuths := d[deltaAzimuth : deltaAzimuth+3]
	var drives []drive
	for i, p := range onCircle(d[deltaShoulderRadius], azimuths) {
		sin, cos := math.Sincos(azimuths[i])
		drives = append(drives, newCrank(p, Vec{X: cos, Y: sin}, Vec{Z: 1}, d[deltaArm], d[deltaRod], d[deltaMode]))
	}
	return newShifting(freedoms, drives, onCircle(d[deltaPlatformRadius], azimuths), Vec{Z: d[deltaHomeHeight]}, Identity(), true, d[deltaRodSpacing]/2, s)
}
