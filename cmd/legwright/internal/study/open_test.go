package study

import (
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

// Files of absurd sizes, and what is no plain file, are refused before memory is asked for.
func TestAbsurdFiles(t *testing.T) {
	const most = 1 << 20
	root := t.TempDir()
	made := func(dir, name string, size int64) string {
		dir = filepath.Join(root, dir)
		os.MkdirAll(dir, 0o777)
		f, err := os.Create(filepath.Join(dir, name))
		if err != nil {
			t.Fatal(err)
		}
		defer f.Close()
		if err := f.Truncate(size); err != nil {
			t.Skip("no sparse files here")
		}
		return dir
	}
	part := made("part", partFile, 1<<40)
	whole, _ := Encode(tilter())
	os.WriteFile(filepath.Join(part, frontFile), whole, 0o666)
	for _, c := range []struct {
		what string
		read func() error
	}{
		{"front", func() error { _, err := Read(made("front", frontFile, 1<<40)); return err }},
		{"part", func() error { _, err := ReadPart(part); return err }},
		{"checkpoint", func() error {
			_, err := (&Folder{dir: made("checkpoint", checkpointFile, 1<<40)}).Checkpoint()
			return err
		}},
		{"certificate", func() error {
			_, err := LoadCertificate(filepath.Join(made("proof", "p.json", 1<<40), "p.json"))
			return err
		}},
		{"folder", func() error { _, err := LoadCertificate(root); return err }},
	} {
		var before, after runtime.MemStats
		runtime.ReadMemStats(&before)
		err := c.read()
		runtime.ReadMemStats(&after)
		if err == nil || !strings.Contains(err.Error(), "bytes, more than") && !strings.Contains(err.Error(), "no plain file") {
			t.Errorf("%s: %v", c.what, err)
		}
		if n := after.TotalAlloc - before.TotalAlloc; n > most {
			t.Errorf("%s: refused after %d bytes of memory", c.what, n)
		}
	}
}
