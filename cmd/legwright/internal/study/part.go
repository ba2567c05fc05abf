package study

import (
	"encoding/json"
	"errors"
	"fmt"
	"io/fs"
	"path/filepath"

	"legwright/opt"
)

// PartFormat names the layout of part.json.
const PartFormat = "legwright-part/1"

// maxPart bounds what is read of a part.json, in bytes.
const maxPart = 1 << 30

// PartName says which part of a study a search is.
type PartName struct {
	Number int    `json:"number"` // from 1
	Of     int    `json:"of"`
	Stream string `json:"stream"` // seed of its own random numbers, hexadecimal
}

// PartLine is what a part brought to a merged front.
type PartLine struct {
	PartName
	Evaluations int    `json:"evaluations"`
	Feasible    int    `json:"feasible"`
	StoppedBy   string `json:"stopped_by"`
	Kept        int    `json:"kept"`     // designs that no other of the part beats
	OnFront     int    `json:"on_front"` // of them on the merged front
}

// Parts is what a merged front is made of.
type Parts struct {
	Of      int        `json:"of"`
	Present []PartLine `json:"present"`
	Missing []int      `json:"missing"`
}

// Part is what part.json holds: of a part of a study all that merging needs.
type Part struct {
	Format  string `json:"format"`
	Program string `json:"program"`
	Brief   string `json:"brief"` // SHA-256 of the brief and its pose files
	Seed    int64  `json:"seed"`  // of the whole study
	Whole   int    `json:"whole"` // evaluations of the whole study
	PartName
	StoppedBy  string       `json:"stopped_by"`
	Budget     int          `json:"budget"` // of this part
	Outcome    *PartOutcome `json:"outcome"`
	Dimensions []int        `json:"dimensions"` // variables of each family's designs
}

// PartOutcome is an opt.Outcome, as far as merging needs it. Goals are to be minimised.
type PartOutcome struct {
	Status      int            `json:"status"`
	Evaluations int            `json:"evaluations"`
	Feasible    int            `json:"feasible"`
	Population  int            `json:"population"`
	Polished    int            `json:"polished"`
	Reference   []float64      `json:"reference"`
	Kept        []PartDesign   `json:"kept"`
	Near        []PartDesign   `json:"near"`
	Single      [][]PartDesign `json:"single"`
	Spaces      []PartSpace    `json:"spaces"`
	Failed      []PartDesign   `json:"failed"`
	Failures    int            `json:"failures"`
}

// PartSpace is an opt.SpaceOutcome.
type PartSpace struct {
	Evaluations int          `json:"evaluations"`
	Feasible    int          `json:"feasible"`
	Best        []PartDesign `json:"best"`
	Near        []PartDesign `json:"near"`
}

// PartDesign is an opt.Design: a feasible one has goals, one that is not has excesses.
type PartDesign struct {
	Space     int       `json:"space"`
	X         []float64 `json:"x"`
	Goals     []float64 `json:"goals,omitempty"`
	Excess    []float64 `json:"excess,omitempty"`
	Violation float64   `json:"violation,omitempty"`
	Fault     string    `json:"fault,omitempty"` // a design that failed has this alone
	Order     int       `json:"order"`
	Origin    string    `json:"origin"`
}

// NewPartOutcome takes of an outcome what merging needs.
func NewPartOutcome(o *opt.Outcome) *PartOutcome {
	p := &PartOutcome{
		Status: int(o.Status), Evaluations: o.Evaluations, Feasible: o.Feasible, Population: o.Population, Polished: o.Polished,
		Reference: o.Reference, Kept: partDesigns(o.Kept), Near: partDesigns(o.Near), Failed: partDesigns(o.Failed), Failures: o.Failures,
	}
	for _, l := range o.Single {
		p.Single = append(p.Single, partDesigns(l))
	}
	for i := range o.Spaces {
		s := &o.Spaces[i]
		p.Spaces = append(p.Spaces, PartSpace{s.Evaluations, s.Feasible, partDesigns(s.Best), partDesigns(s.Near)})
	}
	return p
}

