package handover

import (
	"cmp"
	"math"
	"slices"

	"legwright/cmd/legwright/internal/drawing"
)

// mm and deg are the texts of dimensions.
func mm(v float64) string  { return decimals(v, 3) }
func deg(a float64) string { return decimals(a*180/math.Pi, 3) + "°" }

// dimensions draws those that place the joints: the pitch circle, angles, and distances of neighbours.
func (p *plan) dimensions(d *design, first float64, low drawing.Point) {
	k := p.Scale
	switch {
	case p.radius > 0:
		p.Distance(drawing.Point{X: -p.radius}, drawing.Point{X: p.radius}, low.Y-17*k, "Ø "+mm(2*p.radius))
		switch {
		case len(p.ring) < 6:
			p.single()
		case !p.paired(first):
			p.chain()
		}
	case len(p.ring) > 2:
		p.chain()
	case len(p.ring) == 2 && p.ring[0].Point != p.ring[1].Point: // the pivots of a five-bar
		p.Distance(p.ring[0].Point, p.ring[1].Point, low.Y-12*k, mm(apart(p.ring[0], p.ring[1])))
	case len(p.holes) == 2 && len(p.ring) == 1: // column and shoulder
		p.Distance(p.holes[0].Point, p.holes[1].Point, low.Y-12*k, mm(apart(p.holes[0], p.holes[1])))
	}
	if len(p.lines) > 0 && len(p.holes) > 1 && p.lines[0][0].name == "P1a" {
		a, b := p.lines[0][0], p.lines[0][1]
		off := 7 * k
		m := drawing.Point{X: (a.X + b.X) / 2, Y: (a.Y + b.Y) / 2}
		if side := (b.X-a.X)*m.Y - (b.Y-a.Y)*m.X; side < 0 { // left of the way from a to b points inward
			off = -off
		}
		p.Distance(a.Point, b.Point, off, mm(apart(a, b)))
	}
}

func apart(a, b mark) float64 { return math.Hypot(a.X-b.X, a.Y-b.Y) }

// angleOf is the azimuth of a mark.
func angleOf(m mark) float64 { return azimuth(m.X/1000, m.Y/1000) }

// paired dimensions six joints in three pairs that are centred 120° apart, the first at the azimuth: the half-angle
// and the distances within a pair and between pairs. It reports false where they do not stand so.
func (p *plan) paired(first float64) bool {
	const third = 2 * math.Pi / 3
	// the joints before and after the first pair's centre, and the one after that
	var before, after, next *mark
	half := math.Inf(1)
	for i := range p.ring {
		m := &p.ring[i]
		switch a := math.Remainder(angleOf(*m)-first, 2*math.Pi); {
		case a > 0 && (after == nil || a < half):
			after, half = m, a
		}
	}
	for i := range p.ring {
		m := &p.ring[i]
		a := math.Remainder(angleOf(*m)-first, 2*math.Pi)
		turn := math.Remainder(a, third)
		if math.Abs(math.Abs(turn)-half) > 1e-9 {
			return false // not in equal pairs
		}
		if math.Abs(a+half) < 1e-9 {
			before = m
		}
		if math.Abs(a-(third-half)) < 1e-9 {
			next = m
		}
	}
	if before == nil || after == nil || next == nil {
		return false
	}
	for i := range 3 {
		a := first + float64(i)*third
		p.Lines = append(p.Lines, drawing.Line{Layer: drawing.Centre, To: polar(p.radius+6*p.Scale, a)})
	}
	p.Angle(drawing.Point{}, 0.62*p.radius, first, first+half, deg(half))
	p.Angle(drawing.Point{}, 0.3*p.radius, first+third, first+2*third, deg(third))
	p.outside(*before, *after)
	p.outside(*after, *next)
	return true
}

// chain dimensions the distance of each joint from the next one about the origin. The table has their places.
func (p *plan) chain() {
	round := slices.Clone(p.ring)
	slices.SortStableFunc(round, func(a, b mark) int { return cmp.Compare(angleOf(a), angleOf(b)) })
	for i, a := range round {
		if b := round[(i+1)%len(round)]; apart(a, b) > 1e-6 {
			p.Distance(a.Point, b.Point, -6*p.Scale, mm(apart(a, b)))
		}
	}
}

// single dimensions a few joints by their angles, each from the one before, the first from +x, and the distance of the first two.
func (p *plan) single() {
	last := 0.0
	for i := range p.ring {
		a := angleOf(p.ring[i])
		if a > last+1e-9 {
			p.Angle(drawing.Point{}, (0.35+0.1*float64(i%2))*p.radius, last, a, deg(a-last))
			last = a
		}
	}
	if len(p.ring) > 1 && p.ring[0].name == p.holes[0].name {
		p.outside(p.ring[0], p.ring[1])
	}
}

// outside dimensions the distance of two joints of the pitch circle: beyond the circle, or between chord and circle
// where there is room.
func (p *plan) outside(a, b mark) {
	if math.Remainder(angleOf(b)-angleOf(a), 2*math.Pi) < 0 {
		a, b = b, a
	}
	k := p.Scale
	rise := p.radius - math.Hypot((a.X+b.X)/2, (a.Y+b.Y)/2)
	off := rise + 9*k
	if rise > 14*k {
		off = 5 * k
	}
	p.Distance(a.Point, b.Point, -off, mm(apart(a, b)))
}

// polar is the point at the distance from the origin, at the angle.
func polar(r, angle float64) drawing.Point {
	sin, cos := math.Sincos(angle)
	return drawing.Point{X: r * cos, Y: r * sin}
}
