package kin

import "strconv"

// threeAzimuths are the azimuths of three-leg families unless a brief says otherwise.
var threeAzimuths = [3]float64{90 * deg, 210 * deg, 330 * deg}

// legAzimuths are the dimensions that turn the legs of a three-leg family about z.
func legAzimuths() []Dimension {
	var out []Dimension
	for i, a := range threeAzimuths {
		leg := strconv.Itoa(i + 1)
		out = append(out, Dimension{Name: "leg_azimuths_" + leg, Unit: Radian, Joints: true,
			Low: a, High: a, Optional: true, Default: a, Text: "azimuth of leg " + leg + " from +x (written as a list of three: leg_azimuths)"})
	}
	return out
}

// jointOffsets are the dimensions that move the joints of a planar three-leg stage along their circles.
func jointOffsets() []Dimension {
	var out []Dimension
	for _, plate := range [2]string{"base", "platform"} {
		for i := range 3 {
			leg := strconv.Itoa(i + 1)
			out = append(out, Dimension{Name: plate + "_offset_" + leg, Unit: Radian, Joints: true,
				Optional: true, Text: "angle by which the " + plate + " joint of leg " + leg + " stands off its azimuth, counter-clockwise"})
		}
	}
	return out
}

// stageAzimuths are the azimuths of a planar stage's joints: d holds three leg
// azimuths, three offsets of base joints and three of platform joints.
func stageAzimuths(d []float64) (base, platform []float64) {
	for i := range 3 {
		base = append(base, d[i]+d[3+i])
		platform = append(platform, d[i]+d[6+i])
	}
	return base, platform
}

// workingModes are the dimensions that choose each leg's working mode, as a list.
func workingModes(n int, text string) []Dimension {
	var out []Dimension
	for i := range n {
		leg := strconv.Itoa(i + 1)
		out = append(out, Dimension{Name: "modes_" + leg, Unit: Sign, Low: -1, High: 1, Optional: true, Default: 1,
			Text: text + " of leg " + leg + " (written as a list: modes)"})
	}
	return out
}

// workingMode is the dimension that chooses the working mode of all legs.
func workingMode(text string) Dimension {
	return Dimension{Name: "mode", Unit: Sign, Low: -1, High: 1, Optional: true, Default: 1, Text: text}
}

// crankRange are the dimensions that bound the crank angles.
func crankRange(what string, least, most, narrow, wide float64) []Dimension {
	return []Dimension{
		{Name: "angle_min", Unit: Radian, Role: Least, Low: least, High: most, Text: "least angle of each " + what},
		{Name: "angle_range", Unit: Radian, Role: Span, Low: narrow, High: wide, Text: "angle through which each " + what + " can turn from there"},
	}
}

// railRange are the dimensions that bound the carriages' travel.
func railRange(from string, least, most, short, long float64) []Dimension {
	return []Dimension{
		{Name: "travel_min", Unit: Metre, Role: Least, Low: least, High: most, Text: "least coordinate of a carriage along its rail, from " + from},
		{Name: "travel", Unit: Metre, Role: Span, Low: short, High: long, Text: "travel of a carriage from there"},
	}
}
