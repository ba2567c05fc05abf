package brief

import (
	"fmt"
	"path/filepath"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

const (
	maxPoses       = 1_000_000 // of all zones
	maxZones       = 1000
	defaultSamples = 500
	axisSamples    = 25 // of each coordinate that moves alone
)

// zoneKeys are the keys of a zone.
func zoneKeys() []key {
	return []key{
		{name: "name", read: readName},
		{name: Box, read: readRanges},
		{name: Axes, read: readRanges},
		{name: Ellipsoid, read: readRanges},
		{name: Recorded, read: readPoseFile},
		{name: "samples", read: counted(1, maxPoses)},
	}
}

func readName(r *reader, n *node) any {
	s, ok := r.word(n, "a name")
	if !ok {
		return nil
	}
	if len(s) > 200 || strings.ContainsAny(s, "\r\n\t") {
		r.refuse(n, "is no name", "write a short text on one line")
		return nil
	}
	return s
}

func readZones(r *reader, n *node) any {
	items := r.items(n, "a list of zones: [{name: work, box: {z: 100 mm}}]")
	if len(items) > maxZones {
		r.refuse(n, fmt.Sprintf("has %d zones, more than %d", len(items), maxZones), "give recorded poses as a CSV file")
		return nil
	}
	var zones []Zone
	for i, item := range items {
		zones = append(zones, r.zone(item, i))
	}
	if r.samples > maxPoses {
		r.refuse(n, fmt.Sprintf("the zones hold %d poses, more than %d", r.samples, maxPoses), "write smaller samples")
	}
	return zones
}

func (r *reader) zone(n *node, index int) Zone {
	z := Zone{Name: fmt.Sprintf("zone %d", index+1)}
	m := r.mapping(n, zoneKeys())
	if m == nil {
		return z
	}
	if name, ok := m["name"].(string); ok {
		z.Name = name
	}
	if r.zones[z.Name] {
		at, ok := n.child("name")
		if !ok {
			at = n
		}
		r.refuse(at, fmt.Sprintf("a second zone is named %q", z.Name), "give each zone a name of its own")
	}
	r.zones[z.Name] = true
	r.zoneShape(n, m, &z)
	return z
}

// zoneShape takes the one shape that the zone must have, and its samples.
func (r *reader) zoneShape(n *node, m map[string]any, z *Zone) {
	for _, shape := range []string{Box, Axes, Ellipsoid, Recorded} {
		v, ok := n.child(shape)
		switch {
		case ok && z.Shape != "":
			r.refuse(v, fmt.Sprintf("the zone already has %s", z.Shape), "write a zone of its own for each shape")
		case ok:
			z.Shape = shape
		}
	}
	samples, given := n.child("samples")
	switch {
	case z.Shape == "" && near1(n, Box, Axes, Ellipsoid, Recorded):
	case z.Shape == "":
		r.refuse(n, "the zone has no shape", "add one of box, axes, ellipsoid, file")
	case z.Shape == Recorded:
		if given {
			r.refuse(samples, "a file holds its own poses", "leave samples out")
		}
		f, _ := m[Recorded].(poseFile)
		z.File, z.Poses = f.name, f.poses
		r.samples += len(f.poses)
	default:
		z.Ranges, _ = m[z.Shape].([]Range)
		z.Samples = defaultSamples
		if z.Shape == Axes {
			z.Samples = axisSamples * z.Moving()
		}
		if v, ok := m["samples"].(int64); ok {
			z.Samples = int(v)
			r.enough(samples, z)
		}
		r.samples += z.Samples
	}
}

// near1 reports whether a key of the mapping is one of the names misspelt.
func near1(n *node, names ...string) bool {
	for _, e := range n.entries {
		if !contains([]string{"name", "samples"}, e.name) && near(e.name, names) != "" {
			return true
		}
	}
	return false
}

// enough refuses fewer samples than the shape has corners or ends, with its centre.
func (r *reader) enough(n *node, z *Zone) {
	moving := z.Moving()
	if moving == 0 {
		return
	}
	need, what := 0, ""
	switch z.Shape {
	case Box:
		need, what = 1<<moving+1, "the corners and the centre of the box"
	case Ellipsoid:
		need, what = 2*moving+1, "the centre of the ellipsoid and the ends of its axes"
	case Axes:
		need, what = 2*moving, "the ends of every excursion"
	}
	if z.Samples < need {
		r.refuse(n, fmt.Sprintf("%s poses do not hold %s", n.text, what), fmt.Sprintf("write %d or more", need))
	}
}

// readRanges reads the coordinates of a zone into []Range in their fixed order.
func readRanges(r *reader, n *node) any {
	if !r.isMapping(n, "coordinates: {z: 100 mm, yaw: [-10 deg, 30 deg]}") {
		return nil
	}
	r.strangers(n, coordinates[:])
	var out []Range
	for i, name := range coordinates {
		v, ok := n.child(name)
		if !ok {
			continue
		}
		for _, f := range r.families {
			if !f.has(name) {
				r.fault(v.key, v.path, fmt.Sprintf("%s does not move in %s", f.Name, name), "its coordinates are "+strings.Join(f.Freedoms, ", "))
			}
		}
		low, high, ok := r.excursion(v, coordinateKind(i))
		if ok && i >= 3 && (low < -halfTurn || high > halfTurn) {
			r.refuse(v, "reaches beyond half a turn", "write angles from -180 deg to 180 deg")
			continue
		}
		if ok {
			out = append(out, Range{name, i, low, high})
		}
	}
	return out
}

// excursion reads a single number as ±, a pair as it stands.
func (r *reader) excursion(n *node, k units.Kind) (low, high float64, ok bool) {
	if n.shape != list {
		v, _, ok := r.quantity(n, k)
		if ok && v < 0 {
			r.refuse(n, "a single number stands for both directions and is not negative", fmt.Sprintf("write %s, or [%s, 0 %s] for one direction", strings.TrimPrefix(n.text, "-"), n.text, k.SI()))
			return 0, 0, false
		}
		return -v + 0, v, ok
	}
	var pair [2]float64
	if !r.fill(n, pair[:], k, anySign) {
		return 0, 0, false
	}
	if pair[0] > pair[1] {
		a, b := n.items[0].text, n.items[1].text
		r.refuse(n, fmt.Sprintf("the range runs backwards, from %s to %s", a, b), fmt.Sprintf("write [%s, %s]", b, a))
		return 0, 0, false
	}
	return pair[0], pair[1], true
}

// poseFile is a pose file with what it holds.
type poseFile struct {
	name  string
	poses [][6]float64
}

// readPoseFile reads the poses of a file named relative to the brief.
func readPoseFile(r *reader, n *node) any {
	name, ok := r.word(n, "the name of a CSV file")
	if !ok {
		return nil
	}
	path := name
	if !filepath.IsAbs(path) {
		path = filepath.Join(filepath.Dir(r.places.file), path)
	}
	data, err := readFile(path, maxPoseFile)
	if err != nil {
		r.refuse(n, err.Error(), "write the path of a pose file, relative to this file")
		return nil
	}
	poses, faults := parsePoses(path, data, r.families)
	r.faults = append(r.faults, faults...)
	return poseFile{name, poses}
}
