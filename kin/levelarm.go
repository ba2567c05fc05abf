package kin

// The places of the dimensions of level-arm.
const (
	armBaseOffset = iota
	armBaseHeight
	armUpper
	armForearm
	armWristOffset
	armHomeReach
	armHomeHeight
	armWristDrop
	armMode
	armStops // least angle and range of upper arm, of forearm, of the angle between them
)

func levelArm() *Family {
	f := &Family{
		Name:     "level-arm",
		Text:     "palletising arm: turning column, two links driven from the shoulder, a wrist that parallelograms keep level; x, y, z and yaw",
		Freedoms: []Freedom{X, Y, Z, Yaw},
		Legs:     4,
		Drive:    Rotary,
		Picture: `The base origin lies on the column's axis at floor level. The column turns about z; the plane of the arm turns
with it. In that plane the shoulder stands base_offset out from the axis and base_height up, the upper arm runs from
the shoulder to the elbow, the forearm from the elbow to the wrist, the wrist plate, which parallelogram linkages
keep level, wrist_offset further out to the tool's axis and wrist_drop down to the platform origin. Both links
are driven from the shoulder: the motors' angles θ2 (of the upper arm, by its crank) and θ3 (of the forearm, through a
coupler) are the angles of the links themselves from the outward level, positive up; neither moves the other. The
fourth motor sits on the wrist plate and turns the tool about the vertical against the plane of the arm. At home
the platform origin is at (home_reach, 0, home_height), the column at 0 and the tool not turned. With mode 1 the
elbow is above the line from shoulder to wrist, with mode -1 below. upper_angle, forearm_angle and
elbow_angle (between the two links' directions, 0 where the arm is stretched, 180° where it is folded: the dead
points of the parallelograms) have fixed stops, each given by its least value and its range. The column turns
within ±180° and the tool's motor within ±180° of the arm.`,
		Dimensions: []Dimension{
			{Name: "base_offset", Unit: Metre, Low: 0.05, High: 0.25,
				Text: "distance of the shoulder from the column's axis"},
			{Name: "base_height", Unit: Metre, Low: 0.4, High: 0.8,
				Text: "height of the shoulder above the floor"},
			{Name: "upper_arm", Unit: Metre, Low: 0.5, High: 1,
				Text: "length of the upper arm, from shoulder to elbow"},
			{Name: "forearm", Unit: Metre, Low: 0.5, High: 1,
				Text: "length of the forearm, from elbow to wrist"},
			{Name: "wrist_offset", Unit: Metre, Low: 0.05, High: 0.15,
				Text: "level distance from the wrist outward to the tool's axis"},
			{Name: "home_reach", Unit: Metre, Low: 0.8, High: 1.3,
				Text: "distance of the platform origin from the column's axis at home"},
			{Name: "home_height", Unit: Metre, Low: 0.3, High: 0.9,
				Text: "height of the platform origin above the floor at home"},
			{Name: "wrist_drop", Unit: Metre, Optional: true,
				Text: "distance of the platform origin below the wrist"},
			{Name: "mode", Unit: Sign, Low: -1, High: 1, Optional: true, Default: 1,
				Text: "side of the elbow: 1 above the line from shoulder to wrist, -1 below"},
		},
		Starter: Starter{
			Title:    "A palletising arm to start from",
			Box:      Coords{X: 0.15, Y: 0.3, Z: 0.15, Yaw: 90 * deg},
			Mass:     10,
			Centre:   Vec{Z: -0.1},
			Accel:    5,
			Speed:    1,
			Spin:     1,
			Diameter: 0.08,
			Swing:    45 * deg,
		},
		Sources: []string{
			"two links driven by their absolute angles through parallelograms, wrist plate kept level by two more (common practice, no source)",
			"J. K. Salisbury and J. J. Craig 1982, Int. J. Robotics Research 1(1):4, isotropy of two links (from memory)",
		},
	}
	for _, stop := range []struct {
		name, text string
		least      float64
	}{
		{"upper_angle", "angle of the upper arm from the outward level, positive up", -10 * deg},
		{"forearm_angle", "angle of the forearm from the outward level, positive up", -110 * deg},
		{"elbow_angle", "angle between the directions of upper arm and forearm", 20 * deg},
	} {
		span := 150 * deg
		if stop.name == "elbow_angle" {
			span = 140 * deg
		}
		f.Dimensions = append(f.Dimensions,
			Dimension{Name: stop.name + "_min", Unit: Radian, Optional: true, Low: stop.least, High: stop.least, Default: stop.least,
				Text: "least " + stop.text},
			Dimension{Name: stop.name + "_range", Unit: Radian, Optional: true, Low: span, High: span, Default: span,
				Text: "range of that angle, up to the other stop"})
	}
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine { return newArm(freedoms, d, s) }
	return f
}
