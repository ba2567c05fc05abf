package opt

import "slices"

// referenceSample is the number of feasible designs that the reference is
// fixed from, if so many are met.
const referenceSample = 30

// fixReference sets the reference, unless that was done: beyond the front so
// far, and no nearer than most designs. The worst are left out: one next to a
// singularity would carry the reference off.
func (r *run) fixReference() {
	if r.reference != nil || r.archive.Len() == 0 {
		return
	}
	low, high := r.archive.bounds()
	r.reference = make([]float64, r.problem.Goals)
	column := make([]float64, len(r.early))
	for k := range r.reference {
		for i, g := range r.early {
			column[i] = g[k]
		}
		slices.Sort(column)
		quartile := column[len(column)*3/4]
		r.reference[k] = max(margin(low[k], high[k], 0.5), quartile)
	}
	r.early = nil
}

// outlying is the share of the archive that the reference may leave out, goal
// by goal.
const outlying = 0.05

// widen moves the reference out to where the front has grown since it was
// fixed: a tenth of the range beyond all of the archive but its most outlying
// designs in each goal. A reference that the caller gave stays.
func (r *run) widen() {
	n := r.archive.Len()
	if r.reference == nil || r.set.Reference != nil || n == 0 {
		return
	}
	m := r.problem.Goals
	column := make([]float64, n)
	low, _ := r.archive.bounds()
	for k := range m {
		near, beyond := low[k]+(r.reference[k]-low[k])/1.1, 0
		for i := range column {
			if column[i] = r.archive.goals[i*m+k]; column[i] > near {
				beyond++
			}
		}
		if beyond <= int(outlying*float64(n)) {
			continue // the usual case: nothing to sort
		}
		slices.Sort(column)
		if at := margin(column[0], column[n-1-int(outlying*float64(n))], 0.1); at > r.reference[k] {
			r.reference = slices.Clone(r.reference)
			r.reference[k] = at
		}
	}
}
