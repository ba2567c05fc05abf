package job

import (
	"fmt"
	"strings"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

// inWords tells the brief in sentences and lists.
func (s *Study) inWords(file string) sheet.Brief {
	b := s.Brief
	out := sheet.Brief{File: file}
	for i := range b.Duty.Zones {
		out.Zones = append(out.Zones, zoneInWords(&b.Duty.Zones[i]))
	}
	for i := range b.Duty.Cases {
		out.Cases = append(out.Cases, caseInWords(&b.Duty.Cases[i]))
	}
	out.Limits = s.limitsInWords()
	for i := range b.Families {
		f := &b.Families[i]
		var open []string
		for k := range f.Dimensions {
			if t := openInWords(&f.Dimensions[k]); t != "" {
				open = append(open, t)
			}
		}
		if len(b.Families) > 1 && len(open) > 0 {
			open[0] = f.Name + ": " + open[0]
		}
		out.Open = append(out.Open, open...)
	}
	out.Paragraph = s.paragraph(&out)
	return out
}

func (s *Study) paragraph(t *sheet.Brief) string {
	b := s.Brief
	var names, goals []string
	for i := range b.Families {
		names = append(names, b.Families[i].Name)
	}
	for _, g := range b.Goals {
		goals = append(goals, string(g.Sense)+" "+g.Measure)
	}
	text := "Sought: " + strings.Join(names, ", ") + " machines that " + strings.Join(goals, ", ") + "."
	if b.Mount == "ceiling" {
		text += " They hang."
	}
	text += " Required poses: " + strings.Join(t.Zones, "; ") + "."
	if len(t.Cases) > 0 {
		text += " Cases: " + strings.Join(t.Cases, "; ") + "."
	} else {
		text += " No case: nothing is carried and nothing moves."
	}
	if len(t.Limits) > 0 {
		text += " Limits: " + strings.Join(t.Limits, "; ") + "."
	}
	return text
}

func zoneInWords(z *brief.Zone) string {
	if z.Shape == brief.Recorded {
		return fmt.Sprintf("%s: %s of the file %s", z.Name, number(len(z.Poses), "pose"), z.File)
	}
	var ranges []string
	for _, r := range z.Ranges {
		k := units.Length
		if kin.Freedom(r.Index).Angular() {
			k = units.Angle
		}
		ranges = append(ranges, r.Coordinate+" "+rangeInWords(r.Low, r.High, k))
	}
	how := "all at once"
	switch z.Shape {
	case brief.Axes:
		how = "each alone"
	case brief.Ellipsoid:
		how = "all at once, within the ellipsoid"
	}
	if z.Moving() == 0 {
		return z.Name + ": " + strings.Join(ranges, ", ")
	}
	return fmt.Sprintf("%s: %s; %s, %s", z.Name, strings.Join(ranges, ", "), how, number(z.Samples, "pose"))
}

// rangeInWords is ±100 mm, 5 mm, or -200 to 0 mm.
func rangeInWords(low, high float64, k units.Kind) string {
	switch {
	case low == high:
		return amount(low, k)
	case low == -high:
		return "±" + amount(high, k)
	}
	if u := units.Display(k); u.Symbol != "" {
		return units.Digits(u.From(low), 6) + " to " + amount(high, k)
	}
	return amount(low, k) + " to " + amount(high, k)
}

func amount(v float64, k units.Kind) string { return units.Format(v, k, 6) }

func number(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

func caseInWords(c *brief.Case) string {
	var parts []string
	for i := range c.Loads {
		parts = append(parts, loadInWords(&c.Loads[i]))
	}
	var speeds []string
	if t := setInWords(&c.Speeds.Linear, units.Speed); t != "" {
		speeds = append(speeds, t)
	}
	if t := setInWords(&c.Speeds.Angular, units.AngularSpeed); t != "" {
		speeds = append(speeds, t)
	}
	if len(speeds) > 0 {
		parts = append(parts, "speeds "+strings.Join(speeds, " and "))
	}
	name := c.Name
	if len(c.Zones) > 0 {
		name += " (in " + strings.Join(c.Zones, ", ") + ")"
	}
	if len(parts) == 0 {
		return name + ": nothing"
	}
	return name + ": " + strings.Join(parts, ", ")
}

func loadInWords(l *brief.CaseLoad) string {
	var parts []string
	if l.Mass != 0 {
		parts = append(parts, amount(l.Mass, units.Mass)+" at "+vector(l.Centre, units.Length))
	}
	var accelerations []string
	if t := setInWords(&l.Acceleration.Linear, units.Acceleration); t != "" {
		accelerations = append(accelerations, t)
	}
	if t := setInWords(&l.Acceleration.Angular, units.AngularAcceleration); t != "" {
		accelerations = append(accelerations, t)
	}
	if len(accelerations) > 0 {
		t := "accelerated at " + strings.Join(accelerations, " and ")
		if l.Acceleration.AtTool {
			t += " of the tool point"
		}
		parts = append(parts, t)
	}
	for _, p := range []struct {
		name         string
		mean, spread [3]float64
		kind         units.Kind
	}{{"force", l.Force, l.ForceSpread, units.Force}, {"moment", l.Moment, l.MomentSpread, units.Torque}} {
		if p.mean == [3]float64{} && p.spread == [3]float64{} {
			continue
		}
		t := p.name + " " + vector(p.mean, p.kind)
		if p.spread != [3]float64{} {
			t += " ± " + vector(p.spread, p.kind)
		}
		if l.At != nil && p.kind == units.Force {
			t += " at " + vector(*l.At, units.Length)
		}
		parts = append(parts, t)
	}
	return l.Name + " " + strings.Join(parts, ", ")
}

// vector is (1, 2, 3) mm.
func vector(v [3]float64, k units.Kind) string {
	u := units.Display(k)
	var parts []string
	for _, x := range v {
		parts = append(parts, units.Digits(u.From(x), 6))
	}
	return strings.TrimSpace("(" + strings.Join(parts, ", ") + ") " + u.Symbol)
}

func setInWords(s *brief.Set, k units.Kind) string {
	switch s.Kind {
	case brief.BallSet:
		return "up to " + amount(s.Radius, k) + " any way"
	case brief.BoxSet:
		return "±" + vector(s.Half, k)
	}
	return ""
}

// limitsInWords lists the limits of the brief, its ratings among them. A family with other actuators has other ratings.
func (s *Study) limitsInWords() []string {
	var out []string
	seen := map[string]bool{}
	add := func(t string) {
		if !seen[t] {
			seen[t] = true
			out = append(out, t)
		}
	}
	for i, t := range s.Tasks {
		if t.Coverage > 0 {
			add("coverage at least " + units.Digits(100*t.Coverage, 6) + " %")
		}
		f := s.Plans[i].Family
		for k := range t.Limits {
			l := &t.Limits[k]
			word := "at most"
			if l.AtLeast {
				word = "at least"
			}
			add(fmt.Sprintf("%s %s %s", l.Measure.Name, word, amount(l.Bound, study.UnitKind(l.Measure.UnitOf(f)))))
		}
	}
	a := &s.Brief.Actuator
	if a.DeadLength != nil {
		add(fmt.Sprintf("shortest leg at least %s times the stroke and %s", units.Digits(a.DeadRatio, 6), amount(*a.DeadLength, units.Length)))
	}
	if a.Reserve > 0 {
		add(amount(a.Reserve, units.Length) + " kept free at each end of the stroke")
	}
	if a.TurnReserve > 0 {
		add(amount(a.TurnReserve, units.Angle) + " kept free at each end of the crank's range")
	}
	return out
}

// openInWords is a dimension that the search varied, "" for one that it did not.
func openInWords(d *brief.Dimension) string {
	switch d.Form {
	case brief.Ranged:
		return d.Name + " " + rangeInWords(d.Low, d.High, d.Kind)
	case brief.Stepped:
		return d.Name + " " + rangeInWords(d.Low, d.High, d.Kind) + " in steps of " + amount(d.Step, d.Kind)
	case brief.Chosen:
		var parts []string
		for _, v := range d.Choices {
			parts = append(parts, amount(v, d.Kind))
		}
		return d.Name + " " + strings.Join(parts, " or ")
	case brief.Sized:
		return d.Name + " as the duty needs"
	case brief.PerLeg:
		var parts []string
		for i := range d.Each {
			if t := openInWords(&d.Each[i]); t != "" {
				parts = append(parts, t)
			}
		}
		return strings.Join(parts, ", ")
	}
	return ""
}
