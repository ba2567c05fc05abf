package report

import (
	"fmt"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// wholeStroke says where the platform can go within its strokes, whatever the duty is.
func (s *sheet) wholeStroke(d *study.Design) {
	w := d.WholeStroke
	if w == nil {
		return
	}
	s.heading("Within the strokes, whatever the duty: from home to all ends (+ longest, - shortest, 0 at home)")
	cols := []column{{head: "", left: true}, {head: "worst"}, {head: "unit", left: true}, {head: "on the way to", left: true}}
	for _, l := range []struct {
		name string
		kind units.Kind
		peak *study.Peak
	}{
		{"tilt from home", units.Angle, w.Tilt}, {"base_swing", units.Angle, w.BaseSwing},
		{"platform_swing", units.Angle, w.PlatformSwing}, {"leg_clearance", units.Length, w.Clearance},
	} {
		if l.peak == nil {
			continue
		}
		c := scale{kind: l.kind}
		for i, t := range []string{l.name, c.number(float64(l.peak.Value), manyDigits), c.unit(), study.Clean(l.peak.Ends)} {
			cols[i].cells = append(cols[i].cells, t)
		}
	}
	if len(cols[0].cells) > 0 {
		s.grid(cols)
		s.gap()
	}
	if w.First == nil {
		s.say(fmt.Sprintf("None of the %d combinations of shortest and longest actuators meets a singularity on the straight way from home.", w.Combinations))
	} else {
		s.b.WriteString(s.alarm(fmt.Sprintf("%d of the %d combinations meet a singularity", w.Singular, w.Combinations)) + "\n")
		s.say(fmt.Sprintf("first %s, after %.3g %% of the way; there the way ends, since the platform could go on either way.", study.Clean(w.First.Ends), 100*float64(w.First.Share)))
	}
	if w.AloneCross > 0 {
		s.say(fmt.Sprintf("%d of the %d ways of one actuator alone do, too: %s after %.3g %%.", w.AloneCross, w.Alone, study.Clean(w.Single[0].Ends), 100*float64(w.Single[0].Share)))
	}
	switch p := &w.Parked; p.Stops {
	case "":
		s.say("Parked, all actuators at their shortest, is reached from home.")
	default:
		s.say(fmt.Sprintf("Parked, all actuators at their shortest, is not reached from home: the way ends after %.3g %%, %s.", 100*float64(p.Share), stopped(p.Stops)))
	}
	s.say("Each way is followed in steps of 1/48 of it or less, and worst values are those of these poses. Other ways, on which actuators do not start and arrive together, are not looked at.")
	s.gap()
}

// stopped says what ended a way.
func stopped(by string) string {
	switch by {
	case "singular":
		return "at a singularity"
	case "reach":
		return "where a leg cannot follow"
	}
	return "by " + study.Clean(by)
}
