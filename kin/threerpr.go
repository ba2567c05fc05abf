package kin

// The places of the dimensions of 3-RPR.
const (
	rprBaseRadius = iota
	rprPlatformRadius
	rprHomeHeading
	rprAzimuth // three of them, then three base offsets and three platform offsets
)

func threeRPR() *Family {
	f := &Family{
		Name:     "3-RPR",
		Text:     "planar three-leg stage: three prismatic legs between revolute joints, x, y and yaw",
		Freedoms: []Freedom{X, Y, Yaw},
		Legs:     3,
		Drive:    Linear,
		Picture: `Seen from above, the base joints stand on a circle about the base origin at the leg azimuths (90°, 210°
and 330° from +x unless leg_azimuths says otherwise), each moved along the circle by its base_offset; the
platform joints stand on their circle at the same azimuths plus platform_offset, in the platform's own
frame. At home the two origins coincide and the platform is turned by home_heading, counter-clockwise.
With similar triangles at heading 0 the three leg lines always meet in a point: that machine is
singular everywhere, so home_heading has no default. leg_min is the distance between the joint centres of
a leg drawn in completely, stroke how much longer it can become.`,
		Dimensions: []Dimension{
			{Name: "base_radius", Unit: Metre, Low: 0.2, High: 0.6, Joints: true,
				Text: "radius of the circle of the base joint centres about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.05, High: 0.3, Joints: true,
				Text: "radius of the circle of the platform joint centres about the platform origin"},
			{Name: "home_heading", Unit: Radian, Low: 20 * deg, High: 120 * deg, Joints: true,
				Text: "angle of the platform frame against the base frame at home, counter-clockwise"},
		},
		Starter: Starter{
			Title:    "A planar stage to start from",
			Box:      Coords{X: 0.05, Y: 0.05, Yaw: 10 * deg},
			Mass:     20,
			Centre:   Vec{X: 0.02},
			Accel:    5,
			Speed:    0.3,
			Spin:     1,
			Diameter: 0.02,
			Swing:    60 * deg,
		},
		Sources: []string{
			"C. Gosselin and J. Angeles 1988, 1990 (from memory)",
			"J. Sefrioui and C. Gosselin 1995, Mechanism and Machine Theory 30:533 (from memory)",
		},
		Outright: func(j *Joints, s *Setup) Machine {
			t := planarSetup(s)
			if t.Length == 0 {
				t.Length = meanRadius(j.Platform)
			}
			return newStruts([]Freedom{X, Y, Yaw}, j.Base, j.Platform, j.Home, j.HomeRot, &t)
		},
	}
	f.Dimensions = append(f.Dimensions, legAzimuths()...)
	f.Dimensions = append(f.Dimensions, jointOffsets()...)
	f.Dimensions = append(f.Dimensions,
		Dimension{Name: "leg_min", Unit: Metre, Role: Least, Low: 0.1, High: 0.6,
			Text: "distance between the joint centres of a leg when drawn in completely"},
		Dimension{Name: "stroke", Unit: Metre, Role: Span, Low: 0.05, High: 0.4,
			Text: "travel of a leg between its two end stops"})
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine {
		a, b := stageAzimuths(d[rprAzimuth:])
		t := planarSetup(s)
		if t.Length == 0 {
			t.Length = d[rprPlatformRadius]
		}
		return newStruts(freedoms, onCircle(d[rprBaseRadius], a), onCircle(d[rprPlatformRadius], b),
			Vec{}, RPY(0, 0, d[rprHomeHeading]), &t)
	}
	return f
}

// planarSetup is the setup with the tool point in the plane of the legs: its
// height is nothing to a planar stage, and would give the rows of J parts in
// roll and pitch, which the joints take.
func planarSetup(s *Setup) Setup {
	t := *s
	t.Tool.Z = 0
	return t
}
