package objective

import (
	"math"

	"legwright/kin"
)

// poseLimits judges single poses of one design against every pose limit.
type poseLimits struct {
	v     *View
	plan  *Plan
	d     *Design
	limit []*Limit // those on measures that have a value per pose
	track []tracker
	need  Need
}

func newPoseLimits(t *Task, v *View, p *Plan, d *Design) *poseLimits {
	l := &poseLimits{v: v, plan: p, d: d, need: NeedMatrix}
	for i := range t.Limits {
		m := t.Limits[i].Measure
		if m.Scan == nil || m.Mean {
			continue
		}
		l.limit = append(l.limit, &t.Limits[i])
		l.track = append(l.track, tracker{m: m})
		l.need |= m.Need
	}
	return l
}

// fails names the first pose limit that fails at the sample, or gives "".
func (l *poseLimits) fails(s *Sample) string {
	v := l.v
	v.keep = math.Inf(1)
	if !v.at(s, len(v.task.samples), l.need) { // no scout: what only scouts are asked is not asked here
		if v.S.Fail == kin.Stopped {
			return v.S.What
		}
		return "reach"
	}
	for i := range v.n - v.free {
		if l.plan.rangeExcess(&v.task.Actuator, v.S.Q[i], v.S.Q[i], l.d.Values) > 0 {
			return "actuator range"
		}
	}
	if v.isSingular() {
		return "singular"
	}
	for i := range l.track {
		t := &l.track[i]
		t.reset()
		t.m.Scan(v, &t.w)
		if !l.limit[i].Holds(v.task, t.m.value(&t.w)) {
			return t.m.Name
		}
	}
	return ""
}

// coverage is the share of the required poses at which every pose limit holds.
func (s *Screen) coverage() float64 {
	s.resolve()
	l := newPoseLimits(s.task, s.v, s.plan, &s.d)
	good := 0
	for i := range s.task.samples {
		if l.fails(&s.task.samples[i]) == "" {
			good++
		}
	}
	return float64(good) / float64(len(s.task.samples))
}
