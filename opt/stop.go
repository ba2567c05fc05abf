package opt

import "time"

// Stall ends a search whose front has ceased to grow.
type Stall struct {
	// Evaluations is the stretch that is looked at, 0 means none: the search
	// runs to its budget however little it gains.
	Evaluations int
	// Gain is the least growth of the hypervolume over the stretch, relative
	// to what it was at its beginning.
	Gain float64
}

// stallLooks is how often the hypervolume is taken within the stretch.
const stallLooks = 10

// stopper knows the rules that end a search before its budget is spent.
//
// A search that is stopped so does what one with StopAt set to its count of
// evaluations does, to the last bit: it ends at a generation barrier, only
// while no more was ever given out than has been evaluated or is under way, and
// waits for what is under way.
type stopper struct {
	began   time.Time
	fresh   bool   // a result was not recalled: time counts
	most    int    // evaluations given out at one time, at most
	next    int    // evaluations at the next look
	looks   []look // of the last stretch, oldest first
	best    float64
	stalled bool
	stopped bool
	by      Status
}

// look is the hypervolume after a number of evaluations.
type look struct {
	evaluations int
	volume      float64
}

// given returns the evaluations given out so far.
func (r *run) given() int { return r.set.StopAt - r.left }

// gave notes how much was given out.
func (r *run) gave() { r.stop.most = max(r.stop.most, r.given()) }

// stops decides at a generation barrier whether the search ends here.
func (r *run) stops() bool {
	s := &r.stop
	s.stalled = s.stalled || r.stalls()
	if !s.fresh {
		s.began = time.Now()
	}
	if r.left == 0 || r.given() < s.most { // about to end, or a part of what was given out came back unused
		return false
	}
	switch {
	case s.stalled:
		s.stopped, s.by = true, Stalled
	case r.set.Time > 0 && s.fresh && time.Since(s.began) >= r.set.Time:
		s.stopped, s.by = true, TimeSpent
	}
	return s.stopped
}

// stalls looks at the hypervolume when that is due and reports that it has
// not grown enough.
func (r *run) stalls() bool {
	s, rule := &r.stop, r.set.Stall
	if rule.Evaluations == 0 || r.reference == nil || r.evaluations < s.next {
		return false
	}
	s.next = r.evaluations + max(1, rule.Evaluations/stallLooks)
	s.best = max(s.best, r.volume())
	s.looks = append(s.looks, look{r.evaluations, s.best})
	first := -1 // the last look that lies a whole stretch back
	for i, l := range s.looks {
		if l.evaluations <= r.evaluations-rule.Evaluations {
			first = i
		}
	}
	if first < 0 {
		return false
	}
	s.looks = append(s.looks[:0], s.looks[first:]...)
	was := s.looks[0].volume
	return was > 0 && s.best-was < float64(rule.Gain*was)
}
