package study

import (
	"fmt"
	"math"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

// FamilyLine is what became of one of the families of a brief that names several.
type FamilyLine struct {
	Name        string            `json:"name"`
	Evaluations int               `json:"evaluations"`
	Feasible    int               `json:"feasible"` // feasible designs among the evaluated
	OnFront     int               `json:"on_front"`
	Share       Number            `json:"share"`               // of the designs of the front
	Best        map[string]Number `json:"best"`                // of each goal, over all its feasible designs
	Unbounded   map[string]bool   `json:"unbounded,omitempty"` // goals whose best is null
	Why         string            `json:"why"`                 // why it lost, or what it is good for
}

// FamilyFound is what a search found of one family.
type FamilyFound struct {
	Name        string
	Evaluations int
	Feasible    int
	Best        []Design // designs that hold every limit, the best in each goal among them; none without feasible ones
	Nearest     *Design  // the design that violates the limits least; nil if every design is feasible or failed
}

// Compare sets the front's line for each family, if there are several.
func (f *Front) Compare(found []FamilyFound) {
	f.Families = nil
	if len(found) < 2 {
		return
	}
	for i := range found {
		f.Families = append(f.Families, f.line(&found[i]))
	}
	best := map[string]Number{}
	for _, g := range f.Goals {
		for i := range f.Families {
			if v, ok := f.Families[i].Best[g.Measure]; ok {
				takeBest(best, &g, v)
			}
		}
	}
	for i := range f.Families {
		l := &f.Families[i]
		switch {
		case l.Evaluations == 0:
			l.Why = "none of its designs was looked at"
		case l.Feasible == 0:
			l.Why = missed(l, found[i].Nearest)
		case l.OnFront == 0:
			l.Why = f.beaten(l, best)
		default:
			l.Why = f.merits(l, best)
		}
	}
}

// line is a family's line without the reason.
func (f *Front) line(found *FamilyFound) FamilyLine {
	l := FamilyLine{Name: found.Name, Evaluations: found.Evaluations, Feasible: found.Feasible, Best: map[string]Number{}}
	take := func(d *Design) {
		for i := range f.Goals {
			if v, ok := d.Measures[f.Goals[i].Measure]; ok {
				takeBest(l.Best, &f.Goals[i], v)
			}
		}
	}
	for i := range found.Best {
		take(&found.Best[i])
	}
	for i := range f.Designs {
		if f.Designs[i].Family == found.Name {
			l.OnFront++
			take(&f.Designs[i])
		}
	}
	if n := len(f.Designs); n > 0 {
		l.Share = Number(float64(l.OnFront) / float64(n))
	}
	for name, v := range l.Best {
		if unbounded(float64(v)) {
			if l.Unbounded == nil {
				l.Unbounded = map[string]bool{}
			}
			l.Unbounded[name] = true
		}
	}
	return l
}

// takeBest keeps the better value of a goal.
func takeBest(best map[string]Number, g *Goal, v Number) {
	if old, ok := best[g.Measure]; !ok || (v > old) == (g.Sense == Maximise) {
		best[g.Measure] = v
	}
}

// missed says which limit stands in the way of a family without a feasible design.
func missed(l *FamilyLine, nearest *Design) string {
	t := fmt.Sprintf("none of its %d designs holds every limit", l.Evaluations)
	if nearest == nil {
		return t
	}
	broken := nearest.Broken()
	if len(broken) == 0 {
		return t
	}
	worst := &broken[0]
	for i := range broken {
		if unbounded(float64(broken[i].Value)) {
			return t + "; the nearest has no posture, or a singular one, at some required pose"
		}
		if broken[i].Margin < worst.Margin {
			worst = &broken[i]
		}
	}
	word := "at most"
	if worst.Sense == AtLeast {
		word = "at least"
	}
	amount := func(v Number) string {
		if worst.Measure == "coverage" {
			return units.Digits(100*float64(v), 5) + " %"
		}
		return units.Format(float64(v), KindOf(worst.Unit), 5)
	}
	t += fmt.Sprintf("; the nearest has %s %s, %s %s is wanted", worst.Measure, amount(worst.Value), word, amount(worst.Bound))
	if n := len(broken) - 1; n > 0 {
		t += fmt.Sprintf(", and breaks %d more", n)
	}
	return t
}

// beaten says how far a family that has no design on the front is behind.
func (f *Front) beaten(l *FamilyLine, best map[string]Number) string {
	var behind, equal []string
	for i := range f.Goals {
		g := &f.Goals[i]
		if by := behindBy(g, l.Best[g.Measure], best[g.Measure]); by != "" {
			behind = append(behind, by+" in "+g.Measure)
		} else {
			equal = append(equal, g.Measure)
		}
	}
	t := "every one of its designs is beaten"
	if len(behind) > 0 {
		t += "; at its best it is behind the front by " + list(behind)
	}
	if len(equal) > 0 {
		t += "; as good as the front in " + list(equal)
	}
	return t
}

// level is the relative difference below which two families do equally well in a goal.
const level = 0.005

// merits says what a family on the front is good for.
func (f *Front) merits(l *FamilyLine, best map[string]Number) string {
	var leads, levels []string
	for i := range f.Goals {
		m := f.Goals[i].Measure
		near := func(v Number) bool {
			return v == best[m] || math.Abs(float64(v-best[m])) <= level*math.Abs(float64(best[m]))
		}
		if !near(l.Best[m]) {
			continue
		}
		alone := true
		for k := range f.Families {
			o := &f.Families[k]
			v, ok := o.Best[m]
			alone = alone && (o == l || !ok || !near(v))
		}
		if alone {
			leads = append(leads, m)
		} else {
			levels = append(levels, m)
		}
	}
	t := fmt.Sprintf("%d of the %d designs of the front", l.OnFront, len(f.Designs))
	if l.OnFront == len(f.Designs) {
		t = "the whole front"
	}
	switch {
	case len(leads) == len(f.Goals):
		return t + "; leads in every goal"
	case len(leads) > 0 && len(levels) > 0:
		return t + "; leads in " + list(leads) + ", level with the best in " + list(levels)
	case len(leads) > 0:
		return t + "; leads in " + list(leads)
	case len(levels) > 0:
		return t + "; level with the best in " + list(levels)
	}
	return t + "; leads in no goal, its designs are compromises"
}

// behindBy is by how much a value falls short of the best, "" if by less than 0.05 %.
func behindBy(g *Goal, v, best Number) string {
	d := math.Abs(float64(v - best))
	switch {
	case v == best:
		return ""
	case unbounded(d):
		return "any amount"
	case best == 0:
		return units.Format(d, KindOf(g.Unit), 3)
	}
	share := 100 * d / math.Abs(float64(best))
	if share < 0.05 {
		return ""
	}
	return units.Digits(share, 2) + " %"
}

// list joins words: a, b and c.
func list(words []string) string {
	if n := len(words); n > 1 {
		return strings.Join(words[:n-1], ", ") + " and " + words[n-1]
	}
	return strings.Join(words, "")
}
