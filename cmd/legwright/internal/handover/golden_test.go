package handover

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"testing"

	"legwright/kin"
)

var update = flag.Bool("update", false, "write the expected sheets again")

// What is handed over stays as it is, byte for byte, but for what a change is meant to change. Sheets of
// what actuators and joints must do are left out: their last digits may differ between processors.
func TestGolden(t *testing.T) {
	for name, sheets := range map[string][]string{
		"6-UPS": {"base.svg", "base.dxf", "joints.csv", "axes.csv", "links.csv", "holes.csv"},
		"delta": {"platform.svg", "platform.dxf", "joints.csv", "axes.csv", "links.csv"},
		"3-RRR": {"base.svg", "holes.csv"},
	} {
		f := kin.FamilyNamed(name)
		task := starterTask(f)
		title := Title{Program: "legwright 0.1.0", Design: "001", Brief: f.Starter.Title, Hash: "2c26b46b68ffc68ff99b453c1d30413413422d706483bfa0f98a5e886266e7ae"}
		files := Files(task, appraised(f, task, 0.3), title)
		for _, s := range sheets {
			path := filepath.Join("testdata", name, s)
			if *update {
				if err := os.MkdirAll(filepath.Dir(path), 0o777); err != nil {
					t.Fatal(err)
				}
				if err := os.WriteFile(path, files[s], 0o666); err != nil {
					t.Fatal(err)
				}
			}
			want, err := os.ReadFile(path)
			if err != nil {
				t.Fatal(err)
			}
			if !bytes.Equal(files[s], want) {
				t.Errorf("%s differs from what is expected; go test ./cmd/legwright/internal/handover -update writes it again", path)
			}
		}
	}
}
