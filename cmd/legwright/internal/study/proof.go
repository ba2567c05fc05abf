package study

import (
	"encoding/json"
	"fmt"
	"math"

	"legwright/kin"
	"legwright/objective"
	"legwright/objective/proof"
)

// CertificateFormat names the layout of a certificate.
const CertificateFormat = "legwright-proof/1"

// CertificateEnding is added to the name of a design's file for the name of its certificate.
const CertificateEnding = ".proof.json"

// Certificate is what a proof has shown of one design under one brief, complete enough to be checked anew.
type Certificate struct {
	Format  string        `json:"format"`
	Program string        `json:"program"`
	Family  string        `json:"family"`
	Design  string        `json:"design"` // SHA-256 of the design file
	Brief   string        `json:"brief"`  // SHA-256 of the brief, its pose files after it
	Boxes   int64         `json:"boxes"`
	Answer  string        `json:"answer"`     // of the whole proof: proved, or undecided
	Claims  []CertLine    `json:"properties"` // what was proved, in words
	Record  *proof.Record `json:"record"`
}

// maxCertificate bounds what is read of a certificate, in bytes.
const maxCertificate = 1 << 30

// LoadCertificate reads the file of a certificate.
func LoadCertificate(path string) (*Certificate, error) {
	b, err := readFile(path, maxCertificate)
	if err != nil {
		return nil, fmt.Errorf("it cannot be read (%w); give the file that legwright prove has written", bare(err))
	}
	return ReadCertificate(b)
}

// CertLine is one property of a certificate: what was asked for, and what was proved.
type CertLine struct {
	Property string  `json:"property"`
	Origin   string  `json:"origin"`
	Unit     string  `json:"unit,omitempty"`
	Sense    string  `json:"sense,omitempty"`
	Limit    *Number `json:"limit,omitempty"`
	Target   *Number `json:"target,omitempty"` // the bound that was proved: the limit, or that less the gap
}

// NewCertLine is the line of a property that was proved to the target.
func NewCertLine(p *proof.Property, target float64) CertLine {
	l := CertLine{Property: p.Name, Origin: p.Origin}
	if p.Bounded {
		if l.Sense = "at_most"; p.AtLeast {
			l.Sense = "at_least"
		}
		l.Unit = UnitKind(p.Unit).SI()
		l.Limit, l.Target = number(p.Limit), number(target)
	}
	return l
}

// Gapped tells whether less than the limit was proved.
func (l *CertLine) Gapped() bool {
	return l.Limit != nil && l.Target != nil && (*l.Target > *l.Limit) == (l.Sense == AtMost) && *l.Target != *l.Limit
}

// Equal tells whether two lines say the same.
func (l CertLine) Equal(m CertLine) bool {
	same := func(a, b *Number) bool { return a == b || a != nil && b != nil && *a == *b }
	return l.Property == m.Property && l.Origin == m.Origin && l.Unit == m.Unit && l.Sense == m.Sense && same(l.Limit, m.Limit) && same(l.Target, m.Target)
}

// Proof is what a certificate says of its design, without the figures of the search.
func (c *Certificate) Proof() *Proof {
	p := &Proof{Family: c.Family, Answer: c.Answer, Gap: c.Record.Gap, NotCovered: []string{}, Boxes: c.Boxes, Regions: 1, Outside: OutsideModel()}
	for i := range c.Claims {
		l := &c.Claims[i]
		p.Properties = append(p.Properties, ProofLine{Property: l.Property, Origin: l.Origin, Answer: proof.Proved.String(),
			Unit: l.Unit, Sense: l.Sense, Limit: l.Limit, Target: l.Target, Gapped: l.Gapped()})
	}
	return p
}

