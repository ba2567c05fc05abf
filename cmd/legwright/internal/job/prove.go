package job

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"math"
	"os"
	"path/filepath"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/objective"
	"legwright/objective/proof"
)

// Subject is a design with its brief, ready to be proved.
type Subject struct {
	Study  *Study
	Task   *objective.Task
	Plan   *objective.Plan
	Values []float64 // of every dimension, sized ones included

	design        *brief.Design
	file          string
	designHash    string
	briefHash     string
	briefFile     string
	briefReplaced bool
}

// NewSubject reads a design and the brief that it names, or briefFile. A range that the design leaves to the brief is sized
// by the worst poses that a search finds.
func NewSubject(file, briefFile string) (*Subject, error) {
	s, t, p, err := Design(file, briefFile)
	if err != nil {
		return nil, err
	}
	out := &Subject{Study: s, Task: t, Plan: p, file: file, briefFile: briefFile, briefReplaced: briefFile != ""}
	if out.design, err = brief.LoadDesign(file, *Known()); err != nil {
		return nil, err
	}
	if briefFile == "" {
		out.briefFile = out.design.BriefFile()
	}
	if out.designHash, err = hashOf(file); err != nil {
		return nil, err
	}
	files := []string{out.briefFile}
	for _, z := range s.Brief.Duty.Zones {
		if z.File == "" {
			continue
		}
		if !filepath.IsAbs(z.File) {
			z.File = filepath.Join(filepath.Dir(out.briefFile), z.File)
		}
		files = append(files, z.File)
	}
	if out.briefHash, err = hashOf(files...); err != nil {
		return nil, err
	}
	out.Values = p.Single()
	for i, v := range out.Values {
		if math.IsNaN(v) && p.Derived(i) {
			out.Values = objective.Appraise(t.Strict(), p, out.Values).Values
			break
		}
	}
	return out, nil
}

// hashOf is the SHA-256 of files, one after the other, in hex.
func hashOf(files ...string) (string, error) {
	h := sha256.New()
	for _, f := range files {
		b, err := os.ReadFile(f)
		if err != nil {
			return "", err
		}
		h.Write(b)
	}
	return hex.EncodeToString(h.Sum(nil)), nil
}

// Prove runs the proof.
func (s *Subject) Prove(ctx context.Context, set proof.Settings) *proof.Result {
	return proof.Prove(ctx, s.Task, s.Plan, s.Values, set)
}

// Certificate is the certificate of what r has proved, nil where that is nothing.
func (s *Subject) Certificate(r *proof.Result) (*study.Certificate, error) {
	return certificate(s.Task, s.Plan.Family.Name, s.designHash, s.briefHash, r)
}

func certificate(t *objective.Task, family, designHash, briefHash string, r *proof.Result) (*study.Certificate, error) {
	rec, err := r.Record()
	if err != nil || len(rec.Claims) == 0 {
		return nil, err
	}
	c := &study.Certificate{Format: study.CertificateFormat, Program: Program(), Family: family,
		Design: designHash, Brief: briefHash, Answer: r.Answer.String(), Record: rec}
	for _, b := range rec.Trees {
		c.Boxes += int64(b.Boxes)
	}
	for i := range r.Outcomes {
		if o := &r.Outcomes[i]; o.Answer == proof.Proved {
			c.Claims = append(c.Claims, study.NewCertLine(&o.Property, o.Target))
		}
	}
	return c, nil
}

// Check replays a certificate. The error says why it does not show what it claims.
func (s *Subject) Check(ctx context.Context, c *study.Certificate, set proof.Settings) (boxes int64, err error) {
	switch {
	case c.Design != s.designHash:
		return 0, fmt.Errorf("it is of another design file, or that was changed since: prove the design again")
	case c.Brief != s.briefHash:
		return 0, fmt.Errorf("it is of another brief, or that was changed since: prove the design again")
	}
	if boxes, err = proof.Check(ctx, s.Task, s.Plan, s.Values, c.Record, set); err != nil {
		return boxes, err
	}
	all := proof.Properties(s.Task, s.Plan, s.Values)
	words := fmt.Errorf("its words are not those of what it proves: prove the design again")
	if len(c.Claims) != len(c.Record.Claims) || c.Boxes != boxes || c.Family != s.Plan.Family.Name {
		return boxes, words
	}
	for i, q := range c.Record.Claims {
		if !c.Claims[i].Equal(study.NewCertLine(&all[q.Place], q.Target)) {
			return boxes, words
		}
	}
	if whole := len(c.Claims) == len(all); whole != (c.Answer == proof.Proved.String()) {
		return boxes, words
	}
	return boxes, nil
}

// Own are the limits on the design itself, of which no pose decides.
func (s *Subject) Own() []study.Limit {
	return study.OwnLimits(objective.Appraise(s.Task.Strict(), s.Plan, s.Values))
}

