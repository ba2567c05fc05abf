package brief

import (
	"fmt"

	"legwright/cmd/legwright/internal/units"
)

// outrightJointKeys are the keys under joints of a design file.
func outrightJointKeys() []key {
	return []key{{name: "base", read: readPoints}, {name: "platform", need: true, read: readPoints}}
}

// readOutright reads joint centres.
func readOutright(r *reader, n *node) any {
	for _, f := range r.families {
		if f.Legs == 0 {
			r.fault(n.key, n.path, "the joints of "+f.Name+" cannot be given outright", "write its dimensions instead")
			return nil
		}
	}
	m := r.mapping(n, outrightJointKeys())
	var j DesignJoints
	take(m, "base", &j.Base)
	take(m, "platform", &j.Platform)
	return j
}

// readPoints reads one point for each leg.
func readPoints(r *reader, n *node) any {
	var points [][3]float64
	items := r.items(n, "a list of points: [[650 mm, 0 mm, 0 mm], …]")
	for _, item := range items {
		p, ok := r.vector(item, units.Length, anySign)
		if !ok {
			continue
		}
		points = append(points, p)
	}
	if items == nil || !r.perLeg(n, len(items)) {
		return nil
	}
	return points
}

// perLeg refuses a number of items other than that of the legs.
func (r *reader) perLeg(n *node, count int) bool {
	for _, f := range r.families {
		if f.Legs != 0 && count != f.Legs {
			r.refuse(n, fmt.Sprintf("has %d items", count), fmt.Sprintf("write one for each leg, %d in all", f.Legs))
			return false
		}
	}
	return true
}

// readHome reads platform origin and roll, pitch, yaw at home.
func readHome(r *reader, n *node) any {
	write := "[x, y, z, roll, pitch, yaw], as [0 mm, 0 mm, 650 mm, 0 deg, 0 deg, 12 deg]"
	items := r.items(n, write)
	if items == nil {
		return nil
	}
	if len(items) != 6 {
		r.refuse(n, fmt.Sprintf("has %d items", len(items)), "write "+write)
		return nil
	}
	var h [6]float64
	good := true
	for i, item := range items {
		v, _, ok := r.quantity(item, coordinateKind(i))
		good = good && ok
		h[i] = v
	}
	if !good {
		return nil
	}
	return h
}

func railKeys() []key {
	return []key{
		{name: "point", need: true, read: triple(units.Length, anySign)},
		{name: "direction", need: true, read: readDirection},
	}
}

func readDirection(r *reader, n *node) any {
	v, ok := r.vector(n, units.Ratio, anySign)
	if !ok {
		return nil
	}
	if v == [3]float64{} {
		r.refuse(n, "the vector has no direction", "write a vector that is not zero, as [0, 0, 1]")
		return nil
	}
	return v
}

// readRails reads the rail of each leg.
func readRails(r *reader, n *node) any {
	for _, f := range r.families {
		if !f.Rails {
			r.fault(n.key, n.path, f.Name+" takes no rails outright", "leave rails out")
			return nil
		}
	}
	items := r.items(n, "a list of rails: [{point: [650 mm, 0 mm, 0 mm], direction: [0, 0, 1]}, …]")
	if items == nil || !r.perLeg(n, len(items)) {
		return nil
	}
	var rails []Rail
	for _, item := range items {
		var rail Rail
		m := r.mapping(item, railKeys())
		take(m, "point", &rail.Point)
		take(m, "direction", &rail.Direction)
		rails = append(rails, rail)
	}
	return rails
}
