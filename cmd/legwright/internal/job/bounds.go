package job

import (
	"fmt"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/objective"
)

// impossible refuses limits that no design can keep: a measure that is never negative at most less than 0.
func impossible(b *brief.Brief) brief.Faults {
	var faults brief.Faults
	for i, l := range b.Limits {
		if m := objective.MeasureNamed(l.Measure); !l.AtLeast && m.Sense == objective.Smaller && l.Bound < 0 {
			faults = append(faults, b.Fault(fmt.Sprintf("limits[%d]", i),
				fmt.Sprintf("%s at most %s: it is never below 0", m.Name, units.Format(l.Bound, study.UnitKind(m.Unit), 6)),
				"write a bound above 0"))
		}
	}
	return faults
}
