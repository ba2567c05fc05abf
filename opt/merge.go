package opt

import (
	"cmp"
	"slices"
)

// Merge joins the outcomes of searches of one Problem with Settings.Archive
// and other seeds into one. The front is picked from all that they kept, at
// most front designs by the rule of Search, up to reference; nil takes the
// worst of theirs in each goal. Evaluations, feasible and failed designs are
// added up. The order of the outcomes changes nothing. Status is that of all
// outcomes, or BudgetSpent where they differ.
//
// It takes of the order of designs times what an archive holds.
func Merge(parts []*Outcome, front int, reference []float64) *Outcome {
	o := &Outcome{Reference: slices.Clone(reference)}
	var kept, near, failed []Design
	var single [][]Design
	for i, p := range parts {
		if reference == nil {
			o.Reference = worst(o.Reference, p.Reference)
		}
		o.Evaluations += p.Evaluations
		o.Feasible += p.Feasible
		o.Polished += p.Polished
		o.Failures += p.Failures
		o.Population, o.Grown, o.Children = max(o.Population, p.Population), max(o.Grown, p.Grown), max(o.Children, p.Children)
		if i == 0 {
			o.Status = p.Status
		}
		kept, near, failed = append(kept, p.Kept...), append(near, p.Near...), append(failed, p.Failed...)
		for l, list := range p.Single {
			if l == len(single) {
				single = append(single, nil)
			}
			single[l] = append(single[l], list...)
		}
	}
	if slices.ContainsFunc(parts, func(p *Outcome) bool { return p.Status != parts[0].Status }) {
		o.Status = BudgetSpent
	}
	slices.SortFunc(kept, inOrder)
	a := Archive{}
	if len(kept) > 0 {
		a.Limit = archiveLimit(front, len(kept[0].Goals))
	}
	for i := range kept {
		a.Add(kept[i])
	}
	o.Archive = a.Len()
	o.Kept = a.Designs()
	o.choose(o.Kept, front)
	o.Near = first(near, violation, defaultNearMisses)
	for l, list := range single {
		o.Single = append(o.Single, first(list, func(d *Design) float64 { return d.Excess[l] }, keptPerLimit))
	}
	o.Failed = first(failed, violation, keptFailed)
	o.mergeSpaces(parts)
	if o.Evaluations > 0 {
		o.History = []Point{{Evaluations: o.Evaluations, Hypervolume: o.Hypervolume, Feasible: float64(o.Feasible) / float64(o.Evaluations)}}
	}
	return o
}

// mergeSpaces sums up what became of each space.
func (o *Outcome) mergeSpaces(parts []*Outcome) {
	for _, p := range parts {
		for i := range p.Spaces {
			if i == len(o.Spaces) {
				o.Spaces = append(o.Spaces, SpaceOutcome{})
			}
			s, q := &o.Spaces[i], &p.Spaces[i]
			s.Evaluations += q.Evaluations
			s.Feasible += q.Feasible
			s.Near = first(append(s.Near, q.Near...), violation, nearPerSpace)
			if s.Best == nil {
				s.Best = slices.Clone(q.Best)
				continue
			}
			for k := range q.Best {
				d, b := &q.Best[k], &s.Best[k]
				if cmp.Or(cmp.Compare(d.Goals[k], b.Goals[k]), inOrder(*d, *b)) < 0 {
					*b = *d
				}
			}
		}
	}
	for i := range o.Front {
		o.Spaces[o.Front[i].Space].Front++
	}
}

// worst returns the larger value of each goal; nil has none.
func worst(a, b []float64) []float64 {
	if a == nil {
		return slices.Clone(b)
	}
	for k := range b {
		a[k] = max(a[k], b[k])
	}
	return a
}

func violation(d *Design) float64 { return d.Violation }

// first returns the n designs that miss by least, of equals in the order of
// their variables.
func first(ds []Design, by func(*Design) float64, n int) []Design {
	slices.SortFunc(ds, func(a, b Design) int { return cmp.Or(cmp.Compare(by(&a), by(&b)), inOrder(a, b)) })
	return ds[:min(n, len(ds))]
}

// inOrder compares designs by goals, space and variables; equal ones by how
// their searches came to them.
func inOrder(a, b Design) int {
	return cmp.Or(slices.Compare(a.Goals, b.Goals), cmp.Compare(a.Space, b.Space), slices.Compare(a.X, b.X),
		cmp.Compare(a.Order, b.Order), cmp.Compare(a.Origin, b.Origin))
}
