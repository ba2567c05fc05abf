package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// linkPair is two legs of drives and rods. e is a fixed unit vector that points from
// leg j to leg i at home: the distance of two links' projections on it is a lower
// bound of their distance, sharp enough to skip most. Where home can be reached it is the
// direction in which the two legs' links are nearest there.
type linkPair struct {
	i, j   int
	e      Vec
	bi, bj float64 // pivots on e
	oi, oj float64 // half the parallelograms' widths on e
	si, sj float64 // 1 where the side of leg i, j points away from the other leg, else -1
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
	for i := range m.leg[:m.n] {
		ps.side[i] = r3.Scale(half, m.leg[i].e3)
	}
	var (
		c closures
		h State
	)
	for i := range m.leg[:m.n] {
		c.w[i] = r3.Sub(r3.Add(m.home, m.leg[i].b), m.leg[i].at)
	}
	reached := m.close(&c, &h)
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
				i: i, j: j,
				cranks: a.crank && foot > small,
				rods:   ps.twin || tip > small,
			}
			p.e = unit(r3.Sub(r3.Add(a.at, a.b), r3.Add(b.at, b.b)))
			if reached {
				p.e = ps.apart(&p, m, &h)
			}
			p.bi, p.bj = r3.Dot(p.e, a.at), r3.Dot(p.e, b.at)
			p.oi, p.oj = r3.Dot(p.e, ps.side[i]), -r3.Dot(p.e, ps.side[j])
			p.si, p.sj = sign(p.oi), sign(p.oj)
			p.oi, p.oj = math.Abs(p.oi), math.Abs(p.oj)
			if !p.rods && !a.crank {
				continue
			}
			ps.pair[ps.n], dist[ps.n] = p, math.Min(foot, tip)
			ps.n++
		}
	}
	nearestFirst(ps.pair[:ps.n], dist[:ps.n])
	return ps
}

// apart is the direction from leg j to leg i where their links are nearest in the posture s.
func (ps *linkPairs) apart(p *linkPair, m *rods, s *State) Vec {
	type link struct {
		from, along Vec
		length      float64
		rod         bool
	}
	links := func(i int) (out []link) {
		l := &m.leg[i]
		for _, k := range [2]float64{-1, 1} {
			out = append(out, link{r3.Add(s.End[i], r3.Scale(k, ps.side[i])), s.Rod[i], l.rod, true})
			if !ps.twin {
				break
			}
		}
		if l.crank {
			out = append(out, link{l.at, l.along(&s.End[i]), l.length, false})
		}
		return out
	}
	least, e := math.Inf(1), Vec{}
	for _, x := range links(p.i) {
		for _, y := range links(p.j) {
			if x.rod && y.rod && !p.rods || !x.rod && !y.rod && !p.cranks {
				continue
			}
			d := r3.Sub(x.from, y.from)
			d = segmentApart(&d, &x.along, &y.along, x.length, y.length)
			if d2 := r3.Norm2(d); d2 < least {
				least, e = d2, unit(d)
			}
		}
	}
	return e
}

// gapSlack is the share of a leg's size by which a gap has to be below keep to be found: more than all rounding
// errors, so that gaps that stay the same from pose to pose, as those of platform joints do, are found once.
const gapSlack = 1e-12

// nearest is the least distance met so far: free is that between surfaces.
type nearest struct{ free float64 }

// see looks at two links that start d apart, run along the unit vectors u and v, and
// whose thickness takes `thick` off the distance of their axes.
func (n *nearest) see(d, u, v *Vec, lu, lv, thick float64) bool {
	d2 := segmentGap2(d, u, v, lu, lv)
	if reach := n.free + thick; reach < 0 || d2 >= reach*reach {
		return false
	}
	n.free = math.Sqrt(d2) - thick
	return true
}

