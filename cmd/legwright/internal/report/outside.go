package report

import (
	"fmt"
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/study"
)

// marksOf are the marks of a design that go into a column; what may happen outside the duty is said below the table.
func marksOf(r *study.Design) []string {
	return slices.DeleteFunc(slices.Clone(r.Marks), func(m string) bool { return m == study.MarkCrosses })
}

// outside says which of the designs shown meet a singularity within their strokes.
func (s *sheet) outside(d *designs) {
	var ids []string
	for _, r := range d.rows {
		if slices.Contains(r.Marks, study.MarkCrosses) {
			ids = append(ids, study.Clean(r.ID))
		}
	}
	if len(ids) > 0 {
		s.say(fmt.Sprintf("Outside the duty, some combinations of strokes meet a singularity: %s. See legwright appraise --whole-stroke.", strings.Join(ids, ", ")))
	}
}
