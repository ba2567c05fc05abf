package main

import (
	"errors"
	"fmt"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/study"
)

func newMerge(c *common) *cobra.Command {
	var (
		dir     string
		workers int
		force   bool
	)
	cmd := &cobra.Command{
		Use:   "merge DIR... -o DIR",
		Short: "join the parts of a study into one front",
		Long: `merge joins folders that search --part has written into one study. Its front is
picked from all designs that the parts have kept, up to one common reference point:
the brief's, else the worst of theirs in each goal. front.json says which parts it is
made of. A part that is missing or unfinished is left out with a warning; parts of
another brief, seed, budget, cut or version are refused. The order of the folders
changes nothing.`,
		Example: "  legwright search big.yaml --part 1/4 -o parts/1\n  legwright merge parts/* -o whole",
		Args:    cobra.MinimumNArgs(1),
		RunE: func(cmd *cobra.Command, args []string) error {
			if dir == "" {
				return inputError{fmt.Errorf("legwright merge: no folder for the front; give one with -o DIR")}
			}
			if workers < 0 || workers > mostWorkers {
				return inputError{fmt.Errorf("--workers %d: write a whole number from 1 to %d, or leave it out", workers, mostWorkers)}
			}
			return merge(c, args, dir, workers, force)
		},
	}
	f := cmd.Flags()
	f.StringVarP(&dir, "output", "o", "", "folder for the merged study (required)")
	f.IntVar(&workers, "workers", 0, "designs judged side by side (default: all processors); never changes the result")
	f.BoolVar(&force, "force", false, "replace the study that the folder holds")
	return cmd
}

func merge(c *common, dirs []string, dir string, workers int, force bool) error {
	parts, folders, err := readParts(c, dirs)
	if err != nil {
		return inputError{err}
	}
	first := parts[0]
	s, sources, err := briefOfPart(folders[first], first)
	if err != nil {
		return inputError{err}
	}
	found, err := s.Merge(parts, workers)
	if err != nil {
		return inputError{err}
	}
	if front := found.Front; len(front.Parts.Missing) > 0 {
		c.hint("warning: %s", front.Parts.Note())
	}
	folder, err := study.Create(dir, study.Intent{Force: force})
	if err != nil {
		return inputError{err}
	}
	defer folder.Close()
	mark := job.NewCheckpoint(sources, job.Run{Seed: first.Seed, Evaluations: first.Whole})
	mark.Part = job.Merging
	if err := save(folder, mark); err != nil {
		return err
	}
	if err := put(folder, s, sources, found, dir, workers); err != nil {
		return err
	}
	err = c.show(found.Front, dir)
	if err == nil && len(found.Front.Designs) == 0 {
		err = status(exitLimit)
	}
	return err
}

// readParts reads the parts in the folders, in the order of their numbers, with the folder of each.
// Missing ones are told of.
func readParts(c *common, dirs []string) ([]*study.Part, map[*study.Part]string, error) {
	var parts []*study.Part
	folders := map[*study.Part]string{}
	for _, d := range dirs {
		p, err := study.ReadPart(d)
		if errors.Is(err, study.ErrNoPart) {
			c.hint("warning: %v; left out", err)
			continue
		}
		if err != nil {
			return nil, nil, err
		}
		parts = append(parts, p)
		folders[p] = d
	}
	return parts, folders, job.CheckParts(parts, func(p *study.Part) string { return folders[p] })
}

// briefOfPart reads the brief that lies in a part's folder, and refuses one that was changed since.
func briefOfPart(dir string, p *study.Part) (*job.Study, *study.Sources, error) {
	name, err := study.BriefCopy(dir)
	if err != nil {
		return nil, nil, err
	}
	s, sources, err := studyFrom(name)
	if err != nil {
		return nil, nil, err
	}
	if job.NewCheckpoint(sources, job.Run{}).Brief != p.Brief {
		return nil, nil, fmt.Errorf("%s: the brief there, or a pose file of it, is not the one that was searched; put it back", study.Clean(dir))
	}
	return s, sources, nil
}
