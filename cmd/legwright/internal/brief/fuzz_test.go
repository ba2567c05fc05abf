package brief

import (
	"errors"
	"os"
	"testing"
)

// The readers take any text without a panic; what they refuse they refuse with faults that have a
// file, and what they take holds only finite numbers (encoding/json would fail on others).
func fuzzBrief(f *testing.F, file string, seeds ...string) {
	for _, s := range append(seeds, "", planar, "goals = []\n[[goals]]\n", "a: &a [*a]", "{\"a\":[{}]}", "? {a: b}\n: c", "- - - a\n--- b", "a.b.c = {d.e = 1}\n[a.b]\n") {
		f.Add([]byte(s))
	}
	for _, name := range []string{"tilt.yaml", "whole.yaml", "whole.toml", "whole.json"} {
		text, err := os.ReadFile("testdata/" + name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	k := known()
	f.Fuzz(func(t *testing.T, text []byte) {
		b, err := Parse(file, text, k)
		faultsOnly(t, b == nil, err)
		if b != nil && len(b.Goals) == 0 {
			t.Error("a brief without goals")
		}
		d, err := ParseDesign(file, text, k)
		faultsOnly(t, d == nil, err)
		if d != nil {
			if _, err := ParseDesign("d.yaml", d.Encode(), k); err != nil {
				t.Errorf("%v\n%s", err, d.Encode())
			}
		}
	})
}

func faultsOnly(t *testing.T, none bool, err error) {
	t.Helper()
	if err == nil {
		return
	}
	var fs Faults
	if !none || !errors.As(err, &fs) || len(fs) == 0 {
		t.Fatalf("refused with %T: %v", err, err)
	}
	for _, f := range fs {
		if f.At.File == "" || f.Problem == "" || f.Remedy == "" {
			t.Errorf("fault without a place, a problem or a remedy: %+v", f)
		}
	}
}

func FuzzBriefYAML(f *testing.F) { fuzzBrief(f, "testdata/b.yaml", slider, pushed) }
func FuzzBriefTOML(f *testing.F) { fuzzBrief(f, "testdata/b.toml") }
func FuzzBriefJSON(f *testing.F) { fuzzBrief(f, "testdata/b.json") }

func FuzzPoses(f *testing.F) {
	for _, s := range []string{"", "x_mm,yaw_deg\n10,12\n", "\ufeffx [m]\r\n1e-3\r\n", "x_mm;y_mm\n1;2\n", "x_mm\n\"1\n"} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		poses, err := posesFor(text, nil)
		faultsOnly(t, poses == nil, err)
		for _, p := range poses {
			for _, v := range p {
				if v-v != 0 {
					t.Errorf("pose %v", p)
				}
			}
		}
	})
}
