package kin

import "math"

// The places of the dimensions of 3-RRR.
const (
	rrrBaseRadius = iota
	rrrPlatformRadius
	rrrProximal
	rrrDistal
	rrrHomeHeading
	rrrAzimuth // three of them, then three base offsets and three platform offsets
	rrrModes   = rrrAzimuth + 9
)

func threeRRR() *Family {
	f := &Family{
		Name:     "3-RRR",
		Text:     "planar three-leg stage with rotary drives: three cranks with links between revolute joints, x, y and yaw",
		Freedoms: []Freedom{X, Y, Yaw},
		Legs:     3,
		Drive:    Rotary,
		Picture: `Seen from above, the crank pivots stand on a circle about the base origin at the leg azimuths (90°, 210° and
330° from +x unless leg_azimuths says otherwise), each moved along the circle by its base_offset; the platform
joints stand on their circle at the same azimuths plus platform_offset, in the platform's own frame. proximal is
the crank, from pivot to elbow, distal the link from elbow to platform joint. At home the two origins
coincide and the platform is turned by home_heading, counter-clockwise. A crank's angle is 0 where it points
straight away from the base origin (at its pivot's own azimuth: leg_azimuths plus base_offset; of a pivot on the base
origin given outright: along +x) and grows counter-clockwise; it is counted within half a turn of the angle at home, which
lies between -180° and 180°. The mode of a leg is the sign of the turn from its crank to its link: 1 where the link
bends off counter-clockwise.`,
		Dimensions: []Dimension{
			{Name: "base_radius", Unit: Metre, Low: 0.25, High: 0.5, Joints: true, Text: "radius of the circle of the crank pivots about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.05, High: 0.2, Joints: true, Text: "radius of the circle of the platform joint centres about the platform origin"},
			{Name: "proximal", Unit: Metre, Low: 0.15, High: 0.4, Text: "length of a crank, from its pivot to the elbow"},
			{Name: "distal", Unit: Metre, Low: 0.15, High: 0.45, Text: "length of a link, from the elbow to the platform joint"},
			{Name: "home_heading", Unit: Radian, Low: -30 * deg, High: 30 * deg, Joints: true, Optional: true,
				Text: "angle of the platform frame against the base frame at home, counter-clockwise"},
		},
		Starter: Starter{
			Title:    "A planar stage with cranks to start from",
			Box:      Coords{X: 0.05, Y: 0.05, Yaw: 10 * deg},
			Mass:     10,
			Centre:   Vec{X: 0.02},
			Accel:    5,
			Speed:    0.5,
			Spin:     1,
			Diameter: 0.02,
			Swing:    75 * deg,
		},
		Sources: []string{
			"C. Gosselin and J. Angeles 1988, The optimum kinematic design of a planar three-degree-of-freedom parallel manipulator, ASME J. Mechanisms Transm. Autom. Des. 110:35 (from memory)",
		},
	}
	f.Dimensions = append(f.Dimensions, legAzimuths()...)
	f.Dimensions = append(f.Dimensions, jointOffsets()...)
	f.Dimensions = append(f.Dimensions, workingModes(3, "turn from crank to link")...)
	f.Dimensions = append(f.Dimensions, crankRange("crank", -180*deg, 180*deg, 30*deg, 180*deg)...)
	f.Dimensions[len(f.Dimensions)-2].Text = "least angle of a crank, counter-clockwise from the outward direction at its pivot"
	freedoms := f.Freedoms
	stage := func(pivots, out, platform []Vec, home Vec, homeRot Rot, d []float64, s *Setup) Machine {
		var drives []drive
		for i, p := range pivots {
			drives = append(drives, newCrank(p, out[i], Vec{X: -out[i].Y, Y: out[i].X}, d[rrrProximal], d[rrrDistal], d[rrrModes+i]))
		}
		return &turningRods{newRods(freedoms, drives, platform, home, homeRot, 0, s)}
	}
	f.Build = func(d []float64, s *Setup) Machine {
		a, b := stageAzimuths(d[rrrAzimuth:])
		t := planarSetup(s)
		if t.Length == 0 {
			t.Length = d[rrrPlatformRadius]
		}
		return stage(onCircle(d[rrrBaseRadius], a), onCircle(1, a), onCircle(d[rrrPlatformRadius], b), Vec{}, RPY(0, 0, d[rrrHomeHeading]), d, &t)
	}
	f.Outright = func(j *Joints, s *Setup) Machine {
		t := planarSetup(s)
		if t.Length == 0 {
			t.Length = meanRadius(j.Platform)
		}
		var out []Vec
		for _, p := range j.Base {
			sin, cos := math.Sincos(math.Atan2(p.Y, p.X))
			out = append(out, Vec{X: cos, Y: sin})
		}
		return stage(j.Base, out, j.Platform, j.Home, j.HomeRot, j.Values, &t)
	}
	return f
}
