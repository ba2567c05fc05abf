package job

import (
	"math"

	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// followed is for how many designs, best ranks first, it is found where they go within their strokes: those that are shown first.
const followed = 7

// strokes follows the designs shown first through their strokes, and marks those that meet a singularity.
func (s *Study) strokes(f *study.Front) {
	for i := range f.Designs[:min(followed, len(f.Designs))] {
		d := &f.Designs[i]
		for k, p := range s.Plans {
			if p.Family.Name != d.Family {
				continue
			}
			values := make([]float64, len(p.Family.Dimensions))
			for j := range values {
				v, ok := d.Dimensions[p.Family.Dimensions[j].Name]
				if values[j] = float64(v); !ok {
					values[j] = math.NaN()
				}
			}
			if w, ok := objective.Strokes(s.Tasks[k], p, values); ok {
				d.WholeStroke = study.WholeStrokeOf(w)
			}
		}
	}
	study.Rank(f, f.Weights) // for the marks
}
