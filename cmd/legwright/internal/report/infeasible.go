package report

import (
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// infeasible draws what a search without a feasible design still tells: what stands in the way, what
// change of one limit alone would do, the designs that came nearest, and what to try.
func infeasible(w io.Writer, f *study.Front, p Page) error {
	s := p.sheet()
	s.title(f)
	s.gap()
	s.b.WriteString(s.alarm("No design was found that holds every limit.") + "\n")
	if f.Status == "interrupted" {
		s.say("The search was interrupted, so there may be some.")
	}
	s.gap()
	s.families(f)
	if h := f.Help; h != nil {
		s.binding(h)
		number, _ := numbers(h.Nearest)
		s.relaxations(h, number)
		s.nearest(Nearest(f))
		s.advice(h)
	}
	s.leftOut(f.Poses, f.Notes, study.Caution)
	return s.to(w)
}

func (s *sheet) binding(h *study.Help) {
	if len(h.Binding) == 0 {
		return
	}
	s.heading("What stands in the way")
	cols := []column{{head: "limit", left: true}, {head: "broken by"}, {head: "at least by"}}
	for _, b := range h.Binding {
		least := "without bound"
		if !math.IsInf(float64(b.Least), 0) {
			least = units.Digits(100*float64(b.Least), 2) + " %"
		}
		for i, t := range []string{study.Clean(b.Constraint), fmt.Sprintf("%d of %d", b.Designs, b.Of), least} {
			cols[i].cells = append(cols[i].cells, t)
		}
	}
	s.grid(cols)
	s.say("Counted among the designs that came nearest, in % of the bound.")
	s.gap()
}

func (s *sheet) relaxations(h *study.Help, number []int) {
	s.heading("What would be enough: one limit changed, all others kept")
	some := false
	for _, r := range h.Relaxations {
		if t := relaxed(&r, number[r.Design]); t != "" {
			s.item(t)
			some = true
		}
	}
	if !some {
		s.item("no change of a single limit would admit a design that was met; at least two stand in the way together")
	}
	s.gap()
}

// numbers gives each of the nearest designs a number from 1, the same one to designs that would be
// shown with the same figures, and the first design of each number.
func numbers(near []study.Design) (number, first []int) {
	seen := map[string]int{}
	for i := range near {
		t := inWords(&near[i])
		if seen[t] == 0 {
			first = append(first, i)
			seen[t] = len(first)
		}
		number = append(number, seen[t])
	}
	return number, first
}

// relaxed says in words how far a limit has to give way so that design n would do, "" where it cannot.
func relaxed(r *study.Relaxation, n int) string {
	c := limitScale(r.Constraint, r.Unit)
	bound, needed := float64(r.Bound), float64(r.Needed)
	if math.IsInf(needed, 0) || math.IsNaN(needed) {
		return ""
	}
	by := c.text(math.Abs(needed-bound), 3)
	key := study.Clean(r.Origin)
	name := study.Clean(r.Constraint)
	switch r.Constraint {
	case "singular poses":
		return fmt.Sprintf("%s: poses that are singular are %s; no limit helps, but without these poses design %d below would do", name, c.text(needed, 3), n)
	case "shortest needed":
		return fmt.Sprintf("%s: %s shorter legs when drawn in (%s instead of %s) would admit design %d below", key, by, c.text(needed, manyDigits), c.text(bound, manyDigits), n)
	case "longest needed":
		return fmt.Sprintf("%s: %s longer legs when drawn out (%s instead of %s) would admit design %d below", key, by, c.text(needed, manyDigits), c.text(bound, manyDigits), n)
	case "dead length":
		return fmt.Sprintf("%s: %s less dead length would admit design %d below, whose legs draw in to %s", key, by, n, c.text(needed, manyDigits))
	case "stock stroke":
		return fmt.Sprintf("%s: a stroke of %s, %s more than the longest in stock, would admit design %d below", key, c.text(needed, manyDigits), by, n)
	}
	word := "at most"
	if needed < bound {
		word = "at least"
	}
	where := ""
	if key != "" && key != "limits" {
		where = " (" + key + ")"
	}
	if c.percent {
		by = c.number(math.Abs(needed-bound), 3) + " points"
	}
	return fmt.Sprintf("%s%s: %s %s instead of %s would admit design %d below (%s of relief)",
		name, where, word, c.text(needed, manyDigits), c.text(bound, manyDigits), n, by)
}

// Near is a design that came near to holding every limit.
type Near struct {
	Number int         // from 1, as Shortfall counts
	Text   string      // its family and dimensions
	Broken [][4]string // of each limit that it breaks: name, value, what is wanted, margin
}

// Nearest are the designs that came nearest where no design holds every limit, each of the same figures once.
func Nearest(f *study.Front) (out []Near) {
	if f.Help == nil {
		return nil
	}
	_, first := numbers(f.Help.Nearest)
	for n, i := range first {
		d := &f.Help.Nearest[i]
		v := Near{Number: n + 1, Text: inWords(d)}
		for _, l := range d.Broken() {
			c := limitScale(l.Measure, l.Unit)
			v.Broken = append(v.Broken, [4]string{study.Clean(l.Measure), c.text(float64(l.Value), manyDigits), wanted(&l), margin(&l)})
		}
		out = append(out, v)
	}
	return out
}

func (s *sheet) nearest(near []Near) {
	if len(near) == 0 {
		return
	}
	s.heading("The designs that came nearest")
	cols := []column{
		{head: "design"}, {head: "limit it breaks", left: true}, {head: "value"}, {head: "wanted", left: true}, {head: "margin"},
	}
	for _, d := range near {
		number := strconv.Itoa(d.Number)
		for _, cells := range d.Broken {
			for j, t := range append([]string{number}, cells[:]...) {
				cols[j].cells = append(cols[j].cells, t)
			}
			number = ""
		}
	}
	s.grid(cols)
	for _, d := range near {
		s.item(fmt.Sprintf("design %d: %s", d.Number, d.Text))
	}
	s.gap()
}

// inWords lists the dimensions of a design.
func inWords(d *study.Design) string {
	f := study.Front{Designs: []study.Design{*d}}
	var out []string
	for _, n := range f.DimensionNames() {
		c := scale{kind: study.DimensionKind(d.Family, n)}
		out = append(out, study.Clean(n)+" "+c.text(float64(d.Dimensions[n]), manyDigits))
	}
	return study.Clean(d.Family) + ", " + strings.Join(out, ", ")
}

// hints are what to try where a limit stands in the way.
var hints = []struct{ limit, try string }{
	{"coverage", "a smaller zone, or a limit on coverage below 100 %; `legwright appraise --poses` shows which poses fail"},
	{"shortest needed", "leg_min: sized and stroke: sized, so that the duty sets the range of the legs"},
	{"longest needed", "leg_min: sized and stroke: sized, so that the duty sets the range of the legs"},
	{"dead length", "a higher home_height, a smaller zone, or an actuator with less dead length (telescopes: dead_ratio below 1)"},
	{"stock stroke", "a longer stroke in actuator.strokes, or a smaller zone"},
	{"singular poses", "less rotation in the zones, or wider ranges for the half angles and radii"},
	{"leg_clearance", "thinner legs, or wider ranges for the half angles and radii"},
	{"base_swing", "joints with more swing, joints.axis: home_leg, or a smaller zone"},
	{"platform_swing", "joints with more swing, joints.axis: home_leg, or a smaller zone"},
	{"push_force", "less load or acceleration, stronger actuators, or wider ranges for the radii"},
	{"pull_force", "less load or acceleration, stronger actuators, or wider ranges for the radii"},
	{"leg_force", "less load or acceleration, stronger actuators, or wider ranges for the radii"},
	{"leg_speed", "lower speeds in the cases, faster actuators, or a smaller characteristic motion"},
	{"buckling_margin", "a thicker rod, or shorter legs"},
}

func (s *sheet) advice(h *study.Help) {
	s.heading("What to try")
	told := map[string]bool{}
	for _, b := range h.Binding {
		for _, a := range hints {
			if a.limit == b.Constraint && !told[a.try] && len(told) < 4 {
				told[a.try] = true
				s.item(study.Clean(b.Constraint) + ": " + a.try)
			}
		}
	}
	s.item("in general: wider ranges under dimensions, and more evaluations, since what was not met may still exist")
	s.gap()
}
