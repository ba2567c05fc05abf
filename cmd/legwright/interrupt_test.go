package main

import (
	"bufio"
	"errors"
	"os"
	"os/exec"
	"syscall"
	"testing"
	"time"
)

// The first signal ends the context and leaves the process to save what it has; a later one ends the
// process, however busy it is.
func TestSecondInterruptEndsTheProcess(t *testing.T) {
	const busy = "LEGWRIGHT_TEST_BUSY"
	if os.Getenv(busy) != "" {
		ctx, stop := interruptible()
		defer stop()
		os.Stdout.WriteString("ready\n")
		<-ctx.Done()
		os.Stdout.WriteString("saving\n")
		time.Sleep(time.Minute) // does not look at ctx
		return
	}
	cmd := exec.Command(os.Args[0], "-test.run=^TestSecondInterruptEndsTheProcess$")
	cmd.Env = append(os.Environ(), busy+"=1")
	out, err := cmd.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	defer cmd.Process.Kill()
	lines := bufio.NewScanner(out)
	read := func(want string) {
		if !lines.Scan() || lines.Text() != want {
			t.Fatalf("the process says %q, want %q", lines.Text(), want)
		}
	}
	read("ready")
	cmd.Process.Signal(os.Interrupt)
	cmd.Process.Signal(os.Interrupt) // as of a sender that signals twice
	read("saving")
	ended := make(chan error, 1)
	go func() { ended <- cmd.Wait() }()
	again := time.NewTicker(settle)
	defer again.Stop()
	for deadline := time.After(20 * time.Second); ; {
		select {
		case err := <-ended:
			var exit *exec.ExitError
			if !errors.As(err, &exit) {
				t.Fatalf("ended with %v, want by the signal", err)
			}
			if s, ok := exit.Sys().(syscall.WaitStatus); !ok || s.Signal() != syscall.SIGINT {
				t.Errorf("ended with %v, want by an interrupt", err)
			}
			return
		case <-again.C:
			cmd.Process.Signal(os.Interrupt)
		case <-deadline:
			t.Fatal("further interrupts do not end the process")
		}
	}
}
