package kin

// The places of the dimensions of 3-RPS.
const (
	rpsBaseRadius = iota
	rpsPlatformRadius
	rpsHomeHeight
	rpsAzimuth // three of them
)

func threeRPS() *Family {
	f := &Family{
		Name:     "3-RPS",
		Text:     "tilting tripod: three prismatic legs that swing in vertical planes, z, roll and pitch; x, y and yaw follow",
		Freedoms: []Freedom{Z, Roll, Pitch},
		Legs:     3,
		Drive:    Linear,
		Picture: `Seen from above, the base joints stand on a circle about the base origin at the leg azimuths (90°, 210° and
330° from +x unless leg_azimuths says otherwise). Each is a revolute joint whose axis lies along the circle, so that
its leg swings in the vertical plane through the base origin at its azimuth. The platform joints are spherical and
stand on their circle at the same azimuths, in the platform's own frame; at home the platform is level, not
turned and straight above the base, home_height up. Where it tilts, the legs' planes move it sideways and turn it: for legs
120° apart tan yaw = sin pitch sin roll / (cos pitch + cos roll). Poses are told by the height z of the tool
point, roll and pitch. leg_min is the distance between the joint centres of a leg drawn in completely, stroke
how much longer it can become.`,
		Dimensions: []Dimension{
			{Name: "base_radius", Unit: Metre, Low: 0.15, High: 0.5, Joints: true,
				Text: "radius of the circle of the base joint centres about the base origin"},
			{Name: "platform_radius", Unit: Metre, Low: 0.1, High: 0.3, Joints: true,
				Text: "radius of the circle of the platform joint centres about the platform origin"},
			{Name: "home_height", Unit: Metre, Low: 0.3, High: 0.8, Joints: true,
				Text: "height of the platform origin above the base origin at home"},
		},
		Starter: Starter{
			Title:    "A tilting tripod to start from",
			Box:      Coords{Z: 0.06, Roll: 15 * deg, Pitch: 15 * deg},
			Mass:     40,
			Centre:   Vec{Z: 0.1},
			Accel:    3,
			Speed:    0.2,
			Spin:     0.5,
			Diameter: 0.04,
			Swing:    45 * deg,
		},
		Sources: []string{
			"K. H. Hunt 1983, Structural kinematics of in-parallel-actuated robot-arms, ASME J. Mech. Transm. Autom. Des. 105:705 (from memory)",
			"J. A. Carretero, R. P. Podhorodeski, M. A. Nahon and C. M. Gosselin 2000, ASME J. Mech. Des. 122:17, parasitic motion (from memory)",
			"I. A. Bonev 2002, Geometric analysis of parallel mechanisms, thesis, Laval University: no torsion (from memory)",
		},
	}
	f.Dimensions = append(f.Dimensions, legAzimuths()...)
	f.Dimensions = append(f.Dimensions,
		Dimension{Name: "leg_min", Unit: Metre, Role: Least, Low: 0.2, High: 0.8,
			Text: "distance between the joint centres of a leg when drawn in completely"},
		Dimension{Name: "stroke", Unit: Metre, Role: Span, Low: 0.05, High: 0.5,
			Text: "travel of a leg between its two end stops"})
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine {
		t := *s
		if t.Length == 0 {
			t.Length = d[rpsPlatformRadius]
		}
		return newTripod(freedoms, d[rpsBaseRadius], d[rpsPlatformRadius], d[rpsHomeHeight], d[rpsAzimuth:rpsAzimuth+3], &t)
	}
	return f
}
