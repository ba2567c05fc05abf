package job

import (
	"cmp"
	"errors"
	"fmt"
	"runtime"
	"slices"

	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// CheckParts orders the parts of a study by their number. It says what is wrong with parts that do not
// belong together; at gives the name of a part's folder for that.
func CheckParts(parts []*study.Part, at func(*study.Part) string) error {
	if len(parts) == 0 {
		return errors.New("there is no finished part to merge; run search --part first")
	}
	slices.SortStableFunc(parts, func(a, b *study.Part) int {
		return cmp.Or(cmp.Compare(a.Number, b.Number), cmp.Compare(at(a), at(b)))
	})
	first := parts[0]
	differ := func(p *study.Part, what string, a, b any) error {
		return fmt.Errorf("%s: is part of another study: its %s is %v, that of %s %v; merge parts of one study only", study.Clean(at(p)), what, b, study.Clean(at(first)), a)
	}
	for i, p := range parts {
		switch {
		case p.Program != Program():
			return fmt.Errorf("%s: was made by %.60s, this is %s; search all parts with one version and merge them with it", study.Clean(at(p)), study.Clean(p.Program), Program())
		case p.Brief != first.Brief:
			return fmt.Errorf("%s: is a part of another brief than %s; merge parts of one brief only", study.Clean(at(p)), study.Clean(at(first)))
		case p.Seed != first.Seed:
			return differ(p, "seed", first.Seed, p.Seed)
		case p.Of != first.Of:
			return differ(p, "number of parts", first.Of, p.Of)
		case p.Whole != first.Whole:
			return differ(p, "budget", first.Whole, p.Whole)
		case i > 0 && p.Number == parts[i-1].Number:
			return fmt.Errorf("%s and %s are both part %d of %d; give each part once", study.Clean(at(parts[i-1])), study.Clean(at(p)), p.Number, p.Of)
		}
	}
	return nil
}

// Merge joins parts that CheckParts has passed into one front.
func (s *Study) Merge(parts []*study.Part, workers int) (*Found, error) {
	if workers <= 0 {
		workers = runtime.GOMAXPROCS(0)
	}
	outs := make([]*opt.Outcome, len(parts))
	for i, p := range parts {
		if err := s.fits(p); err != nil {
			return nil, fmt.Errorf("part %d: %w; search it again", p.Number, err)
		}
		outs[i] = p.Outcome.Outcome()
	}
	first := parts[0]
	out := opt.Merge(outs, s.Brief.Search.Front, s.reference())
	f := s.front(out, &Run{Evaluations: first.Whole, Seed: first.Seed, Workers: workers})
	s.strokes(f, workers)
	f.StoppedBy, f.Status = "", ""
	f.Parts = &study.Parts{Of: first.Of, Present: []study.PartLine{}, Missing: []int{}}
	there := map[int]bool{}
	for _, p := range parts {
		there[p.Number] = true
		l := study.PartLine{PartName: p.PartName, Evaluations: p.Outcome.Evaluations, Feasible: p.Outcome.Feasible, StoppedBy: p.StoppedBy, Kept: len(p.Outcome.Kept)}
		for i := range out.Front {
			if slices.ContainsFunc(p.Outcome.Kept, func(d study.PartDesign) bool {
				return d.Space == out.Front[i].Space && slices.Equal(d.X, out.Front[i].X)
			}) {
				l.OnFront++
			}
		}
		f.Parts.Present = append(f.Parts.Present, l)
	}
	for n := 1; n <= first.Of; n++ {
		if !there[n] {
			f.Parts.Missing = append(f.Parts.Missing, n)
		}
	}
	f.Notes = append(f.Notes, f.Parts.Note())
	return &Found{Front: f, History: out.History, Status: out.Status}, nil
}

// fits says whether a part's designs are those of the study.
func (s *Study) fits(p *study.Part) error {
	if len(p.Dimensions) != len(s.Plans) {
		return fmt.Errorf("it has %d families, the brief %d", len(p.Dimensions), len(s.Plans))
	}
	if n := len(p.Outcome.Reference); n != 0 && n != len(s.goals()) {
		return fmt.Errorf("it has %d goals, the brief %d", n, len(s.goals()))
	}
	o := p.Outcome
	lists := append([][]study.PartDesign{o.Kept, o.Near, o.Failed}, o.Single...)
	for i := range o.Spaces {
		lists = append(lists, o.Spaces[i].Best, o.Spaces[i].Near)
	}
	spaces := make([]opt.Space, len(s.Plans))
	for i, plan := range s.Plans {
		if spaces[i] = space(plan); len(spaces[i].Vars) != p.Dimensions[i] {
			return fmt.Errorf("its designs have %d dimensions to vary, those of the brief %d", p.Dimensions[i], len(spaces[i].Vars))
		}
	}
	for _, l := range lists {
		for i := range l {
			for k, v := range spaces[l[i].Space].Vars {
				x := l[i].X[k]
				if low, high := v.Low, v.High; v.Kind == opt.Real && !(x >= low && x <= high) ||
					v.Kind != opt.Real && !(x >= 0 && x <= float64(v.Levels-1) && x == float64(int(x))) {
					return fmt.Errorf("a design's %s is %v, out of the brief's range", v.Name, x)
				}
			}
		}
	}
	return nil
}
