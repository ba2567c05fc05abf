package report

import (
	"fmt"
	"math"
	"strings"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// The changes of a goal, as shares of its range over the front, that make a step along the front:
// the least gain that is worth a line, the gain that is looked for, and the most that counts as no
// change.
const (
	leastGain = 0.05
	fairGain  = 0.10
	noChange  = 0.02
)

// step goes from one design to another.
type step struct {
	to   int
	gain []float64 // of each goal, as a share of its range over the front; negative for a loss
}

// steps says in words what a step along the front costs, from the knee to designs nearby.
func (s *sheet) steps(f *study.Front) {
	from := f.Marked(study.MarkKnee)
	if from < 0 || len(f.Goals) < 2 {
		return
	}
	lines := stepLines(f, from)
	if len(lines) == 0 {
		return
	}
	s.heading(fmt.Sprintf("What a step along the front costs, from the knee (%s)", f.Designs[from].ID))
	s.say("The knee is the compromise from which a gain in one goal begins to cost much in the others.")
	for _, l := range lines {
		s.item(l)
	}
	s.gap()
}

func stepLines(f *study.Front, from int) []string {
	all := stepsFrom(f, from)
	var lines []string
	told := map[int]bool{}
	tell := func(st *step, gained int) {
		if st != nil && !told[st.to] {
			told[st.to] = true
			lines = append(lines, st.words(f, from, gained))
		}
	}
	for a := range f.Goals {
		found := false
		if len(f.Goals) <= 3 {
			for b := range f.Goals {
				if st := nearest(all, a, b); b != a && st != nil {
					tell(st, a)
					found = true
				}
			}
		}
		if found {
			continue
		}
		if st := nearest(all, a, -1); st != nil {
			tell(st, a)
		} else if best := f.Marked(study.MarkBest(f.Goals[a].Measure)); best >= 0 {
			lines = append(lines, little(f, from, best, f.Goals[a].Measure))
		}
	}
	return lines
}

// stepsFrom lists the steps from a design to every other.
func stepsFrom(f *study.Front, from int) []step {
	gains := make([][]float64, len(f.Designs))
	for i := range gains {
		gains[i] = make([]float64, len(f.Goals))
	}
	for j, g := range f.Goals {
		low, high := math.Inf(1), math.Inf(-1)
		for i := range f.Designs {
			if v := float64(f.Designs[i].Measures[g.Measure]); !math.IsInf(v, 0) {
				low, high = math.Min(low, v), math.Max(high, v)
			}
		}
		home := float64(f.Designs[from].Measures[g.Measure])
		for i := range f.Designs {
			d := float64(f.Designs[i].Measures[g.Measure]) - home
			if g.Sense == study.Minimise {
				d = -d
			}
			if high > low {
				gains[i][j] = d / (high - low)
			}
		}
	}
	var out []step
	for i := range gains {
		if i != from {
			out = append(out, step{i, gains[i]})
		}
	}
	return out
}

// nearest is the step that gains about fairGain in goal a, loses in goal b alone, and changes least
// besides; nil if there is none. With b < 0 any goals may lose.
func nearest(all []step, a, b int) *step {
	var best *step
	least := math.Inf(1)
	for k := range all {
		st := &all[k]
		if st.gain[a] < leastGain {
			continue
		}
		off, fits := math.Abs(st.gain[a]-fairGain), true
		for j, g := range st.gain {
			if math.IsInf(g, 0) || math.IsNaN(g) {
				fits = false
			}
			if j == a {
				continue
			}
			if b >= 0 && j != b && g < -noChange {
				fits = false
			}
			off = math.Hypot(off, math.Min(g, 0))
			if b >= 0 && j != b {
				off = math.Hypot(off, g)
			}
		}
		if fits && b >= 0 && st.gain[b] > -noChange {
			fits = false
		}
		if fits && off < least {
			best, least = st, off
		}
	}
	return best
}

// little says that a goal cannot be made much better than it is.
func little(f *study.Front, from, best int, measure string) string {
	if best == from {
		return study.Clean(measure) + ": no design has better than this"
	}
	a, b := &f.Designs[from], &f.Designs[best]
	return fmt.Sprintf("%s is near its best: design %s has %s", study.Clean(measure), b.ID, change(measure, a, b))
}

// words says what the step gains in a goal, what it costs, and what else it changes.
func (st *step) words(f *study.Front, from, gained int) string {
	a, b := &f.Designs[from], &f.Designs[st.to]
	var costs, brings, stays []string
	for j, g := range f.Goals {
		switch {
		case j == gained:
		case st.gain[j] < -noChange:
			costs = append(costs, change(g.Measure, a, b))
		case st.gain[j] > noChange:
			brings = append(brings, change(g.Measure, a, b))
		default:
			stays = append(stays, study.Clean(g.Measure))
		}
	}
	t := change(f.Goals[gained].Measure, a, b)
	if len(costs) > 0 {
		t += " costs " + strings.Join(costs, " and ")
	} else {
		t += " costs nothing to speak of"
	}
	if len(brings) > 0 {
		t += ", and brings " + strings.Join(brings, " and ")
	}
	if len(stays) > 0 {
		t += "; " + strings.Join(stays, ", ") + " about the same"
	}
	t += ": design " + b.ID
	if b.Family != a.Family {
		t += ", a " + study.Clean(b.Family)
	}
	return t
}

// change says how a measure changes from a to b: "8.1 % less leg_force (2140 to 1970 N)"; lengths and
// angles as such: "120 mm more footprint (1530 to 1650 mm)".
func change(measure string, a, b *study.Design) string {
	c := measureScale(a.Family, measure)
	u, v := float64(a.Measures[measure]), float64(b.Measures[measure])
	word := "more"
	if v < u {
		word = "less"
	}
	both := c.apart([]float64{u, v})
	span := both[0] + " to " + both[1]
	if c.unit() != "" {
		span += " " + c.unit()
	}
	amount := c.text(math.Abs(v-u), 3)
	if c.percent {
		amount = c.number(math.Abs(v-u), 2) + " points"
	}
	if c.kind != units.Length && c.kind != units.Angle && !c.percent && u != 0 {
		amount = units.Digits(100*math.Abs(v-u)/math.Abs(u), 2) + " %"
	}
	return fmt.Sprintf("%s %s %s (%s)", together(amount), word, study.Clean(measure), together(span))
}
