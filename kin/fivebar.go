package kin

// The places of the dimensions of five-bar.
const (
	barSpacing = iota
	barProximal
	barDistal
	barHomeY
	barModes
)

func fiveBar() *Family {
	f := &Family{
		Name:     "five-bar",
		Text:     "planar linkage of two cranks and two links that meet in a point: x and y",
		Freedoms: []Freedom{X, Y},
		Legs:     2,
		Drive:    Rotary,
		Picture: `Seen from above, the pivots of cranks 1 and 2 stand on the x axis at -spacing/2 and +spacing/2 from the base origin.
proximal is the crank, from pivot to elbow, distal the link from elbow to the point where both links meet:
the platform, which does not turn in this program. At home it is at (0, home_y). Crank angles are counted
from +x, counter-clockwise, within half a turn of the angle at home, which lies between -180° and 180°. The mode of a
leg is the sign of the turn from its crank to its link: 1 where the link bends off counter-clockwise.
With modes -1 and 1 both elbows are on the outside.`,
		Dimensions: []Dimension{
			{Name: "spacing", Unit: Metre, Low: 0.1, High: 0.4, Text: "distance between the pivots"},
			{Name: "proximal", Unit: Metre, Low: 0.15, High: 0.4, Text: "length of a crank, from its pivot to the elbow"},
			{Name: "distal", Unit: Metre, Low: 0.2, High: 0.5, Text: "length of a link, from the elbow to the platform point"},
			{Name: "home_y", Unit: Metre, Low: 0.15, High: 0.5, Text: "y of the platform point at home"},
		},
		Starter: Starter{
			Title:    "A five-bar to start from",
			Box:      Coords{X: 0.08, Y: 0.05},
			Mass:     2,
			Accel:    10,
			Speed:    1,
			Diameter: 0.02,
			Swing:    75 * deg,
		},
		Sources: []string{
			"X.-J. Liu, J. Wang and G. Pritschow 2006, Mechanism and Machine Theory 41:119 (from memory)",
		},
	}
	f.Dimensions = append(f.Dimensions, workingModes(2, "turn from crank to link")...)
	f.Dimensions[barModes].Default = -1
	f.Dimensions = append(f.Dimensions, crankRange("crank", -180*deg, 180*deg, 30*deg, 360*deg)...)
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine {
		t := planarSetup(s)
		var drives []drive
		for i, x := range [2]float64{-d[barSpacing] / 2, d[barSpacing] / 2} {
			drives = append(drives, newCrank(Vec{X: x}, Vec{X: 1}, Vec{Y: 1}, d[barProximal], d[barDistal], d[barModes+i]))
		}
		return newShifting(freedoms, drives, make([]Vec, 2), Vec{Y: d[barHomeY]}, Identity(), false, 0, &t)
	}
	return f
}
