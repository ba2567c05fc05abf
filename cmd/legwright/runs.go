package main

import (
	"fmt"
	"time"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/job"
	"legwright/opt"
)

// runFlags are the flags of search that say how it runs.
type runFlags struct {
	evaluations, budget int
	seed                int64
	workers             int
	time, beat          time.Duration
	part                string
	force, resume       bool
	prove               int
}

// Bounds on the flags.
const (
	mostEvaluations = 1_000_000_000
	mostWorkers     = 4096
	mostProved      = 500
	leastBeat       = 10 * time.Millisecond
)

func (r *runFlags) add(cmd *cobra.Command) {
	f := cmd.Flags()
	f.IntVar(&r.evaluations, "evaluations", 0, "designs to look at, of all parts together (default: the brief's, else 20000)")
	f.IntVar(&r.budget, "budget", 0, "designs that the search is laid out for, if --evaluations stops it before: repeats a search that time has stopped")
	f.DurationVar(&r.time, "time", 0, "stop after this time, such as 2h or 90s, if evaluations are left then (default: the brief's, else none)")
	f.Int64Var(&r.seed, "seed", 0, "seed of the random numbers (default: the brief's, else 1)")
	f.IntVar(&r.workers, "workers", 0, "designs judged side by side (default: all processors); never changes the result")
	f.StringVar(&r.part, "part", "", "K/N: search part K of N, an independent search with its share of the evaluations, for merge")
	f.IntVar(&r.prove, "prove", 0, "designs of best rank to prove over the continuous duty; what refutes one joins the duty for the rest of the search")
	f.DurationVar(&r.beat, "checkpoint", 30*time.Second, "time between checkpoints")
	f.BoolVar(&r.force, "force", false, "replace the study that the folder holds, finished or not")
	f.BoolVar(&r.resume, "resume", false, "go on with an interrupted study from its last checkpoint; leave a finished one as it is")
}

// run puts the flags over the brief's own settings. What is wrong with them is an inputError.
func (r *runFlags) run(cmd *cobra.Command, b *brief.Brief) (job.Run, error) {
	given := job.Settings(b)
	set := func(name string) bool { return cmd.Flags().Changed(name) }
	refuse := func(format string, a ...any) (job.Run, error) {
		return given, inputError{fmt.Errorf(format, a...)}
	}
	if set("evaluations") {
		given.Evaluations = r.evaluations
	}
	if set("seed") {
		given.Seed = r.seed
	}
	if set("time") {
		given.Time = r.time
	}
	var err error
	if given.Part, err = job.ParsePart(r.part); err != nil || r.part == "" && set("part") {
		return refuse("%w", err)
	}
	least := leastEvaluations * len(b.Families)
	switch {
	case r.force && r.resume:
		return refuse("--force replaces a study and --resume goes on with it; give one of them")
	case given.Evaluations < least || given.Evaluations > mostEvaluations:
		return refuse("%d evaluations: write a whole number from %d to %d", given.Evaluations, least, mostEvaluations)
	case set("budget") && !set("evaluations"):
		return refuse("--budget %d: say with --evaluations where the search stops before", r.budget)
	case set("budget") && (r.budget < given.Evaluations || r.budget > mostEvaluations):
		return refuse("--budget %d: write a whole number from the --evaluations, %d, to %d", r.budget, given.Evaluations, mostEvaluations)
	case given.Seed < 0:
		return refuse("--seed %d: write a whole number from 0 on", given.Seed)
	case r.workers < 0 || r.workers > mostWorkers || r.workers == 0 && set("workers"):
		return refuse("--workers %d: write a whole number from 1 to %d, or leave it out", r.workers, mostWorkers)
	case set("time") && (r.time <= 0 || r.time.Seconds() > brief.LongestTime):
		return refuse("--time %v: write a time such as 2h or 90s, of at most ten years", r.time)
	case r.prove < 0 || r.prove > mostProved || r.prove == 0 && set("prove"):
		return refuse("--prove %d: write a whole number from 1 to %d, or leave it out", r.prove, mostProved)
	case r.prove > 0 && set("part"):
		return refuse("--prove goes with a whole study; prove designs of the merged front with legwright prove")
	case r.beat < leastBeat:
		return refuse("--checkpoint %v: write a time such as 30s, of at least %v", r.beat, leastBeat)
	}
	given.Workers, given.Prove = r.workers, r.prove
	if set("budget") && r.budget > given.Evaluations {
		given.StopAt, given.Evaluations = given.Evaluations, r.budget
	}
	if share := given.Part.Share(given.Evaluations); share < least {
		return refuse("--part %s: %d evaluations for each part are too few, at least %d are needed; ask for more --evaluations or fewer parts", given.Part, share, least)
	} else if given.StopAt > share {
		return refuse("--evaluations %d: with --budget they are this part's, whose share of %d is %d", given.StopAt, given.Evaluations, share)
	}
	return given, nil
}

// ended tells why a search ended before its budget was spent, and how to repeat it.
func (c *common) ended(found *job.Found, given *job.Run) {
	n, budget := found.Front.Evaluations, given.Evaluations
	switch found.Status {
	case opt.TimeSpent:
		c.hint("stopped by time after %d of %d evaluations; --evaluations %d --budget %d repeats this search", n, given.Part.Share(budget), n, budget)
	case opt.Stalled:
		c.hint("stopped after %d of %d evaluations, because the hypervolume grew by less than %g %% over the last %d", n, given.Part.Share(budget), 100*given.Stall.Gain, given.Stall.Evaluations)
	case opt.Exhausted:
		c.hint("stopped after %d evaluations: every design of the brief was tried", n)
	case opt.BudgetSpent, opt.NoFeasible:
		if given.Time > 0 {
			c.hint("all %d evaluations were made before the time was over; ask for more --evaluations to use it", n)
		}
	}
}
