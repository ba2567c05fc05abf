package report

import (
	"fmt"
	"math"

	"legwright/cmd/legwright/internal/study"
)

const deg = math.Pi / 180

// lensTable is an invented study: thirteen designs along a smooth front, with figures made up by
// simple formulas so that every screen has something to show.
func lensTable() *study.Front {
	f := &study.Front{
		Format: study.Format, Program: "legwright 0.0.0", Title: "Polishing table for lens blanks, 40 kg",
		Seed: 7, Status: "budget spent", Evaluations: 12000, Feasible: 4711, Population: 60, Poses: 400,
		Goals: []study.Goal{
			{Measure: "conditioning", Sense: study.Maximise},
			{Measure: "leg_force", Sense: study.Minimise, Unit: "N"},
			{Measure: "footprint", Sense: study.Minimise, Unit: "m"},
		},
		Hypervolume: 0.2614,
		Notes:       append(study.LeftOut(400), `zone "service" asks for each excursion alone; such excursions are not reachable together`),
	}
	for i := range 13 {
		f.Designs = append(f.Designs, lensDesign(float64(i)/12))
	}
	study.Rank(f, map[string]float64{"conditioning": 2})
	return f
}

// lensDesign is the design at t along the front, from small and stiff to wide.
func lensDesign(t float64) study.Design {
	n := func(v float64) study.Number { return study.Number(v) }
	footprint := 0.8 + 0.6*t
	force := 900 - 400*math.Sqrt(t)
	d := study.Design{
		Family: "6-UPS", Feasible: true, Poses: 400,
		Dimensions: map[string]study.Number{
			"base_radius": n(footprint / 2), "platform_radius": n(0.2 + 0.05*t), "base_half_angle": n(12 * deg),
			"platform_half_angle": n((20 + 10*t) * deg), "home_height": n(0.6 + 0.1*t), "leg_min": n(0.55), "stroke": n(0.22),
		},
		Measures: map[string]study.Number{
			"coverage": 1, "conditioning": n(0.2 + 0.2*t*(2-t)), "leg_force": n(force), "push_force": n(force), "pull_force": n(force / 4),
			"leg_speed": n(0.35), "base_swing": n(22.5 * deg), "leg_clearance": n(0.012 - 0.008*math.Abs(t-0.6)),
			"footprint": n(footprint), "stroke": n(0.22), "home_height": n(0.6 + 0.1*t), "stiffness": n(3.2e7), "buckling_margin": n(math.Inf(1)),
		},
		Unbounded: map[string]bool{"buckling_margin": true},
		Worst: map[string]study.Worst{
			"conditioning":  {Pose: &study.Pose{X: 0.1, Y: -0.1, Z: 0.05, Roll: 8 * deg, Pitch: -8 * deg}, Zone: "grind"},
			"leg_force":     {Pose: &study.Pose{X: 0.1, Y: 0.1, Z: 0.0125, Roll: 8 * deg, Pitch: 8 * deg}, Leg: 3, Zone: "grind", Case: "pressing"},
			"leg_clearance": {Pose: &study.Pose{X: 0.1, Y: 0.1, Z: 0.0125, Roll: 8 * deg, Pitch: 8 * deg}, Leg: 2, Mate: 3, Zone: "grind"},
		},
		Excursions: []study.Excursion{
			{Coordinate: "x", Low: -0.21, LowFails: "actuator range", High: 0.2, HighFails: "base_swing"},
			{Coordinate: "yaw", Low: n(math.Inf(-1)), High: n(math.Inf(1)), Unbounded: map[string]bool{"low": true, "high": true}},
		},
	}
	clearance := d.Measures["leg_clearance"]
	d.Limits = []study.Limit{
		{Measure: "coverage", Origin: "limits", Sense: study.AtLeast, Bound: 1, Value: 1, Holds: true},
		{Measure: "leg_clearance", Origin: "limits", Unit: "m", Sense: study.AtLeast, Bound: 0, Value: clearance, Holds: true, Margin: clearance / 0.04},
		{Measure: "base_swing", Origin: "joints.base_swing", Unit: "rad", Sense: study.AtMost, Bound: n(30 * deg), Value: n(22.5 * deg), Holds: true, Margin: 0.25 + n(t/100)},
	}
	for i := range 6 {
		k := float64(i)
		leg := study.Leg{Shortest: n(0.56 + k/1000), Home: 0.66, Longest: n(0.76 - k/1000), Push: n(force - 10*k), Pull: n(force/4 - k),
			Speed: 0.35, BaseSwing: n((22.5 - k) * deg), PlatformSwing: n((31 - k) * deg), LongestAt: &study.Pose{Z: 0.05}}
		if i > 0 {
			leg.ShortestAt = &study.Pose{X: 0.1, Y: -0.1, Z: -0.05}
		}
		d.Legs = append(d.Legs, leg)
	}
	return d
}

