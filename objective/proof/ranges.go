package proof

import (
	"context"
	"errors"
	"math"

	"legwright/objective"
)

// RangeTolerance is how far a proved range may reach beyond the coordinates that are met, as a share of their spread.
const RangeTolerance = 1e-3

// Range is an enclosure of the actuator coordinates that a duty needs.
type Range struct {
	Least, Most           float64 // proved: no coordinate of an actuator with a bounded range leaves them
	MetLeast, MetMost     float64 // met at poses, in plain arithmetic
	Boxes                 int64
	Interrupted, TooLate  bool
	Unreachable, Unproved bool // a pose has no posture; the boxes became too small
}

// Known tells whether the range is proved.
func (r *Range) Known() bool { return !r.Interrupted && !r.TooLate && !r.Unreachable && !r.Unproved }

// Ranges encloses the actuator coordinates over all zones and home, to RangeTolerance. Of values those of the actuator range are
// not looked at.
func Ranges(ctx context.Context, t *objective.Task, plan *objective.Plan, values []float64, set Settings) (*Range, error) {
	if least, _ := plan.RangeOf(); least < 0 {
		return nil, errors.New("the family has no actuator range")
	}
	s, _ := newSubject(t, plan, values)
	s.props = []Property{
		{Name: "reach", kind: reach},
		{Name: "shortest needed", Bounded: true, AtLeast: true, Limit: math.Inf(-1), Scale: 1, kind: shortest},
		{Name: "longest needed", Bounded: true, Limit: math.Inf(1), Scale: 1, kind: longest},
	}
	s.target = make([]float64, len(s.props))
	out := &Range{}
	p := newProver(ctx, s, set)
	p.search(0)
	out.MetLeast, out.MetMost = p.out[1].Found, p.out[2].Found
	for range 20 {
		if p.out[0].Answer == Refuted || math.IsNaN(out.MetLeast) {
			out.Unreachable = true
			return out, nil
		}
		room := RangeTolerance * max(out.MetMost-out.MetLeast, 1e-9)
		q := newProver(ctx, s, set)
		q.end, q.boxes = p.end, out.Boxes
		for i := range q.out {
			q.out[i].Property = s.props[i]
		}
		// A pose beyond the target is met where the search has missed the extreme: it becomes the target.
		s.props[1].Limit, s.props[2].Limit = out.MetLeast-room, out.MetMost+room
		q.out[1].Target, q.out[2].Target = s.props[1].Limit, s.props[2].Limit
		r := q.finish(0, nil, set.Progress)
		out.Boxes = r.Boxes
		out.Interrupted, out.TooLate = r.Interrupted, r.OutOfTime
		again := false
		for i, met := range []*float64{nil, &out.MetLeast, &out.MetMost} {
			if o := &r.Outcomes[i]; o.Answer == Refuted {
				if again = true; i == 0 {
					out.Unreachable = true
					return out, nil
				}
				*met = o.At.Value
			}
		}
		if again {
			continue
		}
		// No tighter than what a proof of the range takes as it is, without its gap.
		out.Least, out.Most = min(r.Outcomes[1].Bound, out.MetLeast-room/2), max(r.Outcomes[2].Bound, out.MetMost+room/2)
		out.Unproved = r.Answer != Proved
		if r.Regions == 0 {
			out.Least, out.Most = out.MetLeast, out.MetMost
		}
		return out, nil
	}
	out.Unproved = true
	return out, nil
}
