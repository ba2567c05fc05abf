package brief

import "legwright/cmd/legwright/internal/units"

// known is a small set of names in the manner of the real registries.
func known() Known {
	six := []string{"x", "y", "z", "roll", "pitch", "yaw"}
	length := func(name string) KnownDimension {
		return KnownDimension{Name: name, Kind: units.Length, Positive: true}
	}
	angle := func(name string) KnownDimension { return KnownDimension{Name: name, Kind: units.Angle} }
	placed := func(d KnownDimension, p Places) KnownDimension { d.Places = p; return d }
	sizable := func(d KnownDimension) KnownDimension { d.Sizable = true; return d }
	optional := func(d KnownDimension) KnownDimension { d.Optional = true; return d }
	hexagons := []KnownDimension{
		placed(length("base_radius"), PlacesJoints),
		placed(length("platform_radius"), PlacesJoints),
		placed(angle("base_half_angle"), PlacesJoints),
		placed(angle("platform_half_angle"), PlacesJoints),
		placed(length("home_height"), PlacesHome),
	}
	with := func(more ...KnownDimension) []KnownDimension {
		return append(append([]KnownDimension{}, hexagons...), more...)
	}
	azimuths := placed(optional(angle("leg_azimuths")), PlacesJoints)
	azimuths.Each = 3
	mode := KnownDimension{Name: "mode", Kind: units.Sign, Optional: true}
	return Known{
		Families: []KnownFamily{
			{Name: "6-UPS", Freedoms: six, Legs: 6, Dimensions: with(sizable(length("leg_min")), sizable(length("stroke")))},
			{Name: "6-RUS", Freedoms: six, Rotary: true, Legs: 6, Dimensions: with(
				length("crank_length"), length("rod_length"), mode, sizable(angle("angle_min")), sizable(angle("angle_range")))},
			{Name: "6-PUS", Freedoms: six, Legs: 6, Rails: true, Dimensions: with(
				placed(angle("rail_slope"), PlacesRails), length("rod_length"),
				KnownDimension{Name: "travel_min", Kind: units.Length, Sizable: true}, sizable(length("travel")))},
			{Name: "3-RPR", Freedoms: []string{"x", "y", "yaw"}, Legs: 3, Dimensions: []KnownDimension{
				placed(length("base_radius"), PlacesJoints), placed(length("platform_radius"), PlacesJoints), azimuths,
				placed(angle("home_heading"), PlacesHome), sizable(length("leg_min")), sizable(length("stroke"))}},
			{Name: "delta", Freedoms: []string{"x", "y", "z"}, Rotary: true, Dimensions: []KnownDimension{
				length("shoulder_radius"), length("arm"), length("rod"), placed(length("home_height"), PlacesHome)}},
		},
		Measures: []KnownMeasure{
			{Name: "coverage", Kind: units.Ratio, Sense: Maximise, Share: true},
			{Name: "conditioning", Kind: units.Ratio, Sense: Maximise},
			{Name: "leg_force", Kind: units.Force, Sense: Minimise, Families: []string{"6-UPS", "6-PUS", "3-RPR"}},
			{Name: "motor_torque", Kind: units.Torque, Sense: Minimise, Families: []string{"6-RUS", "delta"}},
			{Name: "stiffness", Kind: units.Stiffness, Sense: Maximise, Needs: []string{"actuator.stiffness"}},
			{Name: "position_error", Kind: units.Length, Sense: Minimise, Needs: []string{"actuator.error"}},
			{Name: "buckling_margin", Kind: units.Ratio, Sense: Maximise, Needs: []string{"legs.rod_diameter", "legs.modulus"}},
			{Name: "footprint", Kind: units.Length, Sense: Minimise},
			{Name: "leg_clearance", Kind: units.Length, Sense: Maximise},
			{Name: "stroke", Kind: units.Length},
		},
	}
}
