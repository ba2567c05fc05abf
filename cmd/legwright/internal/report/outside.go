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

// proofs says what was proved of the front's designs.
func (s *sheet) proofs(f *study.Front) {
	var words []string
	ids := map[string][]string{}
	for i := range f.Designs {
		if d := &f.Designs[i]; d.Proof != nil {
			m := d.Proof.Mark()
			if ids[m] == nil {
				words = append(words, m)
			}
			ids[m] = append(ids[m], study.Clean(d.ID))
		}
	}
	for k, m := range words {
		words[k] = study.Clean(m) + ": " + strings.Join(ids[m], ", ")
	}
	if len(words) > 0 {
		s.say("Over the continuous duty, for this model, " + strings.Join(words, "; ") + ". Sized ranges of these are widened to what all poses need; the certificates lie beside the designs.")
	}
	if n := len(f.Counterexamples); n > 0 {
		s.say(fmt.Sprintf("%s refuted designs on the way and joined the required poses.", plural(n, "pose", "poses")))
	}
}

// outside says which of the designs shown meet a singularity within their strokes.
func (s *sheet) outside(d *designs) {
	var ids []string
	looked := 0
	for _, r := range d.rows {
		if r.WholeStroke != nil {
			looked++
		}
		if slices.Contains(r.Marks, study.MarkCrosses) {
			ids = append(ids, study.Clean(r.ID))
		}
	}
	if len(ids) > 0 {
		s.say(fmt.Sprintf("Outside the duty, some combinations of shortest and longest actuators meet a singularity: %s (%d of the designs above were looked at). See legwright appraise --whole-stroke.", strings.Join(ids, ", "), looked))
	}
}
