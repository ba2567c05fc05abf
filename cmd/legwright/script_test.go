package main

import (
	"errors"
	"flag"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/rogpeppe/go-internal/testscript"

	"legwright/cmd/legwright/internal/study"
)

var update = flag.Bool("update", false, "write the expected texts again")

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"legwright": main})
}

// Each file under testdata/script is one story of commands. `rc N COMMAND…` runs a
// command that must end with status N. $BRIEFS is testdata/briefs.
func TestScripts(t *testing.T) {
	briefs, err := filepath.Abs("../../testdata/briefs")
	if err != nil {
		t.Fatal(err)
	}
	testscript.Run(t, testscript.Params{
		Dir:           "testdata/script",
		UpdateScripts: *update,
		Setup: func(e *testscript.Env) error {
			e.Setenv("NO_COLOR", "1")
			e.Setenv("BRIEFS", briefs)
			return nil
		},
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			// interrupt AFTER COMMAND… sends an interrupt after that time; the command must end with status 130.
			"interrupt": func(ts *testscript.TestScript, neg bool, args []string) {
				after, err := time.ParseDuration(args[0])
				ts.Check(err)
				cmd := exec.Command(args[1], args[2:]...)
				cmd.Dir, cmd.Env = ts.Getenv("WORK"), append(os.Environ(), "NO_COLOR=1", "PATH="+ts.Getenv("PATH"))
				if cmd.Path, err = exec.LookPath(args[1]); err != nil {
					cmd.Path = filepath.Join(filepath.SplitList(ts.Getenv("PATH"))[0], args[1])
					cmd.Err = nil
				}
				ts.Check(cmd.Start())
				time.Sleep(after)
				ts.Check(cmd.Process.Signal(os.Interrupt))
				if err := cmd.Wait(); cmd.ProcessState.ExitCode() != exitInterrupted {
					ts.Fatalf("status %d, want %d: %v", cmd.ProcessState.ExitCode(), exitInterrupted, err)
				}
			},
			// spoil FILE COPY OLD NEW copies a file with one piece of text replaced.
			"spoil": func(ts *testscript.TestScript, neg bool, args []string) {
				text := ts.ReadFile(args[0])
				if !strings.Contains(text, args[2]) {
					ts.Fatalf("%s does not hold %q", args[0], args[2])
				}
				ts.Check(os.WriteFile(ts.MkAbs(args[1]), []byte(strings.Replace(text, args[2], args[3], 1)), 0o666))
			},
			// repeat DONE OUT BRIEF BUDGET searches the evaluations that the study DONE reached, of the budget.
			"repeat": func(ts *testscript.TestScript, neg bool, args []string) {
				front, err := study.Read(ts.MkAbs(args[0]))
				ts.Check(err)
				ts.Check(ts.Exec("legwright", "search", args[2], "-o", args[1], "--quiet",
					"--evaluations", strconv.Itoa(front.Evaluations), "--budget", args[3]))
			},
			"rc": func(ts *testscript.TestScript, neg bool, args []string) {
				if neg || len(args) < 2 {
					ts.Fatalf("usage: rc STATUS COMMAND [ARG]…")
				}
				want, err := strconv.Atoi(args[0])
				ts.Check(err)
				err = ts.Exec(args[1], args[2:]...)
				got := 0
				var exit *exec.ExitError
				if errors.As(err, &exit) {
					got = exit.ExitCode()
				} else if err != nil {
					ts.Fatalf("%v", err)
				}
				if got != want {
					ts.Fatalf("status %d, want %d\n%s%s", got, want, ts.ReadFile("stdout"), ts.ReadFile("stderr"))
				}
			},
		},
	})
}

// The embedded examples are those under testdata/briefs.
func TestExamplesAreInTestdata(t *testing.T) {
	for _, name := range []string{"tilt-table.yaml", "gauge-stage.yaml"} {
		a, err := os.ReadFile("example/" + name)
		if err != nil {
			t.Fatal(err)
		}
		b, err := os.ReadFile("../../testdata/briefs/" + name)
		if err != nil {
			t.Fatal(err)
		}
		if string(a) != string(b) {
			t.Errorf("example/%s and testdata/briefs/%s differ", name, name)
		}
	}
}
