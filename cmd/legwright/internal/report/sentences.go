package report

import (
	"fmt"
	"strings"

	"legwright/cmd/legwright/internal/study"
)

// ProofSentence says in one paragraph of plain text what became of a proof.
func ProofSentence(p *study.Proof) string {
	var proved, open, failed, gapped []string
	poses := new(gazetteer)
	for i := range p.Properties {
		l := &p.Properties[i]
		name := study.Clean(l.Property)
		switch l.Answer {
		case "proved":
			proved = append(proved, name)
			if l.Gapped {
				gapped = append(gapped, name)
			}
		case "refuted":
			failed = append(failed, refuted(l, poses))
		default:
			open = append(open, name)
		}
	}
	var out []string
	list := func(words []string) string { return strings.Join(words, ", ") }
	if p.Regions == 0 {
		out = append(out, "the duty has no continuous zone, so that nothing is proved beyond its single poses")
	} else if len(proved) > 0 {
		t := "for this model and every pose of the continuous zones: " + list(proved)
		if len(gapped) > 0 {
			t += fmt.Sprintf(" (to within %s of the limit: %s)", percent(p.Gap), list(gapped))
		}
		out = append(out, "proved "+t)
	}
	if len(failed) > 0 {
		out = append(out, list(failed))
	}
	if len(open) > 0 {
		out = append(out, "undecided: "+list(open))
	}
	if len(p.NotCovered) > 0 {
		out = append(out, "not covered by the proof: "+study.Clean(list(p.NotCovered)))
	}
	return strings.Join(out, "; ") + ". Outside the model: elasticity, tolerances, the payload's shape, faults of drives and control, poses outside the duty."
}

// StrokeSentence says in one paragraph of plain text where a machine can go within its strokes.
func StrokeSentence(w *study.WholeStroke) string {
	var out []string
	if w.First == nil {
		out = append(out, fmt.Sprintf("none of the %d combinations of shortest and longest actuators meets a singularity on the straight way from home", w.Combinations))
	} else {
		out = append(out, fmt.Sprintf("%d of the %d combinations of shortest and longest actuators meet a singularity on the straight way from home, first %s after %.3g %% of the way",
			w.Singular, w.Combinations, study.Clean(w.First.Ends), 100*float64(w.First.Share)))
	}
	if w.AloneCross > 0 {
		out = append(out, fmt.Sprintf("so do %d of the %d ways of one actuator alone", w.AloneCross, w.Alone))
	}
	for _, l := range []struct {
		text, unit string
		peak       *study.Peak
	}{{"tilt up to", "rad", w.Tilt}, {"base swing up to", "rad", w.BaseSwing}, {"platform swing up to", "rad", w.PlatformSwing}, {"leg clearance down to", "m", w.Clearance}} {
		if l.peak != nil {
			c := scale{kind: study.KindOf(l.unit)}
			out = append(out, l.text+" "+c.text(float64(l.peak.Value), manyDigits))
		}
	}
	if p := &w.Parked; p.Stops != "" {
		out = append(out, "all actuators at their shortest is not reached from home: "+study.Clean(p.Stops))
	}
	return strings.Join(out, "; ") + ". + longest, - shortest."
}
