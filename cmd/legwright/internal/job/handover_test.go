package job

import (
	"bytes"
	"context"
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
)

// The sheets of a design that a search found are those of its record: joints, leg lengths and forces as in front.json,
// though the design was judged anew. Joint centres are written to 1e-6 mm, lengths to 1e-4 mm, forces with six digits.
func TestSheetsAreThoseOfTheRecord(t *testing.T) {
	const name = "../../../../testdata/briefs/tilt-table.yaml"
	text, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	b, err := brief.Parse(name, text, *Known())
	if err != nil {
		t.Fatal(err)
	}
	s, err := New(b)
	if err != nil {
		t.Fatal(err)
	}
	found, err := s.Search(context.Background(), Run{Evaluations: 300, Population: 40, Seed: 3})
	if err != nil {
		t.Fatal(err)
	}
	sources := &study.Sources{Brief: study.File{Name: name, Bytes: text}}
	if len(found.Front.Designs) == 0 {
		t.Fatal("no design was found")
	}
	r := found.Front.Designs[0]
	files, err := s.Sheets(r, sources)
	if err != nil {
		t.Fatal(err)
	}
	table := func(sheet string) map[string]map[string]float64 {
		c := csv.NewReader(bytes.NewReader(files[sheet]))
		c.Comment = '#'
		rows, err := c.ReadAll()
		if err != nil {
			t.Fatal(err)
		}
		out := map[string]map[string]float64{}
		for _, row := range rows[1:] {
			out[row[0]] = map[string]float64{}
			for i, v := range row {
				if x, err := strconv.ParseFloat(v, 64); err == nil {
					out[row[0]][rows[0][i]] = x
				}
			}
		}
		return out
	}
	near := func(what string, got, want, tol float64) {
		t.Helper()
		if !(math.Abs(got-want) <= tol) {
			t.Errorf("%s = %.15g, want %.15g", what, got, want)
		}
	}
	joints, legs := table(study.JointsSheet), table(study.ActuatorsSheet)
	for i := range r.Legs {
		n := strconv.Itoa(i + 1)
		for k, axis := range []string{"x", "y", "z"} {
			near("B"+n, joints["B"+n]["base_frame_"+axis+"_mm"], 1000*r.Joints.Base[i][k], 6e-7)
			near("P"+n, joints["P"+n]["platform_frame_"+axis+"_mm"], 1000*r.Joints.Platform[i][k], 6e-7)
		}
		near("shortest", legs[n]["shortest_mm"], 1000*float64(r.Legs[i].Shortest), 6e-5)
		near("longest", legs[n]["longest_mm"], 1000*float64(r.Legs[i].Longest), 6e-5)
		near("push", legs[n]["push_N"], float64(r.Legs[i].Push), 5e-6*float64(r.Legs[i].Push))
	}
	if !strings.Contains(string(files[study.HolesSheet]), SourcesHash(sources)) {
		t.Error("the hole table does not name the brief's hash")
	}

	delete(r.Dimensions, "base_radius")
	if _, err := s.Sheets(r, sources); err == nil || !strings.Contains(err.Error(), "base_radius") {
		t.Errorf("a record without base_radius: %v", err)
	}
	r.Family = "delta"
	if _, err := s.Sheets(r, sources); err == nil || !strings.Contains(err.Error(), "delta") {
		t.Errorf("a record of another family: %v", err)
	}
}
