package objective

import (
	"math"

	"legwright/kin"
)

// Reading is a measure's duty-wide value and what decides it.
type Reading struct {
	Measure *Measure
	Value   float64 // ±Inf where it has no bound
	Pose    *Sample // nil where no pose decides
	Leg     int     // 0-based, -1 for none
	Mate    int     // second leg of a pair, -1 for none
	Case    int     // -1 for none
	Kind    string  // the kind of singularity that the pose is near: serial, actuator or constraint; "" for none
}

// Verdict is a limit with the value that a design has.
type Verdict struct {
	Name    string
	Origin  string // key of the brief
	Unit    Unit
	AtLeast bool
	Bound   float64
	Value   float64
	Holds   bool
	Margin  float64 // relative to the bound; negative where it does not hold
}

// Leg is what one leg must do, over the required poses that count (Task.Coverage), and home for the coordinates. These, Push
// and Pull are searched between the samples for every leg; Speed and the swings only for the leg that is worst, of the
// others they are those of the samples and of the poses found for anything else.
type Leg struct {
	Least, Home, Most        float64 // actuator coordinate
	LeastAt, MostAt          *Sample // nil for home
	Push, Pull, Speed        float64
	BaseSwing, PlatformSwing float64
}

// Appraisal is the complete judgement of one design.
type Appraisal struct {
	Plan       *Plan
	Values     []float64 // every dimension, sized ones included
	Machine    kin.Machine
	Readings   []Reading
	Verdicts   []Verdict
	Legs       []Leg
	Excursions []Excursion
	Feasible   bool
	Notes      []string
	Poses      int

	ends   *[12]spot // where extreme coordinates lie between the samples
	failed *Sample   // a pose between the samples that is out of reach or singular; nil if none was met
	lost   bool      // it is out of reach
}

// Reading is the reading of the named measure, or nil.
func (a *Appraisal) Reading(name string) *Reading {
	for i := range a.Readings {
		if a.Readings[i].Measure.Name == name {
			return &a.Readings[i]
		}
	}
	return nil
}

// Tightest is the verdict with the least margin, or nil where there are no limits.
func (a *Appraisal) Tightest() *Verdict {
	var least *Verdict
	for i := range a.Verdicts {
		v := &a.Verdicts[i]
		if least == nil || v.Margin < least.Margin {
			least = v
		}
	}
	return least
}

// gives tells whether the task has the input of a measure.
func (t *Task) gives(key string) bool {
	switch key {
	case "actuator.stiffness":
		return t.Actuator.Stiffness > 0
	case "actuator.error":
		return t.Actuator.Error > 0
	case "legs.rod_diameter":
		return t.Legs.RodDiameter > 0
	case "legs.modulus":
		return t.Legs.Modulus > 0
	}
	return true
}

// applicable lists the measures that the family has and whose inputs the task gives.
func applicable(t *Task, f *kin.Family) []*Measure {
	var out []*Measure
next:
	for _, m := range Measures() {
		if m.Has != nil && !m.Has(f) {
			continue
		}
		for _, k := range m.Inputs {
			if !t.gives(k) {
				continue next
			}
		}
		out = append(out, m)
	}
	return out
}

