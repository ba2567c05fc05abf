package job

import (
	"math"

	"legwright/objective"
	"legwright/opt"
)

// settle leaves out of the judged front what the closer look of an appraisal turns down: it drives worst values over
// continuous zones further than the search has time for, so that once in a hundred designs one turns out a little
// worse, breaks a limit or is beaten by another. It also gives the hypervolume of what is left.
func (s *Study) settle(as []*objective.Appraisal, out *opt.Outcome) ([]*objective.Appraisal, float64) {
	goals := make([][]float64, len(as))
	same := true
	for i, a := range as {
		for k, g := range s.goals() {
			v := out.Front[i].Goals[k]
			if r := a.Reading(g.Measure.Name); r != nil {
				if w := s.turn(k, r.Value); w > v+objective.Tolerance*math.Abs(v) && !math.IsInf(w, 1) {
					v, same = w, false
				}
			}
			goals[i] = append(goals[i], v)
		}
		same = same && a.Feasible
	}
	if same {
		return as, out.Hypervolume
	}
	var kept []*objective.Appraisal
	var front opt.Archive
	for i, a := range as {
		if a.Feasible {
			front.Add(opt.Design{Space: out.Front[i].Space, X: out.Front[i].X, Goals: goals[i], Excess: out.Front[i].Excess, Origin: out.Front[i].Origin, Order: i})
		}
	}
	var points [][]float64
	on := make([]bool, len(as))
	for _, d := range front.Designs() {
		on[d.Order] = true
		points = append(points, d.Goals)
	}
	for i, a := range as {
		if on[i] {
			kept = append(kept, a)
		}
	}
	return kept, opt.Hypervolume(points, out.Reference)
}
