package opt

import "math"

// latest is how many evaluated designs a pool remembers besides the population.
const latest = 200

// pool holds evaluated designs of a space for models of it: the population and
// the latest others, failed ones left out.
type pool struct {
	dom   *domain
	last  []*genome // a ring
	count int       // designs that it took
	all   []*genome
	x     []float64 // real variables of all, scaled, one design after another
	round int
}

// take remembers an evaluated design.
func (p *pool) take(g *genome) {
	if math.IsInf(g.violation, 1) {
		return
	}
	if len(p.last) < latest {
		p.last = append(p.last, g)
	} else {
		p.last[p.count%latest] = g
	}
	p.count++
}

// fill makes the pool ready for models.
func (p *pool) fill(population []*genome) {
	p.all, p.x = p.all[:0], p.x[:0]
	p.round++
	for _, set := range [2][]*genome{population, p.last} {
		for _, g := range set {
			if g.pooled == p.round || math.IsInf(g.violation, 1) {
				continue
			}
			g.pooled = p.round
			p.all = append(p.all, g)
			if len(g.unit) == 0 {
				g.unit = p.dom.unit(g.unit, g.x)
			}
			p.x = append(p.x, g.unit...)
		}
	}
}

// unit appends the real variables of x, scaled to ranges of [0, 1].
func (d *domain) unit(dst, x []float64) []float64 {
	for _, i := range d.real {
		dst = append(dst, (x[i]-d.low[i])/(d.high[i]-d.low[i]))
	}
	return dst
}

// alike tells whether x and y agree in all that is not real.
func (d *domain) alike(x, y []float64) bool {
	for _, i := range d.discrete {
		if x[i] != y[i] {
			return false
		}
	}
	return true
}