// Resize widens the design's actuator range, where the brief leaves it to the duty, to the proved enclosure of what the
// duty needs, with reserve and stock strokes. It gives the record and the design file for the path out, which is not written.
func (s *Subject) Resize(ctx context.Context, out string, set proof.Settings) (*study.Resized, []byte, error) {
	p, err := s.sizing()
	if err != nil {
		return nil, nil, err
	}
	r, err := proof.Ranges(ctx, s.Task, s.Plan, s.Values, set)
	if err != nil {
		return nil, nil, err
	}
	switch {
	case r.Interrupted:
		return nil, nil, ctx.Err()
	case r.Unreachable:
		return nil, nil, fmt.Errorf("%s: a pose of the duty has no posture, so that no range is enough; see legwright appraise", study.Clean(s.file))
	case !r.Known():
		return nil, nil, fmt.Errorf("%s: the range that the duty needs could not be enclosed in time; give more with --time", study.Clean(s.file))
	}
	least, span := p.RangeOf()
	p.Resize(&s.Task.Actuator, r.Least, r.Most, s.Values)
	if stock := s.Task.Actuator.Strokes; len(stock) > 0 && s.Values[span] > stock[len(stock)-1]*(1+objective.Tolerance) {
		return nil, nil, fmt.Errorf("%s: the duty needs a stroke of %.6g mm for certain, reserve included, and the longest stock stroke is %.6g mm; search with a little more reserve, or add a stock stroke",
			study.Clean(s.file), 1e3*s.Values[span], 1e3*stock[len(stock)-1])
	}
	f := p.Family
	for _, i := range []int{least, span} {
		d := &f.Dimensions[i]
		s.give(d.Name, study.DimensionUnit(d.Unit), s.Values[i])
	}
	specs := append([]objective.Spec(nil), s.Plan.Specs...)
	for _, i := range []int{least, span} {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{s.Values[i]}}
	}
	joints := s.Plan.Joints
	s.Plan = objective.NewPlan(s.Task, f, specs)
	s.Plan.Joints = joints
	if s.briefReplaced || filepath.Dir(out) != filepath.Dir(s.file) {
		if rel, err := filepath.Rel(filepath.Dir(out), s.briefFile); err == nil {
			s.design.Brief = filepath.ToSlash(rel)
		} else if s.design.Brief, err = filepath.Abs(s.briefFile); err != nil {
			return nil, nil, err
		}
	}
	text := s.design.Encode()
	sum := sha256.Sum256(text)
	s.designHash = hex.EncodeToString(sum[:])
	return &study.Resized{File: out, Unit: study.DimensionUnit(f.Dimensions[least].Unit).SI(),
		Least: study.Number(r.Least), Most: study.Number(r.Most), MetLeast: study.Number(r.MetLeast), MetMost: study.Number(r.MetMost),
		Low: study.Number(s.Values[least]), High: study.Number(s.Values[least] + s.Values[span])}, text, nil
}

// sizing is the plan by which the brief sizes the design's range.
func (s *Subject) sizing() (*objective.Plan, error) {
	least, span := s.Plan.RangeOf()
	if least < 0 {
		return nil, fmt.Errorf("%s: machines of the family %s have no actuator range to be widened; leave --resize out", study.Clean(s.file), s.Plan.Family.Name)
	}
	specs := append([]objective.Spec(nil), s.Plan.Specs...)
	for _, i := range []int{least, span} {
		specs[i] = objective.Spec{Kind: objective.Sized}
		for _, p := range s.Study.Plans {
			if p.Family.Name == s.Plan.Family.Name && p.Specs[i].Kind == objective.Fixed {
				name := p.Family.Dimensions[i].Name
				return nil, brief.Faults{s.Study.Brief.Fault("dimensions."+name, name+" is given, so that the duty cannot widen it", "write "+name+": sized, or leave --resize out")}
			} else if p.Family.Name == s.Plan.Family.Name && p.Derived(i) {
				specs[i] = p.Specs[i]
			}
		}
	}
	p := objective.NewPlan(s.Task, s.Plan.Family, specs)
	for _, i := range []int{least, span} {
		if !p.Derived(i) { // the brief's limits or goals speak of the range: it is sized all the same
			specs[i] = objective.Spec{Kind: objective.Sized}
		}
	}
	return p, nil
}

// give writes a dimension into the design file.
func (s *Subject) give(name string, kind units.Kind, value float64) {
	for i := range s.design.Dimensions {
		if s.design.Dimensions[i].Name == name {
			s.design.Dimensions[i].Values = []float64{value}
			return
		}
	}
	s.design.Dimensions = append(s.design.Dimensions, brief.DesignDimension{Name: name, Kind: kind, Values: []float64{value}})
}
