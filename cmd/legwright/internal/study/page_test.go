package study

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// The page is a file of the study: written whole into a folder that holds one, and refused elsewhere.
func TestPageOfAFolder(t *testing.T) {
	dir := t.TempDir()
	if _, _, err := Open(dir); err == nil || !strings.Contains(err.Error(), "no front.json") {
		t.Errorf("an empty folder: %v", err)
	}
	text, err := Encode(&Front{Format: Format, Goals: []Goal{{Measure: "footprint", Sense: Minimise}}})
	if err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(filepath.Join(dir, frontFile), text, 0o600); err != nil {
		t.Fatal(err)
	}
	f, front, err := Open(dir)
	if err != nil || front.Goals[0].Measure != "footprint" {
		t.Fatalf("%v, %+v", err, front)
	}
	if _, _, err := Open(dir); err == nil || !strings.Contains(err.Error(), "is at work in the folder") {
		t.Errorf("opened twice: %v", err)
	}
	if _, err := f.Brief(); err == nil || !strings.Contains(err.Error(), "copy of the brief is missing") {
		t.Errorf("no brief: %v", err)
	}
	want := filepath.Join(dir, "brief.toml")
	if err := os.WriteFile(want, []byte("a"), 0o600); err != nil {
		t.Fatal(err)
	}
	if got, err := f.Brief(); got != want || err != nil {
		t.Errorf("%s, %v", got, err)
	}
	for _, page := range []string{"one", "two"} {
		if err := f.SavePage([]byte(page)); err != nil {
			t.Fatal(err)
		}
		if b, err := os.ReadFile(f.Page()); string(b) != page || err != nil {
			t.Errorf("%q, %v", b, err)
		}
	}
	if err := f.Close(); err != nil {
		t.Error(err)
	}
	if f, _, err = Open(dir); err != nil {
		t.Errorf("opened again: %v", err)
	} else if err := f.Close(); err != nil {
		t.Error(err)
	}
	if s := (&Sources{Poses: []File{{Name: pageFile}}}); len(s.Apart()) != 1 {
		t.Error("a pose file takes the page's name")
	}
}
