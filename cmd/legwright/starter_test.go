package main

import (
	"bytes"
	"os"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
)

// The starter brief of every family runs as it is and finds feasible designs within
// 600 evaluations; the design files that it leaves are read back and hold.
func TestStarterFindsDesigns(t *testing.T) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			if testing.Short() && f.Name != "five-bar" {
				t.Skip("one family is enough for short runs")
			}
			t.Chdir(t.TempDir())
			text, err := starter(f)
			if err != nil {
				t.Fatal(err)
			}
			if err := os.WriteFile("brief.yaml", []byte(text), 0o666); err != nil {
				t.Fatal(err)
			}
			legwright(t, exitDone, "search", "brief.yaml", "-o", "out", "--evaluations", "600", "--quiet")
			front, err := study.Read("out")
			if err != nil {
				t.Fatal(err)
			}
			if len(front.Designs) < 3 {
				t.Errorf("%d designs", len(front.Designs))
			}
			legwright(t, exitDone, "appraise", "out/designs/001.yaml")
			legwright(t, exitDone, "rank", "out")
		})
	}
}

// legwright runs a command that must end with the status, and gives what it prints.
func legwright(t *testing.T, want int, args ...string) string {
	t.Helper()
	var stdout, stderr bytes.Buffer
	if got := run(args, &stdout, &stderr); got != want {
		t.Fatalf("legwright %q: status %d, want %d\n%s%s", args, got, want, stdout.String(), stderr.String())
	}
	return stdout.String()
}
