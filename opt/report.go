package opt

import "slices"

const (
	historyPoints = 50
	historySubset = 40 // designs that stand for the archive with 4 goals or more
)

// record adds a history point.
func (r *run) record() {
	r.widen()
	p := Point{Evaluations: r.evaluations, Feasible: float64(r.feasible) / float64(r.evaluations)}
	p.Hypervolume = r.volume()
	r.history = append(r.history, p)
	step := max(1, r.set.Evaluations/historyPoints)
	for r.next <= r.evaluations {
		r.next += step
	}
}

// volume returns the hypervolume of the archive, with 4 goals or more of a
// subset picked from it; 0 before there is a reference.
func (r *run) volume() float64 {
	if r.reference == nil {
		return 0
	}
	pts := r.archive.points()
	if len(r.reference) > 3 && len(pts) > historySubset {
		sub := make([][]float64, 0, historySubset)
		for _, i := range scatter(pts, historySubset) {
			sub = append(sub, pts[i])
		}
		pts = sub
	}
	return Hypervolume(pts, r.reference)
}

// points returns the goals of all designs.
func (a *Archive) points() [][]float64 {
	pts := make([][]float64, len(a.designs))
	for i, g := range a.designs {
		pts[i] = g.goals
	}
	return pts
}

// outcome sums the run up.
func (r *run) outcome() *Outcome {
	r.fixReference()
	r.widen()
	o := &Outcome{
		Archive: r.archive.Len(), Reference: r.reference, Evaluations: r.evaluations, Feasible: r.feasible,
		Population: r.start, Grown: r.grown(), Children: r.set.Children, Polished: r.polished,
		Near: designs(r.misses.near), Failed: r.misses.failed, Failures: r.misses.failures,
	}
	for _, list := range r.misses.single {
		o.Single = append(o.Single, designs(list))
	}
	all := r.archive.Designs()
	o.choose(all, r.set.Front)
	if r.set.Archive {
		o.Kept = all
	}
	o.Spaces = r.spaces(o.Front)
	if n := len(r.history); r.evaluations > 0 && (n == 0 || r.history[n-1].Evaluations < r.evaluations) {
		r.record()
	}
	o.History = r.history
	switch {
	case r.ctx.Err() != nil && !r.spent():
		o.Status = Interrupted
	case r.stop.stopped:
		o.Status = r.stop.by
	case r.evaluations < r.set.StopAt:
		o.Status = Exhausted
	case r.evaluations < r.set.Evaluations:
		o.Status = Stopped
	case r.feasible == 0:
		o.Status = NoFeasible
	}
	return o
}

// choose sets the front and its hypervolume: at most n of all designs, which
// come in ascending order of their goals.
func (o *Outcome) choose(all []Design, n int) {
	if o.Reference == nil {
		return
	}
	pts := make([][]float64, len(all))
	for i := range all {
		pts[i] = all[i].Goals
	}
	chosen := pick(pts, n, o.Reference)
	slices.Sort(chosen)
	var front [][]float64
	for _, i := range chosen {
		o.Front = append(o.Front, all[i])
		front = append(front, pts[i])
	}
	o.Hypervolume = Hypervolume(front, o.Reference)
}
