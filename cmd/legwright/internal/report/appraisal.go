package report

import (
	"fmt"
	"io"
	"strconv"

	"legwright/cmd/legwright/internal/study"
)

// Appraisal draws everything about one design.
func Appraisal(w io.Writer, d *study.Design, p Page) error {
	s := p.sheet()
	name := d.Family
	if d.ID != "" {
		name += ", design " + d.ID
	}
	s.heading(name)
	s.verdict(d)
	s.gap()
	s.dimensions(d)
	s.gap()
	poses := new(gazetteer)
	s.measures(d, poses)
	s.gap()
	s.limits(d)
	s.legs(d, poses)
	s.poses(poses)
	s.excursions(d)
	s.wholeStroke(d)
	s.leftOut(d.Poses, d.Notes, study.FullCaution)
	return s.to(w)
}

// verdict says in a line whether the design holds.
func (s *sheet) verdict(d *study.Design) {
	failed := 0
	for _, l := range d.Limits {
		if !l.Holds {
			failed++
		}
	}
	covered := d.Measures["coverage"]
	switch {
	case failed == 0 && covered < 1:
		s.say(fmt.Sprintf("Every limit holds at the poses that count: %.4g %% of the %d sampled ones. Every figure is over these alone.", 100*float64(covered), d.Poses))
	case failed == 0:
		s.say(fmt.Sprintf("Every limit holds at the %d sampled poses.", d.Poses))
	default:
		s.b.WriteString(s.alarm(fmt.Sprintf("%s at the %d sampled poses.", plural(failed, "limit FAILS", "limits FAIL"), d.Poses)) + "\n")
	}
}

func plural(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return strconv.Itoa(n) + " " + many
}

func (s *sheet) dimensions(d *study.Design) {
	f := study.Front{Designs: []study.Design{*d}}
	var names, values, unit []string
	for _, n := range f.DimensionNames() {
		c := scale{kind: study.DimensionKind(d.Family, n)}
		names = append(names, study.Clean(n))
		values = append(values, c.number(float64(d.Dimensions[n]), 6))
		unit = append(unit, c.unit())
	}
	s.grid([]column{
		{head: "dimension", cells: names, left: true},
		{head: "value", cells: values},
		{head: "unit", cells: unit, left: true},
	})
}

func (s *sheet) measures(d *study.Design, poses *gazetteer) {
	cols := []column{
		{head: "measure", left: true}, {head: "value"}, {head: "unit", left: true},
		{head: "pose", left: true}, {head: "leg", left: true},
		{head: "case", name: "case", left: true, most: 20}, {head: "zone", name: "zone", left: true, most: 20},
	}
	for _, n := range d.MeasureNames() {
		c := measureScale(d.Family, n)
		v := c.exact(float64(d.Measures[n]), manyDigits)
		if d.Unbounded[n] {
			v = "unbounded"
		}
		w := d.Worst[n]
		leg := ""
		if w.Leg > 0 {
			leg = strconv.Itoa(w.Leg)
		}
		if w.Mate > 0 {
			leg += "-" + strconv.Itoa(w.Mate)
		}
		name := study.Clean(n)
		if n == torque {
			name += " " + payloadOnly
		}
		for i, t := range []string{name, v, c.unit(), poses.label(w.Pose), leg, study.Clean(w.Case), study.Clean(w.Zone)} {
			cols[i].cells = append(cols[i].cells, t)
		}
	}
	s.grid(cols)
}

func (s *sheet) limits(d *study.Design) {
	if len(d.Limits) == 0 {
		return
	}
	cols := []column{
		{head: "limit", left: true}, {head: "value"}, {head: "wanted", left: true},
		{head: "margin"}, {head: "", left: true}, {head: "from", name: "from", left: true, keep: 1},
	}
	for i := range d.Limits {
		l := &d.Limits[i]
		c := limitScale(l.Measure, l.Unit)
		holds := "holds"
		if !l.Holds {
			holds = s.alarm("FAILS")
		}
		for i, t := range []string{study.Clean(l.Measure), c.text(float64(l.Value), manyDigits), wanted(l), room(l), holds, study.Clean(l.Origin)} {
			cols[i].cells = append(cols[i].cells, t)
		}
	}
	s.grid(cols)
	s.gap()
}

// room is the margin of a limit, empty for one that cannot have any.
func room(l *study.Limit) string {
	if l.Full() {
		return ""
	}
	return margin(l)
}

// wanted says what a limit asks for.
func wanted(l *study.Limit) string {
	word := "at most "
	if l.Sense == study.AtLeast {
		word = "at least "
	}
	return word + limitScale(l.Measure, l.Unit).text(float64(l.Bound), manyDigits)
}

// excursions says how far each coordinate goes alone.
func (s *sheet) excursions(d *study.Design) {
	if len(d.Excursions) == 0 {
		return
	}
	s.heading("Single excursions from home, each alone: they are not reachable together")
	cols := []column{{head: "", left: true}, {head: "from"}, {head: "to"}, {head: "unit", left: true}, {head: "low end set by", left: true}, {head: "high end set by", left: true}}
	for i := range d.Excursions {
		e := &d.Excursions[i]
		c := coordinate(e.Coordinate)
		for i, t := range []string{study.Clean(e.Coordinate), end(c, e.Low, e.Unbounded["low"]), end(c, e.High, e.Unbounded["high"]),
			c.unit(), study.Clean(e.LowFails), study.Clean(e.HighFails)} {
			cols[i].cells = append(cols[i].cells, t)
		}
	}
	s.grid(cols)
	s.gap()
}

func end(c scale, v study.Number, free bool) string {
	if free {
		return "no end"
	}
	return c.number(float64(v), manyDigits)
}
