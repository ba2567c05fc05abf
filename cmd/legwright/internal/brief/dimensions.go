package brief

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

// Bounds on discrete dimensions.
const (
	maxSteps   = 1_000_000
	maxChoices = 10_000
)

// readFamily reads a name or a list of names into []string and notes the families. A misspelt
// family is taken for the nearest one, so that the rest of the file can be checked.
func readFamily(r *reader, n *node) any {
	items := []*node{n}
	if n.shape == list {
		items = r.items(n, "a family or a list of families")
	}
	var found []string
	for _, item := range items {
		name, ok := r.oneOf(item, "family", familyNames(r.known))
		if !ok {
			name = near(name, familyNames(r.known))
		}
		f, known := r.known.Family(name)
		if !known {
			continue
		}
		if slices.Contains(found, name) {
			if ok {
				r.refuse(item, name+" is given twice", "name each family once")
			}
			continue
		}
		found = append(found, name)
		r.families = append(r.families, f)
	}
	return families{found, n.shape == list}
}

// families are the names as given; perName tells that dimensions come per family.
type families struct {
	names   []string
	perName bool
}

// dimensions reads the dimensions of all families.
func (r *reader) dimensions(n *node, fs families) (out []Family) {
	if len(r.families) == 0 {
		r.family(n, anyFamily(r.known)) // the family is at fault: check what can be checked
		return nil
	}
	_, nested := n.child(fs.names[0])
	if len(fs.names) == 1 && !(fs.perName && nested) {
		return []Family{r.family(n, r.families[0])}
	}
	example := fmt.Sprintf("the dimensions of each family: %s: {…}", strings.Join(fs.names, ": {…}, "))
	if !r.isMapping(n, example) {
		return nil
	}
	if first := n.entries[0].name; !nested && slices.Contains(dimensionNames(anyFamily(r.known)), first) {
		r.refuse(n, first+" stands under no family", "write "+example)
		return nil
	}
	excused := r.strangers(n, fs.names)
	for i, name := range fs.names {
		v, ok := n.child(name)
		switch {
		case ok:
			out = append(out, r.family(v, r.families[i]))
		case !excused[name]:
			r.missing(n, name)
		}
	}
	return out
}

// anyFamily has every dimension of every family.
func anyFamily(k *Known) *KnownFamily {
	all := &KnownFamily{}
	for _, f := range k.Families {
		for _, d := range f.Dimensions {
			if _, ok := all.Dimension(d.Name); !ok {
				d.Optional = true
				all.Dimensions = append(all.Dimensions, d)
			}
		}
	}
	return all
}

func (r *reader) family(n *node, f *KnownFamily) Family {
	out := Family{Name: f.Name}
	if !r.isMapping(n, "the dimensions: "+strings.Join(dimensionNames(f), ", ")) {
		return out
	}
	if v, ok := n.child(f.Name); ok {
		r.fault(v.key, v.path, "the only family needs no key of its own", "write its dimensions directly under "+n.path)
		return out
	}
	excused := r.strangers(n, dimensionNames(f))
	for i := range f.Dimensions {
		d := &f.Dimensions[i]
		v, ok := n.child(d.Name)
		if ok {
			if dim, ok := r.dimension(v, d); ok {
				out.Dimensions = append(out.Dimensions, dim)
			}
		} else if !d.Optional && !excused[d.Name] {
			r.lacks(n, d.Name, d.Name+": "+d.Kind.Sample())
		}
	}
	return out
}

// dimension reads one dimension: one form, a list with a form for each leg, or one sign for all legs.
func (r *reader) dimension(n *node, d *KnownDimension) (Dimension, bool) {
	if d.Each < 2 {
		return r.form(n, d, d.Name)
	}
	out := Dimension{Name: d.Name, Kind: d.Kind, Form: PerLeg}
	if d.Kind == units.Sign && n.shape != list {
		if _, ok := n.child("choices"); ok {
			each := strings.Join(slices.Repeat([]string{"{choices: [-1, 1]}"}, d.Each), ", ")
			r.refuse(n, "choices do not say whether all legs choose alike", "write a list, one for each leg: ["+each+"]")
			return out, false
		}
		one, ok := r.form(n, d, "")
		for i := range d.Each {
			one.Name = fmt.Sprintf("%s_%d", d.Name, i+1)
			out.Each = append(out.Each, one)
		}
		return out, ok
	}
	write := fmt.Sprintf("a list of %d: [%s, …]", d.Each, d.Kind.Sample())
	items := r.items(n, write)
	if items == nil {
		return out, false
	}
	if len(items) != d.Each {
		r.refuse(n, fmt.Sprintf("has %d items", len(items)), "write "+write)
		return out, false
	}
	good := true
	for i, item := range items {
		one, ok := r.form(item, d, fmt.Sprintf("%s_%d", d.Name, i+1))
		good = good && ok
		out.Each = append(out.Each, one)
	}
	return out, good
}

