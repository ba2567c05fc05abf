package objective

import "math"

// Screen judges designs for a search: cheap tests first, goals and limits only.
// It is scratch for one goroutine.
type Screen struct {
	task *Task
	plan *Plan
	v    *View
	d    Design

	geo, all []tracker // measures of poses: without and with the inverse Jacobian
	geoNeed  Need
	allNeed  Need
	limitAt  []int // for each limit its tracker in all, -1 for a design's own, -2 for coverage
	goalAt   []int
	geoLimit []bool      // the limit can be judged without the inverse Jacobian
	late     []bool      // the limit can be judged only after all poses: further ones may mend it
	limits   *poseLimits // of a soft task, nil otherwise
	refiner  *Refiner    // nil where nothing is refined
}

// The first constraints of every task, before its limits.
const (
	conReach = iota
	conRange
	conDead
	conSingular
	conCoverage
	firstLimit
)

// Score is what a search needs to know of a design.
type Score struct {
	Goals     []float64 // to be minimised: maximised measures with the sign turned
	Excess    []float64 // of each of Task.Constraints, at most 0 where it holds or was not looked at
	Violation float64   // 0 for a feasible design

	coverage float64
}

// reset clears r for a number of goals and constraints.
func (r *Score) reset(goals, constraints int) {
	if len(r.Goals) != goals || len(r.Excess) != constraints {
		r.Goals, r.Excess = make([]float64, goals), make([]float64, constraints)
	}
	clear(r.Goals)
	clear(r.Excess)
	r.Violation, r.coverage = 0, 1
}

// total is the sum of the excesses above zero.
func (r *Score) total() float64 {
	sum := 0.0
	for _, e := range r.Excess {
		sum += positive(e)
	}
	return sum
}

// Constraints names the constraints of a Score, in order.
func (t *Task) Constraints() []string {
	out := []string{"reach", "actuator range", "dead length", "singular poses", "coverage"}
	for i := range t.Limits {
		out = append(out, t.Limits[i].Measure.Name)
	}
	return out
}

// NewScreen makes scratch for judging designs of a plan.
func NewScreen(t *Task, p *Plan) *Screen {
	s := &Screen{task: t, plan: p, v: newView(t)}
	s.v.serve(p.Family)
	s.d = Design{Family: p.Family, Values: make([]float64, len(p.Specs))}
	if t.soft() {
		s.limits = newPoseLimits(t, s.v, p, &s.d)
	}
	at := func(m *Measure) int {
		switch {
		case m.Name == "coverage":
			return -2
		case m.Scan == nil:
			return -1
		}
		for i := range s.all {
			if s.all[i].m.Name == m.Name {
				return i
			}
		}
		s.all = append(s.all, tracker{m: m})
		return len(s.all) - 1
	}
	for i := range t.Limits {
		s.limitAt = append(s.limitAt, at(t.Limits[i].Measure))
	}
	for i := range t.Goals {
		s.goalAt = append(s.goalAt, at(t.Goals[i].Measure))
	}
	for i := range t.Limits {
		m := t.Limits[i].Measure
		s.geoLimit = append(s.geoLimit, m.Scan == nil || m.Need&^NeedGap == 0)
		s.late = append(s.late, m.Mean || mends(&t.Limits[i]))
	}
	for i := range s.all {
		s.allNeed |= s.all[i].m.Need
	}
	s.allNeed |= NeedMatrix
	// The first look: range, swing, clearance. Its trackers share the order of all, so that the
	// same places serve both.
	for i := range s.all {
		if s.all[i].m.Need&^NeedGap == 0 {
			s.geo = append(s.geo, s.all[i])
			s.geoNeed |= s.all[i].m.Need
		}
	}
	if t.refined() {
		s.refiner = newRefiner(s.v, quick())
	}
	return s
}

