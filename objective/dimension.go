package objective

import "legwright/kin"

// hasDimension chooses families that have the named dimension.
func hasDimension(name string) func(*kin.Family) bool {
	return func(f *kin.Family) bool { return f.Index(name) >= 0 }
}

// own is a measure that is a plain property of the design.
func own(name, text string, has func(*kin.Family) bool, value func(d *Design) float64) *Measure {
	return &Measure{Name: name, Text: text, Unit: Metre, Sense: Either, Has: has, Design: value,
		Source: "definition", Scale: func(*Task) float64 { return 0.1 }}
}

func stroke() *Measure {
	return own("stroke", "travel of a leg between its end stops", hasDimension("stroke"),
		func(d *Design) float64 { return d.dimension("stroke") })
}

func legMin() *Measure {
	return own("leg_min", "length of a leg drawn in completely", hasDimension("leg_min"),
		func(d *Design) float64 { return d.dimension("leg_min") })
}

func legMax() *Measure {
	return own("leg_max", "length of a leg drawn out completely", hasDimension("leg_min"),
		func(d *Design) float64 { return d.dimension("leg_min") + d.dimension("stroke") })
}

func homeHeight() *Measure {
	return own("home_height", "height of the platform origin above the base origin at home", rises,
		func(d *Design) float64 { return d.Machine.Frame().Home.Z })
}

// rises tells whether machines of the family move along z.
func rises(f *kin.Family) bool { return f.Has(kin.Z) }

// coverage is computed by the walk itself.
func coverage() *Measure {
	return &Measure{
		Name: "coverage", Unit: Ratio, Sense: Larger, Most: 1,
		Text:   "share of the required poses at which every pose limit holds: reachable, actuator range less reserve, ratings, swing, not singular, and limits on measures that have a value per pose",
		Source: "definition",
	}
}
