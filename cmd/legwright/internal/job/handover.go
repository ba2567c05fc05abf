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
	values := make([]float64, len(f.Dimensions))
	specs := make([]objective.Spec, len(values))
	for i := range values {
		v, ok := r.Dimensions[f.Dimensions[i].Name]
		if values[i] = float64(v); !ok || math.IsInf(values[i], 0) {
			return nil, fmt.Errorf("the dimension %s is missing; search again", f.Dimensions[i].Name)
		}
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: values[i : i+1]}
	}
	t := s.Tasks[k]
	a := objective.Appraise(t, objective.NewPlan(t, f, specs), values)
	return handover.Files(t, a, handover.Title{Program: Program(), Design: r.ID, Brief: s.Brief.Title, Hash: sourcesHash(sources)}), nil
}
