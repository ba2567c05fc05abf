package report

import (
	"fmt"
	"io"
	"strconv"
	"strings"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// Proof draws what became of a proof.
func Proof(w io.Writer, p *study.Proof, page Page) error {
	s := page.sheet()
	s.heading(p.Family)
	s.proofAnswer(p)
	s.gap()
	poses := new(gazetteer)
	s.proofTable(p)
	if broken := p.Broken(); len(broken) > 0 {
		s.gap()
		s.b.WriteString(s.alarm(fmt.Sprintf("%s on the design itself, of which no pose decides, FAIL:", plural(len(broken), "limit", "limits"))) + "\n")
		s.limits(&study.Design{Limits: broken})
	} else {
		s.gap()
	}
	s.item("a proved bound is as tight as its limit asked for; the true worst lies between it and the worst met")
	for i := range p.Properties {
		s.proofLine(&p.Properties[i], p.Gap, poses)
	}
	if b := p.WorstBox; b != nil {
		s.item(fmt.Sprintf("the largest box left is in zone %s, %s of its volume, from %s to %s: open there are %s", study.Clean(b.Zone),
			percent(b.Share), poses.label(&b.Low), poses.label(&b.High), study.Clean(strings.Join(b.Open, ", "))))
	}
	if r := p.Resized; r != nil {
		c := scale{kind: study.KindOf(r.Unit)}
		s.item(fmt.Sprintf("the actuator range was widened to %s to %s: the duty needs %s to %s for certain, and %s to %s are met; written to %s",
			c.number(float64(r.Low), manyDigits+1), c.text(float64(r.High), manyDigits+1), c.number(float64(r.Least), manyDigits+1), c.text(float64(r.Most), manyDigits+1),
			c.number(float64(r.MetLeast), manyDigits+1), c.text(float64(r.MetMost), manyDigits+1), study.Clean(r.File)))
	}
	if p.SinglePoses > 0 {
		s.item(fmt.Sprintf("%s of zones that are lists of poses, or in which nothing moves, checked in plain arithmetic: nothing is proved between them", plural(p.SinglePoses, "pose", "poses")))
	}
	if len(p.NotCovered) > 0 {
		s.item("the brief's limits on " + study.Clean(strings.Join(p.NotCovered, ", ")) + " are not covered by a proof; legwright appraise shows them at samples")
	}
	for _, n := range p.Notes {
		s.item(n)
	}
	if p.Certificate != "" {
		s.item("certificate: " + study.Clean(p.Certificate) + "; legwright prove --check replays it")
	}
	s.gap()
	s.poses(poses)
	s.heading("Outside the model, and so outside every proof")
	for _, n := range p.Outside {
		s.item(n)
	}
	s.say(study.FullCaution)
	return s.to(w)
}

// proofAnswer is the answer in a sentence.
func (s *sheet) proofAnswer(p *study.Proof) {
	count := map[string]int{}
	for i := range p.Properties {
		count[p.Properties[i].Answer]++
	}
	all := len(p.Properties)
	switch p.Answer {
	case "proved":
		what := "for every pose of the continuous zones"
		if p.Regions == 0 {
			what = "at the single poses of the duty, which has no continuous zone"
		}
		gapped := 0
		for i := range p.Properties {
			if p.Properties[i].Gapped {
				gapped++
			}
		}
		near := ""
		if gapped > 0 {
			near = fmt.Sprintf(", %d of them to within %s of the limit", gapped, percent(p.Gap))
		}
		s.say(fmt.Sprintf("Proved for this model, %s: %s%s, %s.", what, plural(all, "property", "properties"), near, plural(int(p.Boxes), "box", "boxes")))
	case "refuted":
		s.b.WriteString(s.alarm(fmt.Sprintf("Refuted: %d of %d properties FAIL at a pose of the duty.", count["refuted"], all)) + "\n")
	default:
		why := "boxes became too small"
		switch {
		case p.Interrupted:
			why = "interrupted"
		case p.OutOfTime:
			why = "time is out"
		}
		s.b.WriteString(s.alarm(fmt.Sprintf("Undecided, %s: %d of %d properties are proved for this model.", why, count["proved"], all)) + "\n")
	}
}

// proofTable has a line for each property.
func (s *sheet) proofTable(p *study.Proof) {
	cols := []column{
		{head: "property", left: true}, {head: "", left: true}, {head: "limit", left: true}, {head: "proved bound", left: true},
		{head: "margin"}, {head: "worst met", left: true}, {head: "boxes", name: "boxes", keep: 1}, {head: "from", name: "from", left: true, keep: 1},
	}
	for i := range p.Properties {
		l := &p.Properties[i]
		answer := l.Answer
		if answer != "proved" {
			answer = s.alarm(answer)
		}
		limit, bound, room, found := proofWords[l.Property], "", "", ""
		if l.Limit != nil {
			c := limitScale(l.Property, l.Unit)
			limit = sense(l.Sense) + c.text(float64(*l.Limit), manyDigits)
			if l.Found != nil {
				found = c.text(float64(*l.Found), manyDigits)
			}
			if l.Answer == "proved" && l.Bound != nil {
				bound = c.text(float64(*l.Bound), manyDigits)
				if l.Margin != nil {
					room = margin(&study.Limit{Measure: l.Property, Unit: l.Unit, Sense: l.Sense, Bound: *l.Limit, Value: *l.Bound, Margin: *l.Margin, Holds: true})
				}
			}
		}
		if l.Limit == nil && l.Bound != nil && l.Answer == "proved" {
			bound = "1/kappa " + units.Digits(float64(*l.Bound), manyDigits)
			if l.Found != nil {
				found = units.Digits(float64(*l.Found), manyDigits)
			}
		}
		for k, t := range []string{study.Clean(l.Property), answer, limit, bound, room, found, strconv.FormatInt(l.Boxes, 10), study.Clean(l.Origin)} {
			cols[k].cells = append(cols[k].cells, t)
		}
	}
	s.grid(cols)
}

// proofWords say what properties without a limit are.
var proofWords = map[string]string{
	"reach":            "every pose has a posture",
	"regular":          "no pose is singular",
	"regular wrenches": "joints hold the platform",
}

func sense(word string) string {
	if word == study.AtLeast {
		return "at least "
	}
	return "at most "
}

// proofLine says in words what the table has no room for.
func (s *sheet) proofLine(l *study.ProofLine, gap float64, poses *gazetteer) {
	name := study.Clean(l.Property)
	switch {
	case l.Answer == "refuted":
		s.item(refuted(l, poses))
	case l.Needs != "":
		s.item(fmt.Sprintf("%s: not looked at, since %s is refuted", name, study.Clean(l.Needs)))
	case l.Answer == "undecided":
		s.item(fmt.Sprintf("%s: undecided on %s of the volume", name, percent(float64(l.Left))))
	case l.Gapped && l.Limit != nil && l.Target != nil && l.Found != nil:
		c := limitScale(l.Property, l.Unit)
		where := ""
		if l.At != nil && l.At.Pose != nil {
			where = " at pose " + poses.label(l.At.Pose)
		}
		of := ""
		if strings.HasSuffix(l.Property, "needed") {
			of = " of the stroke"
		}
		s.item(fmt.Sprintf("%s: proved to within %s%s, that is to %s, since %s is met%s, too near to the limit or at it",
			name, percent(gap), of, c.text(float64(*l.Target), manyDigits+1), c.text(float64(*l.Found), manyDigits+1), where))
	}
}

// refuted says where a property fails.
func refuted(l *study.ProofLine, poses *gazetteer) string {
	t := study.Clean(l.Property) + " is refuted"
	if l.At == nil {
		return t
	}
	if l.At.Pose != nil {
		t += " at pose " + poses.label(l.At.Pose)
	}
	if l.At.Zone == "" {
		t += " (home)"
	} else {
		t += " of zone " + study.Clean(l.At.Zone)
	}
	switch {
	case l.At.Mate > 0:
		t += fmt.Sprintf(", legs %d and %d", l.At.Leg, l.At.Mate)
	case l.At.Leg > 0:
		t += fmt.Sprintf(", leg %d", l.At.Leg)
	}
	if l.At.Case != "" {
		t += ", case " + study.Clean(l.At.Case)
	}
	switch {
	case l.Stop != "":
		t += ": beyond the stop of " + study.Clean(l.Stop)
	case l.Property == "reach":
		t += ": there is no posture"
	case l.Other != nil:
		t += ": the determinant has the other sign there than at pose " + poses.label(l.Other) + ", both signs certified, so that a singular pose lies between"
	case l.Found != nil && l.Limit != nil:
		c := limitScale(l.Property, l.Unit)
		t += fmt.Sprintf(": %s, wanted is %s%s", c.text(float64(*l.Found), manyDigits+1), sense(l.Sense), c.text(float64(*l.Limit), manyDigits+1))
	case l.Found != nil:
		t += ": 1/kappa is " + units.Digits(float64(*l.Found), 3)
	}
	return t
}

// percent shows a share.
func percent(share float64) string { return units.Digits(100*share, 3) + " %" }

// Checked draws what a certificate has shown that was replayed.
func Checked(w io.Writer, cert *study.Certificate, boxes int64, page Page) error {
	s := page.sheet()
	s.heading(cert.Family)
	s.say(fmt.Sprintf("The certificate holds: %s replayed, each tested anew. It shows for this model:", plural(int(boxes), "box", "boxes")))
	for i := range cert.Claims {
		l := &cert.Claims[i]
		t := study.Clean(l.Property)
		if l.Target != nil && l.Limit != nil {
			c := limitScale(l.Property, l.Unit)
			t += ": " + sense(l.Sense) + c.text(float64(*l.Target), manyDigits+1)
			if l.Gapped() {
				t += fmt.Sprintf(", which is not the limit of %s but nearly", c.text(float64(*l.Limit), manyDigits+1))
			}
		}
		if what, ok := proofWords[l.Property]; ok {
			t += ": " + what
		}
		s.item(t)
	}
	s.heading("Outside the model, and so outside every proof")
	for _, n := range study.OutsideModel() {
		s.item(n)
	}
	return s.to(w)
}

// Settled says how far a proof has come.
func Settled(share float64, boxes int64) Count {
	return Count{Phase: fmt.Sprintf("%s of the volume settled, %d boxes", percent(share), boxes)}
}

// Proving says how far the proofs within a search have come, after what the search did before.
func Proving(c Count, done, of int, share float64) Count {
	c.Phase = fmt.Sprintf("proving design %d of %d, %s of the volume settled", done+1, of, percent(share))
	return c
}
