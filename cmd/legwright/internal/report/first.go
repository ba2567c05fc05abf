package report

import (
	"fmt"
	"io"
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

const (
	marksWidth = 18 // columns for the marks: "best conditioning,"
)

// FirstScreen draws what one needs to choose a design: a few that differ, what a step along the front
// costs, and what the figures leave out. A front without designs is drawn by Infeasible.
func FirstScreen(w io.Writer, f *study.Front, p Page) error {
	if len(f.Designs) == 0 {
		return infeasible(w, f, p)
	}
	s := p.sheet()
	s.title(f)
	s.gap()

	d := &designs{front: f}
	near := map[string][]string{}
	for _, c := range study.Choose(f, study.FirstShown) {
		d.rows = append(d.rows, &f.Designs[c.Index])
		near[f.Designs[c.Index].ID] = c.Near
	}
	marks := d.text("marks", 0, func(r *study.Design) string {
		out := marksOf(r)
		for _, m := range near[r.ID] {
			out = append(out, "near "+m)
		}
		return strings.Join(out, ", ")
	})
	marks.most = marksWidth
	cols := []column{d.id(), marks}
	if len(families(f)) > 1 {
		cols = append(cols, d.text("family", 0, func(r *study.Design) string { return r.Family }))
	}
	for _, g := range f.Goals {
		cols = append(cols, d.measure(g.Measure, 0))
	}
	cols = append(cols, d.tightest(0), d.margin(0))
	needs := append([]column{d.id()}, d.strokeUsed(0)...)
	for _, m := range []string{"stroke", "leg_min"} {
		if d.has(m) && !goal(f, m) {
			needs = append(needs, d.measure(m, 0))
		}
	}
	for _, m := range []string{"push_force", "pull_force", "motor_torque", "footprint", "home_height"} {
		if d.has(m) && !goal(f, m) {
			needs = append(needs, d.measure(m, 0))
		}
	}
	if all := append(slices.Clone(cols), needs[1:]...); fits(all, s.Width) {
		s.blocks(all)
	} else {
		s.blocks(cols)
		s.gap()
		s.blocks(needs)
	}
	if d.limited() {
		s.say(margins)
	}
	s.proofs(f)
	s.outside(d)
	s.gap()
	s.families(f)
	s.steps(f)
	s.leftOut(f.Poses, f.Notes, study.Caution)
	if p.Dir != "" {
		dir := quote(p.Dir)
		s.gap()
		s.item(fmt.Sprintf("all designs in order: %s", together(fmt.Sprintf("legwright rank %s --top %d", dir, len(f.Designs)))))
		s.item(fmt.Sprintf("other weights: %s", together(fmt.Sprintf("legwright rank %s --weight %s=2", dir, study.Clean(f.Goals[0].Measure)))))
		s.item(fmt.Sprintf("the page to choose by: %s", together(quote(p.Dir+"/report.html"))))
		s.item(fmt.Sprintf("one design with every worst pose: %s", together("legwright appraise "+quote(p.Dir+"/designs/"+f.Designs[0].ID+".yaml"))))
		s.item(fmt.Sprintf("its limits between the samples: %s", together("legwright prove "+quote(p.Dir+"/designs/"+f.Designs[0].ID+".yaml"))))
	}
	return s.to(w)
}

// limited tells whether any of the designs has a limit with a margin.
func (d *designs) limited() bool {
	for _, r := range d.rows {
		if r.Tightest() != nil {
			return true
		}
	}
	return false
}

// title says what was searched.
func (s *sheet) title(f *study.Front) {
	title := f.Title
	if strings.TrimSpace(study.Clean(title)) == "" {
		title = "Study without a title"
	}
	s.heading(title)
	line := fmt.Sprintf("%d designs evaluated", f.Evaluations)
	if f.Evaluations > 0 {
		line += fmt.Sprintf(", %s %% of them feasible", units.Digits(100*float64(f.Feasible)/float64(f.Evaluations), 2))
	}
	if n := len(f.Designs); n == 1 {
		line += "; 1 on the front"
	} else if n > 1 {
		line += fmt.Sprintf("; %d on the front", n)
	}
	if fam := families(f); len(fam) > 0 {
		line += " (" + strings.Join(fam, ", ") + ")"
	}
	s.say(fmt.Sprintf("%s. Seed %d, population %d, %d sampled poses.", line, f.Seed, f.Population, f.Poses))
	if f.Status != "" && f.Status != "budget spent" && len(f.Designs) > 0 {
		s.say("Ended early: " + f.Status + ".")
	}
	var goals []string
	for _, g := range f.Goals {
		t := g.Sense + " " + g.Measure
		if v, ok := f.Weights[g.Measure]; ok && v != 1 {
			t += fmt.Sprintf(" (weight %s)", units.Digits(v, 3))
		}
		goals = append(goals, t)
	}
	s.say("Goals: " + strings.Join(goals, ", ") + ".")
}

// quote makes a path fit to be pasted into a shell.
func quote(path string) string {
	path = study.Clean(path)
	safe := func(r rune) bool {
		return r == '/' || r == '.' || r == '-' || r == '_' || r >= '0' && r <= '9' || r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z'
	}
	for _, r := range path {
		if !safe(r) {
			return "'" + strings.ReplaceAll(path, "'", `'\''`) + "'"
		}
	}
	return path
}
