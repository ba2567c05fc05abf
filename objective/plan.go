package objective

import (
	"math"

	"legwright/kin"
)

// SpecKind tells where a dimension's value comes from.
type SpecKind int

// The kinds of dimension specifications.
const (
	Fixed   SpecKind = iota // Values[0]
	Range                   // anywhere in [Low, High]
	Steps                   // Low + k·Step, k = 0 … Levels-1
	Choices                 // one of Values
	Sized                   // the least that the duty needs
)

// Spec is how one dimension is given.
type Spec struct {
	Kind      SpecKind
	Low, High float64
	Step      float64
	Levels    int
	Values    []float64
}

// Plan is a family with a specification for each of its dimensions, or with
// joint centres given outright.
type Plan struct {
	Family *kin.Family
	Specs  []Spec      // in the order of Family.Dimensions
	Joints *kin.Joints // nil unless given outright

	// Derive is set when the actuator range is given as ranges or steps and no goal
	// or limit could be served by anything but the longest leg_min and the shortest
	// stroke: these are then derived for each design, within them, rather than searched.
	Derive bool

	least, span int // places of the dimensions that bound the actuator range
}

// NewPlan prepares a plan for a task.
func NewPlan(t *Task, f *kin.Family, specs []Spec) *Plan {
	p := &Plan{Family: f, Specs: specs}
	p.least, p.span = f.Range()
	if p.least < 0 {
		return p
	}
	p.Derive = (searched(&specs[p.least]) || searched(&specs[p.span])) && !t.speaksOfRange()
	return p
}

// searched tells whether the dimension is one that a search would vary.
func searched(s *Spec) bool {
	return s.Kind == Range || s.Kind == Steps || s.Kind == Choices
}

// ordered tells whether a value can be derived within the specification.
func ordered(s *Spec) bool { return s.Kind != Choices }

// speaksOfRange tells whether a goal is about the actuator range itself, or a limit
// on it may hold for another range than the one that deriving gives.
func (t *Task) speaksOfRange() bool {
	about := func(m *Measure) bool {
		return m.Name == "stroke" || m.Name == "leg_min" || m.Name == "leg_max" || m.Name == "coverage"
	}
	for i := range t.Goals {
		if about(t.Goals[i].Measure) {
			return true
		}
	}
	for i := range t.Limits {
		if mends(&t.Limits[i]) {
			return true
		}
	}
	return t.CoverageGoal || t.Coverage < 1
}

// Free lists the dimensions that a search varies, in order.
func (p *Plan) Free() []int {
	var out []int
	for i := range p.Specs {
		if p.derived(i) {
			continue
		}
		if searched(&p.Specs[i]) {
			out = append(out, i)
		}
	}
	return out
}

// derived tells whether dimension i is found from the duty rather than searched or fixed.
func (p *Plan) derived(i int) bool {
	if i != p.least && i != p.span {
		return false
	}
	return p.Specs[i].Kind == Sized || p.Derive && searched(&p.Specs[i]) && ordered(&p.Specs[i])
}

// Values puts the value of every dimension into d: x holds one number for each of
// Free, the value itself for a Range, the index for Steps and Choices. Derived
// dimensions are NaN until the duty has sized them.
func (p *Plan) Values(x, d []float64) {
	k := 0
	for i := range p.Specs {
		s := &p.Specs[i]
		switch {
		case p.derived(i):
			d[i] = math.NaN()
			continue
		case s.Kind == Fixed:
			d[i] = s.Values[0]
			continue
		case s.Kind == Range:
			d[i] = x[k]
		case s.Kind == Steps:
			d[i] = s.at(int(x[k]))
		case s.Kind == Choices:
			d[i] = s.Values[int(x[k])]
		}
		k++
	}
}

// at is the value of step k.
func (s *Spec) at(k int) float64 { return s.Low + float64(k)*s.Step }

// build makes the machine for dimension values.
func (p *Plan) build(t *Task, d []float64) kin.Machine {
	s := t.setup()
	if p.Joints != nil {
		return p.Family.Outright(p.Joints, &s)
	}
	return p.Family.Build(d, &s)
}

// Design is one geometry with everything that measures of the design itself read.
type Design struct {
	Family  *kin.Family
	Values  []float64
	Machine kin.Machine
}

// dimension is the named dimension's value.
func (d *Design) dimension(name string) float64 {
	i := d.Family.Index(name)
	if i < 0 {
		return math.NaN()
	}
	return d.Values[i]
}

// Single gives the dimension values of a plan that leaves nothing to a search.
func (p *Plan) Single() []float64 {
	d := make([]float64, len(p.Specs))
	p.Values(nil, d)
	return d
}
