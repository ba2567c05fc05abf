package job

import (
	"context"
	"runtime"
	"slices"
	"sync"
	"time"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
	"legwright/objective/proof"
	"legwright/opt"
)

// Run is how a search is to run: the brief's own settings with those of the command line put over them.
type Run struct {
	Evaluations int // that the search is laid out for; of the whole study if it is cut into parts
	StopAt      int // evaluations at which it ends all the same, 0 for none
	Time        time.Duration
	Stall       opt.Stall
	Part        Part
	Population  int
	Seed        int64
	Workers     int // 0 for all processors; it never changes the result
	Polish      float64
	Prove       int // designs of best rank that are proved, 0 for none
	Proving     func(done, of int, p proof.Progress)
	Journal     *Journal // nil for a run that cannot be gone on with
	Progress    func(opt.Progress)
}

// Found is what a search found.
type Found struct {
	Front   *study.Front
	History []opt.Point
	Status  opt.Status
	Part    *study.Part // of a part, once it has ended

	book *proofs // of a search with proofs
}

// Interrupted tells whether the search was broken off, to be gone on with.
func (f *Found) Interrupted() bool { return f.Status == opt.Interrupted }

// Search runs the search and judges its front completely. When ctx ends it
// returns what was found until then.
func (s *Study) Search(ctx context.Context, r Run) (*Found, error) {
	if r.Workers <= 0 {
		r.Workers = runtime.GOMAXPROCS(0)
	}
	if len(s.goals()) == 1 && r.Polish == 0 {
		r.Polish = 0.5 // a single optimum is for Nelder-Mead to finish
	}
	if r.Prove > 0 && r.Part.Whole() {
		return s.searchProved(ctx, r)
	}
	out, err := s.run(ctx, &r, nil)
	if err != nil {
		return nil, err
	}
	f := s.front(out, &r)
	s.strokes(f, r.Workers)
	return s.found(out, &r, f), nil
}

// run runs the search alone, from the designs in start if there are any.
func (s *Study) run(ctx context.Context, r *Run, start []opt.Start) (*opt.Outcome, error) {
	problem := s.problem(r.Workers)
	set := opt.Settings{
		Evaluations: r.Part.Share(r.Evaluations),
		StopAt:      r.StopAt,
		Time:        r.Time,
		Stall:       r.Stall,
		Population:  r.Population,
		Seed:        r.Part.stream(r.Seed),
		Workers:     r.Workers,
		Front:       s.Brief.Search.Front,
		Reference:   s.reference(),
		Polish:      r.Polish,
		Start:       start,
		Archive:     !r.Part.Whole(),
		Progress:    r.Progress,
	}
	if r.Journal != nil {
		var end context.CancelFunc
		ctx, end = context.WithCancel(ctx)
		defer end()
		r.Journal.attach(&problem, &set, end)
	}
	out, err := opt.Search(ctx, problem, set)
	if r.Journal != nil {
		r.Journal.Flush() // a failure was told of
		if r.Journal.err != nil {
			return nil, r.Journal.err
		}
	}
	return out, err
}

// found is what a search gives, with the part that it is of a study.
func (s *Study) found(out *opt.Outcome, r *Run, f *study.Front) *Found {
	found := &Found{Front: f, History: out.History, Status: out.Status}
	if !r.Part.Whole() {
		name := r.Part.name(r.Seed)
		found.Front.Part = &name
		if out.Status != opt.Interrupted {
			found.Part = s.part(out, r, found.Front)
		}
	}
	return found
}

// front is the front of a study with all that files say of it.
func (s *Study) front(out *opt.Outcome, r *Run) *study.Front {
	f := &study.Front{
		Format: study.Format, Program: Program(), Title: s.Brief.Title, Seed: r.Seed,
		Status: out.Status.String(), StoppedBy: stoppedBy(out.Status), Evaluations: out.Evaluations, Budget: r.Part.Share(r.Evaluations), Feasible: out.Feasible, Population: out.Population,
		Poses:   len(s.Tasks[0].Samples()),
		Weights: s.Brief.Ranking.Weights,
		Designs: []study.Design{},
		Notes:   s.Notes(),
	}
	for i, g := range s.goals() {
		v := study.Goal{Measure: g.Measure.Name, Sense: "minimise", Unit: study.UnitKind(g.Measure.UnitOf(s.Plans[0].Family)).SI()}
		if g.Maximise {
			v.Sense = "maximise"
		}
		f.Goals = append(f.Goals, v)
		if out.Reference != nil {
			f.ReferencePoint = append(f.ReferencePoint, study.Number(s.turn(i, out.Reference[i])))
		}
	}
	front, volume := s.settle(s.appraise(out.Front, r.Workers), out)
	f.Designs, f.Hypervolume = s.records(front), study.Number(volume)
	f.Notes = append(f.Notes, s.ends(f.Designs)...)
	f.Compare(s.families(out, r.Workers))
	if len(f.Designs) == 0 {
		f.Help = s.help(out, r.Workers)
	}
	f.Failures, f.Failed = out.Failures, s.failed(out)
	study.Rank(f, f.Weights)
	return f
}

