package assembly

import (
	"encoding/csv"
	"encoding/json"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"legwright/kin"
)

// referenceFile is the path of a committed file of check values. SOURCES.md beside it names their origin.
func referenceFile(name string) string {
	return filepath.Join("..", "..", "testdata", "reference", name)
}

// readJSON fills out from a reference file.
func readJSON(t testing.TB, name string, out any) {
	t.Helper()
	data, err := os.ReadFile(referenceFile(name))
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, out); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
}

// readTable gives the rows of a reference file as numbers (0 for text), and the place of each column.
func readTable(t testing.TB, name string) (rows [][]float64, column map[string]int) {
	t.Helper()
	f, err := os.Open(referenceFile(name))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	column = map[string]int{}
	for k, h := range records[0] {
		column[h] = k
	}
	for _, rec := range records[1:] {
		row := make([]float64, len(rec))
		for k, text := range rec {
			row[k], _ = strconv.ParseFloat(text, 64)
		}
		rows = append(rows, row)
	}
	return rows, column
}

func vec(p []float64) kin.Vec { return kin.Vec{X: p[0], Y: p[1], Z: p[2]} }
