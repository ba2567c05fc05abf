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
	v     *View
	try   diligence
	gain  ranking
	field []end // starts of climbs
	ends  []end // ends of the climbs so far from one ranking

	// The climb in work.
	reg  region
	m    *Measure // nil for an actuator coordinate
	leg  int
	most bool
	need Need
	here Sample
	goal float64 // what a climb is to pass
	sight
	evaluations int

	by    []ranking // zone·props + property
	props int
	legs  [12]spot // where the least and the greatest coordinate of each leg lie, if not at samples or at home
}

// sight is what was seen at one pose: the worst over the legs and cases.
type sight struct {
	w              Worst // raw
	lost, singular bool
}

// refineGain is how much worse, relatively, a pose must be to take the place of a sample.
const refineGain = 1e-10

// end is where a climb starts or ends.
type end struct {
	reg region
	u   [6]float64
	bad float64
}

// NewRefiner makes scratch for machines of a family.
func NewRefiner(t *Task, f *kin.Family) *Refiner {
	v := newView(t)
	v.serve(f)
	return newRefiner(v, thorough())
}

// newRefiner is a Refiner that goes on where a walk of the view ends.
func newRefiner(v *View, try diligence) *Refiner {
	return &Refiner{v: v, try: try, field: make([]end, 0, rankPlaces), ends: make([]end, 0, try.starts)}
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
		b, ok := math.Inf(1), true
		if r.look(k, r.need) {
			b, ok = r.read()
		} else if r.m != nil {
			r.w.Value = r.m.Lost
		}
		if !ok {
			continue
		}
		r.gain.enter(b, k)
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

// drive climbs from the starts of the ranking and reports whether it met anything worse than worst; the worst pose is
// then the one in work.
func (r *Refiner) drive(zone int, from *ranking, worst float64) bool {
	r.line(zone, from)
	var most sight
	var at Sample
	found, still := false, true
	for i := range min(len(r.field), r.try.starts) {
		e := r.field[i]
		if i == r.try.still && still {
			break
		}
		r.reg = e.reg
		u := e.u
		r.goal = worst
		e.bad = r.climb(&e.u, e.bad)
		still = still && e.u == u
		r.ends = append(r.ends, e)
		if e.bad <= worst+refineGain*math.Abs(worst) {
			continue
		}
		r.bad(&e.u)
		most, at, worst, found = r.sight, r.here, e.bad, true
		if math.IsInf(e.bad, 1) {
			break
		}
	}
	if found {
		r.sight, r.here = most, at
	}
	return found
}

// line makes the field: the ranked poses that are not neighbours of a worse one, which a climb from there passes. In an ellipsoid, where
// none is a corner, each first makes a step.
func (r *Refiner) line(zone int, from *ranking) {
	z := &r.v.task.Zones[zone]
	r.ends, r.field = r.ends[:0], r.field[:0]
	r.here = Sample{Zone: zone, Row: -1}
next:
	for i := range from.n {
		s := &r.v.task.samples[from.at[i].sample]
		e := end{reg: regionOf(z, s), bad: from.at[i].bad}
		e.u = e.reg.from(&s.Coords)
		if z.Kind == Box && len(r.field) < r.try.starts {
			for k := range r.field {
				if e.reg.neighbours(&r.field[k].u, &e.u) {
					continue next
				}
			}
		}
		k := len(r.field)
		r.field = append(r.field, e)
		if z.Kind != Ellipsoid {
			continue
		}
		r.reg = e.reg
		r.first(&e.u, &e.bad)
		for ; k > 0 && r.field[k-1].bad < e.bad; k-- {
			r.field[k] = r.field[k-1]
		}
		r.field[k] = e
	}
}

// bad is how bad the property is at u: +Inf where the pose is out of reach or singular, -Inf where it has no value.
func (r *Refiner) bad(u *[6]float64) float64 {
	if !r.stand(u, r.need) {
		if r.m != nil {
			r.w.Value = r.m.Lost
		}
		return math.Inf(1)
	}
	b, _ := r.read()
	return b
}

// stand moves to u and reports false if that is out of reach.
func (r *Refiner) stand(u *[6]float64, need Need) bool {
	r.here.Coords = r.reg.coords(u)
	r.here.Pose = kin.NewPose(r.here.Coords)
	r.evaluations++
	return r.look(-1, need)
}

// look looks at the pose r.here and reports false if it is out of reach.
func (r *Refiner) look(index int, need Need) bool {
	v := r.v
	v.keep, v.near = math.Inf(1), math.Inf(1)
	r.sight = sight{w: Worst{Pose: -1, Leg: -1, Mate: -1, Case: -1}}
	if r.lost = !v.at(&r.here, index, need); r.lost {
		r.w.Leg = v.S.Leg
		return false
	}
	r.singular = need&(NeedMatrix|NeedEfforts|NeedExact) != 0 && v.isSingular()
	return true
}

// read is how bad the property is at the pose in work; it reports false where it has no value.
func (r *Refiner) read() (float64, bool) {
	if r.m == nil {
		r.w.Value, r.w.Leg = r.v.S.Q[r.leg], r.leg
		if r.most {
			return r.w.Value, true
		}
		return -r.w.Value, true
	}
	b, ok := r.scan(r.m)
	if r.singular {
		return math.Inf(1), true
	}
	return b, ok
}

// scan is how bad a measure is at the pose in work, over the legs and cases; it reports false, and -Inf, where it has no value.
func (r *Refiner) scan(m *Measure) (float64, bool) {
	r.w = Worst{Value: m.Start, Pose: -2, Leg: -1, Mate: -1, Case: -1}
	if m.Scan(r.v, &r.w); r.w.Pose == -2 {
		return math.Inf(-1), false
	}
	return m.bad(r.w.Value), true
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
