package objective

import (
	"math"

	"legwright/kin"
)

// disc is a circle in plan.
type disc struct{ x, y, r float64 }

// holds tells whether the point lies in the disc, rounding aside.
func (d *disc) holds(p *kin.Vec) bool { return math.Hypot(p.X-d.x, p.Y-d.y) <= d.r*(1+1e-12) }

// enclosing is the diameter of the smallest circle in plan that holds the points:
// a point outside the circle of those before it lies on the circle of all so far
// (E. Welzl 1991, Smallest enclosing disks, LNCS 555:359, in the incremental form
// without shuffling; from memory).
func enclosing(p []kin.Vec) float64 {
	if len(p) == 0 {
		return 0
	}
	c := disc{p[0].X, p[0].Y, 0}
	for i := range p {
		if c.holds(&p[i]) {
			continue
		}
		c = disc{p[i].X, p[i].Y, 0}
		for j := range p[:i] {
			if c.holds(&p[j]) {
				continue
			}
			c = across(&p[i], &p[j])
			for k := range p[:j] {
				if !c.holds(&p[k]) {
					c = through(&p[i], &p[j], &p[k])
				}
			}
		}
	}
	return 2 * c.r
}

// across is the disc with the two points at the ends of a diameter.
func across(a, b *kin.Vec) disc {
	return disc{(a.X + b.X) / 2, (a.Y + b.Y) / 2, math.Hypot(a.X-b.X, a.Y-b.Y) / 2}
}

// through is the disc through three points; where they lie on a line, the one across the two that are farthest apart.
func through(a, b, c *kin.Vec) disc {
	ux, uy, vx, vy := b.X-a.X, b.Y-a.Y, c.X-a.X, c.Y-a.Y
	d := 2 * (ux*vy - uy*vx)
	u2, v2 := ux*ux+uy*uy, vx*vx+vy*vy
	if math.Abs(d) <= 1e-14*(u2+v2) {
		best := across(a, b)
		for _, o := range [2]disc{across(a, c), across(b, c)} {
			if o.r > best.r {
				best = o
			}
		}
		return best
	}
	x, y := (vy*u2-uy*v2)/d, (ux*v2-vx*u2)/d
	return disc{a.X + x, a.Y + y, math.Hypot(x, y)}
}
