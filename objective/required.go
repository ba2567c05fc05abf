package objective

import (
	"slices"

	"legwright/kin"
)

// Extent is the least box that holds all required poses.
func (t *Task) Extent() (low, high kin.Coords) {
	for i := range t.samples {
		for k, v := range t.samples[i].Coords {
			if i == 0 || v < low[k] {
				low[k] = v
			}
			if i == 0 || v > high[k] {
				high[k] = v
			}
		}
	}
	return low, high
}

// Scouted lists the coordinates of the required poses that lie farthest out, at most `most`.
func (t *Task) Scouted(most int) []kin.Coords {
	var out []kin.Coords
	for i := range t.samples[:min(t.scouts, most)] {
		out = append(out, t.samples[i].Coords)
	}
	return out
}

// coords are the poses of a zone in the order of generation or of the file.
func (t *Task) coords(zone int) []kin.Coords {
	var in []Sample
	for i := range t.samples {
		if t.samples[i].Zone == zone {
			in = append(in, t.samples[i])
		}
	}
	slices.SortStableFunc(in, func(a, b Sample) int { return a.Row - b.Row })
	out := make([]kin.Coords, len(in))
	for i := range in {
		out[i] = in[i].Coords
	}
	return out
}
