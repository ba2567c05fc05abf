package units_test

import (
	"fmt"

	"legwright/cmd/legwright/internal/units"
)

func Example() {
	v, _, err := units.Parse("650.1 mm", units.Length)
	fmt.Println(v, err)
	_, _, err = units.Parse("650", units.Length)
	fmt.Println(err)
	fmt.Println(units.Format(0.2094395, units.Angle, 4), units.Exact(v, units.Length), units.Heading("stroke", units.Length))
	// Output:
	// 0.6501 <nil>
	// 650 has no unit; write it as a quantity, such as 650 mm
	// 12 deg 0.6501 m stroke_mm
}
