package objective

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"legwright/kin"
)

// notes says what the figures leave out and what looks odd.
func (a *Appraisal) notes(t *Task, l *poseLimits) {
	v := l.v
	note := func(format string, args ...any) { a.Notes = append(a.Notes, fmt.Sprintf(format, args...)) }
	if v.homeSign == 0 {
		note("the home pose is singular: home_height, radii and angles (or home_heading) give a machine that cannot be held there")
	}
	if t.soft() {
		a.left(l, note)
	}
	if t.soft() && t.continuous() {
		note("worst values are those of the sampled poses that count: they are not searched for between the samples")
	}
	switch s := a.failed; {
	case s == nil:
	case a.lost:
		note("a pose between the sampled ones is out of reach: %s of zone %q", poseText(s), t.Zones[s.Zone].Name)
	default:
		note("a pose between the sampled ones is singular or lies behind a singularity of the kind %s: %s of zone %q", kindText(v.kindAt(s)), poseText(s), t.Zones[s.Zone].Name)
	}
	if v.singular > 0 && v.singularAt >= 0 && v.homeSign != 0 {
		s := &t.samples[v.singularAt]
		note("%d of the %d poses are singular or lie behind a singularity; the first met is of the kind %s", v.singular, len(t.samples), kindText(v.kindAt(s)))
	} else {
		for i := range a.Readings {
			if r := &a.Readings[i]; r.Kind != "" {
				note("the worst %s, %.3g, is near a singularity of the kind %s", r.Measure.Name, r.Value, kindText(r.Kind))
			}
		}
	}
	if text := a.oddStroke(t); text != "" {
		note("stroke %s is not one of the stock strokes", text)
	}
	for c := range t.Cases {
		if leg, left, effort := a.spinning(&t.Cases[c], c, t, l); left > 0.05*effort {
			unit := "N"
			if a.Plan.Family.Drive == kin.Rotary {
				unit = "N m"
			}
			note("case %q: terms in ω² are left out, and mass·ω²·|r| may add %.3g %s to leg %d, which is more than 5 %% of the %.3g %s counted there",
				t.Cases[c].Name, left, unit, leg+1, effort, unit)
		}
	}
}

// oddStroke writes the design's stroke where it is given rather than sized and none of the stock strokes, else "".
func (a *Appraisal) oddStroke(t *Task) string {
	p := a.Plan
	if len(t.Actuator.Strokes) == 0 || p.span < 0 || p.Specs[p.span].Kind == Sized {
		return ""
	}
	stroke := a.Values[p.span]
	for _, s := range t.Actuator.Strokes {
		if math.Abs(stroke-s) <= Tolerance*s {
			return ""
		}
	}
	if p.Family.Drive == kin.Rotary {
		return fmt.Sprintf("%.5g°", stroke*180/math.Pi)
	}
	return fmt.Sprintf("%.5g mm", 1000*stroke)
}

// poseText writes the coordinates of a pose that are not 0.
func poseText(s *Sample) string {
	var out []string
	for q, c := range s.Coords {
		switch f := kin.Freedom(q); {
		case c == 0:
		case f.Angular():
			out = append(out, fmt.Sprintf("%s %.5g°", f, c*180/math.Pi))
		default:
			out = append(out, fmt.Sprintf("%s %.5g mm", f, 1000*c))
		}
	}
	if out == nil {
		return "home"
	}
	return strings.Join(out, ", ")
}

// spinning is the leg with the largest share of what centripetal forces may add in a case to the
// effort that is counted, both the largest over the poses. What they add is taken as that of a force
// m ω² |r| at the tool point, in the direction in which the leg's effort is largest: a bound for
// platforms that turn about z alone; about other axes moments come on top.
func (a *Appraisal) spinning(k *Case, c int, t *Task, l *poseLimits) (leg int, left, effort float64) {
	spin := followed(k.Angular, a.Machine.Frame().Freedoms)
	w := spin.farthest()
	force := 0.0
	for i := range k.Loads {
		o := &k.Loads[i]
		r := sub(o.Centre, t.Tool)
		if !a.Plan.Family.Has(kin.Roll) {
			r.Z = 0 // distance from the axis of turning
		}
		force += o.Mass * w * w * norm(r)
	}
	if force == 0 {
		return 0, 0, 0
	}
	v := l.v
	v.keep = 0
	var gain, most [6]float64
	for i := range t.samples {
		s := &t.samples[i]
		if !k.In(s.Zone) || !l.counts(i) || !v.at(s, i, NeedMatrix|NeedEfforts) || v.sign == 0 {
			continue
		}
		for j := range v.n {
			g := kin.Vec{X: v.x[j], Y: v.x[6+j], Z: v.x[12+j]}
			if !a.Plan.Family.Has(kin.Roll) {
				g.Z = 0 // the force is square to the axis
			}
			gain[j] = math.Max(gain[j], norm(g))
			most[j] = math.Max(most[j], largest(v.lo[c][j], v.hi[c][j]))
		}
	}
	worst := 0.0
	for j := range gain {
		if share := gain[j] / most[j]; share > worst { // neither for a leg that nothing reaches
			leg, worst = j, share
		}
	}
	return leg, gain[leg] * force, most[leg]
}

// left tells how many poses do not count, and why.
func (a *Appraisal) left(l *poseLimits, note func(string, ...any)) {
	var reasons []string
	number, total := map[string]int{}, 0
	for _, w := range l.why {
		if w == "" {
			continue
		}
		if number[w]++; number[w] == 1 {
			reasons = append(reasons, w)
		}
		total++
	}
	if total == 0 {
		return
	}
	slices.SortStableFunc(reasons, func(a, b string) int { return number[b] - number[a] })
	for i, w := range reasons {
		reasons[i] = fmt.Sprintf("%s (%d)", w, number[w])
	}
	note("%d of the %d poses do not count, by the first limit that fails: %s; all other figures are over the rest", total, len(l.why), strings.Join(reasons, ", "))
}
