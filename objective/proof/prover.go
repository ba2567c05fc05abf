package proof

import (
	"context"
	"sync"
	"sync/atomic"
	"time"

	"legwright/kin"
	"legwright/kin/enclose"
)

// batch is how many boxes are tested between two looks at the clock. The boxes of a batch are taken off the stack
// together and their results put together in order, so that no answer depends on the number of workers.
const batch = 256

// turns is how many batches of a tree are tested before the next tree has its turn, so that one hard
// property does not keep the others from being settled.
const turns = 8

// slot takes the result of a test.
type slot struct {
	closed  uint64
	split   int
	outside bool
	worst   []float64
	refuted uint64
	counter []Counter
}

// prover runs the tests of one design.
type prover struct {
	*subject
	bench     []*bench
	probe     []*prober
	slots     []slot
	cells     []cell
	alive     uint64 // properties in question
	unsettled uint64 // properties that are open in some box or at some single pose
	leaves    []leaves
	out       []Outcome
	boxes     int64
	most      int64
	end       time.Time
	ctx       context.Context
	late      bool
	halted    bool
	rest      *Rest
}

// run tests all trees by turns until each is settled or it is time to stop.
func (p *prover) run(trees []tree, progress func(Progress)) {
	for open := true; open; {
		open = false
		for k := range trees {
			t := &trees[k]
			if len(t.stack) == 0 || t.props&p.alive == 0 {
				t.stack = t.stack[:0]
				continue
			}
			for _, b := range p.bench {
				b.enter(t.region)
			}
			for range turns {
				if p.stop() {
					for i := range trees {
						p.leave(&trees[i])
					}
					return
				}
				p.step(t)
				if progress != nil {
					sum := 0.0
					for i := range trees {
						sum += trees[i].share
					}
					progress(Progress{Settled: sum / float64(len(trees)), Boxes: p.boxes})
				}
				if len(t.stack) == 0 {
					break
				}
			}
			open = open || len(t.stack) > 0
		}
	}
}

// step tests the boxes on top of a tree's stack.
func (p *prover) step(t *tree) {
	n := min(batch, len(t.stack))
	p.cells = append(p.cells[:0], t.stack[len(t.stack)-n:]...)
	t.stack = t.stack[:len(t.stack)-n]
	p.test(t.region, p.cells)
	for i := range p.cells {
		t.share += p.merge(t, &p.cells[i], &p.slots[i])
	}
}

// stop tells whether to go no further.
func (p *prover) stop() bool {
	switch {
	case p.ctx.Err() != nil:
		p.halted = true
	case !p.end.IsZero() && !time.Now().Before(p.end), p.most > 0 && p.boxes >= p.most:
		p.late = true
	default:
		return false
	}
	return true
}

// test fills a slot for each cell.
func (p *prover) test(g *region, cells []cell) {
	if len(p.bench) == 1 || len(cells) == 1 {
		for i := range cells {
			p.try(0, g, &cells[i], &p.slots[i])
		}
		return
	}
	var next atomic.Int64
	var wait sync.WaitGroup
	for w := range min(len(p.bench), len(cells)) {
		wait.Go(func() {
			for {
				i := int(next.Add(1)) - 1
				if i >= len(cells) {
					return
				}
				p.try(w, g, &cells[i], &p.slots[i])
			}
		})
	}
	wait.Wait()
}

// try tests one cell with the scratch of worker w.
func (p *prover) try(w int, g *region, c *cell, s *slot) {
	b := p.bench[w]
	s.closed, s.refuted, s.split = 0, 0, 0
	if s.outside = g.beyond(&c.box); s.outside {
		return
	}
	open := c.open & p.alive
	s.closed, s.split = b.prove(&c.box, open)
	copy(s.worst, b.worst)
	// Every sixth level the middle and the corner that looks worst are looked at in plain arithmetic.
	if left := open &^ s.closed; left != 0 && c.depth%6 == 0 {
		var at kin.Coords
		for q := range at {
			at[q] = c.box.Low[q]/2 + c.box.High[q]/2
		}
		p.look(w, g, at, left, s)
		if b.corner >= 0 {
			for k, q := range g.moving {
				at[q] = c.box.Low[q]
				if b.corner>>k&1 == 1 {
					at[q] = c.box.High[q]
				}
			}
			p.look(w, g, at, left&^s.refuted, s)
		}
	}
}

// look asks at a pose whether any of the properties fails.
func (p *prover) look(w int, g *region, at kin.Coords, open uint64, s *slot) {
	c := [enclose.Coords]float64(at)
	if !g.holds(&c) {
		return
	}
	v := p.probe[w]
	v.at(at, g.zone)
	for i := range p.props {
		if open>>i&1 == 1 && v.refutes(i, &s.counter[i]) {
			s.refuted |= 1 << i
		}
	}
}
