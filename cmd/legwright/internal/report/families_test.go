package report

import (
	"bytes"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/study"
)

// drives is the invented study with three families: two on the front, of which one turns cranks, and
// one whose designs hold no limit.
func drives() *study.Front {
	f := lensTable()
	f.Weights = nil
	f.Goals[1] = study.Goal{Measure: "leg_power", Sense: study.Minimise, Unit: "W"}
	for i := range f.Designs {
		d := &f.Designs[i]
		d.ID = ""
		d.Measures["leg_power"] = d.Measures["leg_force"] / 4
		if i%3 == 1 {
			d.Family = "6-RUS"
			delete(d.Measures, "push_force")
			delete(d.Measures, "pull_force")
			for _, name := range []string{"leg_min", "stroke"} {
				delete(d.Measures, name)
				delete(d.Dimensions, name)
			}
			d.Measures["motor_torque"] = 31
			for k := range d.Legs {
				d.Legs[k].Shortest, d.Legs[k].Longest = -0.5, 0.7
			}
		}
	}
	best := map[string][]study.Design{}
	for _, d := range f.Designs {
		best[d.Family] = append(best[d.Family], d)
	}
	near := lensDesign(0)
	near.Family = "6-PUS"
	near.Limits[2].Value, near.Limits[2].Holds, near.Limits[2].Margin = 33*deg, false, -0.1
	f.Compare([]study.FamilyFound{
		{Name: "6-UPS", Evaluations: 6900, Feasible: 3100, Best: best["6-UPS"]},
		{Name: "6-RUS", Evaluations: 4000, Feasible: 1611, Best: best["6-RUS"]},
		{Name: "6-PUS", Evaluations: 1100, Nearest: &near},
	})
	study.Rank(f, nil)
	return f
}

// Designs of one family are told from those of another in words, and travels in mm do not stand
// among angles.
func TestScreensTellFamilies(t *testing.T) {
	var first, table bytes.Buffer
	f := drives()
	if err := FirstScreen(&first, f, Page{Width: 120}); err != nil {
		t.Fatal(err)
	}
	if err := Table(&table, f, 5, Page{Width: 120}); err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{"family", "6-UPS", "6-RUS", "6-PUS: none of its 1100 designs holds every limit; the nearest has base_swing 33 deg"} {
		for name, screen := range map[string]string{"first": first.String(), "table": table.String()} {
			if !strings.Contains(strings.Join(strings.Fields(screen), " "), want) {
				t.Errorf("%s: no %q in\n%s", name, want, screen)
			}
		}
	}
	d := &designs{front: f}
	for i := range f.Designs {
		d.rows = append(d.rows, &f.Designs[i])
	}
	cols := d.strokeUsed(0)
	if len(cols) != 2 || cols[0].unit != "mm" || cols[1].unit != "deg" {
		t.Fatalf("columns %+v", cols)
	}
	for i := range f.Designs {
		if turns := f.Designs[i].Family == "6-RUS"; (cols[0].cells[i] == "") != turns || (cols[1].cells[i] == "") == turns {
			t.Errorf("%s: %q mm, %q deg", f.Designs[i].Family, cols[0].cells[i], cols[1].cells[i])
		}
	}
}