// Appraise judges a design completely. values holds every dimension; those that
// the plan derives from the duty are overwritten. Excursions are left to Excurse.
// Worst values over boxes, ellipsoids and single excursions are driven beyond the sampled poses (see Refiner), but not
// where a sampled pose fails, nor in a task in which poses may fail. So are the push and the pull of every leg. Coverage and means are over the samples.
// It costs some microseconds per pose and some milliseconds for the refinement.
func Appraise(t *Task, p *Plan, values []float64) *Appraisal {
	a := &Appraisal{Plan: p, Values: append([]float64(nil), values...), Poses: len(t.samples)}
	d := Design{Family: p.Family, Values: a.Values}
	d.Machine = p.build(t, a.Values)
	a.Machine = d.Machine
	v := newView(t)
	v.serve(p.Family)
	v.begin(d.Machine)

	var ts []tracker
	need := NeedMatrix | NeedEfforts | NeedRates | NeedExact
	measures := applicable(t, p.Family)
	for _, m := range measures {
		if m.Scan != nil {
			ts = append(ts, tracker{m: m})
			need |= m.Need
		}
	}
	if t.refined() {
		ts = append(ts, ownEfforts(v.n)...)
	}
	for i := range ts {
		ts[i].reset()
	}
	l := newPoseLimits(t, v, p, &d)
	good := 0
	if t.soft() {
		good = l.survey(need, ts)
		for i := range ts {
			if good == 0 {
				ts[i].w.Value = ts[i].m.Lost
			}
		}
	} else {
		v.walk(0, len(t.samples), need, ts)
		if t.refined() && v.refinable() {
			a.refine(v, ts)
		}
		least, most := v.span()
		p.size(&t.Actuator, least, most, a.Values)
		good = l.count(len(t.samples), nil)
	}
	a.Legs = a.legs(t, l, ts)
	k := 0
	for _, m := range measures {
		r := Reading{Measure: m, Leg: -1, Mate: -1, Case: -1}
		switch {
		case m.Scan != nil:
			w := &ts[k].w
			r.Value, r.Leg, r.Mate, r.Case = m.value(w), w.Leg, w.Mate, w.Case
			if w.Pose >= 0 && !m.Mean {
				r.Pose = &t.samples[w.Pose]
			}
			if ts[k].set {
				r.Pose = &ts[k].at
			}
			k++
		case m.Design != nil:
			r.Value = m.Design(&d)
		default:
			r.Value = t.share(good)
		}
		if m.Scouts && math.IsNaN(r.Value) {
			a.Notes = append(a.Notes, unknownModes)
			continue
		}
		if math.IsNaN(r.Value) {
			r.Value = inf() // of a range that no pose has sized
		}
		if (m.Name == "conditioning" || m.Name == "regularity") && r.Value < nearSingular && r.Pose != nil {
			r.Kind = v.kindAt(r.Pose)
		}
		a.Readings = append(a.Readings, r)
	}
	a.judge(t, good, v)
	a.notes(t, l)
	return a
}

// refine drives worst values beyond the samples.
func (a *Appraisal) refine(v *View, ts []tracker) {
	r := newRefiner(v, thorough())
	if !r.extend(ts) {
		at := r.here
		a.failed, a.lost = &at, r.lost
	}
	a.ends = &r.legs
}

// legs walks the poses once more for what each leg must do, and those between the samples at which worst values are met.
func (a *Appraisal) legs(t *Task, pl *poseLimits, ts []tracker) []Leg {
	v := pl.v
	out := make([]Leg, v.n)
	for i := range out {
		l := &out[i]
		l.Least, l.Most, l.Home = v.least[i], v.most[i], v.homeQ[i]
		if k := v.leastAt[i]; k >= 0 {
			l.LeastAt = &t.samples[k]
		}
		if k := v.mostAt[i]; k >= 0 {
			l.MostAt = &t.samples[k]
		}
	}
	v.keep = 0
	look := func(s *Sample) {
		if !v.at(s, -1, NeedMatrix|NeedEfforts|NeedRates) {
			return
		}
		for i := range out {
			l := &out[i]
			l.BaseSwing = math.Max(l.BaseSwing, swingOf(v.S.BaseChord[i]))
			l.PlatformSwing = math.Max(l.PlatformSwing, swingOf(v.S.PlatformChord[i]))
			for _, c := range v.active[s.Zone] {
				l.Push = math.Max(l.Push, v.hi[c][i])
				l.Pull = math.Max(l.Pull, -v.lo[c][i])
				l.Speed = math.Max(l.Speed, v.rate[c][i])
			}
		}
	}
	for k := range t.samples {
		if pl.counts(k) {
			look(&t.samples[k])
		}
	}
	for i := range ts {
		if ts[i].set {
			look(&ts[i].at)
		}
	}
	if a.ends != nil {
		for i := range out {
			if e := &a.ends[2*i]; e.set {
				out[i].LeastAt = &e.at
				look(&e.at)
			}
			if e := &a.ends[2*i+1]; e.set {
				out[i].MostAt = &e.at
				look(&e.at)
			}
		}
	}
	return out
}

