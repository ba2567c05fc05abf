package brief

import (
	"fmt"
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

const maxCases = 1000 // also of loads in a case

// caseKeys are the keys of a case.
func caseKeys() []key {
	return []key{
		{name: "name", read: readName},
		{name: "loads", read: readLoads},
		{name: "speeds", read: readSpeeds},
		{name: "zones", read: readCaseZones},
	}
}

func readCases(r *reader, n *node) any {
	items := r.items(n, "a list of cases: [{name: running, loads: […]}]")
	if len(items) > maxCases {
		r.refuse(n, fmt.Sprintf("has %d cases, more than %d", len(items), maxCases), "keep the ones that matter")
		return nil
	}
	var cases []Case
	seen := map[string]bool{}
	for i, item := range items {
		c := Case{Name: fmt.Sprintf("case %d", i+1), Speeds: still()}
		m := r.mapping(item, caseKeys())
		take(m, "name", &c.Name)
		take(m, "loads", &c.Loads)
		take(m, "speeds", &c.Speeds)
		take(m, "zones", &c.Zones)
		if seen[c.Name] {
			r.refuse(item, fmt.Sprintf("a second case is named %q", c.Name), "give each case a name of its own")
		}
		seen[c.Name] = true
		cases = append(cases, c)
	}
	return cases
}

// take copies the value of a key, if it was read.
func take[T any](m map[string]any, name string, dst *T) {
	if v, ok := m[name].(T); ok {
		*dst = v
	}
}

func readCaseZones(r *reader, n *node) any {
	all := []string{}
	for z := range r.zones {
		all = append(all, z)
	}
	slices.Sort(all)
	var out []string
	items := r.items(n, "a list of zone names")
	if len(items) > len(all) {
		r.refuse(n, fmt.Sprintf("has %d names for %d zones", len(items), len(all)), "name each zone once")
		return nil
	}
	for _, item := range items {
		name, ok := r.oneOf(item, "zone", all)
		if ok && slices.Contains(out, name) {
			r.refuse(item, fmt.Sprintf("%q is given twice", name), "name each zone once")
		}
		if ok {
			out = append(out, name)
		}
	}
	return out
}

// loadKeys are the keys of a load.
func loadKeys() []key {
	return []key{
		{name: "name", read: readName},
		{name: "mass", read: measured(units.Mass, aboveZero)},
		{name: "centre", read: triple(units.Length, anySign)},
		{name: "inertia", read: readInertia},
		{name: "acceleration", read: readAcceleration},
		{name: "force", read: triple(units.Force, anySign)},
		{name: "force_spread", read: triple(units.Force, notNegative)},
		{name: "moment", read: triple(units.Torque, anySign)},
		{name: "moment_spread", read: triple(units.Torque, notNegative)},
		{name: "at", read: triple(units.Length, anySign)},
	}
}

func readLoads(r *reader, n *node) any {
	items := r.items(n, "a list of loads: [{mass: 40 kg, centre: [0 mm, 0 mm, 0 mm]}]")
	if len(items) > maxCases {
		r.refuse(n, fmt.Sprintf("has %d loads, more than %d", len(items), maxCases), "gather them")
		return nil
	}
	var loads []CaseLoad
	for i, item := range items {
		l := CaseLoad{Name: fmt.Sprintf("load %d", i+1), Acceleration: Acceleration{Linear: none(), Angular: none()}}
		m := r.mapping(item, loadKeys())
		take(m, "name", &l.Name)
		take(m, "mass", &l.Mass)
		take(m, "centre", &l.Centre)
		take(m, "inertia", &l.Inertia)
		take(m, "acceleration", &l.Acceleration)
		take(m, "force", &l.Force)
		take(m, "force_spread", &l.ForceSpread)
		take(m, "moment", &l.Moment)
		take(m, "moment_spread", &l.MomentSpread)
		if at, ok := m["at"].([3]float64); ok {
			l.At = &at
		}
		if m != nil {
			r.loadWhole(item)
		}
		loads = append(loads, l)
	}
	return loads
}

// loadWhole refuses keys of a load that do nothing without another.
func (r *reader) loadWhole(n *node) {
	has := func(names ...string) bool {
		return slices.ContainsFunc(n.entries, func(e entry) bool { return contains(names, e.name) })
	}
	acts := has("mass", "force", "force_spread", "moment", "moment_spread")
	if !acts {
		r.refuse(n, "the load neither has a mass nor applies a force or a moment", "add mass, force or moment")
		return
	}
	for _, name := range []string{"centre", "inertia", "acceleration"} {
		if v, ok := n.child(name); ok && !has("mass") {
			r.fault(v.key, v.path, "does nothing without mass", "add mass or leave it out")
		}
	}
	if v, ok := n.child("at"); ok && !has("force", "force_spread") {
		r.fault(v.key, v.path, "does nothing without force", "add force or leave it out")
	}
}

// readInertia reads three or six terms of an inertia tensor.
func readInertia(r *reader, n *node) any {
	write := "[xx, yy, zz] or [xx, yy, zz, xy, xz, yz], each as 40 kg m2"
	items := r.items(n, write)
	if items == nil {
		return nil
	}
	if len(items) != 3 && len(items) != 6 {
		r.refuse(n, fmt.Sprintf("has %d items", len(items)), "write "+write)
		return nil
	}
	var t [6]float64
	good := true
	for i, item := range items {
		v, _, ok := r.quantity(item, units.Inertia)
		good = good && ok
		t[i] = v
	}
	if !good {
		return nil
	}
	if !possible(t) {
		r.refuse(n, "no body has this inertia", "its principal moments must not be negative: check signs and products")
		return nil
	}
	return t
}

// possible reports whether the tensor xx yy zz xy xz yz is positive semidefinite, by its principal
// minors, within rounding.
func possible(t [6]float64) bool {
	xx, yy, zz, xy, xz, yz := t[0], t[1], t[2], t[3], t[4], t[5]
	s := max(xx, yy, zz)
	if s == 0 {
		return t == [6]float64{}
	}
	if !(s > 0) {
		return false
	}
	xx, yy, zz, xy, xz, yz = xx/s, yy/s, zz/s, xy/s, xz/s, yz/s
	const rounding = 1e-12
	det := xx*(yy*zz-yz*yz) - xy*(xy*zz-yz*xz) + xz*(xy*yz-yy*xz)
	return min(xx+yy-zz, yy+zz-xx, zz+xx-yy) >= -rounding && // each is twice a sum of m·x²
		min(xx, yy, zz) >= 0 &&
		min(xx*yy-xy*xy, xx*zz-xz*xz, yy*zz-yz*yz, det) >= -rounding
}

func none() Set { return Set{Kind: NoSet} }

func still() Speeds { return Speeds{Linear: none(), Angular: none()} }

func accelerationKeys() []key {
	return []key{
		{name: "linear", read: readSet(units.Acceleration)},
		{name: "angular", read: readSet(units.AngularAcceleration)},
		{name: "at", read: func(r *reader, n *node) any {
			_, ok := r.oneOf(n, "point", []string{"tool"})
			return ok
		}},
	}
}

func readAcceleration(r *reader, n *node) any {
	m := r.mapping(n, accelerationKeys())
	a := Acceleration{Linear: none(), Angular: none()}
	take(m, "linear", &a.Linear)
	take(m, "angular", &a.Angular)
	take(m, "at", &a.AtTool)
	if m != nil {
		r.needOne(n, "linear", "angular")
	}
	return a
}

func speedKeys() []key {
	return []key{
		{name: "linear", read: readSet(units.Speed)},
		{name: "angular", read: readSet(units.AngularSpeed)},
	}
}

func readSpeeds(r *reader, n *node) any {
	m := r.mapping(n, speedKeys())
	s := still()
	take(m, "linear", &s.Linear)
	take(m, "angular", &s.Angular)
	if m != nil {
		r.needOne(n, "linear", "angular")
		r.possibleSpeeds(n)
	}
	return s
}

// needOne refuses a mapping without any of the keys.
func (r *reader) needOne(n *node, names ...string) {
	for _, e := range n.entries {
		if contains(names, e.name) || near(e.name, names) != "" {
			return
		}
	}
	r.refuse(n, "holds none of "+strings.Join(names, ", "), "add one of them")
}

// possibleSpeeds refuses angular speeds where no family turns.
func (r *reader) possibleSpeeds(n *node) {
	v, ok := n.child("angular")
	if !ok || len(r.families) == 0 {
		return
	}
	for _, f := range r.families {
		if f.has("roll") || f.has("pitch") || f.has("yaw") {
			return
		}
	}
	r.fault(v.key, v.path, "the platform of "+r.familyList()+" does not turn", "leave angular out")
}

// readSet reads a magnitude in any direction, or ± on each base axis.
func readSet(k units.Kind) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		if n.shape == list {
			half, ok := r.vector(n, k, notNegative)
			switch {
			case !ok:
				return nil
			case half == [3]float64{}:
				return none()
			}
			return Set{Kind: BoxSet, Half: half}
		}
		v, _, ok := r.quantity(n, k)
		switch {
		case !ok || !r.signed(n, v, notNegative):
			return nil
		case v == 0:
			return none()
		}
		return Set{Kind: BallSet, Radius: v}
	}
}
