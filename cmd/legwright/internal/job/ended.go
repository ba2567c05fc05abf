package job

import (
	"fmt"

	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// stoppedBy is the rule that ended a search, as files record it.
func stoppedBy(s opt.Status) string {
	switch s {
	case opt.TimeSpent:
		return "time"
	case opt.Stalled:
		return "stall"
	case opt.Interrupted:
		return "interrupt"
	case opt.Exhausted:
		return "exhausted"
	}
	return "evaluations"
}

// maxFault bounds the words of a fault, which may hold any values.
const maxFault = 200

// fault words a panic in the judging of a design.
func fault(p any) string {
	text := []rune(study.Clean(fmt.Sprintf("panic: %v", p)))
	return string(text[:min(len(text), maxFault)])
}

// failed are the designs that could not be judged, as far as the search kept them.
func (s *Study) failed(out *opt.Outcome) []study.Failed {
	var list []study.Failed
	for i := range out.Failed {
		d := &out.Failed[i]
		f := s.Plans[d.Space].Family
		one := study.Failed{Family: f.Name, Dimensions: map[string]study.Number{}, Why: d.Fault}
		for k, v := range s.values(d) {
			if v == v { // sized ones are not known
				one.Dimensions[f.Dimensions[k].Name] = study.Number(v)
			}
		}
		list = append(list, one)
	}
	return list
}
