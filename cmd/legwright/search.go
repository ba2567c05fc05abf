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
	"legwright/objective/proof"
	"legwright/opt"
)

// exampleName is the file name of the embedded example.
const exampleName = "tilt-table.yaml"

//go:embed example/tilt-table.yaml
var example []byte

func newSearch(c *common) *cobra.Command {
	var (
		dir   string
		flags runFlags
	)
	cmd := &cobra.Command{
		Use:   "search [BRIEF] -o DIR",
		Short: "find the geometries of which none is beaten by another in every goal",
		Long: `search reads a brief and searches the dimensions that it leaves open. The study
folder DIR then holds the front, its designs and a copy of the brief. Without BRIEF
it works on an embedded example. The same brief and seed give the same files,
whatever the number of workers.

A search ends when its evaluations are spent, when its --time is over, or when its
hypervolume stalls (search.stall of the brief), whichever comes first. What was
evaluated is saved at a slow beat: a search that was interrupted, killed or cut off
goes on with --resume and gives the same files as one that was not. Time counts over
all its runs.

--prove N proves the N designs of best rank over the continuous duty, their sized
ranges widened to what all poses need for certain. It does so when three quarters of
the evaluations are spent, and again at the end. A pose that refutes a design joins
the required ones for the rest of the search.

--part 3/16 searches one part of a study by itself, with its own random numbers and
its share of the evaluations; legwright merge joins the parts.`,
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
			return search(cmd, c, name, text, dir, &flags)
		},
	}
	cmd.Flags().StringVarP(&dir, "output", "o", "", "folder for the study (required)")
	flags.add(cmd)
	return cmd
}

// readBrief reads the text of a brief; the reader of briefs judges it.
func readBrief(name string) ([]byte, error) {
	info, err := os.Stat(name)
	if errors.Is(err, os.ErrNotExist) {
		err = fmt.Errorf("there is no file %s; give the path of a brief, or none for the embedded example", study.Clean(name))
	} else if err == nil && !info.Mode().IsRegular() {
		err = fmt.Errorf("%s is not a plain file; give the path of a brief", name)
	}
	if err != nil {
		return nil, inputError{err}
	}
	text, err := brief.ReadText(name)
	if err != nil {
		return nil, inputError{err}
	}
	return text, nil
}

func search(cmd *cobra.Command, c *common, name string, text []byte, dir string, flags *runFlags) error {
	b, err := brief.Parse(name, text, *job.Known())
	if err != nil {
		return inputError{err}
	}
	given, err := flags.run(cmd, b)
	if err != nil {
		return err
	}
	s, err := job.New(b)
	if err != nil {
		return inputError{err}
	}
	sources, err := sourcesOf(name, text, b)
	if err != nil {
		return inputError{err}
	}
	folder, err := study.Create(dir, study.Intent{Force: flags.force, Resume: flags.resume})
	if err != nil {
		return inputError{err}
	}
	defer folder.Close()
	if folder.State() == study.Finished && !flags.force {
		c.hint("%s holds a finished study; nothing to do", dir)
		return nil
	}
	if !folder.Locked() {
		c.hint("note: %s is on a file system without locks; let no other process work in it", dir)
	}
	here := job.NewCheckpoint(sources, given)
	before, err := goOn(c, folder, here, flags.force)
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
	log, kept, err := folder.OpenLog(here.Key(), before == nil)
	if err != nil {
		return err
	}
	if before != nil {
		c.goesOn(dir, kept)
	}
	given.Journal = job.NewJournal(log, kept, flags.beat, func(text string) { c.hint("warning: %s", text) })
	bar := report.NewProgress(c.err, given.Part.Share(given.Evaluations), c.quiet)
	var last report.Count
	given.Progress = func(p opt.Progress) {
		n := report.Count{Evaluations: p.Evaluations, Feasible: p.Feasible, Hypervolume: p.Hypervolume, Phase: p.Phase}
		if p.Evaluations < kept.Records {
			n.Phase = "from the checkpoint"
		}
		last = n
		bar.Show(n)
	}
	given.Proving = func(done, of int, p proof.Progress) { bar.Show(report.Proving(last, done, of, p.Settled)) }
	found, err := s.Search(cmd.Context(), given)
	bar.Done()
	log.Close()
	if err != nil {
		if folder.State() != study.Unfinished { // as it was
			err = errors.Join(err, folder.RemoveCheckpoint())
		}
		return err
	}
	stopped := found.Interrupted()
	if stopped && before != nil && before.Evaluations > found.Front.Evaluations {
		c.hint("interrupted after %d evaluations; %s keeps the result of the %d that were made before. --resume goes on with it.", found.Front.Evaluations, dir, before.Evaluations)
		return status(exitInterrupted)
	}
	if stopped {
		here.Evaluations = found.Front.Evaluations
		if err := save(folder, here); err != nil {
			return err
		}
	}
	if found.Part != nil {
		found.Part.Brief = here.Brief
	}
	if err := put(folder, s, sources, found, dir, given.Workers); err != nil {
		if text, e := folder.Checkpoint(); e == nil && text != nil {
			err = fmt.Errorf("%w\nwhat was evaluated is safe in the checkpoint; mend this and go on with --resume", err)
		}
		return err
	}
	c.ended(found, &given)
	err = c.show(found.Front, dir)
	switch {
	case err != nil:
		return err
	case stopped:
		c.hint("interrupted after %d evaluations; what was found is in %s. --resume goes on with it, to the same files as those of a search that was not interrupted.", found.Front.Evaluations, dir)
		return status(exitInterrupted)
	case len(found.Front.Designs) == 0:
		return status(exitLimit)
	}
	return nil
}

// leastEvaluations is the least budget for each family: differential evolution wants four designs.
const leastEvaluations = 4

// goOn gives the checkpoint of the unfinished study that the folder holds, nil for none. It refuses a
// study of another brief, part, seed or budget.
func goOn(c *common, folder *study.Folder, here *job.Checkpoint, force bool) (*job.Checkpoint, error) {
	text, err := folder.Checkpoint()
	if err != nil || force {
		return nil, err
	}
	old, err := job.ReadCheckpoint(text)
	if err == nil && old != nil {
		err = here.Continues(old)
	}
	if (err != nil || old == nil) && folder.LogFits(here.Key()) {
		c.hint("warning: checkpoint.json is missing or damaged; checkpoint.log is of this study, which goes on with it")
		mended := *here
		return &mended, save(folder, here)
	}
	return old, err
}

// goesOn tells what an interrupted study has left, and what of it is lost.
func (c *common) goesOn(dir string, k *study.Kept) {
	switch {
	case k.Other:
		c.hint("warning: the log of the checkpoint in %s is damaged at its beginning or of another run; the search begins anew", dir)
	case k.Lost > 0:
		c.hint("warning: the last %d bytes of the checkpoint in %s are not whole: a process was killed while it wrote them, or the disk has damaged them. What they held is evaluated again.", k.Lost, dir)
	}
	c.hint("goes on after %d evaluations of the checkpoint, from %v of work", k.Records, k.Spent)
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
