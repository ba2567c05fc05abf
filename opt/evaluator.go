package opt

import (
	"context"
	"fmt"
	"math"
	"sync"
)

// evaluator runs Problem.Evaluate on a fixed number of workers. Work is taken
// one design at a time, so uneven costs even out; results sit in the designs,
// so the order of finishing is not seen.
type evaluator struct {
	problem *Problem
	ctx     context.Context
	queue   chan task
	workers sync.WaitGroup
	inline  sync.Mutex // guards worker 0 when it is the only one
	single  bool
}

type task struct {
	g     *genome
	front *Archive
	done  *sync.WaitGroup
}

// batch is a set of designs handed in together.
type batch struct {
	designs []*genome
	front   *Archive // as it was when they were handed in; nil where nothing is confirmed
	wait    sync.WaitGroup
}

func newEvaluator(ctx context.Context, p *Problem, workers int) *evaluator {
	e := &evaluator{problem: p, ctx: ctx, single: workers == 1}
	if e.single {
		return e
	}
	e.queue = make(chan task, 4*workers)
	for w := range workers {
		e.workers.Add(1)
		go func() {
			defer e.workers.Done()
			for t := range e.queue {
				e.run(w, t.g, t.front)
				t.done.Done()
			}
		}()
	}
	return e
}

// close ends the workers; nothing may be submitted afterwards.
func (e *evaluator) close() {
	if !e.single {
		close(e.queue)
		e.workers.Wait()
	}
}

// submit starts a batch. With a single worker nothing happens before finish.
func (e *evaluator) submit(b *batch) {
	if e.single {
		return
	}
	b.wait.Add(len(b.designs))
	for _, g := range b.designs {
		e.queue <- task{g, b.front, &b.wait}
	}
}

// finish waits for a batch. After the context's end the designs that were not
// started stay undone.
func (e *evaluator) finish(b *batch) {
	if !e.single {
		b.wait.Wait()
		return
	}
	e.inline.Lock()
	defer e.inline.Unlock()
	for _, g := range b.designs {
		e.run(0, g, b.front)
	}
}

// one evaluates a single design and waits for it.
func (e *evaluator) one(g *genome, front *Archive) {
	b := batch{designs: []*genome{g}, front: front}
	e.submit(&b)
	e.finish(&b)
}

// run evaluates g unless that was done before or the context has ended, and
// confirms it if it is feasible and the front does not beat it.
func (e *evaluator) run(worker int, g *genome, front *Archive) {
	if g.done || e.ctx.Err() != nil {
		return
	}
	r := Result{Goals: g.goals, Excess: g.excess}
	for k := range r.Goals {
		r.Goals[k] = math.NaN()
	}
	clear(r.Excess)
	e.settle(g, &r, call(e.problem.Evaluate, worker, g, &r))
	g.recalled = r.Recalled // confirmed then, if it was to be
	if front != nil && g.feasible() {
		if g.beaten = front.beats(g.goals); !g.beaten && !g.recalled {
			r.Goals, r.Excess = g.goals, g.excess
			e.settle(g, &r, call(e.problem.Confirm, worker, g, &r))
			g.beaten = g.feasible() && front.beats(g.goals)
		}
	}
	g.done = true
}

// settle takes a result into the design; text says that it came of a panic.
func (e *evaluator) settle(g *genome, r *Result, text string) {
	if text != "" {
		r.Violation, r.Fault = math.Inf(1), text
	}
	copy(g.goals, r.Goals)
	copy(g.excess, r.Excess)
	g.violation, g.fault = verdict(r, g)
}

// call turns a panic into text.
func call(f func(worker, space int, x []float64, r *Result), worker int, g *genome, r *Result) (text string) {
	defer func() {
		if p := recover(); p != nil {
			text = fmt.Sprintf("panic: %v", p)
		}
	}()
	f(worker, g.space, g.x, r)
	return ""
}

// verdict returns the violation to rank g by, +Inf with a reason if the
// result is unusable.
func verdict(r *Result, g *genome) (float64, string) {
	switch v := r.Violation; {
	case r.Fault != "":
		return math.Inf(1), r.Fault
	case math.IsInf(v, 1):
		return v, "failed"
	case math.IsNaN(v) || v < 0:
		return math.Inf(1), fmt.Sprintf("violation is %v", v)
	}
	for l, v := range g.excess {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return math.Inf(1), fmt.Sprintf("excess of limit %d is %v", l, v)
		}
	}
	if r.Violation > 0 {
		return r.Violation, ""
	}
	for k, v := range g.goals {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return math.Inf(1), fmt.Sprintf("goal %d is %v", k, v)
		}
	}
	return 0, ""
}
