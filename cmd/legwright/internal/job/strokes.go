package job

import (
	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// strokes follows the designs shown first through their strokes, and marks those that meet a singularity.
func (s *Study) strokes(f *study.Front, workers int) {
	first := f.First()
	each(len(first), workers, func(i int) {
		d := &f.Designs[first[i]]
		for k, p := range s.Plans {
			if p.Family.Name != d.Family {
				continue
			}
			values := dimensionsOf(p, d)
			if w, ok := objective.Strokes(s.Tasks[k], p, values); ok {
				d.WholeStroke = study.WholeStrokeOf(w)
			}
		}
	})
	study.Rank(f, f.Weights) // for the marks
}