// judge fills the verdicts.
func (a *Appraisal) judge(t *Task, good int, v *View) {
	p := a.Plan
	soft := t.soft()
	least, most := v.span()
	add := func(w Verdict, excess float64) {
		w.Holds = excess <= Tolerance
		if w.Margin = -excess; w.Holds && math.Abs(excess) < 1e-6 {
			w.Margin = 0 // met exactly, as sized dimensions are
		}
		a.Verdicts = append(a.Verdicts, w)
	}
	add(Verdict{Name: "coverage", Origin: "limits", AtLeast: true, Bound: t.Coverage, Value: t.share(good)}, t.shortfall(good))
	if a.failed != nil && a.lost {
		add(Verdict{Name: failReach, Origin: "duty.zones", Bound: 0, Value: 1}, 1)
	}
	if p.least >= 0 {
		unit := Metre
		if p.Family.Drive == kin.Rotary {
			unit = Radian
		}
		first, final := "shortest needed", "longest needed"
		if p.Family.Drive == kin.Rotary || p.Family.Rails {
			first, final = "least needed", "most needed"
		}
		low, span := a.Values[p.least], a.Values[p.span]
		r := t.Actuator.Reserve
		slack := p.rangeSlack(a.Values)
		if !p.derived(p.least) && !soft {
			add(Verdict{Name: first, Origin: "dimensions." + p.Family.Dimensions[p.least].Name, Unit: unit, AtLeast: true,
				Bound: low + r, Value: least}, (low+r-least-slack)/math.Max(span, 1e-3))
		}
		if !p.derived(p.span) && !soft {
			add(Verdict{Name: final, Origin: "dimensions." + p.Family.Dimensions[p.span].Name, Unit: unit,
				Bound: low + span - r, Value: most}, (most-low-span+r-slack)/math.Max(span, 1e-3))
		}
		if n := len(t.Actuator.Strokes); n > 0 && p.Specs[p.span].Kind == Sized {
			last, need := t.Actuator.Strokes[n-1], most+r-low
			if soft {
				need = span
			}
			add(Verdict{Name: "stock stroke", Origin: "actuator.strokes", Unit: unit, Bound: last, Value: need}, (need-last)/last)
		}
		if !math.IsNaN(t.Actuator.DeadLength) {
			need := t.Actuator.DeadRatio*span + t.Actuator.DeadLength
			add(Verdict{Name: "dead length", Origin: "actuator.dead_length", Unit: unit, AtLeast: true, Bound: need, Value: low}, (need-low)/need)
		}
	}
	for i := range t.Limits {
		l := &t.Limits[i]
		r := a.Reading(l.Measure.Name)
		if r == nil {
			if l.Measure.Scouts { // unknown, which is not enough
				add(Verdict{Name: l.Measure.Name, Origin: l.Origin, Unit: l.Measure.Unit, AtLeast: l.AtLeast, Bound: l.Bound, Value: l.Measure.Lost}, math.Inf(1))
			}
			continue
		}
		add(Verdict{Name: l.Measure.Name, Origin: l.Origin, Unit: l.Measure.UnitOf(p.Family), AtLeast: l.AtLeast, Bound: l.Bound, Value: r.Value},
			l.excess(t, r.Value))
	}
	if !soft && (v.singular > 0 || v.homeSign == 0) {
		add(Verdict{Name: "singular poses", Origin: "singular_below", Bound: 0, Value: float64(v.singular)}, 1)
	}
	a.Feasible = least <= most // else there is no posture, not even at home
	for i := range a.Verdicts {
		a.Feasible = a.Feasible && a.Verdicts[i].Holds
	}
}
