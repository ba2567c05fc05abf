package job

import (
	"fmt"
	"math"

	"legwright/cmd/legwright/internal/handover"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// AllSheets gives the sheets of the designs that are handed over, by id, side by side.
func (s *Study) AllSheets(f *study.Front, sources *study.Sources, workers int) (map[string]map[string][]byte, error) {
	places := f.HandedOver()
	files, errs := make([]map[string][]byte, len(places)), make([]error, len(places))
	each(len(places), workers, func(i int) {
		files[i], errs[i] = s.Sheets(f.Designs[places[i]], sources)
	})
	out := map[string]map[string][]byte{}
	for i, p := range places {
		if errs[i] != nil {
			return nil, fmt.Errorf("design %s: %w", f.Designs[p].ID, errs[i])
		}
		out[f.Designs[p].ID] = files[i]
	}
	return out, nil
}

// Sheets gives the sheets by which a design of the study's front is handed over: tables and plan drawings, by the names
// of study.SheetNames. The design is judged anew by its dimensions.
func (s *Study) Sheets(r study.Design, sources *study.Sources) (map[string][]byte, error) {
	t, a, err := s.judgedAnew(&r)
	if err != nil {
		return nil, err
	}
	return handover.Files(t, a, s.sheetTitle(&r, sources)), nil
}

// judgedAnew appraises a design of the front by its dimensions.
func (s *Study) judgedAnew(r *study.Design) (*objective.Task, *objective.Appraisal, error) {
	k := s.planOf(r.Family)
	if k < 0 {
		return nil, nil, fmt.Errorf("the family %s is not in the brief; put the brief back that the front was found with", study.Clean(r.Family))
	}
	f := s.Plans[k].Family
	values := dimensionsOf(s.Plans[k], r)
	for i, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return nil, nil, fmt.Errorf("the dimension %s is missing; search again", f.Dimensions[i].Name)
		}
	}
	t := s.Tasks[k]
	return t, objective.Appraise(t, fixed(t, s.Plans[k], values), values), nil
}

func (s *Study) sheetTitle(r *study.Design, sources *study.Sources) handover.Title {
	return handover.Title{Program: Program(), Design: r.ID, Brief: s.Brief.Title, Hash: SourcesHash(sources)}
}

// handover is what the page shows of the sheets of a design.
func (b *sheetBuilder) handover(r *study.Design) (*sheet.Handover, error) {
	t, a, err := b.study.judgedAnew(r)
	if err != nil {
		return nil, fmt.Errorf("design %s: %w", r.ID, err)
	}
	h := handover.Summarize(t, a, b.study.sheetTitle(r, b.run.Sources))
	out := &sheet.Handover{Base: h.Base, Platform: h.Platform}
	for _, v := range []struct {
		file  string
		table handover.Table
	}{
		{study.JointsSheet, h.Joints}, {study.AxesSheet, h.Axes}, {study.ActuatorsSheet, h.Actuators},
		{study.ForcesSheet, h.Forces}, {study.HeightsSheet, h.Heights},
	} {
		out.Tables = append(out.Tables, sheet.Table{Name: v.table.Name, File: v.file, Notes: v.table.Notes, Heads: v.table.Heads, Rows: v.table.Rows})
	}
	return out, nil
}
