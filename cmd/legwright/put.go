package main

import (
	"errors"

	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/study"
)

// put writes all files of a study into its folder, the page before front.json, which comes last.
func put(folder *study.Folder, s *job.Study, sources *study.Sources, found *job.Found, dir string, workers int) error {
	sheets, err := s.AllSheets(found.Front, sources, workers)
	if err != nil {
		return err
	}
	pageErr := savePage(folder, s, found.Front, job.SheetRun{Sources: sources, Folder: dir, Workers: workers})
	return errors.Join(pageErr, folder.Save(&study.Result{
		Front: found.Front, History: found.History, Sources: *sources, Part: found.Part, Unfinished: found.Interrupted(),
		Certificate: func(d study.Design, text []byte) (*study.Certificate, error) {
			return found.Certificate(d, text, sources)
		},
		Encode: func(d study.Design) ([]byte, error) {
			return job.EncodeDesign(d, "../"+sources.BriefName()), nil
		},
		Sheets: func(d study.Design) (map[string][]byte, error) { return sheets[d.ID], nil },
	}))
}

// show prints a study that was just written: the front as JSON, or the first screen.
func (c *common) show(front *study.Front, dir string) error {
	if c.json {
		return printJSON(c.out, front)
	}
	page := report.PageOf(c.out)
	page.Dir = dir
	return report.FirstScreen(c.out, front, page)
}
