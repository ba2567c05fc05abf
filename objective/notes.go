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
	for c := range t.Cases {
		k := &t.Cases[c]
		spin := followed(k.Angular, a.Machine.Frame().Freedoms)
		w := spin.farthest()
		if w == 0 {
			continue
		}
		effort := 0.0
		v.keep = 0
		for i := range t.samples {
			s := &t.samples[i]
			if !k.In(s.Zone) || !l.counts(i) || !v.at(s, i, NeedMatrix|NeedEfforts) {
				continue
			}
			for j := range v.n {
				effort = math.Max(effort, largest(v.lo[c][j], v.hi[c][j]))
			}
		}
		left := 0.0
		for i := range k.Loads {
			l := &k.Loads[i]
			r := sub(l.Centre, t.Tool)
			if !a.Plan.Family.Has(kin.Roll) {
				r.Z = 0 // distance from the axis of turning
			}
			left += l.Mass * w * w * norm(r)
		}
		if a.Plan.Family.Drive == kin.Linear && left > 0.05*effort {
			note("case %q: terms in ω² are left out, and mass·ω²·|r| = %.3g N is more than 5 %% of the counted leg force %.3g N", k.Name, left, effort)
		}
	}
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