// gap looks at the pairs in order and skips those whose bound shows that they cannot be the least, or not below keep.
func (ps *linkPairs) gap(m *rods, s *State, keep float64) (gap float64, i, j int) {
	n := nearest{free: keep - gapSlack*(m.leg[0].length+m.leg[0].rod)}
	i, j = -1, -1
	crank := m.leg[0].crank
	for k := range ps.pair[:ps.n] {
		p := &ps.pair[k]
		a, b := &m.leg[p.i], &m.leg[p.j]
		ea, eb, ua, ub := &s.End[p.i], &s.End[p.j], &s.Rod[p.i], &s.Rod[p.j]
		// on e: the least of leg i's rods and crank, the greatest of leg j's
		ei, ej := p.e.X*ea.X+p.e.Y*ea.Y+p.e.Z*ea.Z, p.e.X*eb.X+p.e.Y*eb.Y+p.e.Z*eb.Z
		ti := ei + a.rod*(p.e.X*ua.X+p.e.Y*ua.Y+p.e.Z*ua.Z)
		tj := ej + b.rod*(p.e.X*ub.X+p.e.Y*ub.Y+p.e.Z*ub.Z)
		ri, rj := min(ei, ti)-p.oi, max(ej, tj)+p.oj
		ci, cj := ri, rj
		if crank {
			ci, cj = min(p.bi, ei), max(p.bj, ej)
		}
		if min(ci, ri)-max(cj, rj)-ps.thick >= n.free {
			continue
		}
		closer := false
		if p.rods && ri-rj-ps.rodRod < n.free {
			closer = ps.rodsOf(&n, p, m, s, ri, rj)
		}
		if crank && (ci-rj-ps.crankRod < n.free || ri-cj-ps.crankRod < n.free || p.cranks && ci-cj-ps.crankCrank < n.free) {
			ca, cb := a.along(ea), b.along(eb)
			if ci-rj-ps.crankRod < n.free && ps.crankAndRods(&n, a, &ca, b, s, p.j) {
				closer = true
			}
			if ri-cj-ps.crankRod < n.free && ps.crankAndRods(&n, b, &cb, a, s, p.i) {
				closer = true
			}
			if p.cranks && ci-cj-ps.crankCrank < n.free {
				d := Vec{X: a.at.X - b.at.X, Y: a.at.Y - b.at.Y, Z: a.at.Z - b.at.Z}
				if n.see(&d, &ca, &cb, a.length, b.length, ps.crankCrank) {
					closer = true
				}
			}
		}
		if closer {
			i, j = p.i, p.j
		}
	}
	if i < 0 {
		return math.Inf(1), i, j
	}
	return n.free, i, j
}

// along is the unit vector along the crank whose end is given.
func (d *drive) along(end *Vec) Vec {
	inv := 1 / d.length
	return Vec{X: (end.X - d.at.X) * inv, Y: (end.Y - d.at.Y) * inv, Z: (end.Z - d.at.Z) * inv}
}

// rodsOf looks at the rods of two legs, whose least and greatest projections are ri and rj: of parallelograms at the two
// rods first that lie nearer on e, and at the others if their own bounds let them be nearer.
func (ps *linkPairs) rodsOf(n *nearest, p *linkPair, m *rods, s *State, ri, rj float64) bool {
	a, b := &s.End[p.i], &s.End[p.j]
	la, lb := m.leg[p.i].rod, m.leg[p.j].rod
	d := Vec{X: a.X - b.X, Y: a.Y - b.Y, Z: a.Z - b.Z}
	if !ps.twin {
		return n.see(&d, &s.Rod[p.i], &s.Rod[p.j], la, lb, ps.rodRod)
	}
	closer := false
	for k := range 4 {
		// side points away from the other leg: the near rod is at -side
		x, y, low := -1., -1., ri-rj-ps.rodRod
		if k&1 != 0 {
			x, low = 1, low+2*p.oi
		}
		if k&2 != 0 {
			y, low = 1, low+2*p.oj
		}
		if low >= n.free {
			continue
		}
		x *= p.si
		y *= p.sj
		o, q := &ps.side[p.i], &ps.side[p.j]
		g := Vec{X: d.X + x*o.X - y*q.X, Y: d.Y + x*o.Y - y*q.Y, Z: d.Z + x*o.Z - y*q.Z}
		if n.see(&g, &s.Rod[p.i], &s.Rod[p.j], la, lb, ps.rodRod) {
			closer = true
		}
	}
	return closer
}

// crankAndRods looks at the crank of one leg, which runs along c, and the rods of the other, which is number leg.
func (ps *linkPairs) crankAndRods(n *nearest, crank *rodLeg, c *Vec, rod *rodLeg, s *State, leg int) bool {
	e := &s.End[leg]
	d := Vec{X: crank.at.X - e.X, Y: crank.at.Y - e.Y, Z: crank.at.Z - e.Z}
	if !ps.twin {
		return n.see(&d, c, &s.Rod[leg], crank.length, rod.rod, ps.crankRod)
	}
	o := &ps.side[leg]
	x, y := Vec{X: d.X + o.X, Y: d.Y + o.Y, Z: d.Z + o.Z}, Vec{X: d.X - o.X, Y: d.Y - o.Y, Z: d.Z - o.Z}
	closer := n.see(&x, c, &s.Rod[leg], crank.length, rod.rod, ps.crankRod)
	return n.see(&y, c, &s.Rod[leg], crank.length, rod.rod, ps.crankRod) || closer
}