// Outcome is the outcome again.
func (p *PartOutcome) Outcome() *opt.Outcome {
	o := &opt.Outcome{
		Status: opt.Status(p.Status), Evaluations: p.Evaluations, Feasible: p.Feasible, Population: p.Population, Polished: p.Polished,
		Reference: p.Reference, Archive: len(p.Kept), Kept: optDesigns(p.Kept), Near: optDesigns(p.Near), Failed: optDesigns(p.Failed), Failures: p.Failures,
	}
	for _, l := range p.Single {
		o.Single = append(o.Single, optDesigns(l))
	}
	for i := range p.Spaces {
		s := &p.Spaces[i]
		o.Spaces = append(o.Spaces, opt.SpaceOutcome{Evaluations: s.Evaluations, Feasible: s.Feasible, Best: optDesigns(s.Best), Near: optDesigns(s.Near)})
	}
	return o
}

func partDesigns(ds []opt.Design) []PartDesign {
	out := make([]PartDesign, len(ds))
	for i := range ds {
		d := &ds[i]
		out[i] = PartDesign{Space: d.Space, X: d.X, Order: d.Order, Origin: d.Origin, Fault: d.Fault}
		switch {
		case d.Fault != "":
		case d.Violation > 0:
			out[i].Excess, out[i].Violation = d.Excess, d.Violation
		default:
			out[i].Goals = d.Goals
		}
	}
	return out
}

func optDesigns(ds []PartDesign) []opt.Design {
	out := make([]opt.Design, len(ds))
	for i := range ds {
		d := &ds[i]
		out[i] = opt.Design{Space: d.Space, X: d.X, Goals: d.Goals, Excess: d.Excess, Violation: d.Violation, Fault: d.Fault, Order: d.Order, Origin: d.Origin}
	}
	return out
}

// ErrNoPart says that a folder holds no finished part, or none yet.
var ErrNoPart = errors.New("no finished part")

// ReadPart reads the part of a study that a folder holds. ErrNoPart is wrapped where there is none yet.
func ReadPart(dir string) (*Part, error) {
	path := filepath.Join(dir, partFile)
	state, err := inspect(dir)
	switch {
	case err != nil:
		return nil, err
	case state == Empty:
		return nil, fmt.Errorf("%s: is not there, or empty: %w", Clean(dir), ErrNoPart)
	case state == Unfinished:
		return nil, fmt.Errorf("%s: holds an unfinished part: %w; finish it with search --resume", Clean(dir), ErrNoPart)
	case state == Foreign:
		return nil, fmt.Errorf("%s: holds no study; give the folders that `legwright search --part` has written", Clean(dir))
	}
	b, err := readFile(path, maxPart)
	if errors.Is(err, fs.ErrNotExist) {
		return nil, fmt.Errorf("%s: holds a whole study, not a part; give the folders that `legwright search --part` has written", Clean(dir))
	}
	if err != nil {
		return nil, fmt.Errorf("%s: cannot be read (%w); search the part again", Clean(path), bare(err))
	}
	p, err := DecodePart(b)
	if err != nil {
		return nil, fmt.Errorf("%s: %w; search the part again", Clean(path), err)
	}
	return p, nil
}

// BriefCopy is the path of the brief's copy in a part's folder.
func BriefCopy(dir string) (string, error) { return (&Folder{dir: dir}).Brief() }

// DecodePart reads the text of a part.json.
func DecodePart(b []byte) (*Part, error) {
	p := new(Part)
	if err := json.Unmarshal(b, p); err != nil {
		return nil, unreadable(b, err)
	}
	if p.Format != PartFormat {
		return nil, fmt.Errorf("format is %.60q, not %q", Clean(p.Format), PartFormat)
	}
	return p, p.check()
}

// savePart writes part.json, or removes one that a study before left.
func (f *Folder) savePart(p *Part) error {
	if p == nil {
		return f.remove(partFile)
	}
	b, err := json.Marshal(p)
	if err != nil {
		return err
	}
	return f.write(partFile, append(b, '\n'))
}
