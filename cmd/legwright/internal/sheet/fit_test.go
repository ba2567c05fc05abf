package sheet

import (
	"slices"
	"testing"
)

// many has designs with three deciding poses each, of which the first ten are shown in full and the third is marked.
func many() *Data {
	d := &Data{Goals: []Goal{{Measure: 0}}}
	for i := range 100 {
		v := Design{ID: string(rune('A' + i)), Poses: make([]Pose, 4), Deciding: [][6]int{{2, 1}, {0, 3}, {1, 2}, {5, 3}}}
		for k := range v.Poses {
			v.Poses[k].At[0] = Num(k)
		}
		if i < 10 {
			v.Detail = &Detail{Path: Track{Place: make([]int, 1000)}, Maps: make([]Map, 3)}
		}
		if i == 2 {
			v.Marks = []string{"knee"}
		}
		d.Designs = append(d.Designs, v)
	}
	return d
}

// Data that fit stay as they are; else poses go from the last design on, then details, but for marked designs and those kept.
func TestFit(t *testing.T) {
	full := func(d *Data) (out []int) {
		for i := range d.Designs {
			if d.Designs[i].Detail != nil {
				out = append(out, i)
			}
		}
		return out
	}
	whole := size(many())
	for _, c := range []struct {
		bytes int
		thin  bool // the last design lost poses
		full  []int
	}{
		{whole, false, []int{0, 1, 2, 3, 4, 5, 6, 7, 8, 9}},
		{whole - 200, true, []int{0, 1, 2, 3, 4, 5, 6, 7, 8, 9}},
		{1, true, []int{2, 4}},
	} {
		d := many()
		Fit(d, c.bytes, []string{d.Designs[4].ID})
		if n := size(d); n > c.bytes && c.bytes > 1 {
			t.Errorf("%d bytes of %d", n, c.bytes)
		}
		if got := full(d); !slices.Equal(got, c.full) {
			t.Errorf("%d bytes: in full %v, want %v", c.bytes, got, c.full)
		}
		last := &d.Designs[99]
		if !c.thin {
			if len(last.Poses) != 4 {
				t.Error("poses are lost")
			}
			continue
		}
		// Of measure 0, the goal, pose 3 decides.
		if len(last.Poses) != 2 || last.Poses[1].At[0] != 3 || !slices.Equal(last.Deciding, [][6]int{{0, 1}}) {
			t.Errorf("%d bytes: %+v", c.bytes, last)
		}
	}
	// Plans go first, but for those of the first screen and of designs kept; tables stay.
	d := many()
	d.First = []First{{Design: 1}}
	for i := range 10 {
		d.Designs[i].Detail.Handover = &Handover{Tables: []Table{{Name: "t"}}, Base: make([]byte, 900), Platform: make([]byte, 900)}
	}
	Fit(d, size(d)-8*2400, []string{d.Designs[4].ID})
	for i := range 10 {
		h := d.Designs[i].Detail.Handover
		if stay := i == 1 || i == 4; (h.Base != nil) != stay || (h.Platform != nil) != stay || len(h.Tables) != 1 {
			t.Errorf("design %d: plans of %d and %d bytes, %d tables", i, len(h.Base), len(h.Platform), len(h.Tables))
		}
	}
	if n := len(d.Designs[99].Poses); n != 4 {
		t.Errorf("poses are lost before plans: %d", n)
	}
	d = many()
	for i := range d.Designs[10:] {
		d.Designs[10+i].thin(d.Goals)
	}
	thinned := size(d)
	d = many()
	Fit(d, thinned-100, nil)
	if n := len(d.Designs[9].Detail.Maps); n != 1 || len(full(d)) != 10 || len(d.Designs[0].Detail.Maps) != 3 {
		t.Errorf("%d maps of the last design in full, %d in full", n, len(full(d)))
	}
	d = many()
	Fit(d, size(d)-200, nil)
	if n := len(d.Designs[50].Poses); n != 4 {
		t.Errorf("a design in the middle has %d poses", n)
	}
}