// Judge scores the design with the search variables x into r, whose slices it
// keeps. A design that fails at the scouts is not looked at further: its
// violation then counts what the scouts showed.
func (s *Screen) Judge(x []float64, r *Score) {
	t := s.task
	r.reset(len(t.Goals), firstLimit+len(t.Limits))
	s.plan.Values(x, s.d.Values)
	s.d.Machine = s.plan.build(t, s.d.Values)
	s.v.begin(s.d.Machine)
	for i := range s.all {
		s.all[i].reset()
	}
	for i := range s.geo {
		s.geo[i].reset()
	}
	own := s.ownLimits(r)

	if s.limits != nil {
		s.survey(r)
	} else {
		s.look(r, own)
	}
	s.total(r)
}

// Refines tells whether Confirm has anything to do.
func (s *Screen) Refines() bool { return s.refiner != nil }

// Confirm scores the design judged last anew, by worst values that are driven beyond the sampled poses as those
// of Appraise are (see Refiner), less thoroughly. It is for designs that Judge found feasible, and costs
// about as much as judging one to the end. The score is never better than before.
func (s *Screen) Confirm(r *Score) {
	if s.refiner == nil || r.Violation > 0 || !s.v.refinable() {
		return
	}
	s.confirm(r)
	s.judge(r)
	s.total(r)
}

// confirm drives what decides the score, what is cheap and what has limits first, until a limit fails.
func (s *Screen) confirm(r *Score) {
	s.refiner.prepare(s.all)
	if !s.refiner.stretch() || s.geometry(r, s.all) > 0 {
		return
	}
	for i := range s.all { // limits come first
		if !s.refiner.worsen(s.all, i) {
			return
		}
		for k, at := range s.limitAt {
			if l := &s.task.Limits[k]; at == i && !l.Holds(s.task, l.Measure.value(&s.all[i].w)) {
				return
			}
		}
	}
}

// total fills the violation and, of a feasible design, the goals.
func (s *Screen) total(r *Score) {
	t := s.task
	r.Violation = r.total()
	if r.Violation > 0 {
		return
	}
	for i := range t.Goals {
		g := s.value(s.goalAt[i], t.Goals[i].Measure, r)
		if t.Goals[i].Maximise {
			g = -g
		}
		if math.IsNaN(g) && t.Goals[i].Measure.Scouts { // unknown; any other is a fault, and stays one
			g = beyond
		}
		r.Goals[i] = math.Max(-beyond, math.Min(beyond, g))
	}
}

// look fills the excess of a design of which every pose must keep every limit.
func (s *Screen) look(r *Score, own float64) {
	t := s.task
	// 1. Scouts, geometry alone.
	s.v.walk(0, t.scouts, s.geoNeed, s.geo)
	if s.geometry(r, s.geo)+own > 0 {
		return
	}
	// 2. Scouts with the inverse Jacobian, then 3. all the rest.
	s.v.lost, s.v.seen = 0, 0
	s.v.walk(0, t.scouts, s.allNeed, s.all)
	if s.judge(r) > 0 {
		return
	}
	s.v.walk(t.scouts, len(t.samples), s.allNeed, s.all)
	s.judge(r)
}

// survey fills the excess of a design of a soft task.
func (s *Screen) survey(r *Score) {
	good := s.limits.survey(s.allNeed, s.all)
	if good > 0 {
		s.judge(r)
	}
	r.coverage = s.task.share(good)
	r.Excess[conCoverage] = slack(s.task.shortfall(good))
}

// beyond is the value of a goal without bound, such as the buckling margin of legs that nothing pushes.
const beyond = 1e12

// mends tells whether a limit on the actuator range can come to hold as leg_min falls
// and the stroke grows, as they do while more poses are seen; leg_max may go
// either way, as both are rounded to steps or to stock.
func mends(l *Limit) bool {
	switch l.Measure.Name {
	case "leg_min":
		return !l.AtLeast
	case "stroke":
		return l.AtLeast
	}
	return l.Measure.Name == "leg_max"
}

