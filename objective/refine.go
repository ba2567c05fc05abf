package objective

import (
	"math"

	"legwright/kin"
)

// Property is what a Refiner drives to its worst.
type Property struct {
	Measure *Measure // a measure of poses; nil for the coordinate of an actuator
	Leg     int      // that actuator, 0-based
	Most    bool     // its greatest coordinate, else its least
}

// Extreme is the worst value of a property in a zone, as far as known.
type Extreme struct {
	Value   float64 // of the measure, or the actuator coordinate; Measure.Lost where the pose is out of reach
	Sample  Sample  // where: of the task's samples, or a pose between them (Refined)
	Refined bool
	Leg     int // 0-based, -1 for none
	Mate    int // second leg of a pair, -1 for none
	Case    int // -1 for none
	Lost    bool
	// Singular: 1/kappa is below Task.Singular at the pose, or the determinant has another sign there than at home. It is
	// seen by measures that ask for the inverse Jacobian alone (Measure.Need).
	Singular bool
}

// Refiner drives worst values over the continuous zones of a task, boxes, ellipsoids and single
// excursions, beyond the sampled poses: bounded local searches from the 8 worst samples, corners among them. What it gives
// is met at a pose, so never more than the true worst; that it is no less is likely, not certain. Poses of
// Listed zones are not left. It is scratch for one goroutine; driving allocates nothing.
type Refiner struct {
	v    *View
	ends []end // of the climbs so far from one ranking
	gain ranking

	// The climb in work.
	reg  region
	zone *Zone
	m    *Measure // nil for an actuator coordinate
	leg  int
	most bool
	need Need
	here Sample
	sight
	evaluations int
}

// sight is what was seen at one pose: the worst over the legs and cases.
type sight struct {
	w              Worst // raw
	lost, singular bool
}

// refineGain is how much worse, relatively, a pose must be to take the place of a sample.
const refineGain = 1e-10

// end is where a climb ended.
type end struct {
	u   [6]float64
	bad float64
}

// NewRefiner makes scratch for machines of a family.
func NewRefiner(t *Task, f *kin.Family) *Refiner {
	v := newView(t)
	v.serve(f)
	return newRefiner(v)
}

func newRefiner(v *View) *Refiner {
	return &Refiner{v: v, ends: make([]end, 0, refineStarts)}
}

// Begin makes m the machine whose worst values are wanted. It reports false where home is singular or out of reach:
// what is regular is then not defined.
func (r *Refiner) Begin(m kin.Machine) bool {
	r.v.begin(m)
	return r.v.homeSign != 0
}

// Evaluations is how many poses were looked at since the Refiner was made, without those of the samples.
func (r *Refiner) Evaluations() int { return r.evaluations }

// Worst looks at all samples of the zone, then drives the property on from the worst ones. It reports false if no
// sample has a value. It stops at the first pose that is out of reach or, for measures that ask
// for the inverse Jacobian, singular.
func (r *Refiner) Worst(zone int, p Property) (Extreme, bool) {
	v := r.v
	z := &v.task.Zones[zone]
	r.aim(p)
	r.gain.n = 0
	best := Extreme{Value: math.Inf(-1), Leg: -1, Mate: -1, Case: -1}
	found := false
	bad := math.Inf(-1)
	for k := range v.task.samples {
		s := &v.task.samples[k]
		if s.Zone != zone {
			continue
		}
		r.here = *s
		b, ok := r.judge(k)
		if !ok {
			continue
		}
		if b > r.gain.least() {
			r.gain.enter(b, k)
		}
		if !found || b > bad {
			best, bad, found = r.extreme(), b, true
		}
		if math.IsInf(b, 1) && (r.lost || r.singular) {
			return best, true
		}
	}
	if !found || !z.refinable() {
		return best, found
	}
	if r.drive(zone, &r.gain, bad) {
		best = r.extreme()
	}
	return best, true
}

// aim chooses the property.
func (r *Refiner) aim(p Property) {
	r.m, r.leg, r.most, r.need = p.Measure, p.Leg, p.Most, 0
	if p.Measure != nil {
		r.need = p.Measure.Need
	}
}

// drive climbs from every start of the ranking and reports whether it met anything worse than worst; the worst pose is
// then the one in work.
func (r *Refiner) drive(zone int, from *ranking, worst float64) bool {
	v := r.v
	r.zone = &v.task.Zones[zone]
	r.ends = r.ends[:0]
	var most sight
	var at Sample
	found := false
	for i := range from.n {
		s := &v.task.samples[from.at[i].sample]
		r.reg = regionOf(r.zone, s)
		r.here = Sample{Zone: zone, Row: -1}
		u := r.reg.from(&s.Coords)
		f := r.climb(&u, from.at[i].bad)
		r.ends = append(r.ends, end{u, f})
		if f <= worst+refineGain*math.Abs(worst) {
			continue
		}
		r.bad(&u)
		most, at, worst, found = r.sight, r.here, f, true
		if math.IsInf(f, 1) {
			break
		}
	}
	if found {
		r.sight, r.here = most, at
	}
	return found
}

// bad is how bad the property is at u: +Inf where the pose is out of reach or singular, -Inf where it has no value.
func (r *Refiner) bad(u *[6]float64) float64 {
	r.here.Coords = r.reg.coords(u)
	r.here.Pose = kin.NewPose(r.here.Coords)
	r.evaluations++
	b, _ := r.judge(-1)
	return b
}

// judge looks at the pose r.here; it reports false where the property has no value.
func (r *Refiner) judge(index int) (float64, bool) {
	v := r.v
	v.keep, v.near = math.Inf(1), math.Inf(1)
	r.sight = sight{w: Worst{Pose: -2, Leg: -1, Mate: -1, Case: -1}}
	if !v.at(&r.here, index, r.need) {
		r.lost = true
		r.w.Leg = v.S.Leg
		if r.m != nil {
			r.w.Value = r.m.Lost
		}
		return math.Inf(1), true
	}
	if r.m == nil {
		r.w.Value, r.w.Leg = v.S.Q[r.leg], r.leg
		if r.most {
			return r.w.Value, true
		}
		return -r.w.Value, true
	}
	r.w.Value = r.m.Start
	r.m.Scan(v, &r.w)
	if r.need&(NeedMatrix|NeedEfforts|NeedExact) != 0 && v.isSingular() {
		r.singular = true
		return math.Inf(1), true
	}
	if r.w.Pose == -2 {
		return math.Inf(-1), false
	}
	return r.m.bad(r.w.Value), true
}

// extreme is the pose judged last.
func (r *Refiner) extreme() Extreme {
	e := Extreme{Value: r.w.Value, Sample: r.here, Refined: r.here.Row < 0, Leg: r.w.Leg, Mate: r.w.Mate, Case: r.w.Case,
		Lost: r.lost, Singular: r.singular}
	if r.m != nil {
		e.Value = r.m.value(&r.w)
	}
	return e
}
