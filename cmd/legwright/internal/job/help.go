package job

import (
	"cmp"
	"maps"
	"math"
	"slices"

	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// nearest is how many least-violating designs are shown.
const nearest = 5

// help says what a search without a feasible design has learned: which limits
// bind among the designs that came nearest, and for each limit the smallest
// change of it alone that would have admitted a design that was met.
func (s *Study) help(out *opt.Outcome, workers int) *study.Help {
	near := s.records(s.appraise(out.Near, workers))
	h := &study.Help{Nearest: near[:min(nearest, len(near))]}
	count := map[string]*study.Binding{}
	for i := range near {
		for _, l := range near[i].Broken() {
			b := count[l.Measure]
			if b == nil {
				b = &study.Binding{Constraint: l.Measure, Of: len(near), Least: study.Number(math.Inf(1))}
				count[l.Measure] = b
			}
			b.Designs++
			b.Least = min(b.Least, -l.Margin)
		}
	}
	for _, b := range count {
		h.Binding = append(h.Binding, *b)
	}
	slices.SortFunc(h.Binding, func(a, b study.Binding) int {
		return cmp.Or(cmp.Compare(b.Designs, a.Designs), cmp.Compare(a.Constraint, b.Constraint))
	})

	all := near
	for _, list := range out.Single {
		all = append(all, s.records(s.appraise(list, workers))...)
	}
	best := map[string]study.Relaxation{}
	from := map[string]study.Design{}
	for i := range all {
		b := all[i].Broken()
		if len(b) != 1 {
			continue
		}
		l := b[0]
		r := study.Relaxation{Constraint: l.Measure, Origin: l.Origin, Unit: l.Unit, Bound: l.Bound, Needed: l.Value}
		if o, ok := best[l.Measure]; !ok || gapOf(r) < gapOf(o) {
			best[l.Measure], from[l.Measure] = r, all[i]
		}
	}
	for _, name := range slices.Sorted(maps.Keys(best)) {
		r := best[name]
		d := from[name]
		r.Design = len(h.Nearest)
		for i := range h.Nearest {
			if slices.Equal(keyOf(&h.Nearest[i]), keyOf(&d)) {
				r.Design = i
			}
		}
		if r.Design == len(h.Nearest) {
			h.Nearest = append(h.Nearest, d)
		}
		h.Relaxations = append(h.Relaxations, r)
	}
	return h
}

func gapOf(r study.Relaxation) float64 { return math.Abs(float64(r.Needed - r.Bound)) }

// keyOf tells designs apart: their dimensions in a fixed order.
func keyOf(d *study.Design) []float64 {
	var names []string
	for n := range d.Dimensions {
		names = append(names, n)
	}
	slices.Sort(names)
	var out []float64
	for _, n := range names {
		out = append(out, float64(d.Dimensions[n]))
	}
	return out
}
