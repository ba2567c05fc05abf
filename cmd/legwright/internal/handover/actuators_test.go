package handover

import (
	"math"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

// The schedule has each leg's figures of the appraisal in the units of its headings; a sized stroke leaves the
// reserve at both ends, and the row of all legs is the worst of them. Lengths are written to 1e-4 mm,
// angles to 1e-6°, forces and speeds have six digits.
func TestActuators(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		f := d.a.Plan.Family
		coordinate, effort, rate := study.DriveKinds(f.Name)
		c, e, r := units.Suffix(coordinate), units.Suffix(effort), units.Suffix(rate)
		push, pull := "push_"+e, "pull_"+e
		if f.Drive == kin.Rotary {
			push, pull = "torque_positive_"+e, "torque_negative_"+e
		}
		_, _, rows := read(t, files["actuators.csv"])
		in := func(k units.Kind, si float64) float64 { return units.Display(k).From(si) }
		fine := 6e-7
		if coordinate == units.Length {
			fine = 6e-5
		}
		ranged := f.Index("upper_arm") < 0
		for i := range d.a.Legs {
			l, row := &d.a.Legs[i], rows[i]
			near(t, "shortest", cell(t, row, "shortest_"+c), in(coordinate, l.Least), fine)
			near(t, "home", cell(t, row, "home_"+c), in(coordinate, l.Home), fine)
			near(t, "longest", cell(t, row, "longest_"+c), in(coordinate, l.Most), fine)
			near(t, "push", cell(t, row, push), in(effort, l.Push), 5e-6*math.Abs(l.Push))
			near(t, "pull", cell(t, row, pull), in(effort, l.Pull), 5e-6*math.Abs(l.Pull))
			near(t, "speed", cell(t, row, "speed_"+r), in(rate, l.Speed), 5e-6*in(rate, l.Speed))
		}
		if !ranged {
			for i, name := range [3]string{1: "upper_angle", 2: "forearm_angle"} { // the links' own stops
				if name == "" {
					continue
				}
				low := d.a.Values[f.Index(name+"_min")] * 180 / math.Pi
				near(t, name, cell(t, rows[i], "range_least_deg"), low, fine)
				near(t, name, cell(t, rows[i], "reserve_low_deg"), cell(t, rows[i], "shortest_deg")-low, 3*fine)
			}
			if len(rows) != 4 || rows[0]["range_least_deg"] != "" {
				t.Errorf("%d rows, first %v", len(rows), rows[0])
			}
			return
		}
		all := rows[len(rows)-1]
		if all["leg"] != "all" || len(rows) != len(d.a.Legs)+1 {
			t.Fatalf("last of %d rows: %v", len(rows), all)
		}
		reserve := in(coordinate, d.task.Actuator.Reserve)
		near(t, "reserve", cell(t, all, "reserve_low_"+c), reserve, fine)
		near(t, "reserve", cell(t, all, "reserve_high_"+c), reserve, fine)
		near(t, "range", cell(t, all, "range_most_"+c)-cell(t, all, "range_least_"+c), cell(t, all, "stroke_"+c), 3*fine)
		near(t, "used and reserves", cell(t, all, "used_"+c)+2*reserve, cell(t, all, "stroke_"+c), 3*fine)
	})
}
