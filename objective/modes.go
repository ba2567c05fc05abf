package objective

import (
	"math"

	"legwright/kin"
	"legwright/kin/assembly"
)

// cheapModes tells whether all assembly modes of the family's machines come in closed form or from a
// polynomial. Platforms that tilt need a continuation of 16 or 40 paths, too dear for a search.
func cheapModes(f *kin.Family) bool { return legged(f) && !f.Has(kin.Roll) }

func modeSeparation() *Measure {
	return &Measure{
		Name: "mode_separation", Unit: Metre, Sense: Larger,
		Text:   "least distance to another assembly mode with the same actuator values, over home and the poses that lie farthest out: sqrt(|Δp|² + (Lc·angle)²); of platforms that tilt by appraise --modes alone",
		Source: "C. Innocenti and V. Parenti-Castelli 1992, on changes of mode without a singularity (from memory); the distance is our own",
		Has:    cheapModes, Start: inf(), Lost: 0, Scouts: true,
		Scan: func(v *View, w *Worst) {
			if d := v.separation(&v.pose.Pose, &v.S); d < w.Value || math.IsNaN(d) {
				w.set(v, d, -1, -1)
			}
		},
	}
}

// modeSeed starts the continuation of six-legged machines; any seed finds the same modes.
const modeSeed = 1

// sameMode is the distance, over the machine's size, within which a solution is the posture itself: rounding,
// which near a double solution grows to the square root of the machine's precision.
const sameMode = 1e-6

// separation is the distance from the posture to the nearest other real solution with
// the same actuator coordinates: to the second nearest where the nearest is the posture itself, as it should
// be. It is NaN, unknown, where solutions are missing.
func (v *View) separation(p *kin.Pose, s *kin.State) float64 {
	q := s.Q[:v.n]
	found, ok := assembly.Modes(v.frame, kin.Ends(v.machine, q), q, modeSeed)
	if !ok || found.Lost > 0 {
		return math.NaN()
	}
	here := kin.Settle(v.machine, p)
	first, second := inf(), inf()
	for i := range found.Modes {
		m := found.Modes[i].Pose(v.frame)
		switch d := assembly.Distance(v.frame, &here, &m); {
		case d < first:
			first, second = d, first
		case d < second:
			second = d
		}
	}
	if math.IsInf(first, 1) { // not even the posture itself
		return math.NaN()
	}
	if first > sameMode*(enclosing(v.frame.Base)+norm(v.frame.Home)) {
		return first
	}
	return second
}

// ModeSeparation adds the reading of mode_separation to the appraisal of a machine for which the
// measure is too dear elsewhere. It costs some tenths of a second for each of up to 77 poses.
func ModeSeparation(t *Task, a *Appraisal) {
	m := modeSeparation()
	if a.Reading(m.Name) != nil || !legged(a.Plan.Family) {
		return
	}
	v := newView(t)
	v.serve(a.Plan.Family)
	v.begin(a.Machine)
	ts := []tracker{{m: m}}
	ts[0].reset()
	if t.soft() {
		d := Design{Family: a.Plan.Family, Values: a.Values, Machine: a.Machine}
		v.home(ts)
		newPoseLimits(t, v, a.Plan, &d).count(t.scouts, ts)
	} else {
		v.walk(0, t.scouts, 0, ts)
	}
	if math.IsNaN(ts[0].w.Value) {
		a.Notes = append(a.Notes, unknownModes)
		return
	}
	r := Reading{Measure: m, Value: ts[0].w.Value, Leg: -1, Mate: -1, Case: -1}
	if k := ts[0].w.Pose; k >= 0 {
		r.Pose = &t.samples[k]
	}
	a.Readings = append(a.Readings, r)
}

// unknownModes is the note in place of a reading.
const unknownModes = "mode_separation is left out: at some pose assembly modes are missing among those found"
