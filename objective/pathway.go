package objective

import (
	"math"
	"slices"

	"legwright/kin"
)

// Way is a closed path through required poses, about home: it begins and ends at home.
type Way struct {
	Coords   []kin.Coords
	Required []int // places of the required poses, and of home; the others lie on straight lines between these
}

// tourStops is how many poses of the boxes and ellipsoids of a duty a Way visits.
const tourStops = 24

// Pathway leads through required poses in an order that makes the motion smooth, in at most `most`
// steps (40 at least). It visits the zones one after the other, from home and back. Of boxes and ellipsoids it
// takes the poses that lie farthest from home and from each other (T. F. Gonzalez 1985, Theoretical Computer Science
// 38:293), by a short tour: nearest neighbour, then exchanges of two edges (G. A. Croes 1958, Operations
// Research 6:791; both from memory). Zones of single excursions are followed axis by axis,
// recorded poses in their own order, evenly thinned out where there are too many. Distances are
// those of coordinates over their ranges. Poses between those of different zones, and between recorded ones, need not be
// reachable.
func Pathway(t *Task, most int) *Way {
	if most < 40 {
		panic("objective: a path of too few poses")
	}
	low, high := t.Extent()
	var span kin.Coords
	for k := range span {
		if span[k] = high[k] - low[k]; span[k] == 0 {
			span[k] = math.Abs(high[k])
		}
		if span[k] == 0 {
			span[k] = 1
		}
	}
	var tours, listed int
	for z := range t.Zones {
		switch t.Zones[z].Kind {
		case Box, Ellipsoid:
			tours++
		case Listed:
			listed++
		}
	}
	stops := make([][]kin.Coords, len(t.Zones))
	taken := 2
	for z := range t.Zones {
		switch zone := &t.Zones[z]; zone.Kind {
		case Box, Ellipsoid:
			stops[z] = tour(outermost(t.coords(z), max(2, tourStops/tours), &span), &span)
		case Axes:
			stops[z] = excursions(zone)
		}
		taken += 1 + len(stops[z])
	}
	for z := range t.Zones {
		if t.Zones[z].Kind == Listed {
			stops[z] = thinned(t.coords(z), max(2, (most-taken)/listed-1))
		}
	}
	w := &Way{}
	var all []kin.Coords
	all = append(all, kin.Coords{})
	for z := range stops {
		all = append(all, stops[z]...)
		all = append(all, kin.Coords{})
	}
	all = slices.Compact(all)
	if len(all) > most { // many zones
		all = append(thinned(all[:len(all)-1], most-1), kin.Coords{})
	}
	w.fill(all, most, &span)
	return w
}

// fill puts poses between the stops, in proportion to the distances.
func (w *Way) fill(stops []kin.Coords, most int, span *kin.Coords) {
	total := 0.0
	for i := 1; i < len(stops); i++ {
		total += distance(&stops[i-1], &stops[i], span)
	}
	spare := float64(most - len(stops))
	for i := range stops {
		if i > 0 && total > 0 {
			a, b := &stops[i-1], &stops[i]
			n := int(spare * distance(a, b, span) / total)
			for k := 1; k <= n; k++ {
				var c kin.Coords
				for q := range c {
					c[q] = a[q] + (b[q]-a[q])*float64(k)/float64(n+1)
				}
				w.Coords = append(w.Coords, c)
			}
		}
		w.Required = append(w.Required, len(w.Coords))
		w.Coords = append(w.Coords, stops[i])
	}
}

// distance is that of coordinates over their ranges.
func distance(a, b, span *kin.Coords) float64 {
	sum := 0.0
	for k := range a {
		d := (a[k] - b[k]) / span[k]
		sum += d * d
	}
	return math.Sqrt(sum)
}

// outermost takes n poses, each the farthest from home and from those before it.
func outermost(all []kin.Coords, n int, span *kin.Coords) []kin.Coords {
	near := make([]float64, len(all))
	for i := range all {
		near[i] = distance(&all[i], &kin.Coords{}, span)
	}
	var out []kin.Coords
	for len(out) < min(n, len(all)) {
		at := 0
		for i := range near {
			if near[i] > near[at]*(1+Tolerance) { // not by rounding
				at = i
			}
		}
		if near[at] == 0 && len(out) > 0 {
			break
		}
		out = append(out, all[at])
		for i := range all {
			near[i] = math.Min(near[i], distance(&all[i], &all[at], span))
		}
	}
	return out
}

// tour orders poses so that the way from home through all of them and back is short.
func tour(stops []kin.Coords, span *kin.Coords) []kin.Coords {
	path := []kin.Coords{{}}
	left := slices.Clone(stops)
	for len(left) > 0 {
		last, at := &path[len(path)-1], 0
		for i := range left {
			if distance(last, &left[i], span) < distance(last, &left[at], span)*(1-Tolerance) {
				at = i
			}
		}
		path = append(path, left[at])
		left = slices.Delete(left, at, at+1)
	}
	path = append(path, kin.Coords{})
	for better := true; better; {
		better = false
		for i := 1; i < len(path)-2; i++ {
			for j := i + 1; j < len(path)-1; j++ {
				was := distance(&path[i-1], &path[i], span) + distance(&path[j], &path[j+1], span)
				now := distance(&path[i-1], &path[j], span) + distance(&path[i], &path[j+1], span)
				if now < was*(1-1e-9) {
					slices.Reverse(path[i : j+1])
					better = true
				}
			}
		}
	}
	return path[1 : len(path)-1]
}

// excursions goes to both ends of each axis of a zone, by way of its middle.
func excursions(z *Zone) []kin.Coords {
	out := []kin.Coords{z.fixed()}
	for _, q := range z.moving() {
		for _, end := range [2]float64{z.Low[q], z.High[q]} {
			c := z.fixed()
			c[q] = end
			out = append(out, c, z.fixed())
		}
	}
	return out
}

// thinned keeps n of the poses at even distances in their order, the first and the last among them.
func thinned(all []kin.Coords, n int) []kin.Coords {
	if len(all) <= n {
		return all
	}
	out := make([]kin.Coords, n)
	for i := range out {
		out[i] = all[i*(len(all)-1)/(n-1)]
	}
	return out
}
