package proof

import (
	"context"
	"math"
	"runtime"
	"time"

	"legwright/kin"
	"legwright/objective"
)

// newSubject prepares a proof about the design with the dimension values, all of which must be known.
func newSubject(t *objective.Task, p *objective.Plan, values []float64) (*subject, []string) {
	t = t.Strict()
	s := &subject{task: t, plan: p, values: append([]float64(nil), values...)}
	probe := objective.NewProbe(t, p, values)
	s.machine = probe.Machine().(kin.Encloser)
	s.origin, _ = probe.Home()
	s.rotary = p.Family.Drive == kin.Rotary
	s.frame = s.machine.Frame()
	s.legs = s.frame.Legs()
	s.ranged = s.legs - p.Family.Free
	for _, q := range s.frame.Freedoms {
		s.own = append(s.own, int(q))
	}
	s.six = s.legs == 6 && s.frame.Rods == nil && s.frame.Rails == nil
	s.pushes = pushes(s.machine)
	var left []string
	s.props, left = properties(t, p, s.values, s.frame)
	s.target = make([]float64, len(s.props))
	s.best = make([]float64, len(s.props))
	for i := range s.best {
		s.best[i] = math.NaN()
	}
	return s, left
}

// aim sets what is to be proved of property i, in the terms of its test.
func (s *subject) aim(i int, target float64) {
	if k := s.props[i].kind; k == baseSwing || k == otherSwing {
		target = chord(target)
	}
	s.target[i] = target
}

// value is what the bound of a test says of the property.
func (k kind) value(bound float64) float64 {
	if k == baseSwing || k == otherSwing {
		return swing(bound)
	}
	return bound
}

// chord is 2-2cos of a swing, rounded down; 4 for half a turn and more.
func chord(swing float64) float64 {
	switch {
	case swing >= math.Pi:
		return 4.1
	case !(swing >= 0):
		return -1
	}
	h := math.Sin(swing / 2)
	return 4 * h * h * (1 - 1e-14)
}

// swing is the angle of a chord, rounded up.
func swing(chord float64) float64 {
	if chord >= 4 {
		return math.Pi
	}
	return 2 * math.Atan2(math.Sqrt(max(chord, 0)), math.Sqrt(4-chord)) * (1 + 1e-14)
}

// Prove shows what it can of a design over the continuous zones of the task: values holds every dimension. It
// searches for a counterexample first, then splits the zones into boxes until every property that the
// search did not refute is proved on each of them, or time is out. It gives the same answer and boxes for any
// number of workers. Where the context ends it gives what is known.
func Prove(ctx context.Context, t *objective.Task, plan *objective.Plan, values []float64, set Settings) *Result {
	s, left := newSubject(t, plan, values)
	p := newProver(ctx, s, set)
	gap := set.Gap
	if gap == 0 {
		gap = DefaultGap
	}
	p.search(gap)
	return p.finish(gap, left, set.Progress)
}

// newProver prepares scratch for the workers.
func newProver(ctx context.Context, s *subject, set Settings) *prover {
	p := &prover{subject: s, ctx: ctx, most: set.Boxes}
	if set.Time > 0 {
		p.end = time.Now().Add(set.Time)
	}
	n := set.Workers
	if n <= 0 {
		n = runtime.GOMAXPROCS(0)
	}
	for range n {
		p.bench = append(p.bench, newBench(s))
		p.probe = append(p.probe, newProber(s))
	}
	p.slots = make([]slot, batch)
	for i := range p.slots {
		p.slots[i].worst = make([]float64, len(s.props))
		p.slots[i].counter = make([]Counter, len(s.props))
	}
	p.out = make([]Outcome, len(s.props))
	p.leaves = make([]leaves, len(s.props))
	for i := range p.out {
		p.out[i].Property = s.props[i]
		p.out[i].Bound = math.NaN()
		p.leaves[i].property = &s.props[i]
		p.alive |= 1 << i
	}
	return p
}

// finish proves what the search has left in question.
func (p *prover) finish(gap float64, left []string, progress func(Progress)) *Result {
	res := &Result{Gap: gap, Left: left}
	for i := range p.task.Zones {
		z := &p.task.Zones[i]
		if z.Kind == objective.Listed {
			res.Listed += len(z.Poses)
		} else if len(z.Moving()) == 0 {
			res.Listed++
		}
	}
	all := regions(p.task.Zones)
	res.Regions = len(all)
	for i := range p.out {
		o := &p.out[i]
		p.aim(i, o.Target)
		p.best[i] = o.Found
		o.Left = float64(len(all))
		if o.Answer == Refuted {
			o.Left = 0
		}
		if o.Bound = math.Inf(-1); o.AtLeast {
			o.Bound = math.Inf(1)
		}
	}
	p.depend()
	for k := range all {
		for _, g := range p.groups() {
			res.trees = append(res.trees, plant(&all[k], k, g))
		}
	}
	p.run(res.trees, progress)
	if !p.late && !p.halted {
		p.tighten(all)
		p.late, p.halted = false, false // what was asked for is done, all the same
	}
	p.conclude(res)
	return res
}

// groups are the properties in question that are proved in one tree: those that need large boxes alone, those of
// the Jacobian's matrix, the measure of another matrix, and the distance of the legs.
func (p *prover) groups() (out []uint64) {
	var g [4]uint64
	for i := range p.props {
		k := 1
		switch p.props[i].kind {
		case reach, shortest, longest, regular, held, baseSwing, otherSwing, drift, twist, rate:
			k = 0
		case wrenches:
			if !p.six {
				k = 2
			}
		case apart:
			k = 3
		}
		g[k] |= 1 << i & p.alive
	}
	for _, x := range g {
		if x != 0 {
			out = append(out, x)
		}
	}
	return out
}

// depend takes out of question what means nothing where a refuted property fails.
func (p *prover) depend() {
	for i := range p.out {
		o := &p.out[i]
		if o.Answer != Refuted || o.kind != reach && o.kind != regular {
			continue
		}
		for j := range p.out {
			u := &p.out[j]
			if u.Answer == Refuted || i == j {
				continue
			}
			if o.kind == reach || u.kind.matrix() {
				u.Needs = o.Name
				p.alive &^= 1 << j
			}
		}
	}
}

// conclude fills the answers.
func (p *prover) conclude(res *Result) {
	res.Boxes, res.OutOfTime, res.Interrupted, res.Worst = p.boxes, p.late, p.halted, p.rest
	res.Answer = Proved
	for i := range p.out {
		o := &p.out[i]
		if res.Regions > 0 {
			o.Left /= float64(res.Regions)
		}
		if o.Answer != Refuted {
			// A share of the volume says nothing: what is left may be too small for it.
			if o.Left = max(o.Left, 0); p.unsettled>>i&1 == 0 && o.Needs == "" {
				o.Left, o.Answer = 0, Proved
			}
		}
		if o.kind == regular && o.Answer == Proved && !p.sameSide(regions(p.task.Zones)) {
			o.Answer = Undecided // no pose of the zones is singular, but which side of home they are on is in doubt
		}
		o.Bound = o.kind.value(o.Bound)
		if o.Answer != Proved || !o.Bounded && o.kind != regular && o.kind != held || math.IsInf(o.Bound, 0) {
			o.Bound = math.NaN()
		}
		switch {
		case o.Answer == Refuted:
			res.Answer = Refuted
		case o.Answer == Undecided && res.Answer == Proved:
			res.Answer = Undecided
		}
	}
	res.Outcomes = p.out
}