// whole tells whether the walk has seen all poses.
func (s *Screen) whole() bool { return s.v.seen == len(s.task.samples) }

// Values are the dimension values of the design judged last, sized ones included.
func (s *Screen) Values() []float64 { return s.d.Values }

// geometry fills the excess of what needs no inverse Jacobian and gives its sum.
func (s *Screen) geometry(r *Score, ts []tracker) float64 {
	t := s.task
	share := 0.0
	if s.v.seen > 0 {
		share = float64(s.v.lost) / float64(s.v.seen)
	}
	r.Excess[conReach] = share
	least, most := s.v.span()
	if least > most { // no posture, not even at home: there is nothing to size by
		return share
	}
	if s.limits == nil { // else the survey has sized the range, and poses that leave it do not count
		s.plan.size(&t.Actuator, least, most, s.d.Values)
		r.Excess[conRange] = s.plan.rangeExcess(&t.Actuator, least, most, s.d.Values)
	}
	r.Excess[conDead] = s.plan.deadExcess(&t.Actuator, s.d.Values)
	sum := positive(r.Excess[conReach]) + positive(r.Excess[conRange]) + positive(r.Excess[conDead])
	for i := range t.Limits {
		if !s.geoLimit[i] || s.late[i] && !s.whole() {
			continue
		}
		l := &t.Limits[i]
		if l.Measure.Scan == nil { // it may speak of a sized dimension
			if l.Measure.Design != nil {
				r.Excess[firstLimit+i] = slack(l.excess(t, l.Measure.Design(&s.d)))
			}
		} else {
			for k := range ts {
				if ts[k].m.Name == l.Measure.Name {
					r.Excess[firstLimit+i] = slack(l.excess(t, l.Measure.value(&ts[k].w)))
				}
			}
		}
		sum += positive(r.Excess[firstLimit+i])
	}
	return sum
}

// ownLimits fills the excess of limits on the design's own measures and gives their sum.
func (s *Screen) ownLimits(r *Score) float64 {
	sum := 0.0
	for i := range s.task.Limits {
		l := &s.task.Limits[i]
		if l.Measure.Design == nil {
			continue
		}
		if v := l.Measure.Design(&s.d); !math.IsNaN(v) { // NaN: sized later
			r.Excess[firstLimit+i] = slack(l.excess(s.task, v))
			sum += positive(r.Excess[firstLimit+i])
		}
	}
	return sum
}

// judge fills every excess from the walk so far and gives their sum.
func (s *Screen) judge(r *Score) float64 {
	t := s.task
	sum := s.geometry(r, s.all)
	r.Excess[conSingular] = 0
	if s.v.singular > 0 {
		r.Excess[conSingular] = float64(s.v.singular) / float64(s.v.seen)
	}
	sum += r.Excess[conSingular]
	for i := range t.Limits {
		if k := s.limitAt[i]; k >= 0 && !s.geoLimit[i] && (!s.late[i] || s.whole()) {
			l := &t.Limits[i]
			r.Excess[firstLimit+i] = slack(l.excess(t, l.Measure.value(&s.all[k].w)))
			sum += positive(r.Excess[firstLimit+i])
		}
	}
	return sum
}

// value is a goal's value for the design judged.
func (s *Screen) value(at int, m *Measure, r *Score) float64 {
	switch at {
	case -2:
		return r.coverage
	case -1:
		return m.Design(&s.d)
	}
	return m.value(&s.all[at].w)
}

// farWithin is where an excess is no longer told from -Inf, which a search could not work with.
const farWithin = -1e6

// slack takes off what counts as rounding, and keeps what holds without bound finite.
func slack(e float64) float64 {
	if e <= Tolerance {
		return math.Max(farWithin, math.Min(e, 0))
	}
	return e
}

func positive(x float64) float64 { return math.Max(x, 0) }
