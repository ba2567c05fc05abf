package objective

import (
	"math"

	"legwright/kin"
)

// Moved is a design with one dimension moved.
type Moved struct {
	By    float64   // what was added to the dimension, SI; 0 where it cannot be moved that way
	Goals []float64 // values of the task's goals; ±Inf where they have no bound or a pose is not reached; nil where By is 0
	Fails string    // the constraint that is broken worst, "" where all hold
}

// Sensitivity is what moving one dimension does to the goals. Sized dimensions are sized anew.
type Sensitivity struct {
	Dimension int
	Down, Up  Moved
}

// nudge is by how much dimensions are moved.
const nudge = 0.01

// Sensitivities moves every dimension of a design by itself: by 1 % of its value both ways, by one step where the brief
// gives steps, to the next choice where it gives choices, in both cases within what it allows. A dimension that is 0 moves by
// 1 % of its range, else of the base's diameter in plan or of one radian. Left out are dimensions that the duty sizes, and
// working modes. values holds every dimension. It costs two looks at all poses for each dimension.
func Sensitivities(t *Task, p *Plan, values []float64) []Sensitivity {
	s := NewScreen(t, p)
	var out []Sensitivity
	for i := range p.Specs {
		if p.derived(i) || p.Family.Dimensions[i].Unit == kin.Sign || math.IsNaN(values[i]) {
			continue
		}
		down, up := p.neighbours(t, i, values)
		out = append(out, Sensitivity{Dimension: i, Down: s.moved(values, i, down), Up: s.moved(values, i, up)})
	}
	return out
}

// neighbours gives how far dimension i can be moved down and up.
func (p *Plan) neighbours(t *Task, i int, values []float64) (down, up float64) {
	x, spec := values[i], &p.Specs[i]
	switch spec.Kind {
	case Steps:
		k := int(math.Round((x - spec.Low) / spec.Step))
		if k > 0 {
			down = spec.at(k-1) - x
		}
		if k < spec.Levels-1 {
			up = spec.at(k+1) - x
		}
		return down, up
	case Choices:
		for _, v := range spec.Values { // ascending
			if v < x*(1-math.Copysign(Tolerance, x)) {
				down = v - x
			}
			if v > x*(1+math.Copysign(Tolerance, x)) {
				return down, v - x
			}
		}
		return down, 0
	}
	step := nudge * math.Abs(x)
	if x == 0 {
		switch {
		case spec.Kind == Range:
			step = nudge * (spec.High - spec.Low)
		case p.Family.Dimensions[i].Unit == kin.Metre:
			step = nudge * enclosing(p.build(t, values).Frame().Base)
		default:
			step = nudge
		}
	}
	return -step, step
}

// moved judges the design with one dimension moved.
func (s *Screen) moved(values []float64, i int, by float64) Moved {
	if by == 0 {
		return Moved{}
	}
	d := append([]float64(nil), values...)
	d[i] += by
	m := Moved{By: by}
	m.Goals, m.Fails = s.whatever(d)
	return m
}

// whatever gives the goals of a design, and the constraint that it breaks worst, looking at every pose even
// where a constraint is broken. Sized dimensions among the values are found anew.
func (s *Screen) whatever(values []float64) (goals []float64, fails string) {
	t := s.task
	var r Score
	r.reset(len(t.Goals), firstLimit+len(t.Limits))
	copy(s.d.Values, values)
	for i := range s.d.Values {
		if s.plan.derived(i) {
			s.d.Values[i] = math.NaN()
		}
	}
	s.d.Machine = s.plan.build(t, s.d.Values)
	s.v.begin(s.d.Machine)
	for i := range s.all {
		s.all[i].reset()
	}
	s.ownLimits(&r)
	if s.limits != nil {
		s.survey(&r)
	} else {
		s.v.walk(0, len(t.samples), s.allNeed, s.all)
		if t.refined() && s.v.refinable() {
			newRefiner(s.v, thorough()).extend(s.all)
		}
		s.judge(&r)
	}
	for i := range t.Goals {
		g := s.value(s.goalAt[i], t.Goals[i].Measure, &r)
		if math.IsNaN(g) {
			g = inf() // of a range that no pose has sized
		}
		goals = append(goals, g)
	}
	worst := Tolerance
	for i, e := range r.Excess {
		if e > worst {
			worst, fails = e, t.Constraints()[i]
		}
	}
	return goals, fails
}
