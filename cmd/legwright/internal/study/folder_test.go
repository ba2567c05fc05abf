package study

import (
	"errors"
	"io/fs"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"legwright/opt"
)

// files reads all files below dir.
func files(t *testing.T, dir string) map[string]string {
	t.Helper()
	out := map[string]string{}
	err := filepath.WalkDir(dir, func(path string, e fs.DirEntry, err error) error {
		if err != nil || e.IsDir() {
			return err
		}
		b, err := os.ReadFile(path)
		rel, _ := filepath.Rel(dir, path)
		out[filepath.ToSlash(rel)] = string(b)
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// checkpoint is one as this program writes it, as far as this package reads it.
const checkpoint = `{"program": "legwright 0"}`

const briefText = "title: Tilter\r\n# not as we would write it\n"

func result() *Result {
	return &Result{
		Front:   tilter(),
		History: []opt.Point{{Evaluations: 10, Hypervolume: 0.1, Feasible: 0.3}, {Evaluations: 900, Hypervolume: 1.0 / 3, Feasible: 1.0 / 3}},
		Sources: Sources{
			Brief: File{"somewhere/My Brief.YML", []byte(briefText)},
			Poses: []File{{"poses.csv", []byte("x_mm\n1\n")}, {"duty/more.csv", []byte("x_mm\n2\n")}, {"../out.csv", nil}, {"front.csv", nil}},
		},
		Encode: encodeTest,
	}
}

func TestSaveStudy(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "new", "study")
	f, err := Create(dir, Intent{})
	if err != nil {
		t.Fatal(err)
	}
	if err := f.SaveCheckpoint([]byte(checkpoint)); err != nil {
		t.Fatal(err)
	}
	if b, err := f.Checkpoint(); string(b) != checkpoint || err != nil {
		t.Errorf("checkpoint %q, %v", b, err)
	}
	r := result()
	if err := f.Save(r); err != nil {
		t.Fatal(err)
	}
	if err := f.Close(); err != nil {
		t.Fatal(err)
	}
	got := files(t, dir)
	want := []string{"brief.yaml", "designs/001.yaml", "designs/002.yaml", "designs/003.yaml", "designs/004.yaml",
		"designs/005.yaml", "duty/more.csv", "front.csv", "front.json", "poses.csv", "progress.csv"}
	if names := slices.Sorted(maps.Keys(got)); !slices.Equal(names, want) {
		t.Errorf("files %v, want %v", names, want)
	}
	if got["brief.yaml"] != briefText {
		t.Errorf("brief.yaml is %q", got["brief.yaml"])
	}
	if want := "evaluations,hypervolume,feasible_share\n10,0.1,0.3\n900,0.333333333333333,0.333333333333333\n"; got["progress.csv"] != want {
		t.Errorf("progress.csv is %q", got["progress.csv"])
	}
	if apart := r.Sources.Apart(); !slices.Equal(apart, []string{"../out.csv", "front.csv"}) {
		t.Errorf("apart %v", apart)
	}
	info, err := os.Stat(filepath.Join(dir, "front.json"))
	if err != nil {
		t.Fatal(err)
	}
	folder, _ := os.Stat(dir)
	if info.Mode().Perm() != folder.Mode().Perm()&0o666 {
		t.Errorf("front.json has mode %v in a folder with %v", info.Mode(), folder.Mode())
	}
	if s, err := inspect(dir); s != Finished || err != nil {
		t.Errorf("state %v, %v", s, err)
	}
}

func TestFolderRules(t *testing.T) {
	root := t.TempDir()
	make := func(name string, content map[string]string) string {
		dir := filepath.Join(root, name)
		os.MkdirAll(dir, 0o777)
		for n, c := range content {
			os.MkdirAll(filepath.Dir(filepath.Join(dir, n)), 0o777)
			if err := os.WriteFile(filepath.Join(dir, n), []byte(c), 0o666); err != nil {
				t.Fatal(err)
			}
		}
		return dir
	}
	front, _ := Encode(tilter())
	finished := map[string]string{"front.json": string(front), "brief.yaml": "a"}
	for _, c := range []struct {
		why    string
		dir    string
		intent Intent
		want   string // part of the refusal, "" for none
		state  State
	}{
		{"new", filepath.Join(root, "new"), Intent{}, "", Empty},
		{"empty", make("empty", nil), Intent{}, "", Empty},
		{"empty, resumed", make("empty2", nil), Intent{Resume: true}, "", Empty},
		{"other files", make("other", map[string]string{"letter.txt": "a"}), Intent{}, "holds other files", 0},
		{"other files, forced", make("other", nil), Intent{Force: true}, "holds other files", 0},
		{"only a brief", make("brief", map[string]string{"brief.yaml": "a"}), Intent{Force: true}, "holds other files", 0},
		{"someone else's front.json", make("alien", map[string]string{"front.json": "{}"}), Intent{Force: true}, "holds other files", 0},
		{"finished", make("finished", finished), Intent{}, "finished study", 0},
		{"finished, forced", make("forced", finished), Intent{Force: true}, "", Finished},
		{"finished, resumed", make("resumed", finished), Intent{Resume: true}, "", Finished},
		{"unfinished", make("half", map[string]string{"checkpoint.json": checkpoint}), Intent{}, "--resume", 0},
		{"unfinished, forced", make("half", nil), Intent{Force: true}, "", Unfinished},
		{"unfinished, resumed", make("half", nil), Intent{Resume: true}, "", Unfinished},
		{"broken off while saving", make("broken", map[string]string{"checkpoint.json": checkpoint, "designs/001.yaml": "a", "brief.yaml": "a"}), Intent{Force: true}, "", Unfinished},
		{"designs alone", make("designs", map[string]string{"designs/001.yaml": "a", "brief.yaml": "a"}), Intent{Force: true}, "holds other files", 0},
		{"folders that look like designs", make("years", map[string]string{"designs/2024/keep.txt": "a"}), Intent{Force: true}, "holds other files", 0},
		{"those, resumed", make("years", nil), Intent{Resume: true}, "holds other files", 0},
		{"someone else's checkpoint", make("trained", map[string]string{"checkpoint.json": `{"program": "other 1"}`}), Intent{Force: true}, "holds other files", 0},
		{"a checkpoint that is no JSON", make("noise", map[string]string{"checkpoint.json": "a"}), Intent{Force: true}, "holds other files", 0},
		{"someone else's checkpoint in a study", make("both", map[string]string{"front.json": string(front), "checkpoint.json": "{}"}), Intent{Force: true}, "holds other files", 0},
		{"someone else's front.json with a checkpoint", make("both2", map[string]string{"front.json": "{}", "checkpoint.json": checkpoint}), Intent{Force: true}, "holds other files", 0},
		{"a file", filepath.Join(make("finished", nil), "brief.yaml"), Intent{}, "not a folder", 0},
		{"below a file", filepath.Join(make("finished", nil), "brief.yaml", "deep"), Intent{}, "give another folder", 0},
	} {
		f, err := Create(c.dir, c.intent)
		switch {
		case c.want == "" && err != nil:
			t.Errorf("%s: %v", c.why, err)
		case c.want == "" && f.State() != c.state:
			t.Errorf("%s: state %v, want %v", c.why, f.State(), c.state)
			f.Close()
		case c.want == "":
			f.Close()
		case c.want != "" && (err == nil || !strings.Contains(err.Error(), c.want) || !strings.Contains(err.Error(), c.dir)):
			t.Errorf("%s: got %v, want %q and the folder's name", c.why, err, c.want)
		}
	}
	if got := files(t, filepath.Join(root, "resumed")); len(got) != 2 {
		t.Errorf("resuming a finished study changed it: %v", got)
	}
}

func TestReadOnlyFolder(t *testing.T) {
	if os.Geteuid() == 0 {
		t.Skip("the superuser may write everywhere")
	}
	dir := t.TempDir()
	os.Chmod(dir, 0o555)
	defer os.Chmod(dir, 0o755)
	if _, err := Create(dir, Intent{}); err == nil || !strings.Contains(err.Error(), "may write") {
		t.Errorf("read-only: %v", err)
	}
	os.Chmod(dir, 0o000)
	if _, err := Create(dir, Intent{}); err == nil || !strings.Contains(err.Error(), "cannot be read") {
		t.Errorf("unreadable: %v", err)
	}
}

// A study that takes the place of another leaves the user's own files, and of the other study only its pose files.
func TestForceLeavesNothingStale(t *testing.T) {
	dir := t.TempDir()
	f, err := Create(dir, Intent{})
	if err != nil {
		t.Fatal(err)
	}
	if err := f.Save(result()); err != nil {
		t.Fatal(err)
	}
	for _, name := range []string{"notes.txt", "designs/my notes.txt", "designs/2024/keep.txt", "designs/001/sketch.txt", "designs/1234.yaml"} {
		path := filepath.Join(dir, name)
		os.MkdirAll(filepath.Dir(path), 0o777)
		if err := os.WriteFile(path, []byte("mine"), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	f.Close()
	f, err = Create(dir, Intent{Force: true})
	if err != nil {
		t.Fatal(err)
	}
	r := result()
	r.Front.Designs = r.Front.Designs[1:3] // 002 and 003
	r.Sources = Sources{Brief: File{"other.json", []byte("{}")}}
	if err := f.Save(r); err != nil {
		t.Fatal(err)
	}
	f.Close()
	want := []string{"brief.json", "designs/001/sketch.txt", "designs/002.yaml", "designs/003.yaml", "designs/1234.yaml", "designs/2024/keep.txt",
		"designs/my notes.txt", "duty/more.csv", "front.csv", "front.json", "notes.txt", "poses.csv", "progress.csv"}
	if got := slices.Sorted(maps.Keys(files(t, dir))); !slices.Equal(got, want) {
		t.Errorf("files %v, want %v", got, want)
	}
}

// A design that cannot be written leaves a study that is known to be unfinished, never one that looks whole.
func TestBrokenSaveIsNotFinished(t *testing.T) {
	dir := t.TempDir()
	f, _ := Create(dir, Intent{})
	if err := f.Save(result()); err != nil {
		t.Fatal(err)
	}
	if err := f.SaveCheckpoint([]byte(checkpoint)); err != nil {
		t.Fatal(err)
	}
	r := result()
	r.Encode = func(d Design) ([]byte, error) {
		if d.ID == "003" {
			return nil, errors.New("no ink")
		}
		return encodeTest(d)
	}
	if err := f.Save(r); err == nil || !strings.Contains(err.Error(), "design 003: no ink") {
		t.Errorf("got %v", err)
	}
	if s, _ := inspect(dir); s != Unfinished {
		t.Errorf("state %v", s)
	}
}

// A write that fails leaves the file as it was and nothing beside it.
func TestWriteFileIsAtomic(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "front.json")
	if err := WriteFile(path, []byte("old")); err != nil {
		t.Fatal(err)
	}
	before, _ := os.Stat(path)
	old, _ := os.Open(path) // a reader that is in the middle of it
	defer old.Close()
	if err := WriteFile(path, []byte("new")); err != nil {
		t.Fatal(err)
	}
	b := make([]byte, 3)
	if old.Read(b); string(b) != "old" {
		t.Errorf("a reader of the old file sees %q", b)
	}
	if after, _ := os.Stat(path); os.SameFile(before, after) || after.Mode() != before.Mode() {
		t.Error("the file was written in place, or has another mode")
	}
	target := filepath.Join(dir, "folder")
	os.MkdirAll(filepath.Join(target, "full"), 0o777)
	if err := WriteFile(target, []byte("x")); err == nil || !strings.Contains(err.Error(), target) {
		t.Errorf("a folder in the way: %v", err)
	}
	entries, _ := os.ReadDir(dir)
	if len(entries) != 2 {
		t.Errorf("left beside: %v", entries)
	}
}
