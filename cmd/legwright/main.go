// Command legwright sizes parallel robots: a brief says what the machine must do
// and which dimensions may vary, a search finds the geometries of which none is
// beaten by another in every goal, and the other commands judge, rank and read them.
package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"runtime/debug"
	"strings"
	"syscall"
	"time"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/job"
)

// Exit statuses, as the README documents them.
const (
	exitDone        = 0
	exitInternal    = 1
	exitInput       = 2
	exitLimit       = 3
	exitInterrupted = 130
)

// status is an outcome that is no error of the program: everything was printed already.
type status int

func (s status) Error() string { return fmt.Sprintf("exit status %d", int(s)) }

// inputError marks what is wrong with files, flags and folders.
type inputError struct{ error }

func (e inputError) Unwrap() error { return e.error }

// failure marks what went wrong while a command ran, as against a command line that makes no sense.
type failure struct{ error }

func (f failure) Unwrap() error { return f.error }

func main() { os.Exit(run(os.Args[1:], os.Stdout, os.Stderr)) }

// run is main with its surroundings given, for tests.
func run(args []string, stdout, stderr io.Writer) int {
	ctx, stop := interruptible()
	defer stop()
	root := newRoot(stdout, stderr)
	root.SetArgs(args)
	err := guarded(func() error { return root.ExecuteContext(ctx) })
	var s status
	var in inputError
	var ran failure
	switch {
	case err == nil:
		return exitDone
	case errors.As(err, &s):
		return int(s)
	case errors.As(err, &ran) && !errors.As(err, &in):
		fmt.Fprintln(stderr, "legwright:", err)
		return exitInternal
	}
	fmt.Fprintln(stderr, err) // a file, a flag, or a command that there is not
	return exitInput
}

// guarded turns a panic into a failure, so that it never looks like bad input.
func guarded(f func() error) (err error) {
	defer func() {
		if p := recover(); p != nil {
			err = failure{fmt.Errorf("internal failure: %v\n%s", p, debug.Stack())}
		}
	}()
	return f()
}

// settle is how long after the first signal others are taken for the same one: some senders signal
// both a process and its group.
const settle = 300 * time.Millisecond

// interruptible gives a context that the first signal ends. The next one ends the process at once, with
// the signal's own status (130 in a shell, for Ctrl-C).
func interruptible() (context.Context, context.CancelFunc) {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM, syscall.SIGHUP)
	context.AfterFunc(ctx, func() {
		time.Sleep(settle)
		stop()
	})
	return ctx, stop
}

// common are the flags that every command has.
type common struct {
	json, quiet bool
	out, err    io.Writer
}

func newRoot(stdout, stderr io.Writer) *cobra.Command {
	c := &common{out: stdout, err: stderr}
	root := &cobra.Command{
		Use:   "legwright",
		Short: "size parallel robots: from a duty to dimensions",
		Long: `legwright sizes closed-chain machines. A brief states the poses to be reached,
the loads and speeds, the actuators and joints that can be had, which dimensions
may vary and what counts as better. The search gives a ranked set of geometries of
which none is beaten by another in every goal.

It is a geometry study, not a safety assessment: README, "What it is not".`,
		Version:           job.Version,
		SilenceErrors:     true,
		SilenceUsage:      true,
		CompletionOptions: cobra.CompletionOptions{HiddenDefaultCmd: true},
		Args: func(cmd *cobra.Command, args []string) error {
			if len(args) == 0 {
				return nil
			}
			near := ""
			if s := cmd.SuggestionsFor(args[0]); len(s) > 0 {
				near = "; did you mean " + strings.Join(s, " or ") + "?"
			}
			return fmt.Errorf("legwright: there is no command %q%s", args[0], near)
		},
		SuggestionsMinimumDistance: 2,
		RunE:                       func(cmd *cobra.Command, _ []string) error { return cmd.Help() },
	}
	root.SetOut(stdout)
	root.SetErr(stderr)
	root.PersistentFlags().BoolVar(&c.json, "json", false, "print JSON in SI units and radians on standard output, and nothing else there")
	root.PersistentFlags().BoolVar(&c.quiet, "quiet", false, "no progress, hints or warnings on standard error")
	root.SetFlagErrorFunc(func(cmd *cobra.Command, err error) error {
		return inputError{fmt.Errorf("%w; see legwright help %s", err, cmd.Name())}
	})
	root.AddCommand(
		newSearch(c), newRank(c), newAppraise(c), newProve(c), newLocate(c), newReport(c), newMerge(c), newFamilies(c), newStarter(c),
	)
	for _, cmd := range root.Commands() {
		args, work := cmd.Args, cmd.RunE
		cmd.RunE = func(cmd *cobra.Command, a []string) error {
			if err := work(cmd, a); err != nil {
				return failure{err}
			}
			return nil
		}
		cmd.Args = func(cmd *cobra.Command, a []string) error {
			if err := args(cmd, a); err != nil {
				return inputError{fmt.Errorf("legwright %s: %w; usage: %s", cmd.Name(), err, cmd.UseLine())}
			}
			return nil
		}
	}
	return root
}

// hint writes a line for people on standard error.
func (c *common) hint(format string, args ...any) {
	if !c.quiet {
		fmt.Fprintf(c.err, format+"\n", args...)
	}
}