// ReadCertificate reads what Encode wrote.
func ReadCertificate(b []byte) (*Certificate, error) {
	c := new(Certificate)
	if err := json.Unmarshal(b, c); err != nil {
		return nil, fmt.Errorf("it is no certificate: %w", unreadable(b, err))
	}
	if c.Format != CertificateFormat || c.Record == nil {
		return nil, fmt.Errorf("its format is %.60q; this program reads %q", Clean(c.Format), CertificateFormat)
	}
	return c, nil
}

// Proof is what prove prints.
type Proof struct {
	Family      string      `json:"family"`
	Answer      string      `json:"answer"` // proved, refuted or undecided
	Gap         float64     `json:"gap"`
	Properties  []ProofLine `json:"properties"`
	NotCovered  []string    `json:"not_covered"` // limits of the brief that a proof over boxes does not cover
	Boxes       int64       `json:"boxes"`
	Regions     int         `json:"regions"`      // connected parts of the continuous zones
	SinglePoses int         `json:"single_poses"` // listed poses, checked one by one in plain arithmetic
	OutOfTime   bool        `json:"out_of_time"`
	Interrupted bool        `json:"interrupted"`
	WorstBox    *ProofBox   `json:"worst_box,omitempty"` // the largest that was not settled
	Resized     *Resized    `json:"resized,omitempty"`
	Own         []Limit     `json:"own_limits,omitempty"`  // limits on the design itself, of which no pose decides
	Certificate string      `json:"certificate,omitempty"` // path
	Outside     []string    `json:"outside_model"`
	Notes       []string    `json:"notes,omitempty"`
}

// OwnLimits are the limits of an appraised design that no pose decides: on joint spacing, dead length, footprint and the like.
func OwnLimits(a *objective.Appraisal) (out []Limit) {
	for i := range a.Verdicts {
		v := &a.Verdicts[i]
		m := objective.MeasureNamed(v.Name)
		if v.Name == "dead length" || v.Name == "stock stroke" || m != nil && m.Design != nil {
			out = append(out, limitOf(v))
		}
	}
	return out
}

// Broken are the limits on the design itself that do not hold.
func (p *Proof) Broken() (out []Limit) {
	for _, l := range p.Own {
		if !l.Holds {
			out = append(out, l)
		}
	}
	return out
}

// Mark is the word for the answer among a design's marks: proved, "proved to 1 %" where limits were proved less the gap,
// refuted or undecided.
func (p *Proof) Mark() string {
	if p.Answer == proof.Proved.String() {
		for i := range p.Properties {
			if p.Properties[i].Gapped {
				return fmt.Sprintf("%s to %.3g %%", p.Answer, 100*p.Gap)
			}
		}
	}
	return p.Answer
}

// ProofLine is one property.
type ProofLine struct {
	Property string  `json:"property"`
	Origin   string  `json:"origin"`
	Answer   string  `json:"answer"`
	Unit     string  `json:"unit,omitempty"`
	Sense    string  `json:"sense,omitempty"` // at_least or at_most; absent where there is no limit
	Limit    *Number `json:"limit,omitempty"`
	Target   *Number `json:"target,omitempty"` // the bound that was to be proved: the limit, or that less the gap
	Gapped   bool    `json:"to_the_gap,omitempty"`
	Bound    *Number `json:"bound,omitempty"`  // proved for every pose
	Margin   *Number `json:"margin,omitempty"` // of bound to limit, relative
	Found    *Number `json:"found,omitempty"`  // worst value met in plain arithmetic
	At       *Worst  `json:"at,omitempty"`     // where that is, or what refutes it
	Other    *Pose   `json:"other,omitempty"`  // where the determinant has the other sign
	Stop     string  `json:"stop,omitempty"`   // the passive part that is beyond its stop there
	Boxes    int64   `json:"boxes"`
	Left     Number  `json:"left,omitempty"`  // share of the volume in which it is not settled
	Needs    string  `json:"needs,omitempty"` // the refuted property without which it means nothing
}

// ProofBox is a box of poses about home.
type ProofBox struct {
	Zone  string   `json:"zone"`
	Low   Pose     `json:"low"`
	High  Pose     `json:"high"`
	Open  []string `json:"open"`
	Share float64  `json:"share"` // of its region's volume
}

