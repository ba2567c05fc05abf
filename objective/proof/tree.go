package proof

import (
	"context"
	"math"
	"sync"
	"sync/atomic"
	"time"

	"legwright/kin"
	"legwright/kin/enclose"
)

// batch is how many boxes are tested between two looks at the clock. The boxes of a batch are taken off the stack
// together and their results put together in order, so that no answer depends on the number of workers.
const batch = 256

// finest is how often a box is halved at most along one coordinate, on the average.
const finest = 30

// cell is a box in work.
type cell struct {
	box   enclose.Box
	open  uint64 // properties not yet proved for it
	node  int32
	depth int32
}

// node is what became of a box: the coordinate along which it was split, or why it was not, and the properties proved there.
type node struct {
	split  uint8
	first  int32 // place of the half with the lower coordinate; the other follows
	closed uint64
}

// Ends of branches.
const (
	settled = 6 + iota // every property in question is proved
	outside            // no pose of the region is in the box
	unsettled
)

// tree is the record of the boxes of one region, tested for some of the properties.
type tree struct {
	region *region
	number int // of the region
	props  uint64
	nodes  []node
	stack  []cell // not tested yet
	share  float64
}

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
	bench  []*bench
	probe  []*prober
	slots  []slot
	cells  []cell
	alive  uint64 // properties in question
	out    []Outcome
	boxes  int64
	most   int64
	end    time.Time
	ctx    context.Context
	late   bool
	halted bool
	rest   *Rest
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

// plant starts a tree.
func plant(g *region, number int, props uint64) tree {
	return tree{region: g, number: number, props: props, nodes: []node{{split: unsettled}}, stack: []cell{{box: g.box, open: props}}}
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

// merge takes the result of a cell into the record and puts its halves on the stack. It gives the share of the volume
// that is settled now and was not before.
func (p *prover) merge(t *tree, c *cell, s *slot) float64 {
	share := math.Ldexp(1, -int(c.depth))
	n := &t.nodes[c.node]
	p.boxes++
	for i := range p.props {
		if c.open>>i&1 == 0 {
			continue
		}
		o := &p.out[i]
		o.Boxes++
		if s.refuted>>i&1 == 1 && p.alive>>i&1 == 1 {
			p.alive &^= 1 << i
			o.Answer = Refuted
			at := s.counter[i]
			o.At = &at
		}
		if s.outside || s.closed>>i&1 == 1 {
			o.Left -= share
		}
		if s.closed>>i&1 == 1 && o.worse(s.worst[i], o.Bound) {
			o.Bound = s.worst[i]
		}
	}
	n.closed = s.closed & c.open
	open := c.open &^ s.closed & p.alive
	switch {
	case s.outside:
		n.split = outside
		return share
	case open == 0:
		n.split = settled
		return share
	case int(c.depth) >= finest*len(t.region.moving):
		p.keep(t.region, c, open)
		return 0
	}
	q := s.split
	mid := c.box.Low[q]/2 + c.box.High[q]/2
	first := int32(len(t.nodes))
	n.split, n.first = uint8(q), first
	t.nodes = append(t.nodes, node{split: unsettled}, node{split: unsettled})
	low, high := *c, *c
	low.box.High[q], high.box.Low[q] = mid, mid
	low.open, high.open = open, open
	low.node, high.node = first, first+1
	low.depth, high.depth = c.depth+1, c.depth+1
	t.stack = append(t.stack, high, low)
	return 0
}

// leave notes the largest of the boxes that were not tested.
func (p *prover) leave(t *tree) {
	for i := range t.stack {
		p.keep(t.region, &t.stack[i], t.stack[i].open&p.alive)
	}
}

// keep notes a box that is not settled if it is larger than the one noted.
func (p *prover) keep(g *region, c *cell, open uint64) {
	share := math.Ldexp(1, -int(c.depth))
	if open == 0 || p.rest != nil && p.rest.Share >= share {
		return
	}
	p.rest = &Rest{Zone: g.zone, Box: c.box, Share: share}
	for i := range p.props {
		if open>>i&1 == 1 {
			p.rest.Open = append(p.rest.Open, p.props[i].Name)
		}
	}
}
