package proof

import (
	"container/heap"

	"legwright/kin/enclose"
)

// mostLeaves is how many boxes a property may have been proved on for its bound to be tightened: where it took more, its limit
// is so near to the true extreme that there is little to gain.
const mostLeaves = 1024

// enough is the share of the distance from limit to extreme at which a bound is good enough.
const enough = 0.8

// leaf is a box on which a property is proved, and the bound that it keeps there.
type leaf struct {
	box    enclose.Box
	region int
	split  int
	depth  int32
	worst  float64
}

// leaves is a heap of the boxes of one property, the one with the worst bound on top.
type leaves struct {
	property *Property
	leaf     []leaf
	many     bool // more than mostLeaves, and none is kept
}

func (l *leaves) Len() int           { return len(l.leaf) }
func (l *leaves) Less(i, j int) bool { return l.property.worse(l.leaf[i].worst, l.leaf[j].worst) }
func (l *leaves) Swap(i, j int)      { l.leaf[i], l.leaf[j] = l.leaf[j], l.leaf[i] }
func (l *leaves) Push(x any)         { l.leaf = append(l.leaf, x.(leaf)) }
func (l *leaves) Pop() any {
	n := len(l.leaf) - 1
	x := l.leaf[n]
	l.leaf = l.leaf[:n]
	return x
}

// note adds a leaf.
func (l *leaves) note(x leaf) {
	if l.many = l.many || len(l.leaf) == mostLeaves; l.many {
		l.leaf = nil
		return
	}
	l.leaf = append(l.leaf, x)
}

// tighten improves the bounds of what was proved, which are as far from the true extremes as the limits let them be: boxes with
// the worst bound are split first, for all properties together about half as many as the proof took. Records are not about
// these boxes: they show the limits.
func (p *prover) tighten(all []region) {
	var todo []int
	for i := range p.out {
		l := &p.leaves[i]
		if o := &p.out[i]; p.alive>>i&1 == 1 && o.Bounded && p.unsettled>>i&1 == 0 && !l.many && len(l.leaf) > 0 {
			todo = append(todo, i)
		}
	}
	for _, i := range todo {
		o, l := &p.out[i], &p.leaves[i]
		heap.Init(l)
		p.best[i] = o.Found
		for left := min(4*len(l.leaf)+16, int(p.boxes)/(2*len(todo))+16); left > 0 && len(l.leaf) > 0 && !p.stop(); {
			if o.Slack(o.kind.value(l.leaf[0].worst)) > enough*o.Slack(o.Found) {
				break
			}
			left -= p.divide(all, i, l)
		}
		if len(l.leaf) > 0 { // else all that is left of an ellipsoid's boxes is outside
			o.Bound = l.leaf[0].worst
		}
	}
}

// divide splits some of the worst leaves, and gives the number of boxes that were tested.
func (p *prover) divide(all []region, i int, l *leaves) int {
	const some = 8
	var parents [some]leaf
	n := 0
	p.cells = p.cells[:0]
	for n < some && len(l.leaf) > 0 && (n == 0 || l.leaf[0].region == parents[0].region) {
		x := heap.Pop(l).(leaf)
		parents[n] = x
		n++
		q := x.split
		mid := x.box.Low[q]/2 + x.box.High[q]/2
		low := cell{box: x.box, open: 1 << i, depth: x.depth + 1}
		high := low
		low.box.High[q], high.box.Low[q] = mid, mid
		p.cells = append(p.cells, low, high)
	}
	g := &all[parents[0].region]
	for _, b := range p.bench {
		b.enter(g)
	}
	p.target[i] = parents[0].worst
	p.test(g, p.cells)
	for k := range p.cells {
		c, s := &p.cells[k], &p.slots[k]
		x := parents[k/2] // whose bound holds for its halves
		if s.outside {
			continue
		}
		if s.closed>>i&1 == 1 && p.props[i].worse(x.worst, s.worst[i]) {
			x.worst = s.worst[i]
		}
		x.box, x.split, x.depth = c.box, s.split, c.depth
		heap.Push(l, x)
	}
	return len(p.cells)
}
