package report

import (
	"fmt"
	"math"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// Steps says what a step along the front costs, from the knee to designs nearby, a sentence for each; none
// without a knee.
func Steps(f *study.Front) []string {
	from := f.Marked(study.MarkKnee)
	if from < 0 || len(f.Goals) < 2 {
		return nil
	}
	return stepLines(f, from)
}

// Shortfall says what stands in the way where no design holds every limit, and what change of one
// limit alone would do, a sentence for each.
func Shortfall(f *study.Front) []string {
	h := f.Help
	if h == nil {
		return nil
	}
	var out []string
	for _, b := range h.Binding {
		least := ""
		if !math.IsInf(float64(b.Least), 0) {
			least = ", by " + units.Digits(100*float64(b.Least), 2) + " % of its bound or more"
		}
		out = append(out, fmt.Sprintf("%s is broken by %d of the %d designs that came nearest%s", study.Clean(b.Constraint), b.Designs, b.Of, least))
	}
	number, _ := numbers(h.Nearest)
	for i := range h.Relaxations {
		if t := relaxed(&h.Relaxations[i], number[h.Relaxations[i].Design]); t != "" {
			out = append(out, t)
		}
	}
	return out
}
