package job

import (
	"context"

	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
	"legwright/opt"
)

// provedAt is the share of the budget after which a search proves the best designs of its front: what refutes
// them joins the duty, and the rest of the budget is for a front that holds there, too.
const provedAt = 0.75

// searchProved is Search with the best designs proved. Where the proofs at provedAt refute none, the search goes on as
// if nothing had been, and ends with the same front as one without proofs. Where they refute some, a second search with the
// poses that did so among the required ones begins with the front of the first.
func (s *Study) searchProved(ctx context.Context, r Run) (*Found, error) {
	book := &proofs{s: s, workers: r.Workers, tell: r.Proving, known: map[string]*proven{}}
	found, err := s.searchJudged(ctx, r, book)
	if found != nil {
		found.book = book
	}
	return found, err
}

// judge proves the best n designs of a front, and gives the poses that refute some of them.
type judge interface {
	best(ctx context.Context, f *study.Front, n int) bool
	counters(f *study.Front, n int) ([]objective.Further, []study.Counterexample)
}

func (s *Study) searchJudged(ctx context.Context, r Run, book judge) (*Found, error) {
	first := r
	share := r.Part.Share(r.Evaluations)
	stop := share
	if r.StopAt > 0 {
		stop = r.StopAt
	}
	first.StopAt = min(stop, max(int(provedAt*float64(share)), leastFirst*len(s.Plans)))
	out, err := s.run(ctx, &first, nil)
	if err != nil {
		return nil, err
	}
	f := s.front(out, &r)
	if out.Status == opt.Interrupted {
		return s.found(out, &r, f), nil
	}
	if !book.best(ctx, f, r.Prove) {
		return s.broken(out, &r, f), nil
	}
	poses, counters := book.counters(f, r.Prove)
	left := stop - out.Evaluations
	switch {
	case left <= 0 || out.Status != opt.Stopped || len(poses) > 0 && left < leastFirst*len(s.Plans): // nothing left to go on with, or ended by another rule
	case len(poses) == 0:
		if r.Journal != nil {
			r.Journal.Rewind()
		}
		if out, err = s.run(ctx, &r, nil); err != nil {
			return nil, err
		}
		f = s.front(out, &r)
	default:
		next := *s
		next.Tasks = nil
		for _, t := range s.Tasks {
			next.Tasks = append(next.Tasks, t.With(poses))
		}
		more := r
		more.StopAt, more.Evaluations, more.Seed = 0, left, int64(mix(uint64(r.Seed))>>1)
		if r.Journal != nil {
			r.Journal.Stage()
		}
		second, err := next.run(ctx, &more, starts(out))
		if err != nil {
			return nil, err
		}
		out = joined(out, second)
		f = next.front(out, &r)
		f.Counterexamples = counters
	}
	if out.Status == opt.Interrupted || !book.best(ctx, f, r.Prove) {
		return s.broken(out, &r, f), nil
	}
	s.strokes(f, r.Workers)
	return s.found(out, &r, f), nil
}

// leastFirst is the least first sample of a family.
const leastFirst = 30

// broken is what was found until the context ended.
func (s *Study) broken(out *opt.Outcome, r *Run, f *study.Front) *Found {
	out.Status = opt.Interrupted
	f.Status, f.StoppedBy = out.Status.String(), stoppedBy(out.Status)
	return s.found(out, r, f)
}

// starts are the designs of a front for a search to begin with.
func starts(out *opt.Outcome) (list []opt.Start) {
	for i := range out.Front {
		list = append(list, opt.Start{Space: out.Front[i].Space, X: out.Front[i].X})
	}
	return list
}

// joined is the second search's outcome with the first one's figures added to what they count together.
func joined(first, second *opt.Outcome) *opt.Outcome {
	out := *second
	out.Evaluations += first.Evaluations
	out.Feasible += first.Feasible
	out.Failures += first.Failures
	out.Failed = append(append(out.Failed[:0:0], first.Failed...), second.Failed...)
	out.Population = first.Population
	out.History = append(out.History[:0:0], first.History...)
	for _, p := range second.History {
		all := first.Evaluations + p.Evaluations
		p.Feasible = (float64(first.Feasible) + p.Feasible*float64(p.Evaluations)) / float64(all)
		p.Evaluations = all
		out.History = append(out.History, p)
	}
	return &out
}
