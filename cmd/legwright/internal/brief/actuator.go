package brief

import (
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

const (
	maxStrokes = 1000
	halfTurn   = 3.141592653589793
)

// actuatorKeys are the keys under actuator.
func actuatorKeys() []key {
	return []key{
		{name: "dead_length", read: pushing(measured(units.Length, notNegative))},
		{name: "dead_ratio", read: pushing(measured(units.Ratio, aboveZero))},
		{name: "reserve", read: driven(units.Length, units.Angle, notNegative)},
		{name: "strokes", read: pushing(readStrokes)},
		{name: "push", read: pushing(measured(units.Force, aboveZero))},
		{name: "pull", read: pushing(measured(units.Force, aboveZero))},
		{name: "torque", read: turning(measured(units.Torque, aboveZero))},
		{name: "speed", read: driven(units.Speed, units.AngularSpeed, aboveZero)},
		{name: "power", read: measured(units.Power, aboveZero)},
		{name: "stiffness", read: driven(units.Stiffness, units.TurnStiffness, aboveZero)},
		{name: "error", read: driven(units.Length, units.Angle, aboveZero)},
	}
}

// readActuator reads the section; a value for actuators that turn goes to its turn_ key.
func readActuator(r *reader, n *node) any {
	m := r.mapping(n, actuatorKeys())
	if m == nil {
		return nil
	}
	for name, v := range m {
		d, ok := v.(drivenValue)
		if !ok {
			continue
		}
		delete(m, name)
		if d.push != nil {
			m[name] = *d.push
		}
		if d.turn != nil {
			m["turn_"+name] = *d.turn
		}
	}
	r.dead.note(m)
	if ratio, ok := n.child("dead_ratio"); ok {
		if _, ok := n.child("dead_length"); !ok {
			r.refuse(ratio, "does nothing without dead_length", "add dead_length or leave dead_ratio out")
		}
	}
	return m
}

// drives tells which kinds of actuator the families have; both if no family is known.
func (r *reader) drives() (push, turn bool) {
	for _, f := range r.families {
		push = push || !f.Rotary
		turn = turn || f.Rotary
	}
	return push || !turn, turn || !push
}

func (r *reader) familyList() string {
	var s []string
	for _, f := range r.families {
		s = append(s, f.Name)
	}
	return strings.Join(s, ", ")
}

// pushing reads a key that only families with linear actuators have.
func pushing(read func(*reader, *node) any) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		if push, _ := r.drives(); !push {
			r.refuse(n, "the actuators of "+r.familyList()+" turn", "leave it out (torque is their rating)")
			return nil
		}
		return read(r, n)
	}
}

// turning reads a key that only families with rotary actuators have.
func turning(read func(*reader, *node) any) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		if _, turn := r.drives(); !turn {
			r.refuse(n, "the actuators of "+r.familyList()+" push", "write push and pull instead")
			return nil
		}
		return read(r, n)
	}
}

// drivenValue is a quantity for actuators that push, for those that turn, or both.
type drivenValue struct{ push, turn *float64 }

// driven reads a quantity whose unit depends on whether actuators push or turn. Where families of
// both sorts compete it takes a list of two, one for each sort.
func driven(push, turn units.Kind, s sign) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		var kinds []units.Kind
		p, t := r.drives()
		if p {
			kinds = append(kinds, push)
		}
		if t {
			kinds = append(kinds, turn)
		}
		items := []*node{n}
		if n.shape == list && len(kinds) == 2 {
			items = r.items(n, "one value for actuators that push and one for those that turn")
		}
		var out drivenValue
		for _, item := range items {
			v, k, ok := r.quantity(item, kinds...)
			if !ok || !r.signed(item, v, s) {
				return nil
			}
			slot := &out.push
			if k == turn {
				slot = &out.turn
			}
			if *slot != nil {
				r.refuse(item, "a second "+k.String(), "write one value for each sort of actuator")
				return nil
			}
			*slot = &v
		}
		if len(r.families) > 0 && len(kinds) == 2 && (out.push == nil || out.turn == nil) {
			r.refuse(n, "some families here have actuators that push, some that turn",
				"write both: ["+push.Sample()+", "+turn.Sample()+"]")
			return nil
		}
		return out
	}
}

func readStrokes(r *reader, n *node) any {
	items := r.items(n, "a list of lengths: [200 mm, 300 mm]")
	if len(items) > maxStrokes {
		r.refuse(n, "has more strokes than can be told apart", "write at most 1000")
		return nil
	}
	for _, item := range items {
		v, _, ok := r.quantity(item, units.Length)
		if !ok || !r.signed(item, v, aboveZero) {
			continue
		}
		if slices.Contains(r.strokes, v) {
			r.refuse(item, item.text+" is given twice", "name each stroke once")
			continue
		}
		r.strokes = append(r.strokes, v)
	}
	slices.Sort(r.strokes)
	return r.strokes
}

// jointKeys are the keys under joints.
func jointKeys() []key {
	return []key{
		{name: "base_swing", read: readSwing},
		{name: "platform_swing", read: readSwing},
		{name: "axis", read: readAxis},
		{name: "stiffness", read: measured(units.Stiffness, aboveZero)},
	}
}

func readSwing(r *reader, n *node) any {
	v, _, ok := r.quantity(n, units.Angle)
	if !ok || !r.signed(n, v, aboveZero) {
		return nil
	}
	if v > halfTurn {
		r.refuse(n, n.text+" is more than half a turn", "write the half angle of the cone, at most 180 deg")
		return nil
	}
	return v
}

func readAxis(r *reader, n *node) any {
	if n.shape != list {
		if s, ok := r.oneOf(n, "axis", []string{"home_leg", "plate"}); ok {
			return Axis{Kind: s}
		}
		return nil
	}
	v, ok := r.vector(n, units.Ratio, anySign)
	if !ok {
		return nil
	}
	if v == [3]float64{} {
		r.refuse(n, "the vector has no direction", "write a vector that is not zero, as [0, 0, 1]")
		return nil
	}
	return Axis{Kind: "vector", Vector: v}
}

// readLegs reads the section under legs.
func readLegs(r *reader, n *node) any {
	m := r.mapping(n, legKeys())
	_, rod := n.child("rod_diameter")
	_, modulus := n.child("modulus")
	if m != nil && rod && !modulus {
		r.fault(n.key, n.path+".modulus", "is missing beside rod_diameter", "add modulus: 210 GPa, or leave rod_diameter out")
	}
	if m != nil && modulus && !rod {
		r.fault(n.key, n.path+".rod_diameter", "is missing beside modulus", "add rod_diameter: 30 mm, or leave modulus out")
	}
	if m == nil {
		return nil
	}
	return m
}

func legKeys() []key {
	return []key{
		{name: "diameter", read: measured(units.Length, notNegative)},
		{name: "rod_diameter", read: measured(units.Length, aboveZero)},
		{name: "crank_diameter", read: measured(units.Length, aboveZero)},
		{name: "modulus", read: measured(units.Pressure, aboveZero)},
		{name: "end_fixity", read: measured(units.Ratio, aboveZero)},
	}
}
