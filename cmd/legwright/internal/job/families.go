package job

import (
	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// families tells what the search found of each family of the brief.
func (s *Study) families(out *opt.Outcome, workers int) []study.FamilyFound {
	if len(s.Plans) == 1 {
		return nil
	}
	found := make([]study.FamilyFound, len(s.Plans))
	for i, p := range s.Plans {
		o := &out.Spaces[i]
		found[i] = study.FamilyFound{
			Name: p.Family.Name, Evaluations: o.Evaluations, Feasible: o.Feasible,
			Best: s.records(s.appraise(o.Best, workers)),
		}
		if near := s.records(s.appraise(o.Near[:min(1, len(o.Near))], workers)); len(near) > 0 {
			found[i].Nearest = &near[0]
		}
	}
	return found
}
