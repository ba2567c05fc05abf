package job

import (
	"fmt"
	"math"

	"legwright/cmd/legwright/internal/handover"
	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// Sheets gives the sheets by which a design of the study's front is handed over: tables and plan drawings, by the names
// of study.SheetNames. The design is judged anew by its dimensions.
func (s *Study) Sheets(r study.Design, sources *study.Sources) (map[string][]byte, error) {
	k := s.planOf(r.Family)
	if k < 0 {
		return nil, fmt.Errorf("the family %s is not in the brief; put the brief back that the front was found with", study.Clean(r.Family))
	}
	f := s.Plans[k].Family
	values := dimensionsOf(s.Plans[k], &r)
	for i, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return nil, fmt.Errorf("the dimension %s is missing; search again", f.Dimensions[i].Name)
		}
	}
	t := s.Tasks[k]
	a := objective.Appraise(t, fixed(t, s.Plans[k], values), values)
	return handover.Files(t, a, handover.Title{Program: Program(), Design: r.ID, Brief: s.Brief.Title, Hash: sourcesHash(sources)}), nil
}
