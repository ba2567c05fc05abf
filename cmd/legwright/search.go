package main

import (
	_ "embed"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// exampleName is the file name of the embedded example.
const exampleName = "tilt-table.yaml"

//go:embed example/tilt-table.yaml
var example []byte

func newSearch(c *common) *cobra.Command {
	var (
		dir           string
		run           job.Run
		force, resume bool
	)
	cmd := &cobra.Command{
		Use:   "search [BRIEF] -o DIR",
		Short: "find the geometries of which none is beaten by another in every goal",
		Long: `search reads a brief and searches the dimensions that it leaves open. The study
folder DIR then holds the front, its designs and a copy of the brief. Without BRIEF
it works on an embedded example. The same brief and seed give the same files,
whatever the number of workers.`,
		Args: cobra.MaximumNArgs(1),
		RunE: func(cmd *cobra.Command, args []string) error {
			if dir == "" {
				return inputError{fmt.Errorf("legwright search: no folder for the study; give one with -o DIR")}
			}
			name, text := exampleName, example
			if len(args) == 1 {
				name = args[0]
				var err error
				if text, err = readBrief(name); err != nil {
					return err
				}
			}
			return search(cmd, c, name, text, dir, run, force, resume)
		},
	}
	f := cmd.Flags()
	f.StringVarP(&dir, "output", "o", "", "folder for the study (required)")
	f.IntVar(&run.Evaluations, "evaluations", 0, "designs to look at (default: the brief's, else 20000)")
	f.Int64Var(&run.Seed, "seed", 0, "seed of the random numbers (default: the brief's, else 1)")
	f.IntVar(&run.Workers, "workers", 0, "designs judged side by side (default: all processors); never changes the result")
	f.BoolVar(&force, "force", false, "replace the study that the folder holds, finished or not")
	f.BoolVar(&resume, "resume", false, "replay an interrupted study from the start (the same seed meets the same designs) and on to its end; leave a finished one as it is")
	return cmd
}

// readBrief reads the text of a brief; the reader of briefs judges it.
func readBrief(name string) ([]byte, error) {
	info, err := os.Stat(name)
	if err == nil && !info.Mode().IsRegular() {
		err = fmt.Errorf("%s is not a plain file; give the path of a brief", name)
	}
	if err != nil {
		return nil, inputError{err}
	}
	text, err := os.ReadFile(name)
	if err != nil {
		return nil, inputError{err}
	}
	return text, nil
}

func search(cmd *cobra.Command, c *common, name string, text []byte, dir string, run job.Run, force, resume bool) error {
	b, err := brief.Parse(name, text, *job.Known())
	if err != nil {
		return inputError{err}
	}
	given := job.Settings(b)
	if cmd.Flags().Changed("evaluations") {
		given.Evaluations = run.Evaluations
	}
	if cmd.Flags().Changed("seed") {
		given.Seed = run.Seed
	}
	if force && resume {
		return inputError{fmt.Errorf("--force replaces a study and --resume replays it; give one of them")}
	}
	if least := leastEvaluations * len(b.Families); given.Evaluations < least || given.Evaluations > 1e9 {
		return inputError{fmt.Errorf("%d evaluations: write a whole number from %d to 1000000000", given.Evaluations, least)}
	}
	if given.Seed < 0 {
		return inputError{fmt.Errorf("--seed %d: write a whole number from 0 on", given.Seed)}
	}
	if run.Workers < 0 || run.Workers > 4096 || run.Workers == 0 && cmd.Flags().Changed("workers") {
		return inputError{fmt.Errorf("--workers %d: write a whole number from 1 to 4096, or leave it out", run.Workers)}
	}
	given.Workers = run.Workers
	s, err := job.New(b)
	if err != nil {
		return inputError{err}
	}
	sources, err := sourcesOf(name, text, b)
	if err != nil {
		return inputError{err}
	}
	folder, err := study.Create(dir, study.Intent{Force: force, Resume: resume})
	if err != nil {
		return inputError{err}
	}
	if folder.State() == study.Finished && !force {
		c.hint("%s holds a finished study; nothing to do", dir)
		return nil
	}
	here := job.NewCheckpoint(sources, given)
	before, err := goOn(folder, here, force)
	if err != nil {
		return inputError{fmt.Errorf("%s: %w", dir, err)}
	}
	for _, name := range sources.Apart() {
		c.hint("note: pose file %s is not copied into %s, because its path leads out of the brief's folder; the study does not stand alone", name, dir)
	}
	for _, n := range s.Hints() {
		c.hint("note: %s", n)
	}
	if before == nil { // from here on the folder is known as that of a study
		if err := save(folder, here); err != nil {
			return err
		}
	}
	bar := report.NewProgress(c.err, given.Evaluations, c.quiet)
	given.Progress = func(p opt.Progress) {
		bar.Show(report.Count{Evaluations: p.Evaluations, Feasible: p.Feasible, Hypervolume: p.Hypervolume, Phase: p.Phase})
	}
	found, err := s.Search(cmd.Context(), given)
	bar.Done()
	if err != nil {
		if folder.State() != study.Unfinished { // as it was
			err = errors.Join(err, folder.RemoveCheckpoint())
		}
		return err
	}
	stopped := found.Status == opt.Interrupted
	if stopped && before != nil && before.Evaluations > found.Front.Evaluations {
		c.hint("interrupted after %d evaluations; %s keeps the result of the %d that were made before. --resume replays the study from the start.", found.Front.Evaluations, dir, before.Evaluations)
		return status(exitInterrupted)
	}
	if stopped {
		here.Evaluations = found.Front.Evaluations
		if err := save(folder, here); err != nil {
			return err
		}
	}
	pageErr := savePage(folder, s, found.Front, job.SheetRun{Sources: sources, Folder: dir, Workers: given.Workers})
	err = folder.Save(&study.Result{
		Front: found.Front, History: found.History, Sources: *sources, Unfinished: stopped,
		Encode: func(d study.Design) ([]byte, error) {
			return job.EncodeDesign(d, "../"+sources.BriefName()), nil
		},
		Sheets: func(d study.Design) (map[string][]byte, error) { return s.Sheets(d, sources) },
	})
	if err = errors.Join(err, pageErr); err != nil {
		return err
	}
	if c.json {
		err = printJSON(c.out, found.Front)
	} else {
		page := report.PageOf(c.out)
		page.Dir = dir
		err = report.FirstScreen(c.out, found.Front, page)
	}
	switch {
	case err != nil:
		return err
	case stopped:
		c.hint("interrupted after %d evaluations; what was found is in %s. --resume replays this study from the start: with its seed it meets the same designs, then goes on to the rest.", found.Front.Evaluations, dir)
		return status(exitInterrupted)
	case len(found.Front.Designs) == 0:
		return status(exitLimit)
	}
	return nil
}

// leastEvaluations is the least budget for each family: differential evolution wants four designs.
const leastEvaluations = 4

// goOn gives the checkpoint of the unfinished study that the folder holds, nil for none. It refuses a
// study of another brief, seed or budget.
func goOn(folder *study.Folder, here *job.Checkpoint, force bool) (*job.Checkpoint, error) {
	text, err := folder.Checkpoint()
	if err != nil || force {
		return nil, err
	}
	old, err := job.ReadCheckpoint(text)
	if err != nil || old == nil {
		return nil, err
	}
	return old, here.Continues(old)
}

// save writes the checkpoint into the folder.
func save(folder *study.Folder, c *job.Checkpoint) error {
	text, err := c.Bytes()
	if err != nil {
		return err
	}
	return folder.SaveCheckpoint(text)
}

// sourcesOf are the brief and the pose files that it names, to be copied into the study.
func sourcesOf(name string, text []byte, b *brief.Brief) (*study.Sources, error) {
	s := &study.Sources{Brief: study.File{Name: name, Bytes: text}}
	for _, z := range b.Duty.Zones {
		if z.File == "" {
			continue
		}
		path := z.File
		if !filepath.IsAbs(path) {
			path = filepath.Join(filepath.Dir(name), path)
		}
		bytes, err := os.ReadFile(path)
		if err != nil {
			return nil, err
		}
		s.Poses = append(s.Poses, study.File{Name: z.File, Bytes: bytes})
	}
	return s, nil
}

// printJSON prints v indented.
func printJSON(w io.Writer, v any) error {
	b, err := study.Encode(v)
	if err != nil {
		return err
	}
	_, err = w.Write(b)
	return err
}
