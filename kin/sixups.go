package kin

import "math"

const deg = math.Pi / 180

// pairedBase gives the azimuths of six joints in three pairs at the half-angle a from 0°, 120°, 240°.
func pairedBase(a float64) [6]float64 {
	const t = 120 * deg
	return [6]float64{a, t - a, t + a, 2*t - a, 2*t + a, 3*t - a}
}

// pairedPlatform gives the azimuths of six joints in three pairs at the half-angle b from 60°, 180°, 300°.
func pairedPlatform(b float64) [6]float64 {
	const s, t = 60 * deg, 120 * deg
	return [6]float64{s - b, s + b, s + t - b, s + t + b, s + 2*t - b, s + 2*t + b}
}

// onCircle puts joints on a circle about z at the azimuths.
func onCircle(radius float64, azimuths []float64) []Vec {
	out := make([]Vec, len(azimuths))
	for i, a := range azimuths {
		sin, cos := math.Sincos(a)
		out[i] = Vec{X: radius * cos, Y: radius * sin}
	}
	return out
}

// The places of the dimensions of 6-UPS.
const (
	upsBaseRadius = iota
	upsPlatformRadius
	upsBaseHalfAngle
	upsPlatformHalfAngle
	upsHomeHeight
)

func sixUPS() *Family {
	f := &Family{
		Name:     "6-UPS",
		Text:     "six-legged platform: six prismatic legs between universal and spherical joints, all six freedoms",
		Freedoms: []Freedom{X, Y, Z, Roll, Pitch, Yaw},
		Legs:     6,
		Drive:    Linear,
		Picture: `Seen from above, the base joints stand in three pairs on a circle about the base origin. The pairs are
centred at azimuths 0°, 120° and 240° from +x, and base_half_angle lies between a pair's centre line and
each of its joints: legs 1 to 6 start at α, 120°-α, 120°+α, 240°-α, 240°+α, 360°-α. The platform joints
stand in pairs centred at 60°, 180° and 300°: 60°-β, 60°+β, 180°-β, 180°+β, 300°-β, 300°+β, joined to the
base joints in that order. home_height is the vertical distance between the two planes of joint centres
with the platform level, centred and not turned. leg_min is the distance between the joint centres of a
leg drawn in completely, stroke how much longer it can become.`,
		Dimensions: []Dimension{
			{Name: "base_radius", Unit: Metre, Low: 0.4, High: 1.2, Joints: true,
				Text: "radius of the circle of the base joint centres about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.2, High: 0.8, Joints: true,
				Text: "radius of the circle of the platform joint centres about the platform origin"},
			{Name: "base_half_angle", Unit: Radian, Low: 4 * deg, High: 56 * deg, Joints: true,
				Text: "half the angle between the two base joints of a pair, seen from the base origin"},
			{Name: "platform_half_angle", Unit: Radian, Low: 4 * deg, High: 56 * deg, Joints: true,
				Text: "half the angle between the two platform joints of a pair, seen from the platform origin"},
			{Name: "home_height", Unit: Metre, Low: 0.5, High: 1.4, Joints: true,
				Text: "height of the platform origin above the base origin at home"},
			{Name: "leg_min", Unit: Metre, Role: Least, Low: 0.4, High: 1.4,
				Text: "distance between the joint centres of a leg when drawn in completely"},
			{Name: "stroke", Unit: Metre, Role: Span, Low: 0.1, High: 0.8,
				Text: "travel of a leg between its two end stops"},
		},
		Starter: Starter{
			Title:    "A six-legged platform to start from",
			Box:      Coords{0.1, 0.1, 0.08, 10 * deg, 10 * deg, 12 * deg},
			Mass:     150,
			Centre:   Vec{Z: 0.15},
			Accel:    3,
			Speed:    0.3,
			Spin:     0.5,
			Diameter: 0.05,
			Swing:    45 * deg,
		},
		Sources: []string{
			"V. E. Gough and S. G. Whitehall 1962, D. Stewart 1965 (from memory)",
			"E. F. Fichter 1986, A Stewart platform-based manipulator, Int. J. Robotics Research 5(2):157 (from memory)",
		},
		Outright: func(j *Joints, s *Setup) Machine {
			t := *s
			if t.Length == 0 {
				t.Length = meanRadius(j.Platform)
			}
			return newStruts([]Freedom{X, Y, Z, Roll, Pitch, Yaw}, j.Base, j.Platform, j.Home, j.HomeRot, &t)
		},
		// Legs i and i+3 are exchanged. As the machine is its own image under 120°, the
		// twin is also the machine turned by 60°; only half a turn maps ± ranges onto themselves.
		Twin: func(d []float64) []float64 {
			t := append([]float64(nil), d...)
			t[upsBaseHalfAngle] = 60*deg - d[upsBaseHalfAngle]
			t[upsPlatformHalfAngle] = 60*deg - d[upsPlatformHalfAngle]
			return t
		},
	}
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine {
		a, b := pairedBase(d[upsBaseHalfAngle]), pairedPlatform(d[upsPlatformHalfAngle])
		t := *s
		if t.Length == 0 {
			t.Length = d[upsPlatformRadius]
		}
		return newStruts(freedoms, onCircle(d[upsBaseRadius], a[:]), onCircle(d[upsPlatformRadius], b[:]),
			Vec{Z: d[upsHomeHeight]}, Identity(), &t)
	}
	return f
}

// meanRadius is the mean distance of joints from their plate's axis.
func meanRadius(joints []Vec) float64 {
	s := 0.0
	for _, j := range joints {
		s += math.Hypot(j.X, j.Y)
	}
	return s / float64(len(joints))
}
