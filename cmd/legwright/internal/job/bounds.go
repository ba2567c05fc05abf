package job

import (
	"fmt"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/units"
	"legwright/objective"
)

// impossible refuses limits that no design can keep: a share above 1, a measure
// that is never negative at most less than 0.
func impossible(b *brief.Brief) brief.Faults {
	var faults brief.Faults
	for i, l := range b.Limits {
		for _, m := range objective.Measures() {
			if m.Name != l.Measure {
				continue
			}
			k := MeasureKind(m)
			bound := units.Format(l.Bound, k, 6)
			switch {
			case l.AtLeast && m.Most > 0 && l.Bound > m.Most:
				faults = append(faults, b.Fault(fmt.Sprintf("limits[%d]", i),
					fmt.Sprintf("%s at least %s: no design can have more than %s", m.Name, bound, units.Format(m.Most, k, 6)),
					"write a smaller bound"))
			case !l.AtLeast && m.Sense == objective.Smaller && l.Bound < 0:
				faults = append(faults, b.Fault(fmt.Sprintf("limits[%d]", i),
					fmt.Sprintf("%s at most %s: it is never below 0", m.Name, bound),
					"write a bound above 0"))
			}
		}
	}
	return faults
}