// Resized is an actuator range that was widened to the proved enclosure of what the duty needs.
type Resized struct {
	File     string `json:"file"`
	Unit     string `json:"unit"`
	Least    Number `json:"least_needed"` // proved
	Most     Number `json:"most_needed"`
	MetLeast Number `json:"least_met"` // at poses
	MetMost  Number `json:"most_met"`
	Low      Number `json:"low"` // of the widened design
	High     Number `json:"high"`
}

// OutsideModel is what no proof speaks of.
func OutsideModel() []string {
	return []string{
		"elasticity of legs, plates and joints, and play",
		"tolerances of dimensions and joints: the proof is for the dimensions as they are written",
		"the payload's shape: clearances are those of legs alone",
		"faults of drives, brakes, sensors or control",
		"poses outside the duty, and the way to and from it",
		"the accuracy of sine and cosine in the machine's arithmetic, taken to be right to 1e-15",
	}
}

// FromProof is the record of a proof.
func FromProof(t *objective.Task, family string, r *proof.Result) Proof {
	p := Proof{
		Family: family, Answer: r.Answer.String(), Gap: r.Gap, NotCovered: append([]string{}, r.Left...), Boxes: r.Boxes,
		Regions: r.Regions, SinglePoses: r.Listed, OutOfTime: r.OutOfTime, Interrupted: r.Interrupted, Outside: OutsideModel(),
	}
	for i := range r.Outcomes {
		p.Properties = append(p.Properties, proofLine(t, &r.Outcomes[i]))
	}
	if w := r.Worst; w != nil {
		p.WorstBox = &ProofBox{Zone: t.Zones[w.Zone].Name, Low: poseAt(w.Box.Low), High: poseAt(w.Box.High), Open: w.Open, Share: w.Share}
	}
	return p
}

func proofLine(t *objective.Task, o *proof.Outcome) ProofLine {
	l := ProofLine{Property: o.Name, Origin: o.Origin, Answer: o.Answer.String(), Gapped: o.Gapped, Boxes: o.Boxes, Left: Number(o.Left), Needs: o.Needs}
	if o.Bounded {
		if l.Sense = "at_most"; o.AtLeast {
			l.Sense = "at_least"
		}
		l.Unit = UnitKind(o.Unit).SI()
		l.Limit, l.Target, l.Bound = number(o.Limit), number(o.Target), number(o.Bound)
		if l.Bound != nil {
			l.Margin = number(o.Slack(o.Bound))
		}
	}
	if !o.Bounded && !math.IsNaN(o.Bound) { // least 1/kappa of a matrix that is nowhere singular
		l.Bound, l.Found = number(o.Bound), number(o.Found)
	}
	if o.Bounded || o.Answer == proof.Refuted && o.Name != "reach" {
		l.Found = number(o.Found)
	}
	if c := o.At; c != nil && (o.Bounded || o.Answer == proof.Refuted) {
		at := poseAt(c.Pose)
		l.At = &Worst{Pose: &at, Leg: c.Leg + 1, Mate: c.Mate + 1}
		if c.Zone >= 0 {
			l.At.Zone = t.Zones[c.Zone].Name
		}
		if c.Case >= 0 {
			l.At.Case = t.Cases[c.Case].Name
		}
		if l.Stop = c.What; c.Other != nil {
			other := poseAt(*c.Other)
			l.Other = &other
		}
	}
	return l
}

// number is nil for what is not known.
func number(v float64) *Number {
	if math.IsNaN(v) {
		return nil
	}
	n := Number(v)
	return &n
}

func poseAt(c kin.Coords) Pose {
	return Pose{X: c[kin.X], Y: c[kin.Y], Z: c[kin.Z], Roll: c[kin.Roll], Pitch: c[kin.Pitch], Yaw: c[kin.Yaw]}
}
