package job

import (
	"fmt"
	"strings"

	"legwright/cmd/legwright/internal/brief"
	"legwright/objective"
)

// unfounded refuses goals and limits on efforts where no case has a load, and on rates where none
// has a speed: they would hold because nothing was asked of the machine.
func unfounded(b *brief.Brief) brief.Faults {
	loads, speeds := false, false
	for i := range b.Duty.Cases {
		c := &b.Duty.Cases[i]
		loads = loads || len(c.Loads) > 0
		speeds = speeds || c.Speeds.Linear.Kind != brief.NoSet || c.Speeds.Angular.Kind != brief.NoSet
	}
	var faults brief.Faults
	check := func(path, name string) {
		m := objective.MeasureNamed(name)
		if (m.Need&objective.NeedEfforts != 0 || m.Name == "deflection") && !loads {
			faults = append(faults, b.Fault(path, name+" needs a load, and no case has one", "add duty.cases with loads"))
		}
		if m.Need&objective.NeedRates != 0 && !speeds {
			faults = append(faults, b.Fault(path, name+" needs a speed, and no case has one", "add speeds: {linear: 0.3 m/s} to a case"))
		}
	}
	for i, g := range b.Goals {
		check(fmt.Sprintf("goals[%d]", i), g.Measure)
	}
	for i, l := range b.Limits {
		check(fmt.Sprintf("limits[%d]", i), l.Measure)
	}
	return faults
}

// idle names the zones in which no case occurs, though there are cases.
func idle(t *objective.Task) string {
	if len(t.Cases) == 0 {
		return ""
	}
	var names []string
next:
	for z := range t.Zones {
		for c := range t.Cases {
			if t.Cases[c].In(z) {
				continue next
			}
		}
		names = append(names, fmt.Sprintf("%q", t.Zones[z].Name))
	}
	return strings.Join(names, ", ")
}
