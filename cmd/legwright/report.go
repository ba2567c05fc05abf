package main

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/report/page"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
)

func newReport(c *common) *cobra.Command {
	var detail []string
	cmd := &cobra.Command{
		Use:   "report DIR",
		Short: "write the report page of a study again",
		Long: `report writes report.html into a study folder: the front to filter and to weigh, and a
sheet for each design. Sheets in full, with the machine's way through the duty, maps and
sensitivities, are made of the best 20 designs and those with a mark; --detail adds
others, with the maps of every pair of coordinates, and writes their drawings, tables and
schedules into designs/ID. All other files stay as they are.
With --json the data of the page go to standard output too.`,
		Example: "  legwright report out --detail 057",
		Args:    cobra.ExactArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			folder, front, err := study.Open(args[0])
			if err != nil {
				return inputError{err}
			}
			defer folder.Close()
			s, sources, err := studyOf(folder)
			if err != nil {
				return inputError{err}
			}
			folder.Certified(front, job.SourcesHash(sources))
			for i, id := range detail {
				if len(id) < 3 {
					detail[i] = strings.Repeat("0", 3-len(id)) + id
				}
			}
			run := job.SheetRun{Sources: sources, Folder: args[0], Detail: detail}
			data, err := s.Sheet(front, run)
			if err != nil {
				return inputError{fmt.Errorf("%s: %w", study.Clean(args[0]), err)}
			}
			text, err := pageOf(data, front)
			if err != nil {
				return err
			}
			if err := folder.SavePage(text); err != nil {
				return err
			}
			if err := saveSheets(folder, s, front, sources, detail); err != nil {
				return err
			}
			if c.json {
				return printJSON(c.out, data)
			}
			_, err = fmt.Fprintln(c.out, folder.Page())
			return err
		},
	}
	cmd.Flags().StringSliceVar(&detail, "detail", nil, "ids of designs to show in full besides the best ones (may be repeated)")
	return cmd
}

// saveSheets writes what is handed over of the designs with the ids.
func saveSheets(folder *study.Folder, s *job.Study, front *study.Front, sources *study.Sources, ids []string) error {
	for i := range front.Designs {
		d := &front.Designs[i]
		if !slices.Contains(ids, d.ID) {
			continue
		}
		files, err := s.Sheets(*d, sources)
		if err != nil {
			return fmt.Errorf("design %s: %w", d.ID, err)
		}
		if err := folder.SaveSheets(d.ID, files); err != nil {
			return err
		}
	}
	return nil
}

// pageOf puts into the data what is said in words, and draws the page.
func pageOf(data *sheet.Data, front *study.Front) ([]byte, error) {
	data.Steps = append(data.Steps, report.Steps(front)...)
	data.Help = report.Shortfall(front)
	return page.WritePage(data)
}

// savePage writes the report page of a study that is about to be saved.
func savePage(folder *study.Folder, s *job.Study, front *study.Front, run job.SheetRun) error {
	data, err := s.Sheet(front, run)
	if err != nil {
		return err
	}
	text, err := pageOf(data, front)
	if err != nil {
		return err
	}
	return folder.SavePage(text)
}

// studyOf reads the study that the folder holds from its own copy of the brief.
func studyOf(folder *study.Folder) (*job.Study, *study.Sources, error) {
	name, err := folder.Brief()
	if err != nil {
		return nil, nil, err
	}
	return studyFrom(name)
}

// studyFrom reads the study of a brief.
func studyFrom(name string) (*job.Study, *study.Sources, error) {
	text, err := brief.ReadText(name)
	if err != nil {
		return nil, nil, err
	}
	b, err := brief.Parse(name, text, *job.Known())
	if err != nil {
		return nil, nil, err
	}
	sources, err := sourcesOf(name, text, b)
	if err != nil {
		return nil, nil, errors.Join(err, fmt.Errorf("%s names it; put it back", study.Clean(name)))
	}
	s, err := job.New(b)
	return s, sources, err
}
