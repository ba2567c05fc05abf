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
	sized bool     // the actuator range is known, and is a limit
	why   []string // of each required pose seen by count, what fails there
}

// Reasons why a pose does not count, besides passive stops and measures, which give their own names.
const (
	failReach    = "reach"
	failRange    = "actuator range"
	failSingular = "singular"
)

func newPoseLimits(t *Task, v *View, p *Plan, d *Design) *poseLimits {
	l := &poseLimits{v: v, plan: p, d: d, need: NeedMatrix, sized: true, why: make([]string, len(t.samples))}
	for i := range t.Limits {
		m := t.Limits[i].Measure
		if !m.perPose() {
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
	if !v.at(s, -1, l.need) {
		if v.S.Fail == kin.Stopped {
			return v.S.What
		}
		return failReach
	}
	for i := range v.n - v.free {
		if l.sized && l.plan.rangeExcess(&v.task.Actuator, v.S.Q[i], v.S.Q[i], l.d.Values) > 0 {
			return failRange
		}
	}
	if v.isSingular() {
		return failSingular
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

// soft tells whether single poses may fail: a share of them is enough, or their share is a goal. A
// pose then counts only where every pose limit holds, and every measure is over the poses that count.
func (t *Task) soft() bool { return t.Coverage < 1 || t.CoverageGoal }

// survey walks all poses of a soft task: it sizes the derived dimensions by home and the poses at which every
// pose limit but the actuator range holds, then brings the trackers up to date with the poses that
// count, and gives their number. The view's extreme coordinates are then those of home and these poses.
func (l *poseLimits) survey(need Need, ts []tracker) int {
	v := l.v
	l.need |= need
	if p := l.plan; p.least >= 0 && (p.derived(p.least) || p.derived(p.span)) {
		l.sized = false
		l.count(len(l.why), nil)
		least, most := v.span()
		p.size(&v.task.Actuator, least, most, l.d.Values)
		v.begin(l.d.Machine)
		l.sized = true
	}
	v.home(ts)
	good := l.count(len(l.why), ts)
	v.seen = len(l.why)
	return good
}

// count brings the trackers up to date with those of the first poses that keep every pose limit, and gives their number.
func (l *poseLimits) count(poses int, ts []tracker) int {
	good := 0
	for k := range poses {
		s := &l.v.task.samples[k]
		if l.why[k] = l.fails(s); l.why[k] != "" {
			continue
		}
		good++
		l.v.index = k
		l.v.follow(ts)
	}
	return good
}

// counts tells whether figures are over pose k too: in a task that is not soft they are over all.
func (l *poseLimits) counts(k int) bool { return l.why[k] == "" || !l.v.task.soft() }

// share is the coverage where so many poses keep every pose limit.
func (t *Task) share(good int) float64 { return float64(good) / float64(len(t.samples)) }

// shortfall is how far the coverage is below what is wanted. Where no pose counts there is nothing to judge a
// design by: that is never enough.
func (t *Task) shortfall(good int) float64 {
	if good == 0 {
		return 1
	}
	return t.Coverage - t.share(good)
}
