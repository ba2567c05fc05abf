package report

import (
	"fmt"
	"math"
	"strconv"

	"legwright/cmd/legwright/internal/study"
)

// families draws a line for each of several families, and in words why it lost or what it is good
// for; nothing where the brief names one.
func (s *sheet) families(f *study.Front) {
	if len(f.Families) == 0 {
		return
	}
	n := len(f.Families)
	cell := func(name string, left bool, of func(l *study.FamilyLine) string) column {
		c := column{name: name, head: words(name), left: left}
		for i := range n {
			c.cells = append(c.cells, study.Clean(of(&f.Families[i])))
		}
		return c
	}
	cols := []column{
		cell("family", true, func(l *study.FamilyLine) string { return l.Name }),
		cell("evaluations", false, func(l *study.FamilyLine) string { return strconv.Itoa(l.Evaluations) }),
		cell("feasible", false, func(l *study.FamilyLine) string { return strconv.Itoa(l.Feasible) }),
		cell("on_front", false, func(l *study.FamilyLine) string { return strconv.Itoa(l.OnFront) }),
		cell("share", false, func(l *study.FamilyLine) string {
			return fmt.Sprintf("%.0f %%", 100*float64(l.Share))
		}),
	}
	for _, g := range f.Goals {
		values := make([]float64, n)
		for i := range values {
			values[i] = math.NaN()
			if v, ok := f.Families[i].Best[g.Measure]; ok {
				values[i] = float64(v)
			}
		}
		c := limitScale(g.Measure, g.Unit)
		cols = append(cols, column{name: g.Measure, head: "best\n" + words(study.Clean(g.Measure)), unit: c.unit(), cells: c.apart(values)})
	}
	s.heading("Families")
	s.blocks(cols)
	for i := range f.Families {
		l := &f.Families[i]
		s.item(study.Clean(l.Name) + ": " + study.Clean(l.Why))
	}
	s.gap()
}
