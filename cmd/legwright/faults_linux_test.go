package main

import (
	"errors"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
)

// mount mounts a small file system in memory, for a superuser that may; others skip.
func mount(t *testing.T, dir, size string) {
	t.Helper()
	if os.Geteuid() != 0 {
		t.Skip("needs root, to mount a small file system")
	}
	if err := os.Mkdir(dir, 0o777); err != nil {
		t.Fatal(err)
	}
	if err := syscall.Mount("legwright-test", dir, "tmpfs", 0, "size="+size); err != nil {
		t.Skipf("cannot mount a file system here: %v", err)
	}
	t.Cleanup(func() {
		if err := syscall.Unmount(dir, 0); err != nil {
			t.Error(err)
		}
	})
}

// exit is the exit status of a command.
func exit(t *testing.T, cmd *exec.Cmd) int {
	t.Helper()
	err := cmd.Run()
	var e *exec.ExitError
	if err != nil && !errors.As(err, &e) {
		t.Fatal(err)
	}
	return cmd.ProcessState.ExitCode()
}

// A search whose disk is full goes on, says so, writes no half file and ends with an error; once there is
// room, it goes on from its checkpoint to the files of a search that always had room.
func TestFullDisk(t *testing.T) {
	if testing.Short() {
		t.Skip("searches for some seconds")
	}
	root := t.TempDir()
	roomy, small := filepath.Join(root, "roomy"), filepath.Join(root, "small")
	os.Mkdir(roomy, 0o777)
	mount(t, small, "200k")
	brief := filepath.Join(root, "stage.yaml")
	if err := os.WriteFile(brief, []byte(resumeBrief), 0o666); err != nil {
		t.Fatal(err)
	}
	args := []string{"search", "../stage.yaml", "-o", "out", "--evaluations", "5000", "--checkpoint", "20ms"}
	cmd, said := program(t, roomy, args...)
	if n := exit(t, cmd); n != exitDone {
		t.Fatalf("status %d: %s", n, said)
	}
	want := tree(t, filepath.Join(roomy, "out"))

	cmd, said = program(t, small, args...)
	if n := exit(t, cmd); n != exitInternal {
		t.Fatalf("on a full disk: status %d: %s", n, said)
	}
	for _, words := range []string{"no space left on device", "are not saved yet", "make room", "go on with --resume"} {
		if !strings.Contains(said.String(), words) {
			t.Errorf("said %q, want %q in it", said, words)
		}
	}
	for name, text := range tree(t, filepath.Join(small, "out")) {
		if whole, ok := want[name]; ok && whole != text {
			t.Errorf("%s is not whole", name)
		} else if !ok && !strings.HasPrefix(name, "checkpoint.") {
			t.Errorf("%s is left behind", name)
		}
	}
	if err := syscall.Mount("legwright-test", small, "tmpfs", syscall.MS_REMOUNT, "size=100m"); err != nil {
		t.Fatal(err)
	}
	cmd, said = program(t, small, append(args, "--resume")...)
	if n := exit(t, cmd); n != exitDone || !strings.Contains(said.String(), "goes on after") || strings.Contains(said.String(), "goes on after 0 ") {
		t.Fatalf("with room: status %d: %s", n, said)
	}
	sameFiles(t, tree(t, filepath.Join(small, "out")), want)
	// A disk without any room is refused at once.
	if err := os.WriteFile(filepath.Join(small, "fill"), make([]byte, 99<<20), 0o666); err == nil {
		os.WriteFile(filepath.Join(small, "rest"), make([]byte, 2<<20), 0o666)
	}
	cmd, said = program(t, small, "search", "../stage.yaml", "-o", "none", "--evaluations", "300")
	if n := exit(t, cmd); n == exitDone || !strings.Contains(said.String(), "no space left on device") {
		t.Errorf("no room at all: status %d: %s", n, said)
	}
}

// A folder on a file system that is mounted read-only is refused, as new and as one to go on with.
func TestReadOnlyFileSystem(t *testing.T) {
	root := t.TempDir()
	dir := filepath.Join(root, "closed")
	mount(t, dir, "10m")
	if err := os.WriteFile(filepath.Join(root, "stage.yaml"), []byte(resumeBrief), 0o666); err != nil {
		t.Fatal(err)
	}
	out := filepath.Join(dir, "out")
	os.Mkdir(out, 0o777)
	os.WriteFile(filepath.Join(out, "checkpoint.json"), []byte(`{"program": "legwright 0.1.0"}`), 0o666)
	if err := syscall.Mount("legwright-test", dir, "tmpfs", syscall.MS_REMOUNT|syscall.MS_RDONLY, ""); err != nil {
		t.Fatal(err)
	}
	for _, args := range [][]string{{"-o", "closed/new"}, {"-o", "closed/out", "--resume"}, {"-o", "closed/out", "--force"}} {
		cmd, said := program(t, root, append([]string{"search", "stage.yaml", "--evaluations", "300"}, args...)...)
		if n := exit(t, cmd); n != exitInput || !strings.Contains(said.String(), "read-only file system") || !strings.Contains(said.String(), "may write to") {
			t.Errorf("%v: status %d: %s", args, n, said)
		}
	}
}

// A second process in the folder of a search that runs is refused with the first one's number, whatever
// it wants, and does not disturb the first.
func TestSecondProcess(t *testing.T) {
	root := t.TempDir()
	if err := os.WriteFile(filepath.Join(root, "stage.yaml"), []byte(resumeBrief), 0o666); err != nil {
		t.Fatal(err)
	}
	args := []string{"search", "stage.yaml", "-o", "out", "--evaluations", "3000000", "--quiet"}
	first, said := program(t, root, args...)
	if err := first.Start(); err != nil {
		t.Fatal(err)
	}
	defer first.Process.Kill()
	waitFor(t, filepath.Join(root, "out", "checkpoint.log"))
	for _, more := range [][]string{nil, {"--resume"}, {"--force"}} {
		cmd, heard := program(t, root, append(args, more...)...)
		if n := exit(t, cmd); n != exitInput || !strings.Contains(heard.String(), "process ") || !strings.Contains(heard.String(), " is at work in the folder") {
			t.Errorf("%v: status %d: %s", more, n, heard)
		}
	}
	first.Process.Signal(os.Interrupt)
	if first.Wait(); first.ProcessState.ExitCode() != exitInterrupted {
		t.Errorf("the first: status %d: %s", first.ProcessState.ExitCode(), said)
	}
	for _, name := range []string{"front.json", "checkpoint.json", "checkpoint.log"} {
		if _, err := os.Stat(filepath.Join(root, "out", name)); err != nil {
			t.Error(err)
		}
	}
}

// Absurd paths are refused in a line or two.
func TestAbsurdPaths(t *testing.T) {
	root := t.TempDir()
	if err := os.WriteFile(filepath.Join(root, "stage.yaml"), []byte(resumeBrief), 0o666); err != nil {
		t.Fatal(err)
	}
	long := strings.Repeat("p", 5000)
	for _, args := range [][]string{
		{"search", "stage.yaml", "-o", long},
		{"search", "stage.yaml", "-o", strings.Repeat("p/", 2500)},
		{"search", long, "-o", "out"},
		{"merge", long, "-o", "out"},
		{"merge", "stage.yaml", "-o", long},
		{"rank", long},
		{"appraise", long},
	} {
		cmd, said := program(t, root, args...)
		if n := exit(t, cmd); n != exitInput || said.Len() > 8000 || said.Len() == 0 {
			t.Errorf("%s: status %d, %d bytes: %.300s", args[0], n, said.Len(), said)
		}
	}
}
