//go:build unix

package study

import (
	"bufio"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// While one process has a folder open no other gets it, and is told who has it; once that process is
// killed, its file that stays behind keeps nobody out.
func TestLockEndsWithItsProcess(t *testing.T) {
	const held = "LEGWRIGHT_TEST_HOLD"
	if dir := os.Getenv(held); dir != "" {
		if _, err := Create(dir, Intent{}); err != nil {
			t.Fatal(err)
		}
		os.Stdout.WriteString("held\n")
		select {}
	}
	dir := t.TempDir()
	cmd := exec.Command(os.Args[0], "-test.run=^TestLockEndsWithItsProcess$")
	cmd.Env = append(os.Environ(), held+"="+dir)
	out, err := cmd.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	defer cmd.Process.Kill()
	if lines := bufio.NewScanner(out); !lines.Scan() || lines.Text() != "held" {
		t.Fatalf("the process says %q", lines.Text())
	}
	for _, intent := range []Intent{{}, {Resume: true}, {Force: true}} {
		f, err := Create(dir, intent)
		who := fmt.Sprintf("process %d on ", cmd.Process.Pid)
		if err == nil || !strings.Contains(err.Error(), who) || !strings.Contains(err.Error(), dir) {
			t.Fatalf("%+v: %v, %v; want a refusal that names %q", intent, f, err, who)
		}
	}
	cmd.Process.Kill()
	cmd.Wait()
	if _, err := os.Stat(filepath.Join(dir, lockFile)); err != nil {
		t.Errorf("the killed process left no file, so this tests too little: %v", err)
	}
	f, err := Create(dir, Intent{})
	if err != nil {
		t.Fatal(err)
	}
	if !f.Locked() {
		t.Error("not locked")
	}
	if err := f.Close(); err != nil {
		t.Error(err)
	}
	if got := files(t, dir); len(got) != 0 {
		t.Errorf("left behind: %v", got)
	}
}

// An unfinished study that a process works on is refused with that process, not with advice to resume.
func TestBusyStudyIsNotResumed(t *testing.T) {
	dir := t.TempDir()
	f, err := Create(dir, Intent{})
	if err != nil {
		t.Fatal(err)
	}
	if err := f.SaveCheckpoint([]byte(checkpoint)); err != nil {
		t.Fatal(err)
	}
	if _, err := Create(dir, Intent{}); err == nil || !strings.Contains(err.Error(), "at work") {
		t.Errorf("at work: %v", err)
	}
	f.Close()
	if _, err := Create(dir, Intent{}); err == nil || !strings.Contains(err.Error(), "--resume") {
		t.Errorf("left: %v", err)
	}
	if _, err := os.Stat(filepath.Join(dir, lockFile)); err == nil {
		t.Error("a refusal leaves a lock file")
	}
}
