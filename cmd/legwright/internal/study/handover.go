package study

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
)

// The sheets of a design, in its folder designs/NNN. Plans have the endings .svg and .dxf.
const (
	JointsSheet    = "joints.csv"
	AxesSheet      = "axes.csv"
	LinksSheet     = "links.csv"
	HolesSheet     = "holes.csv"
	ActuatorsSheet = "actuators.csv"
	ForcesSheet    = "forces.csv"
	TogetherSheet  = "forces-together.csv"
	HeightsSheet   = "heights.csv"
	BasePlan       = "base"
	PlatformPlan   = "platform"
)

// SheetNames are the names of all sheets that a design can have.
func SheetNames() []string {
	return []string{JointsSheet, AxesSheet, LinksSheet, HolesSheet, ActuatorsSheet, ForcesSheet, TogetherSheet, HeightsSheet,
		BasePlan + ".svg", BasePlan + ".dxf", PlatformPlan + ".svg", PlatformPlan + ".dxf"}
}

// handedOver is the number of best designs whose sheets a search writes.
const handedOver = 20

// HandedOver are the places of the designs whose sheets a search writes: the best 20, those with a mark,
// and those of the first screen.
func (f *Front) HandedOver() []int {
	var out []int
	first := f.First()
	for i := range f.Designs {
		if i < handedOver || len(f.Designs[i].Marks) > 0 || slices.Contains(first, i) {
			out = append(out, i)
		}
	}
	return out
}

// FirstShown is the number of designs of the first screen.
const FirstShown = 7

// First are the places of the designs of the first screen.
func (f *Front) First() (out []int) {
	for _, c := range Choose(f, FirstShown) {
		out = append(out, c.Index)
	}
	return out
}

// SaveSheets writes the sheets of a design into designs/ID, each whole or not at all, and removes sheets of
// that design that files does not hold. Other files there stay. The names are among SheetNames.
func (f *Folder) SaveSheets(id string, files map[string][]byte) error {
	if !idForm.MatchString(id) {
		panic("study: a design without a number")
	}
	for _, name := range SheetNames() {
		b, ok := files[name]
		var err error
		if ok {
			err = f.write(sheetName(id, name), b)
		} else {
			err = f.remove(sheetName(id, name))
		}
		if err != nil {
			return err
		}
	}
	return nil
}

// removeSheets removes the sheets of a design, and its folder if nothing else is in it.
func (f *Folder) removeSheets(id string) error {
	for _, name := range SheetNames() {
		if err := f.remove(sheetName(id, name)); err != nil {
			return err
		}
	}
	dir := filepath.Join(f.dir, designsFolder, id)
	if left, err := os.ReadDir(dir); err == nil && len(left) == 0 {
		return f.remove(designsFolder + "/" + id)
	}
	return nil
}

func sheetName(id, name string) string { return designsFolder + "/" + id + "/" + name }

// saveSheets writes the sheets of the designs that are handed over.
func (f *Folder) saveSheets(r *Result) error {
	if r.Sheets == nil {
		return nil
	}
	for _, i := range r.Front.HandedOver() {
		d := &r.Front.Designs[i]
		files, err := r.Sheets(*d)
		if err != nil {
			return fmt.Errorf("design %s: %w", d.ID, err)
		}
		if err := f.SaveSheets(d.ID, files); err != nil {
			return err
		}
	}
	return nil
}
