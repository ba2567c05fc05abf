package brief

import (
	"fmt"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

// standardGravity in m/s² (3rd CGPM, 1901).
const standardGravity = 9.80665

// briefKeys are the keys at the top of a brief, in the order in which they are read: families before
// dimensions, zones before cases, goals before weights.
func briefKeys() []key {
	return []key{
		{name: "title", read: readTitle},
		{name: "family", need: true, read: readFamily},
		{name: "mount", read: readMount},
		{name: "gravity", read: readGravity},
		{name: "tool", read: triple(units.Length, anySign)},
		{name: "dimensions", need: true, read: func(_ *reader, n *node) any { return n }},
		{name: "actuator", read: readActuator},
		{name: "joints", keys: jointKeys()},
		{name: "legs", read: readLegs},
		{name: "characteristic_length", read: readCharacteristicLength},
		{name: "singular_below", read: ratio(0, 1)},
		{name: "duty", need: true, keys: []key{
			{name: "zones", need: true, read: readZones},
			{name: "cases", read: readCases},
		}},
		{name: "goals", need: true, read: readGoals},
		{name: "limits", read: readLimits},
		{name: "ranking", keys: []key{{name: "weights", need: true, read: readWeights}}},
		{name: "search", keys: searchKeys()},
	}
}

// brief reads the whole tree into the values that viper then merges with the defaults.
func (r *reader) brief(n *node) map[string]any {
	m := r.mapping(n, briefKeys())
	if m == nil {
		return nil
	}
	fs, _ := m["family"].(families)
	var out []Family
	if dims, ok := m["dimensions"].(*node); ok {
		out = r.dimensions(dims, fs)
	}
	delete(m, "dimensions")
	m["family"] = out
	mount, _ := m["mount"].(string)
	g, ok := m["gravity"].(gravity)
	if !ok {
		g.size = standardGravity
	}
	m["gravity"] = g.vector(mount)
	r.strokesFit(out)
	r.needs()
	r.weigh(m)
	return m
}

// weigh gives every goal without a weight the weight 1, and refuses weights that are all 0.
func (r *reader) weigh(m map[string]any) {
	ranking, _ := m["ranking"].(map[string]any)
	given, _ := ranking["weights"].(map[string]float64)
	weights := map[string]float64{}
	sum := 0.0
	for _, name := range r.goalNames() {
		w, ok := given[name]
		if !ok {
			w = 1
		}
		weights[name] = w
		sum += w
	}
	if sum == 0 && len(given) > 0 && len(given) == len(weights) {
		r.fault(r.places.find("ranking.weights"), "ranking.weights", "every weight is 0", "give at least one goal a weight above 0")
	}
	m["ranking"] = map[string]any{"weights": weights}
}

func readTitle(r *reader, n *node) any {
	s, ok := r.word(n, "a text (in quotes if it looks like a number or a date)")
	if !ok {
		return nil
	}
	if len(s) > 1000 {
		r.refuse(n, "is longer than a title", "write at most 1000 characters")
		return nil
	}
	return s
}

const (
	floor   = "floor"
	ceiling = "ceiling"
)

func readMount(r *reader, n *node) any {
	if s, ok := r.oneOf(n, "mount", []string{floor, ceiling}); ok {
		return s
	}
	return nil
}

// gravity is a size towards the floor or a vector in base axes.
type gravity struct {
	size    float64
	given   [3]float64
	isGiven bool
}

// vector is gravity in base axes; z points from base to platform, which is down under a ceiling.
func (g gravity) vector(mount string) [3]float64 {
	switch {
	case g.isGiven:
		return g.given
	case mount == ceiling:
		return [3]float64{0, 0, g.size}
	}
	return [3]float64{0, 0, -g.size + 0}
}

func readGravity(r *reader, n *node) any {
	if n.shape == list {
		if v, ok := r.vector(n, units.Acceleration, anySign); ok {
			return gravity{given: v, isGiven: true}
		}
		return nil
	}
	if v, _, ok := r.quantity(n, units.Acceleration); ok && r.signed(n, v, notNegative) {
		return gravity{size: v}
	}
	return nil
}

const platformRadius = "platform_radius"

func readCharacteristicLength(r *reader, n *node) any {
	if n.shape != text || blank(n.text) || strings.ContainsAny(n.text, "0123456789") {
		if v, _, ok := r.quantity(n, units.Length); ok && r.signed(n, v, aboveZero) {
			return Length{"value", v}
		}
		return nil
	}
	s, ok := r.oneOf(n, "characteristic length", []string{platformRadius, "duty"})
	if !ok {
		return nil
	}
	for _, f := range r.families {
		if _, has := f.Dimension(platformRadius); s == platformRadius && !has {
			r.refuse(n, f.Name+" has no platform_radius", "write a length or duty")
			return nil
		}
	}
	return Length{Kind: s}
}

// deadLength is what of the actuator a leg must hold beside its stroke.
type deadLength struct {
	given         bool
	length, ratio float64
}

func (d *deadLength) note(m map[string]any) {
	d.length, d.given = m["dead_length"].(float64)
	d.ratio = 1
	take(m, "dead_ratio", &d.ratio)
}

// strokesFit refuses ranges in which no leg is long enough for its own actuator.
func (r *reader) strokesFit(fs []Family) {
	if !r.dead.given {
		return
	}
	for _, f := range fs {
		var longest, shortest float64
		var known int
		for _, d := range f.Dimensions {
			low, high, ok := d.Bounds()
			switch {
			case d.Name == "leg_min" && ok:
				longest = high
				known++
			case d.Name == "stroke" && d.Form == Sized && len(r.strokes) > 0:
				shortest = r.strokes[0]
				known++
			case d.Name == "stroke" && ok:
				shortest = low
				known++
			}
		}
		need := r.dead.ratio*shortest + r.dead.length
		if known < 2 || longest >= need*(1-1e-9) {
			continue
		}
		path := "dimensions.leg_min"
		if _, ok := r.places.at["dimensions."+f.Name+".leg_min"]; ok {
			path = "dimensions." + f.Name + ".leg_min"
		}
		r.fault(r.places.find(path), path,
			fmt.Sprintf("no leg fits: even at its greatest, %s, leg_min is below dead_ratio · stroke + dead_length, at least %s",
				units.Format(longest, units.Length, 6), units.Format(need, units.Length, 6)),
			"raise leg_min, lower stroke or dead_length, or let leg_min be sized")
	}
}
