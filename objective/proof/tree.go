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

// tree is the record of one region.
type tree struct {
	region region
	nodes  []node
}

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
	stack  []cell
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

// run proves the properties alive over the region, tree being its record. done gets the share of the volume that is settled.
func (p *prover) run(g *region, t *tree, done func(share float64)) {
	for _, b := range p.bench {
		b.enter(g)
	}
	t.region = *g
	t.nodes = append(t.nodes[:0], node{split: unsettled})
	p.stack = append(p.stack[:0], cell{box: g.box, open: p.alive})
	share := 0.0
	for len(p.stack) > 0 {
		if p.stop() {
			p.leave(g)
			return
		}
		n := min(batch, len(p.stack))
		cells := p.stack[len(p.stack)-n:]
		p.test(g, cells)
		p.stack = p.stack[:len(p.stack)-n]
		taken := append([]cell(nil), cells...) // children overwrite their place
		for i := range taken {
			share += p.merge(g, t, &taken[i], &p.slots[i])
		}
		if p.alive == 0 {
			return
		}
		done(share)
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
func (p *prover) merge(g *region, t *tree, c *cell, s *slot) float64 {
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
	case int(c.depth) >= finest*len(g.moving):
		p.keep(g, c, open)
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
	p.stack = append(p.stack, high, low)
	return 0
}

// leave notes the worst of the boxes on the stack.
func (p *prover) leave(g *region) {
	for i := range p.stack {
		p.keep(g, &p.stack[i], p.stack[i].open&p.alive)
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
