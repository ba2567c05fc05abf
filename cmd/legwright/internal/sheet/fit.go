package sheet

import (
	"encoding/json"
	"slices"
)

// Fit makes the data small enough, as far as it can, without touching the designs kept: first designs that are not on the
// first screen lose their plans, which lie in the study folder too, the last of them first; then designs that are not
// shown in full lose the poses that decide none of the goals; then unmarked designs lose all maps but one, then their detail.
// The page shows the command that brings it back.
func Fit(d *Data, bytes int, keep []string) {
	designs := d.Designs
	d.Designs = []Design{}
	total := size(d) - 1 // one comma less than designs
	d.Designs = designs
	sizes := make([]int, len(designs))
	for i := range designs {
		sizes[i] = size(&designs[i]) + 1
		total += sizes[i]
	}
	shrink := func(i int, by func(*Design)) {
		by(&designs[i])
		n := size(&designs[i]) + 1
		total += n - sizes[i]
		sizes[i] = n
	}
	first := func(i int) bool { return slices.ContainsFunc(d.First, func(f First) bool { return f.Design == i }) }
	for i := len(designs) - 1; i >= 0 && total > bytes; i-- {
		if v := &designs[i]; v.Detail != nil && v.Detail.Handover != nil && !first(i) && !slices.Contains(keep, v.ID) {
			shrink(i, func(v *Design) { v.Detail.Handover.Base, v.Detail.Handover.Platform = nil, nil })
		}
	}
	for i := len(designs) - 1; i >= 0 && total > bytes; i-- {
		if designs[i].Detail == nil {
			shrink(i, func(v *Design) { v.thin(d.Goals) })
		}
	}
	for _, by := range []func(*Design){
		func(v *Design) { v.Detail.Maps = v.Detail.Maps[:min(1, len(v.Detail.Maps))] },
		func(v *Design) { v.Detail = nil },
	} {
		for i := len(designs) - 1; i >= 0 && total > bytes; i-- {
			if v := &designs[i]; v.Detail != nil && len(v.Marks) == 0 && !slices.Contains(keep, v.ID) {
				shrink(i, by)
			}
		}
	}
}

func size(v any) int {
	b, err := json.Marshal(v)
	if err != nil {
		panic("sheet: data that cannot be written")
	}
	return len(b)
}

// thin leaves home and the poses that decide goals.
func (v *Design) thin(goals []Goal) {
	poses, rows := v.Poses[:1:1], [][6]int{}
	at := map[int]int{0: 0}
	for _, r := range v.Deciding {
		if !slices.ContainsFunc(goals, func(g Goal) bool { return g.Measure == r[0] }) {
			continue
		}
		n, ok := at[r[1]]
		if !ok {
			n = len(poses)
			at[r[1]] = n
			poses = append(poses, v.Poses[r[1]])
		}
		r[1] = n
		rows = append(rows, r)
	}
	v.Poses, v.Deciding = poses, rows
}
