package brief

import (
	"bytes"
	"errors"
	"math"
	"os"
	"reflect"
	"strings"
	"testing"
	"unicode"

	"legwright/cmd/legwright/internal/bounded"
	"legwright/cmd/legwright/internal/units"
)

// files are the texts of whole files, real ones among them.
func files(f *testing.F, names ...string) (out []string) {
	for _, name := range names {
		text, err := os.ReadFile(name)
		if err != nil {
			f.Fatal(err)
		}
		out = append(out, string(text))
	}
	return out
}

const shared = "../../../../testdata/"

// A brief takes any text without a panic and at a bounded cost. What it refuses it refuses with faults that have a place,
// the same ones each time, and what it takes reads the same each time.
func fuzzBrief(f *testing.F, file string, seeds ...string) {
	seeds = append(seeds, files(f, "testdata/tilt.yaml", "testdata/whole.yaml", "testdata/whole.toml", "testdata/whole.json")...)
	for _, s := range append(seeds, "", planar, "goals = []\n[[goals]]\n", "a: &a [*a]", "{\"a\":[{}]}", "? {a: b}\n: c", "- - - a\n--- b", "a.b.c = {d.e = 1}\n[a.b]\n") {
		f.Add([]byte(s))
	}
	k := known()
	f.Fuzz(func(t *testing.T, text []byte) {
		var b *Brief
		var err error
		bounded.Read(t, len(text), func() { b, err = Parse(file, text, k) })
		faultsOnly(t, file, text, b == nil, err)
		if b != nil && len(b.Goals) == 0 {
			t.Error("a brief without goals")
		}
		again, other := Parse(file, text, k)
		if !reflect.DeepEqual(again, b) || !reflect.DeepEqual(other, err) {
			t.Errorf("reads as\n%+v %v\nthen as\n%+v %v", b, err, again, other)
		}
	})
}

func FuzzBriefYAML(f *testing.F) {
	fuzzBrief(f, "testdata/b.yaml", files(f, shared+"briefs/gauge-stage.yaml", shared+"briefs/isotropic.yaml", shared+"briefs/three-drives.yaml",
		shared+"briefs/tilt-table.yaml", shared+"study-a/sized.yaml", shared+"study-a/ranges.yaml")...)
}
func FuzzBriefTOML(f *testing.F) { fuzzBrief(f, "testdata/b.toml") }
func FuzzBriefJSON(f *testing.F) { fuzzBrief(f, "testdata/b.json") }

// faultsOnly tells of an error that is no list of faults, each with a place in the file, a problem and a remedy.
func faultsOnly(t *testing.T, file string, text []byte, none bool, err error) {
	t.Helper()
	if err == nil {
		return
	}
	var fs Faults
	if !none || !errors.As(err, &fs) || len(fs) == 0 {
		t.Fatalf("refused with %T: %v", err, err)
	}
	lines := 2                                                               // what is missing at the end is missing after the last line
	for _, end := range []string{"\n", "\r", "\u0085", "\u2028", "\u2029"} { // all that ends a line of YAML
		lines += bytes.Count(text, []byte(end))
	}
	for _, f := range fs {
		if f.At.File == "" || f.Problem == "" || f.Remedy == "" {
			t.Errorf("fault without a place, a problem or a remedy: %+v", f)
		}
		if f.At.File == file && (f.At.Line < 1 && !strings.Contains(f.Problem, "more faults follow") || f.At.Line > lines || f.At.Line > 0 && f.At.Column < 1) {
			t.Errorf("fault outside the %d lines of the file: %+v", lines, f)
		}
		if strings.IndexFunc(f.Error(), func(r rune) bool { return !unicode.IsPrint(r) }) >= 0 {
			t.Errorf("a fault that is not one line that prints: %q", f.Error())
		}
	}
}

// A design that is taken is written, and reads back to the same bits.
func FuzzDesign(f *testing.F) {
	whole := files(f, "testdata/design.yaml", "testdata/joints.yaml", "testdata/rails.yaml", "testdata/design.toml", "testdata/design.json")
	for i, s := range append(whole, slider, pushed, "family: delta\n", `{"family": "3-RPR"}`, "family = '3-RPR'\n[[rails]]\n") {
		f.Add(uint8(i), []byte(s))
		f.Add(uint8(0), []byte(s))
	}
	k := known()
	f.Fuzz(func(t *testing.T, ending uint8, text []byte) {
		file := "d" + []string{".yaml", ".toml", ".json"}[ending%3]
		var d *Design
		var err error
		bounded.Read(t, len(text), func() { d, err = ParseDesign(file, text, k) })
		faultsOnly(t, file, text, d == nil, err)
		if d == nil {
			return
		}
		written := d.Encode()
		back, err := ParseDesign("d.yaml", written, k)
		if err != nil {
			t.Fatalf("%v\n%s", err, written)
		}
		d.places, back.places = places{}, places{}
		if !reflect.DeepEqual(back, d) {
			t.Errorf("%s\nreads as %+v\nnot as   %+v", written, back, d)
		}
		if again := back.Encode(); !bytes.Equal(again, written) {
			t.Errorf("written as\n%s\nthen as\n%s", written, again)
		}
	})
}

// Poses that are taken are finite, and read back to the same bits when they are written in SI units.
func FuzzPoses(f *testing.F) {
	for _, s := range append(files(f, "testdata/poses.csv"), "", "x_mm,yaw_deg\n10,12\n", "\ufeffx [m]\r\n1e-3\r\n", "x_mm;y_mm\n1;2\n", "x_mm\n\"1\n") {
		f.Add([]byte(s))
	}
	k := known()
	f.Fuzz(func(t *testing.T, text []byte) {
		var poses [][6]float64
		var err error
		bounded.Read(t, len(text), func() { poses, err = posesFor(text, nil) })
		faultsOnly(t, "p.csv", text, poses == nil, err)
		if _, err := posesFor(text, &k.Families[0]); err != nil {
			faultsOnly(t, "p.csv", text, true, err)
		}
		if len(poses) == 0 {
			return
		}
		var b strings.Builder
		b.WriteString("x_m,y_m,z_m,roll_rad,pitch_rad,yaw_rad")
		for _, p := range poses {
			for q, v := range p {
				if v-v != 0 {
					t.Errorf("pose %v", p)
				}
				b.WriteByte("\n,,,,,"[q])
				b.WriteString(strings.Fields(units.Exact(v, coordinateKind(q)))[0])
			}
		}
		back, err := posesFor([]byte(b.String()), nil)
		if err != nil || len(back) != len(poses) {
			t.Fatalf("%d poses read back as %d: %v", len(poses), len(back), err)
		}
		for i := range poses {
			for q, v := range poses[i] {
				if math.Float64bits(back[i][q]) != math.Float64bits(v) {
					t.Errorf("pose %d: %v reads back as %v", i, poses[i], back[i])
				}
			}
		}
	})
}
