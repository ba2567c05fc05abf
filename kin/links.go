package kin

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// linkPair is two legs of drives and rods. e is a fixed unit vector that points from
// leg j to leg i at home: the distance of two links' projections on it is a lower
// bound of their distance, sharp enough to skip most.
type linkPair struct {
	i, j   int
	e      Vec
	bi, bj float64 // pivots on e
	oi, oj float64 // half the parallelograms' widths on e
	cranks bool    // the cranks share no pivot
	rods   bool    // the rods share no joint
}

// linkPairs are all pairs of legs, the nearest at home first. Links of one leg are
// no pair, nor are cranks with one pivot or rods with one platform joint.
type linkPairs struct {
	pair [15]linkPair
	n    int
	side [6]Vec // from the middle of a parallelogram to one of its rods
	twin bool

	crankCrank, crankRod, rodRod, thick float64 // what the links' own thickness takes, and the most of them
}

// oneJoint is the distance, over the leg's size, below which joint centres count as
// one: centres that a double joint has twice, through two azimuths, differ by rounding.
const oneJoint = 1e-9

func pairLinks(m *rods, half float64, s *Setup) linkPairs {
	crank := s.Crank
	if crank == 0 {
		crank = s.Diameter
	}
	ps := linkPairs{
		twin:       half != 0,
		crankCrank: crank, crankRod: (crank + s.Diameter) / 2, rodRod: s.Diameter,
		thick: math.Max(crank, s.Diameter),
	}
	var middle [6]Vec
	for i := range m.leg[:m.n] {
		l := &m.leg[i]
		ps.side[i] = r3.Scale(half, l.e3)
		middle[i] = r3.Add(l.at, r3.Add(m.home, l.b))
		if l.crank {
			middle[i] = r3.Add(middle[i], r3.Add(l.at, r3.Scale(l.length, l.e1)))
		}
	}
	var dist [15]float64
	for i := range m.n {
		for j := i + 1; j < m.n; j++ {
			if s.Neighbours && j != i+1 && j-i != m.n-1 {
				continue
			}
			a, b := &m.leg[i], &m.leg[j]
			foot, tip := r3.Norm(r3.Sub(a.at, b.at)), r3.Norm(r3.Sub(a.b, b.b))
			small := oneJoint * (a.length + a.rod)
			p := linkPair{
				i: i, j: j, e: unit(r3.Sub(middle[i], middle[j])),
				cranks: a.crank && foot > small,
				rods:   ps.twin || tip > small,
			}
			p.bi, p.bj = r3.Dot(p.e, a.at), r3.Dot(p.e, b.at)
			p.oi, p.oj = math.Abs(r3.Dot(p.e, ps.side[i])), math.Abs(r3.Dot(p.e, ps.side[j]))
			if !p.rods && !a.crank {
				continue
			}
			ps.pair[ps.n], dist[ps.n] = p, math.Min(foot, tip)
			ps.n++
		}
	}
	order := make([]int, ps.n)
	for k := range order {
		order[k] = k
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(dist[a], dist[b]) })
	sorted := ps
	for k, o := range order {
		sorted.pair[k] = ps.pair[o]
	}
	return sorted
}

// link is a straight part: it runs from `from` along the unit vector `way`.
type link struct {
	from, way Vec
	length    float64
}

// within is the lesser of best and the distance between the surfaces of two links.
func within(best float64, a, b *link, thick float64) float64 {
	d := Vec{X: a.from.X - b.from.X, Y: a.from.Y - b.from.Y, Z: a.from.Z - b.from.Z}
	if g := math.Sqrt(segmentGap2(&d, &a.way, &b.way, a.length, b.length)) - thick; g < best {
		return g
	}
	return best
}

