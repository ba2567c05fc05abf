package study

import (
	"errors"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"testing"
)

// someSheets are two sheets that name their design.
func someSheets(d Design) (map[string][]byte, error) {
	return map[string][]byte{JointsSheet: []byte("joints of " + d.ID), BasePlan + ".svg": []byte("plan of " + d.ID)}, nil
}

// A save writes the sheets of the designs that are handed over. Saving again takes away those that are no more, and
// nothing that the user put beside them.
func TestSaveSheets(t *testing.T) {
	dir := t.TempDir()
	f, err := Create(dir, Intent{})
	if err != nil {
		t.Fatal(err)
	}
	r := result()
	r.Sheets = someSheets
	if err := f.Save(r); err != nil {
		t.Fatal(err)
	}
	f.Close()
	got := files(t, dir)
	for i := range r.Front.Designs {
		id := r.Front.Designs[i].ID
		if got["designs/"+id+"/joints.csv"] != "joints of "+id || got["designs/"+id+"/base.svg"] != "plan of "+id {
			t.Errorf("sheets of %s are missing", id)
		}
	}
	keep := filepath.Join(dir, "designs", "004", "my sketch.svg")
	if err := os.WriteFile(keep, []byte("mine"), 0o666); err != nil {
		t.Fatal(err)
	}

	f, err = Create(dir, Intent{Force: true})
	if err != nil {
		t.Fatal(err)
	}
	r = result()
	r.Front.Designs = r.Front.Designs[:2]
	r.Sheets = func(d Design) (map[string][]byte, error) { return map[string][]byte{HolesSheet: []byte("holes")}, nil }
	if err := f.Save(r); err != nil {
		t.Fatal(err)
	}
	f.Close()
	var left []string
	for name := range maps.Keys(files(t, dir)) {
		if filepath.Dir(name) != "." && filepath.Ext(name) != ".yaml" && filepath.Dir(name) != "duty" {
			left = append(left, name)
		}
	}
	slices.Sort(left)
	if want := []string{"designs/001/holes.csv", "designs/002/holes.csv", "designs/004/my sketch.svg"}; !slices.Equal(left, want) {
		t.Errorf("left %v, want %v", left, want)
	}
	if _, err := os.Stat(filepath.Join(dir, "designs", "003")); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("the empty folder of 003 is still there: %v", err)
	}
}

// The sheets of one more design can be written into a finished study, again and again.
func TestSheetsOfOneMore(t *testing.T) {
	dir := t.TempDir()
	f, _ := Create(dir, Intent{})
	if err := f.Save(result()); err != nil {
		t.Fatal(err)
	}
	f.Close()
	g, front, err := Open(dir)
	if err != nil {
		t.Fatal(err)
	}
	all, _ := someSheets(front.Designs[2])
	for _, sheets := range []map[string][]byte{all, {JointsSheet: []byte("new")}} {
		if err := g.SaveSheets("003", sheets); err != nil {
			t.Fatal(err)
		}
	}
	got := files(t, dir)
	if got["designs/003/joints.csv"] != "new" {
		t.Errorf("joints.csv is %q", got["designs/003/joints.csv"])
	}
	if _, ok := got["designs/003/base.svg"]; ok {
		t.Error("base.svg is stale")
	}
}

// A design without sheets leaves a study that is not finished.
func TestBrokenSheets(t *testing.T) {
	dir := t.TempDir()
	f, _ := Create(dir, Intent{})
	if err := f.SaveCheckpoint([]byte(checkpoint)); err != nil {
		t.Fatal(err)
	}
	r := result()
	r.Sheets = func(d Design) (map[string][]byte, error) { return nil, errors.New("no ink") }
	if err := f.Save(r); err == nil {
		t.Fatal("saved")
	}
	f.Close()
	if s, err := inspect(dir); s != Unfinished || err != nil {
		t.Errorf("state %v, %v", s, err)
	}
}

// Handed over are the best 20, and of the rest those with a mark or on the first screen.
func TestHandedOver(t *testing.T) {
	f := &Front{Goals: []Goal{{Measure: "a", Sense: Minimise}, {Measure: "b", Sense: Minimise}}}
	for i := range 40 {
		x := Number(i)
		f.Designs = append(f.Designs, Design{ID: strconv.Itoa(1000 + i), Measures: map[string]Number{"a": x, "b": 1600 - x*x}})
	}
	f.Designs[30].Marks = []string{MarkKnee}
	got := f.HandedOver()
	if !slices.IsSorted(got) || !slices.Contains(got, 30) || len(got) < 21 || len(got) > 20+1+FirstShown {
		t.Errorf("handed over: %v", got)
	}
	for i := range 20 {
		if !slices.Contains(got, i) {
			t.Errorf("%d is left out", i)
		}
	}
	for _, c := range Choose(f, FirstShown) {
		if !slices.Contains(got, c.Index) {
			t.Errorf("%d, of the first screen, is left out", c.Index)
		}
	}
}