// form reads a value, a range, steps, choices or `sized`.
func (r *reader) form(n *node, d *KnownDimension, name string) (Dimension, bool) {
	out := Dimension{Name: name, Kind: d.Kind}
	ok := false
	switch {
	case n.shape == text && n.text == "sized":
		out.Form, ok = Sized, d.Sizable
		if !ok {
			r.refuse(n, d.Name+" cannot be sized by the duty", "write a value, [low, high], {from, to, step} or {choices}")
		}
	case n.shape == text && near(n.text, []string{"sized"}) != "" && !strings.ContainsAny(n.text, "0123456789"):
		r.refuse(n, fmt.Sprintf("%q is not a quantity", n.text), "did you mean sized?")
	case n.shape == list:
		out.Form, ok = Ranged, r.dimensionRange(n, d, &out)
	case n.shape == mapping && len(n.entries) > 0:
		ok = r.discrete(n, d, &out)
	case n.shape == text || n.shape == number:
		out.Form = Fixed
		out.Value, ok = r.dimensionValue(n, d)
	default:
		r.wrong(n, d.Kind.Sample()+", [low, high], {from, to, step}, {choices: […]} or sized")
	}
	return out, ok
}

func (r *reader) dimensionValue(n *node, d *KnownDimension) (float64, bool) {
	s := d.sign()
	v, _, ok := r.quantity(n, d.Kind)
	return v, ok && r.signed(n, v, s)
}

func (r *reader) dimensionRange(n *node, d *KnownDimension, out *Dimension) bool {
	if d.Kind == units.Sign {
		r.refuse(n, "a sign has no range", "write 1, -1 or {choices: [-1, 1]}")
		return false
	}
	items := r.items(n, "[low, high]")
	if items == nil {
		return false
	}
	if len(items) != 2 {
		r.refuse(n, fmt.Sprintf("has %d items", len(items)), "write [low, high] or {choices: […]}")
		return false
	}
	low, ok1 := r.dimensionValue(items[0], d)
	high, ok2 := r.dimensionValue(items[1], d)
	out.Low, out.High = low, high
	return ok1 && ok2 && r.rising(n, low, high, items[0].text, items[1].text)
}

// rising refuses an empty or reversed range.
func (r *reader) rising(n *node, low, high float64, a, b string) bool {
	switch {
	case low > high:
		r.refuse(n, fmt.Sprintf("the range runs backwards, from %s to %s", a, b), fmt.Sprintf("write [%s, %s]", b, a))
		return false
	case low == high:
		r.refuse(n, fmt.Sprintf("the range from %s to %s is empty", a, b), "write "+a+" alone to fix it")
		return false
	}
	return true
}

// discrete reads {from, to, step} or {choices}.
func (r *reader) discrete(n *node, d *KnownDimension, out *Dimension) bool {
	before := len(r.faults)
	quantity := func(r *reader, n *node) any {
		if v, ok := r.dimensionValue(n, d); ok {
			return v
		}
		return nil
	}
	if _, ok := n.child("choices"); ok {
		out.Form = Chosen
		m := r.mapping(n, []key{{name: "choices", need: true, read: func(r *reader, n *node) any { return r.choices(n, d) }}})
		out.Choices, _ = m["choices"].([]float64)
		return len(r.faults) == before
	}
	out.Form = Stepped
	keys := []key{
		{name: "from", need: true, read: quantity},
		{name: "to", need: true, read: quantity},
		{name: "step", need: true, read: measured(d.Kind, aboveZero)},
	}
	if f := n.entries[0].name; near(f, []string{"choices"}) != "" {
		keys = []key{{name: "choices", need: true}}
	}
	m := r.mapping(n, keys)
	if len(r.faults) > before {
		return false
	}
	out.Low, out.High, out.Step = m["from"].(float64), m["to"].(float64), m["step"].(float64)
	from, _ := n.child("from")
	to, _ := n.child("to")
	step, _ := n.child("step")
	if !r.rising(n, out.Low, out.High, from.text, to.text) {
		return false
	}
	switch count := (out.High - out.Low) / out.Step; {
	case count < 1-1e-9:
		r.refuse(step, fmt.Sprintf("a step of %s does not fit between %s and %s", step.text, from.text, to.text), "write a smaller step")
	case count > maxSteps:
		r.refuse(step, fmt.Sprintf("%.0f steps are more than %d", math.Floor(count), maxSteps), "write a larger step or [low, high]")
	}
	return len(r.faults) == before
}

func (r *reader) choices(n *node, d *KnownDimension) any {
	items := r.items(n, "a list of values: ["+d.Kind.Sample()+", …]")
	if len(items) > maxChoices {
		r.refuse(n, fmt.Sprintf("has %d items, more than %d", len(items), maxChoices), "write {from, to, step} or [low, high]")
		return nil
	}
	var all []float64
	for _, item := range items {
		v, ok := r.dimensionValue(item, d)
		if ok && slices.Contains(all, v) {
			r.refuse(item, item.text+" is given twice", "name each choice once")
		}
		if ok {
			all = append(all, v)
		}
	}
	return all
}

// Bounds gives the least and the greatest value that the dimension may take, false for one that is
// sized or given per leg.
func (d *Dimension) Bounds() (low, high float64, ok bool) {
	switch d.Form {
	case Fixed:
		return d.Value, d.Value, true
	case Ranged, Stepped:
		return d.Low, d.High, true
	case Chosen:
		if len(d.Choices) > 0 {
			return slices.Min(d.Choices), slices.Max(d.Choices), true
		}
	}
	return 0, 0, false
}