// gap looks at the pairs in order and skips those whose bound shows that they cannot be the least.
func (ps *linkPairs) gap(m *rods, s *State) (gap float64, i, j int) {
	var arm, rod [6]link
	legs := m.leg[:m.n]
	for k := range legs {
		l := &legs[k]
		rod[k] = link{from: s.End[k], way: s.Rod[k], length: l.rod}
		if l.crank {
			inv := 1 / l.length
			arm[k] = link{from: l.at, length: l.length, way: Vec{
				X: (s.End[k].X - l.at.X) * inv, Y: (s.End[k].Y - l.at.Y) * inv, Z: (s.End[k].Z - l.at.Z) * inv}}
		}
	}
	best := math.Inf(1)
	i, j = -1, -1
	for k := range ps.pair[:ps.n] {
		p := &ps.pair[k]
		a, b := &rod[p.i], &rod[p.j]
		// on e: the least of leg i's rod and crank, the greatest of leg j's
		ei, ej := p.e.X*a.from.X+p.e.Y*a.from.Y+p.e.Z*a.from.Z, p.e.X*b.from.X+p.e.Y*b.from.Y+p.e.Z*b.from.Z
		ti := ei + a.length*(p.e.X*a.way.X+p.e.Y*a.way.Y+p.e.Z*a.way.Z)
		tj := ej + b.length*(p.e.X*b.way.X+p.e.Y*b.way.Y+p.e.Z*b.way.Z)
		ri, rj := lesser(ei, ti)-p.oi, greater(ej, tj)+p.oj
		ci, cj := ri, rj
		crank := legs[p.i].crank
		if crank {
			ci, cj = lesser(p.bi, ei), greater(p.bj, ej)
		}
		if lesser(ci, ri)-greater(cj, rj)-ps.thick >= best {
			continue
		}
		was := best
		if p.rods && ri-rj-ps.rodRod < best {
			best = ps.rodsOf(best, p, a, b)
		}
		if crank {
			if ci-rj-ps.crankRod < best {
				best = ps.crankAndRods(best, &arm[p.i], b, p.j)
			}
			if ri-cj-ps.crankRod < best {
				best = ps.crankAndRods(best, &arm[p.j], a, p.i)
			}
			if p.cranks && ci-cj-ps.crankCrank < best {
				best = within(best, &arm[p.i], &arm[p.j], ps.crankCrank)
			}
		}
		if best < was {
			i, j = p.i, p.j
		}
	}
	return best, i, j
}

// rodsOf is the least distance between the rods of two legs.
func (ps *linkPairs) rodsOf(best float64, p *linkPair, a, b *link) float64 {
	if !ps.twin {
		return within(best, a, b, ps.rodRod)
	}
	for _, x := range a.pair(&ps.side[p.i]) {
		best = ps.crankOrRod(best, &x, b, p.j, ps.rodRod)
	}
	return best
}

// crankAndRods is the least distance between a crank and the rods of another leg.
func (ps *linkPairs) crankAndRods(best float64, crank, rod *link, leg int) float64 {
	if !ps.twin {
		return within(best, crank, rod, ps.crankRod)
	}
	return ps.crankOrRod(best, crank, rod, leg, ps.crankRod)
}

// crankOrRod is the least distance between a link and the two rods of a parallelogram.
func (ps *linkPairs) crankOrRod(best float64, a, rod *link, leg int, thick float64) float64 {
	for _, y := range rod.pair(&ps.side[leg]) {
		best = within(best, a, &y, thick)
	}
	return best
}

// pair is the two rods of the parallelogram whose middle line is l.
func (l *link) pair(side *Vec) [2]link {
	x, y := *l, *l
	x.from = Vec{X: l.from.X + side.X, Y: l.from.Y + side.Y, Z: l.from.Z + side.Z}
	y.from = Vec{X: l.from.X - side.X, Y: l.from.Y - side.Y, Z: l.from.Z - side.Z}
	return [2]link{x, y}
}

func lesser(a, b float64) float64 {
	if b < a {
		return b
	}
	return a
}

func greater(a, b float64) float64 {
	if b > a {
		return b
	}
	return a
}
