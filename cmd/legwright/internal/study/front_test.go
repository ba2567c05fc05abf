package study

import (
	"math"

	"legwright/cmd/legwright/internal/units"
)

// tilter is an invented study with every kind of field in it.
func tilter() *Front {
	f := &Front{
		Format: Format, Program: "legwright 0.0.0", Title: "Tilter for casting moulds", Seed: 5, Status: "budget spent",
		Evaluations: 900, Feasible: 300, Population: 40, Poses: 128,
		Goals:          []Goal{{Measure: "conditioning", Sense: Maximise}, {Measure: "footprint", Sense: Minimise, Unit: "m"}},
		ReferencePoint: []Number{0.1, 1.7000000000000002}, Hypervolume: 1.0 / 3,
		Notes: []string{"a note"},
	}
	for i := range 5 {
		t := float64(i)
		d := Design{
			Family: "3-RPR", Feasible: true, Poses: 128,
			Dimensions: map[string]Number{"base_radius": Number(0.4 + 0.1*t), "home_heading": Number(20 * math.Pi / 180), "stroke": 0.25},
			Measures: map[string]Number{"conditioning": Number(0.2 + 0.1*math.Sqrt(t)), "footprint": Number(0.8 + 0.2*t),
				"leg_clearance": Number(math.Inf(1)), "stroke": 0.25},
			Unbounded: map[string]bool{"leg_clearance": true},
			Worst:     map[string]Worst{"conditioning": {Pose: &Pose{X: 0.05, Yaw: -0.17453292519943295}, Zone: "tilt"}},
			Joints:    Joints{Base: [][3]float64{{0, 0.4, 0}}, Platform: [][3]float64{{0, 0.1, 0}}},
			Limits: []Limit{
				{Measure: "coverage", Origin: "limits", Sense: AtLeast, Bound: 1, Value: 1, Holds: true},
				{Measure: "base_swing", Origin: "joints.base_swing", Unit: "rad", Sense: AtMost, Bound: 1, Value: Number(0.9 - t/100), Holds: true, Margin: Number(0.1 + t/100)},
			},
			Legs:       []Leg{{Shortest: 0.3, Home: 0.35, Longest: 0.5, ShortestAt: &Pose{X: 0.05}}, {Shortest: 0.28, Home: 0.35, Longest: 0.49}},
			Excursions: []Excursion{{Coordinate: "yaw", Low: Number(math.Inf(-1)), High: 1, HighFails: "singular", Unbounded: map[string]bool{"low": true}}},
		}
		f.Designs = append(f.Designs, d)
	}
	Rank(f, nil)
	return f
}

func encodeTest(d Design) ([]byte, error) {
	return []byte("brief: ../brief.yaml\nfamily: " + d.Family + "\nstroke: " + units.Exact(float64(d.Dimensions["stroke"]), units.Length) + "\n"), nil
}
