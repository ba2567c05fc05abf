package brief

import (
	"fmt"
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

// measure reads the name of a measure that every family has.
func (r *reader) measure(n *node) (*KnownMeasure, bool) {
	name, ok := r.oneOf(n, "measure", measureNames(r.known))
	if !ok {
		return nil, false
	}
	m, _ := r.known.Measure(name)
	var without []string
	for _, f := range r.families {
		if !m.of(f.Name) {
			without = append(without, f.Name)
		}
	}
	if len(without) > 0 {
		r.refuse(n, fmt.Sprintf("%s has no value for %s%s", name, strings.Join(without, ", "), r.whose(m, without)), "measures for all families here: "+strings.Join(r.common(), ", "))
		return nil, false
	}
	if push, turn := r.drives(); m.Turn != units.Ratio && turn {
		if push {
			r.refuse(n, fmt.Sprintf("%s of families that push and of families that turn differ in their units", name), "measures for all families here: "+strings.Join(r.common(), ", "))
			return nil, false
		}
		turned := *m
		turned.Kind = m.Turn
		m = &turned
	}
	r.measures = append(r.measures, measureUse{n, m})
	return m, true
}

// whose says how the families without a measure of efforts or rates are driven, where others are driven
// otherwise.
func (r *reader) whose(m *KnownMeasure, without []string) string {
	if push, turn := r.drives(); !push || !turn {
		return ""
	}
	drive := "turn"
	switch m.Kind {
	case units.Force, units.Speed:
	case units.Torque, units.AngularSpeed:
		drive = "push"
	default:
		return ""
	}
	for _, f := range r.families {
		if slices.Contains(without, f.Name) && f.Rotary != (drive == "turn") {
			return ""
		}
	}
	return ", whose actuators " + drive
}

// common lists the measures that every family has.
func (r *reader) common() (names []string) {
	for _, m := range r.known.Measures {
		push, turn := r.drives()
		if push && turn && m.Turn != units.Ratio {
			continue
		}
		if !slices.ContainsFunc(r.families, func(f *KnownFamily) bool { return !m.of(f.Name) }) {
			names = append(names, m.Name)
		}
	}
	return names
}

// needs refuses measures whose input the brief does not give.
func (r *reader) needs() {
	for _, use := range r.measures {
		var missing []string
		for _, path := range use.measure.Needs {
			if _, ok := r.places.at[path]; !ok {
				missing = append(missing, path)
			}
		}
		if len(missing) > 0 {
			all := strings.Join(missing, " and ")
			r.refuse(use.n, fmt.Sprintf("%s needs %s", use.measure.Name, all), "add "+all)
		}
	}
}

func goalKeys() []key {
	return []key{{name: string(Maximise), read: readGoal}, {name: string(Minimise), read: readGoal}}
}

// readGoal reads the measure under maximise or minimise.
func readGoal(r *reader, n *node) any {
	if n.shape == text {
		r.goals[n.text] = true
	}
	m, ok := r.measure(n)
	if !ok {
		return nil
	}
	return m
}

func readGoals(r *reader, n *node) any {
	var goals []Goal
	seen := map[string]bool{}
	for _, item := range r.items(n, "a list of goals: [{maximise: conditioning}]") {
		m := r.mapping(item, goalKeys())
		if m == nil {
			continue
		}
		if len(item.entries) > 1 {
			r.refuse(item, "a goal has one key", "write each goal as an item of its own: - maximise: conditioning")
		}
		for _, sense := range []Sense{Maximise, Minimise} {
			v, ok := m[string(sense)].(*KnownMeasure)
			if !ok {
				continue
			}
			name, _ := item.child(string(sense))
			if seen[v.Name] {
				r.refuse(name, v.Name+" is already a goal", "name each measure once")
			}
			if v.Sense != "" && v.Sense != sense {
				r.refuse(name, fmt.Sprintf("to %s %s makes a machine worse", sense, v.Name), fmt.Sprintf("write %s: %s", v.Sense, v.Name))
			}
			seen[v.Name] = true
			goals = append(goals, Goal{v.Name, sense, v.Kind})
		}
	}
	return goals
}

const (
	atLeast = "at_least"
	atMost  = "at_most"
)

func limitKeys() []key {
	bound := func(*reader, *node) any { return nil } // read when the measure is known
	return []key{
		{name: "measure", need: true, read: func(r *reader, n *node) any {
			if m, ok := r.measure(n); ok {
				return m
			}
			return nil
		}},
		{name: atLeast, read: bound},
		{name: atMost, read: bound},
	}
}

func readLimits(r *reader, n *node) any {
	var limits []Limit
	items := r.items(n, "a list of limits: [{measure: coverage, at_least: 100 %}]")
	if most := 2 * len(r.known.Measures); len(items) > most {
		r.refuse(n, fmt.Sprintf("has %d limits, more than two for each measure", len(items)), "keep one at_least and one at_most for each measure")
		return nil
	}
	for _, item := range items {
		m := r.mapping(item, limitKeys())
		if m == nil {
			continue
		}
		low, least := item.child(atLeast)
		high, most := item.child(atMost)
		switch {
		case least && most:
			r.refuse(high, "a limit has one bound", "write at_least and at_most as two limits")
			continue
		case !least && !most:
			r.needOne(item, atLeast, atMost)
			continue
		case most:
			low = high
		}
		measure, _ := m["measure"].(*KnownMeasure)
		if measure == nil {
			r.anyQuantity(low)
			continue
		}
		bound, _, ok := r.quantity(low, measure.Kind)
		if !ok {
			continue
		}
		l := Limit{measure.Name, least, bound, measure.Kind}
		r.possibleBound(low, l, measure)
		r.clash(low, l, limits)
		limits = append(limits, l)
	}
	return limits
}

// anyQuantity checks a bound whose measure is at fault for being a quantity at all.
func (r *reader) anyQuantity(n *node) {
	if n.shape != text && n.shape != number || n.shape == text && blank(n.text) {
		r.wrong(n, "a bound, such as 3 kN")
	}
}

// possibleBound refuses a bound beyond what a share can be.
func (r *reader) possibleBound(n *node, l Limit, m *KnownMeasure) {
	if m.Share && (l.Bound < 0 || l.Bound > 1) {
		r.refuse(n, fmt.Sprintf("%s lies from 0 to 1, never at %s", l.Measure, n.text), "write a bound from 0 to 1, or from 0 % to 100 %")
	}
}

// clash refuses a bound given twice, and bounds that no number can hold together.
func (r *reader) clash(n *node, l Limit, before []Limit) {
	for _, o := range before {
		switch {
		case o.Measure != l.Measure:
		case o.AtLeast == l.AtLeast:
			r.refuse(n, l.Measure+" already has this bound", "keep the tighter one")
		case l.AtLeast && l.Bound > o.Bound || o.AtLeast && o.Bound > l.Bound:
			r.refuse(n, "no value of "+l.Measure+" holds this and the other bound", "let at_least be below at_most")
		}
	}
}

// readWeights reads the weight of each goal.
func readWeights(r *reader, n *node) any {
	return r.byGoal(n, func(n *node, _ *KnownMeasure) (float64, bool) {
		v, _, ok := r.quantity(n, units.Ratio)
		return v, ok && r.signed(n, v, notNegative)
	})
}

// readReference reads the reference point of the hypervolume.
func readReference(r *reader, n *node) any {
	ref := r.byGoal(n, func(n *node, m *KnownMeasure) (float64, bool) {
		v, _, ok := r.quantity(n, m.Kind)
		return v, ok
	})
	if n.shape == mapping {
		for _, name := range r.goalNames() {
			if _, ok := n.child(name); !ok {
				r.missing(n, name)
			}
		}
	}
	return ref
}

func (r *reader) goalNames() (names []string) {
	for _, m := range r.known.Measures {
		if r.goals[m.Name] {
			names = append(names, m.Name)
		}
	}
	return names
}

// byGoal reads a mapping from goals to numbers.
func (r *reader) byGoal(n *node, read func(*node, *KnownMeasure) (float64, bool)) any {
	if !r.isMapping(n, "numbers by goal: {conditioning: 2}") {
		return nil
	}
	out := map[string]float64{}
	goals := r.goalNames()
	for _, e := range n.entries {
		r.places.at[e.value.path] = e.value.key
		m, known := r.known.Measure(e.name)
		switch {
		case !known:
			r.fault(e.value.key, e.value.path, fmt.Sprintf("unknown measure %q", short(e.name)), suggest(e.name, goals))
		case !r.goals[e.name]:
			r.fault(e.value.key, e.value.path, e.name+" is no goal", suggest(e.name, goals))
		default:
			if v, ok := read(e.value, m); ok {
				out[e.name] = v
			}
		}
	}
	return out
}

// searchKeys are the keys under search.
func searchKeys() []key {
	return []key{
		{name: "evaluations", read: readEvaluations},
		{name: "population", read: readPopulation},
		{name: "seed", read: counted(0, 1<<62)},
		{name: "front", read: counted(1, 100_000)},
		{name: "time", read: readTime},
		{name: "stall", keys: stallKeys()},
		{name: "reference", read: readReference},
	}
}

// leastPopulation is the least number of designs that a search can breed from.
const leastPopulation = 4

// readEvaluations reads the number of designs to judge, at least a population for each family.
func readEvaluations(r *reader, n *node) any {
	return counted(int64(leastPopulation*max(1, len(r.families))), 1_000_000_000)(r, n)
}

// readPopulation reads the number of designs in a generation; with 0 the search chooses.
func readPopulation(r *reader, n *node) any {
	v := counted(0, 100_000)(r, n)
	if size, ok := v.(int64); ok && 0 < size && size < leastPopulation {
		r.refuse(n, n.text+" designs are too few to breed from", fmt.Sprintf("write %d or more, or 0 to let the search choose", leastPopulation))
		return nil
	}
	return v
}