// goals are those of the brief.
func (s *Study) goals() []objective.Goal { return s.Tasks[0].Goals }

// task is the task of a plan.
func (s *Study) task(p *objective.Plan) *objective.Task {
	for i := range s.Plans {
		if s.Plans[i] == p {
			return s.Tasks[i]
		}
	}
	panic("job: a plan of another study")
}

// turn changes between a goal as the search sees it, to be minimised, and the measure's value.
func (s *Study) turn(goal int, v float64) float64 {
	if s.goals()[goal].Maximise {
		return -v
	}
	return v
}

// reference is the brief's reference point as the search sees it, nil if it gives none.
func (s *Study) reference() []float64 {
	given := s.Brief.Search.Reference
	if given == nil {
		return nil
	}
	out := make([]float64, len(s.goals()))
	for i, g := range s.goals() {
		out[i] = s.turn(i, given[g.Measure.Name])
	}
	return out
}

// problem makes the search problem, with scratch for each worker and family.
func (s *Study) problem(workers int) opt.Problem {
	p := opt.Problem{Goals: len(s.goals())}
	for i, plan := range s.Plans {
		p.Limits = max(p.Limits, len(s.Tasks[i].Constraints()))
		p.Spaces = append(p.Spaces, space(plan))
	}
	screens := make([][]*objective.Screen, workers)
	scores := make([]objective.Score, workers)
	for w := range screens {
		for i, plan := range s.Plans {
			screens[w] = append(screens[w], objective.NewScreen(s.Tasks[i], plan))
		}
	}
	with := func(judge func(sc *objective.Screen, x []float64, score *objective.Score)) func(worker, space int, x []float64, r *opt.Result) {
		return func(worker, space int, x []float64, r *opt.Result) {
			defer func() {
				if p := recover(); p != nil { // the scratch may be left half done
					screens[worker][space] = objective.NewScreen(s.Tasks[space], s.Plans[space])
					r.Fault = fault(p)
				}
			}()
			score := &scores[worker]
			judge(screens[worker][space], x, score)
			copy(r.Goals, score.Goals)
			copy(r.Excess, score.Excess)
			r.Violation = score.Violation
		}
	}
	p.Evaluate = with((*objective.Screen).Judge)
	if slices.ContainsFunc(screens[0], (*objective.Screen).Refines) {
		p.Confirm = with(func(sc *objective.Screen, _ []float64, score *objective.Score) { sc.Confirm(score) })
	}
	return p
}

// space is the search space of a plan. A family with nothing to vary has a single design.
func space(p *objective.Plan) opt.Space {
	s := opt.Space{Name: p.Family.Name}
	for _, i := range p.Free() {
		d, sp := &p.Family.Dimensions[i], &p.Specs[i]
		v := opt.Var{Name: d.Name}
		switch sp.Kind {
		case objective.Range:
			v.Kind, v.Low, v.High = opt.Real, sp.Low, sp.High
		case objective.Steps:
			v.Kind, v.Levels = opt.Ordered, sp.Levels
		case objective.Choices:
			v.Kind, v.Levels = opt.Ordered, len(sp.Values)
			if d.Unit == kin.Sign {
				v.Kind = opt.Choice
			}
		}
		s.Vars = append(s.Vars, v)
	}
	if len(s.Vars) == 0 {
		s.Vars = []opt.Var{{Name: "nothing varies", Kind: opt.Choice, Levels: 1}}
	}
	return s
}

// appraise judges designs of the search completely, side by side; the order is kept.
func (s *Study) appraise(ds []opt.Design, workers int) []*objective.Appraisal {
	out := make([]*objective.Appraisal, len(ds))
	var wg sync.WaitGroup
	next := make(chan int)
	for range max(1, workers) {
		wg.Go(func() {
			for i := range next {
				t, p := s.Tasks[ds[i].Space], s.Plans[ds[i].Space]
				out[i] = s.oneOfTwins(objective.Appraise(t, p, s.values(&ds[i])), t)
			}
		})
	}
	for i := range ds {
		next <- i
	}
	close(next)
	wg.Wait()
	return out
}

// records turns appraisals into records, each design once.
func (s *Study) records(as []*objective.Appraisal) []study.Design {
	out := []study.Design{}
next:
	for i, a := range as {
		for _, b := range as[:i] {
			if same(a, b) {
				continue next
			}
		}
		out = append(out, study.FromAppraisal(s.task(a.Plan), a))
	}
	return out
}

// values are the dimensions of a design of the search; sized ones are NaN.
func (s *Study) values(d *opt.Design) []float64 {
	p := s.Plans[d.Space]
	v := make([]float64, len(p.Specs))
	p.Values(d.X, v)
	return v
}

// Settings are the brief's own settings of the search.
func Settings(b *brief.Brief) Run {
	return Run{
		Evaluations: b.Search.Evaluations, Population: b.Search.Population, Seed: b.Search.Seed,
		Time:  time.Duration(b.Search.Time * float64(time.Second)),
		Stall: opt.Stall{Evaluations: b.Search.Stall.Evaluations, Gain: b.Search.Stall.Gain},
	}
}
