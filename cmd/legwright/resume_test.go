//go:build unix

package main

import (
	"bytes"
	"errors"
	"io/fs"
	"maps"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"
)

// resumeBrief is searched in a few seconds, most of which evaluations take.
const resumeBrief = `title: Stage
family: 3-RPR
dimensions: {base_radius: [200 mm, 500 mm], platform_radius: [50 mm, 200 mm], home_heading: [20 deg, 160 deg], leg_min: sized, stroke: sized}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm, yaw: 5 deg}, samples: 600}]}
goals: [{minimise: footprint}, {maximise: conditioning}]
limits: [{measure: conditioning, at_least: 0.05}]
search: {front: 6}
`

// program starts this test's binary as legwright (testscript.Main) in a folder.
func program(t *testing.T, dir string, args ...string) (*exec.Cmd, *bytes.Buffer) {
	t.Helper()
	link := filepath.Join(t.TempDir(), "legwright")
	self, err := os.Executable()
	if err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink(self, link); err != nil {
		t.Fatal(err)
	}
	cmd := exec.Command(link, args...)
	cmd.Dir = dir
	said := new(bytes.Buffer)
	cmd.Stderr = said
	return cmd, said
}

// tree reads all files below a folder.
func tree(t *testing.T, dir string) map[string]string {
	t.Helper()
	out := map[string]string{}
	err := filepath.WalkDir(dir, func(path string, e fs.DirEntry, err error) error {
		if err != nil || e.IsDir() {
			return err
		}
		b, err := os.ReadFile(path)
		name, _ := filepath.Rel(dir, path)
		out[name] = string(b)
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// A search that is killed at random moments, while it writes its files too, and gone on with each time
// ends with the same files as one that was left alone, byte for byte, and no others. No kill costs more
// than what was evaluated since the checkpoint before.
func TestKilledSearchGoesOn(t *testing.T) {
	kills, evaluations := 50, "20000"
	if testing.Short() {
		kills, evaluations = 2, "2000"
	}
	root := t.TempDir()
	whole, cut := filepath.Join(root, "whole"), filepath.Join(root, "cut")
	for _, dir := range []string{whole, cut} { // the page names the folder: the same name in both
		os.Mkdir(dir, 0o777)
		if err := os.WriteFile(filepath.Join(dir, "stage.yaml"), []byte(resumeBrief), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	args := []string{"search", "stage.yaml", "-o", "out", "--evaluations", evaluations, "--checkpoint", "20ms", "--workers", "2"}
	cmd, said := program(t, whole, args...)
	begin := time.Now()
	if err := cmd.Run(); err != nil {
		t.Fatalf("%v: %s", err, said)
	}
	length := time.Since(begin)
	want := tree(t, filepath.Join(whole, "out"))

	rng := rand.New(rand.NewPCG(1, 2))
	args = append(args, "--resume")
	finished, saving, most := 0, 0, 0
	for killed := 0; killed < kills; {
		cmd, said := program(t, cut, args...)
		if err := cmd.Start(); err != nil {
			t.Fatal(err)
		}
		ended := make(chan error, 1)
		go func() { ended <- cmd.Wait() }()
		// One in four waits for the files to be written, the others come at any time of a fresh run.
		after := time.After(time.Duration(rng.Int64N(int64(length / 3))))
		if killed%4 == 3 {
			after = nil
			go func() {
				for {
					if _, err := os.Stat(filepath.Join(cut, "out", "designs")); err == nil {
						time.Sleep(time.Duration(rng.Int64N(int64(200 * time.Millisecond))))
						cmd.Process.Kill()
						return
					}
					if cmd.ProcessState != nil {
						return
					}
					time.Sleep(time.Millisecond)
				}
			}()
		}
		select {
		case <-after:
			cmd.Process.Kill()
			<-ended
			killed++
		case err := <-ended:
			if err != nil && cmd.ProcessState.ExitCode() != -1 {
				t.Fatalf("%v: %s", err, said)
			}
			if err != nil {
				killed++
				saving++
			}
			if err == nil || killed < kills && killed%8 == 0 { // from the beginning again
				if err == nil {
					finished++
					sameFiles(t, tree(t, filepath.Join(cut, "out")), want)
				}
				os.RemoveAll(filepath.Join(cut, "out"))
			}
		}
		if n := strings.Count(said.String(), "warning: "); n > 1 {
			t.Errorf("said %s", said)
		}
		if _, after, ok := strings.Cut(said.String(), "goes on after "); ok {
			n := 0
			for _, c := range after[:strings.IndexByte(after, ' ')] {
				n = 10*n + int(c-'0')
			}
			most = max(most, n)
		}
		if t.Failed() {
			return
		}
	}
	cmd, said = program(t, cut, args...)
	if err := cmd.Run(); err != nil {
		t.Fatalf("%v: %s", err, said)
	}
	sameFiles(t, tree(t, filepath.Join(cut, "out")), want)
	t.Logf("%d kills, %d of them while files were written; %d searches ended between them; gone on with after at most %d evaluations", kills, saving, finished, most)
	if most == 0 {
		t.Error("nothing was ever gone on with; the test tests nothing")
	}
}

// sameFiles tells how files differ.
func sameFiles(t *testing.T, got, want map[string]string) {
	t.Helper()
	if names := slices.Sorted(maps.Keys(got)); !slices.Equal(names, slices.Sorted(maps.Keys(want))) {
		t.Errorf("files %v, want %v", names, slices.Sorted(maps.Keys(want)))
	}
	for name := range want {
		if got[name] != want[name] {
			t.Errorf("%s differs", name)
		}
	}
}

// A damaged checkpoint is gone on with as far as it is whole, and says what was lost; every damage ends
// with the files of a search that was left alone.
func TestDamagedCheckpoint(t *testing.T) {
	if testing.Short() {
		t.Skip("searches for some seconds")
	}
	root := t.TempDir()
	if err := os.WriteFile(filepath.Join(root, "stage.yaml"), []byte(resumeBrief), 0o666); err != nil {
		t.Fatal(err)
	}
	args := []string{"search", "stage.yaml", "-o", "out", "--evaluations", "3000", "--checkpoint", "20ms"}
	out := filepath.Join(root, "out")
	cmd, said := program(t, root, args...)
	if err := cmd.Run(); err != nil {
		t.Fatalf("%v: %s", err, said)
	}
	want := tree(t, out)
	os.RemoveAll(out)
	// A checkpoint of a good part of it.
	cmd, said = program(t, root, args...)
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	log := filepath.Join(out, "checkpoint.log")
	for deadline := time.Now().Add(time.Minute); ; time.Sleep(2 * time.Millisecond) {
		if info, err := os.Stat(log); err == nil && info.Size() > 60_000 {
			break
		}
		if time.Now().After(deadline) {
			t.Fatalf("no checkpoint: %s", said)
		}
	}
	cmd.Process.Kill()
	cmd.Wait()
	kept := tree(t, out)
	if kept["checkpoint.log"] == "" || kept["front.json"] != "" {
		t.Skip("the search was over before it was killed")
	}
	for _, c := range []struct {
		why    string
		damage func(files map[string]string)
		says   string
	}{
		{"none", func(map[string]string) {}, "goes on after"},
		{"cut short", func(f map[string]string) { f["checkpoint.log"] = f["checkpoint.log"][:len(f["checkpoint.log"])-7] }, "are not whole"},
		{"a flipped bit in the middle", func(f map[string]string) { f["checkpoint.log"] = flip(f["checkpoint.log"], 30_000) }, "are not whole"},
		{"a flipped bit in the head", func(f map[string]string) { f["checkpoint.log"] = flip(f["checkpoint.log"], 20) }, "begins anew"},
		{"an empty log", func(f map[string]string) { f["checkpoint.log"] = "" }, "after 0 evaluations"},
		{"no log", func(f map[string]string) { delete(f, "checkpoint.log") }, "after 0 evaluations"},
		{"checkpoint.json cut short", func(f map[string]string) { f["checkpoint.json"] = f["checkpoint.json"][:40] }, "damaged"},
		{"a flipped bit in checkpoint.json", func(f map[string]string) {
			f["checkpoint.json"] = flip(f["checkpoint.json"], strings.Index(f["checkpoint.json"], "brief")+12)
		}, "damaged"},
		{"checkpoint.json missing", func(f map[string]string) { delete(f, "checkpoint.json") }, "missing"},
		{"a half-written file", func(f map[string]string) { f[".new-123"] = "half"; f["designs/.new-9"] = "half" }, "goes on after"},
	} {
		os.RemoveAll(out)
		files := maps.Clone(kept)
		c.damage(files)
		for name, text := range files {
			path := filepath.Join(out, name)
			os.MkdirAll(filepath.Dir(path), 0o777)
			if err := os.WriteFile(path, []byte(text), 0o666); err != nil {
				t.Fatal(err)
			}
		}
		cmd, said := program(t, root, append(args, "--resume")...)
		if err := cmd.Run(); err != nil || !strings.Contains(said.String(), c.says) {
			t.Errorf("%s: %v: %s", c.why, err, said)
		}
		sameFiles(t, tree(t, out), want)
	}
	// Another seed is refused all the same.
	os.RemoveAll(out)
	os.MkdirAll(out, 0o777)
	for name, text := range kept {
		os.WriteFile(filepath.Join(out, name), []byte(text), 0o666)
	}
	cmd, said = program(t, root, append(args, "--resume", "--seed", "9")...)
	var exit *exec.ExitError
	if err := cmd.Run(); !errors.As(err, &exit) || exit.ExitCode() != exitInput || !strings.Contains(said.String(), "give the same seed") {
		t.Errorf("another seed: %v: %s", err, said)
	}
}

// waitFor waits until the file is there.
func waitFor(t *testing.T, path string) {
	t.Helper()
	for deadline := time.Now().Add(time.Minute); ; time.Sleep(2 * time.Millisecond) {
		if _, err := os.Stat(path); err == nil {
			return
		}
		if time.Now().After(deadline) {
			t.Fatalf("%s does not come", path)
		}
	}
}

// flip flips a bit of a byte.
func flip(text string, at int) string {
	b := []byte(text)
	b[at] ^= 1
	return string(b)
}
