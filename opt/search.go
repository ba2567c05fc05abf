package opt

import (
	"context"
	"errors"
	"fmt"
	"math"
	"math/rand"
	"slices"
	"time"

	"github.com/MaxHalford/eaopt"
)

// Search runs until the budget of evaluations is spent or ctx ends; in the
// latter case evaluations under way are waited for and what was found is
// returned with Status Interrupted and no error. An error is only returned
// for a Problem or Settings that make no sense.
func Search(ctx context.Context, p Problem, s Settings) (*Outcome, error) {
	if err := p.check(); err != nil {
		return nil, err
	}
	s, err := s.resolve(&p)
	if err != nil {
		return nil, err
	}
	r := newRun(ctx, &p, s)
	defer r.ev.close()
	if r.left < 0 {
		return nil, fmt.Errorf("opt: Settings.StopAt is %d; the first sample alone takes %d", s.StopAt, r.given())
	}
	err = r.evolve()
	if err != nil && !errors.Is(err, ctx.Err()) {
		return nil, err
	}
	return r.outcome(), nil
}

// run is one Search under way.
type run struct {
	ctx     context.Context
	problem *Problem
	set     Settings
	ev      *evaluator
	ga      *eaopt.GA
	islands []*island
	start   int // population per space at the start
	left    int // evaluations not yet given out

	archive     Archive
	snapshot    *Archive // goals of archive after the last merge, for designs handed in since; nil without Problem.Confirm
	misses      misses
	reference   []float64
	early       [][]float64 // goals of the feasible designs until reference is fixed
	evaluations int
	feasible    int
	polished    int
	history     []Point
	next        int // evaluations at the next history point
	rounds      int // of polish, done
	aimed       int // polish jobs done
	phase       string
	stop        stopper
}

func newRun(ctx context.Context, p *Problem, s Settings) *run {
	r := &run{ctx: ctx, problem: p, set: s, phase: "sample"}
	r.ev = newEvaluator(ctx, p, s.Workers)
	r.archive.Limit = archiveLimit(s.Front, p.Goals)
	r.misses = misses{limit: s.NearMisses, single: make([][]miss, p.Limits)}
	r.reference = slices.Clone(s.Reference)
	r.start, r.left = startSize(p, &s), s.StopAt
	r.stop.began = time.Now()
	for i := range p.Spaces {
		r.islands = append(r.islands, newIsland(r, i))
	}
	return r
}

// archiveLimit bounds what a newcomer costs: enough designs that the choice of
// the front loses a thousandth of its hypervolume at most.
func archiveLimit(front, goals int) int {
	limit := max(1000, 7*front)
	if goals > mostByVolume {
		limit *= 2
	}
	return limit
}

// evolve lets eaopt run the generations: one population per space, which it
// sets up, applies the model to side by side, and orders.
func (r *run) evolve() error {
	if r.problem.Confirm != nil {
		r.snapshot = new(Archive)
	}
	for _, l := range r.islands {
		l.pending.front = r.snapshot
		r.ev.submit(l.pending)
	}
	for _, l := range r.islands {
		r.ev.finish(l.pending)
		l.first = l.collect(l.pending)
	}
	r.merge()
	if err := r.ctx.Err(); err != nil {
		return err
	}
	ga, err := eaopt.GAConfig{
		NPops: uint(len(r.islands)), PopSize: uint(r.start), NGenerations: math.MaxUint32, HofSize: 1,
		Model: (*model)(r), RNG: stream(r.set.Seed, streamMain, 0, 0),
		Callback:  func(*eaopt.GA) { r.barrier() },
		EarlyStop: func(*eaopt.GA) bool { return r.stop.stopped || r.spent() },
	}.NewGA()
	if err != nil {
		return err
	}
	r.ga = ga
	var sample []*genome
	for _, l := range r.islands {
		sample = append(sample, l.sample...)
	}
	err = ga.Minimize(func(*rand.Rand) eaopt.Genome { // eaopt asks for one after another, space by space
		g := sample[0]
		sample = sample[1:]
		return g
	})
	if err != nil || r.stop.stopped { // what is still under way
		for _, l := range r.islands {
			r.ev.finish(l.pending)
			if kids := l.collect(l.pending); r.stop.stopped {
				l.join(kids)
			}
		}
		r.merge()
	}
	return err
}

// spent reports that no space has anything left to do.
func (r *run) spent() bool {
	for _, l := range r.islands {
		if !l.spent() || r.left > 0 && !l.done {
			return false
		}
	}
	return true
}

// barrier runs between generations, on its own.
func (r *run) barrier() {
	r.phase = "search"
	r.merge()
	if !r.stops() {
		r.polish()
		r.allot()
	}
	if r.evaluations >= r.next {
		r.record()
	}
	if r.set.Progress != nil {
		r.set.Progress(r.progress())
	}
}

// merge counts what the spaces have evaluated since the last time, in fixed
// order.
func (r *run) merge() {
	slack := r.nearly()
	for _, l := range r.islands {
		for _, g := range l.fresh {
			r.judge(g, slack)
			r.count(g)
		}
		l.fresh = l.fresh[:0]
		r.left += l.turn // what the space could not breed
		l.turn = 0
	}
	if r.feasible >= referenceSample {
		r.fixReference()
	}
	if r.snapshot != nil {
		r.snapshot = &Archive{goals: slices.Clone(r.archive.goals), m: r.archive.m}
	}
}

// count takes one evaluated design into the books.
func (r *run) count(g *genome) {
	order := r.evaluations
	r.evaluations++
	r.stop.fresh = r.stop.fresh || !g.recalled
	if r.set.Record != nil && !g.recalled {
		r.set.Record(g.space, g.x, &Result{Goals: g.goals, Excess: g.excess, Violation: g.violation, Fault: g.fault})
	}
	r.islands[g.space].books.add(g, order)
	if g.origin == originPolish {
		r.polished++
	}
	if !g.feasible() {
		r.misses.add(g, order)
		return
	}
	r.feasible++
	if r.reference == nil {
		r.early = append(r.early, g.goals)
	}
	if !g.beaten {
		r.archive.add(g, order)
	}
}

func (r *run) progress() Progress {
	p := Progress{Evaluations: r.evaluations, Budget: r.set.Evaluations, Feasible: r.feasible,
		Archive: r.archive.Len(), Phase: r.phase}
	if n := len(r.history); n > 0 {
		p.Hypervolume = r.history[n-1].Hypervolume
	}
	return p
}
