package proof

import (
	"math"

	"legwright/kin/enclose"
)

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

	unsettled = 255 // not tested, or too small to be split
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

// plant starts a tree.
func plant(g *region, number int, props uint64) tree {
	return tree{region: g, number: number, props: props, nodes: []node{{split: unsettled}}, stack: []cell{{box: g.box, open: props}}}
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
			if o.worse(o.Bound, p.best[i]) {
				p.best[i] = o.Bound
			}
		}
		if s.closed>>i&1 == 1 && o.Bounded {
			p.leaves[i].note(leaf{c.box, t.number, s.split, c.depth, s.worst[i]})
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

// keep notes that properties are not settled in a box, however small, and the box if it is larger than the one noted.
func (p *prover) keep(g *region, c *cell, open uint64) {
	p.unsettled |= open
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