// cramped is an invented study in which nothing is feasible.
func cramped() *study.Front {
	f := lensTable()
	f.Designs, f.Feasible, f.Status = nil, 0, "budget spent, no feasible design"
	f.Title = "The same table in a cabinet"
	var near []study.Design
	for i := range 3 {
		d := lensDesign(float64(i) / 12)
		d.Feasible = false
		over := study.Number(30 + 2*float64(i))
		d.Limits[2].Value, d.Limits[2].Holds, d.Limits[2].Margin = (over+1.5)*deg, false, -(over+1.5-30)/30
		if i > 0 {
			d.Limits[0].Value, d.Limits[0].Holds, d.Limits[0].Margin = 0.985, false, -0.015
			d.Limits = append(d.Limits, study.Limit{Measure: "dead length", Origin: "actuator.dead_length", Unit: "m", Sense: study.AtLeast,
				Bound: 0.58, Value: 0.55, Margin: -0.0517})
		}
		near = append(near, d)
	}
	near = append(near, near[2]) // one that would look the same
	f.Help = &study.Help{
		Binding: []study.Binding{
			{Constraint: "base_swing", Designs: 50, Of: 50, Least: 0.05},
			{Constraint: "dead length", Designs: 31, Of: 50, Least: 0.0517},
			{Constraint: "leg_force", Designs: 2, Of: 50, Least: study.Number(math.Inf(1))},
		},
		Nearest: near,
		Relaxations: []study.Relaxation{
			{Constraint: "base_swing", Origin: "joints.base_swing", Unit: "rad", Bound: 30 * deg, Needed: 31.5 * deg, Design: 0},
			{Constraint: "dead length", Origin: "actuator.dead_length", Unit: "m", Bound: 0.58, Needed: 0.55, Design: 1},
			{Constraint: "coverage", Origin: "limits", Bound: 1, Needed: 0.985, Design: 3},
		},
	}
	return f
}

// broken is a design that fails and whose duty has no bound.
func broken() *study.Design {
	d := lensDesign(0.5)
	d.Feasible = false
	inf := study.Number(math.Inf(1))
	d.Measures["leg_force"], d.Unbounded["leg_force"] = inf, true
	d.Measures["leg_clearance"] = -0.0034
	d.Measures["coverage"] = 0.9275
	l := &d.Limits[1]
	l.Value, l.Holds, l.Margin = -0.0034, false, -0.085
	d.Limits[0].Value, d.Limits[0].Holds, d.Limits[0].Margin = 0.9275, false, -0.0725
	d.Limits = append(d.Limits, study.Limit{Measure: "push_force", Origin: "actuator.push", Unit: "N", Sense: study.AtMost, Bound: 2000,
		Value: inf, Unbounded: true, Margin: -inf})
	d.Legs[2].Push = inf
	d.Notes = []string{fmt.Sprintf("case %q: \x1b[31mterms in ω² are left out\x07", "pressing")}
	return &d
}
