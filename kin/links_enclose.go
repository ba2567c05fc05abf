package kin

import (
	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin/enclose"
)

// Links of an enclosure are those of leg after leg: the crank, if there is one, and the rod, or both rods of a parallelogram.

// perLeg is the number of links of a leg.
func (ps *linkPairs) perLeg(crank bool) int {
	n := 1
	if crank {
		n++
	}
	if ps.twin {
		n++
	}
	return n
}

// enclose adds the links of leg i.
func (ps *linkPairs) enclose(e *Enclosure, m *rods, i int, o *loop, hold Hold) {
	l := &m.leg[i]
	var from, to enclose.Vec
	from.AddConst(from.Quads(&o.end), l.at)
	to.AddConst(to.Quads(&o.w), l.at)
	if l.crank {
		e.Links = append(e.Links, Link{Leg: i, To: from, Radius: ps.crankCrank / 2})
		e.Links[len(e.Links)-1].From.Const(l.at)
	}
	if !ps.twin {
		e.Links = append(e.Links, Link{Leg: i, From: from, To: to, Radius: ps.rodRod / 2, Hold: hold, Tip: l.b})
		return
	}
	for _, k := range [2]float64{1, -1} {
		s := r3.Scale(k, ps.side[i])
		e.Links = append(e.Links, Link{Leg: i, Radius: ps.rodRod / 2, Hold: hold, Tip: r3.Add(l.b, s)})
		rod := &e.Links[len(e.Links)-1]
		rod.From.AddConst(&from, s)
		rod.To.AddConst(&to, s)
	}
}

// pairs lists the pairs of links that gap looks at.
func (ps *linkPairs) pairs(e *Enclosure, crank bool) {
	n := ps.perLeg(crank)
	for k := range ps.pair[:ps.n] {
		p := &ps.pair[k]
		for x := range n {
			for y := range n {
				ofCrank, other := crank && x == 0, crank && y == 0
				if ofCrank && other && !p.cranks || !ofCrank && !other && !p.rods {
					continue
				}
				e.Pairs = append(e.Pairs, [2]int{n*p.i + x, n*p.j + y})
			}
		}
	}
}
