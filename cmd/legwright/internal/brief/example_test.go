package brief_test

import (
	"fmt"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/units"
)

func names() brief.Known {
	return brief.Known{
		Families: []brief.KnownFamily{{Name: "delta", Freedoms: []string{"x", "y", "z"}, Rotary: true, Dimensions: []brief.KnownDimension{
			{Name: "arm", Kind: units.Length, Positive: true},
			{Name: "rod", Kind: units.Length, Positive: true},
		}}},
		Measures: []brief.KnownMeasure{{Name: "conditioning", Kind: units.Ratio, Sense: brief.Maximise}},
	}
}

func ExampleParse() {
	b, err := brief.Parse("pick.yaml", []byte(`
family: delta
dimensions: {arm: [200 mm, 400 mm], rod: 0.8 m}
duty: {zones: [{name: tray, box: {x: 150 mm, y: 150 mm}}]}
goals: [{maximise: conditioning}]
`), names())
	if err != nil {
		fmt.Println(err)
		return
	}
	arm := b.Families[0].Dimensions[0]
	fmt.Println(arm.Name, arm.Low, arm.High)
	// Output: arm 0.2 0.4
}

func ExampleFaults() {
	_, err := brief.Parse("pick.yaml", []byte(`
family: delat
dimensions: {arm: 200, rod: [0.8 m, 600 mm]}
duty: {zones: [{name: tray, box: {x: 150 mm, roll: 3 deg}}]}
`), names())
	fmt.Println(err)
	// Output:
	// pick.yaml:2:1: goals: is missing; add goals
	// pick.yaml:2:9: family: unknown family "delat"; did you mean delta?
	// pick.yaml:3:19: dimensions.arm: 200 has no unit; write it as a quantity, such as 650 mm
	// pick.yaml:3:29: dimensions.rod: the range runs backwards, from 0.8 m to 600 mm; write [600 mm, 0.8 m]
	// pick.yaml:4:46: duty.zones[0].box.roll: delta does not move in roll; its coordinates are x, y, z
}
