package report

import (
	"fmt"
	"io"
	"strings"

	"legwright/cmd/legwright/internal/study"
)

// Table draws the top designs of a ranked front, all of them if top is not above zero, with as many
// columns as there is room for.
func Table(w io.Writer, f *study.Front, top int, p Page) error {
	if len(f.Designs) == 0 {
		return infeasible(w, f, p)
	}
	s := p.sheet()
	s.title(f)
	n := len(f.Designs)
	if top > 0 {
		n = min(n, top)
	}
	s.gap()
	d := &designs{front: f}
	for i := range n {
		d.rows = append(d.rows, &f.Designs[i])
	}
	marks := d.text("marks", 48, func(r *study.Design) string { return strings.Join(marksOf(r), ", ") })
	marks.most = marksWidth
	cols := []column{d.rank(), d.id(), d.score(47)}
	if len(families(f)) > 1 {
		cols = append(cols, d.text("family", 60, func(r *study.Design) string { return r.Family }))
	}
	for i, g := range f.Goals {
		cols = append(cols, d.measure(g.Measure, 100-i))
	}
	cols = append(cols, d.tightest(50), d.margin(50), marks)
	for i, name := range f.DimensionNames() {
		cols = append(cols, d.dimension(name, max(40-i, 1)))
	}
	left := s.grid(cols)
	s.without(left)
	if d.limited() && !among("margin", left) {
		s.say(margins)
	}
	s.outside(d)
	if len(f.Families) > 0 {
		s.gap()
		s.families(f)
	}
	s.say("Rank and score: closeness to the ideal under the weights (TOPSIS), 1 at best.")
	if n < len(f.Designs) {
		s.say(fmt.Sprintf("%d of %d designs; --top %d shows all.", n, len(f.Designs), len(f.Designs)))
	}
	s.say(fmt.Sprintf("Figures: worst of %d sampled poses; massless legs; payload, cables and motors not in the clearances.", f.Poses))
	return s.to(w)
}
