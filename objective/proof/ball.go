package proof

import (
	"math"

	"legwright/kin/enclose"
)

// ball is a box seen from the ellipsoid that it is part of: in units of the ellipsoid's half axes, the ellipsoid being the unit
// ball, the box has its centre at `at` and the half-widths 1/by.
type ball struct{ at, by [enclose.Coords]float64 }

// place sets z to the box within the region.
func (z *ball) place(g *region, box *enclose.Box) {
	for _, q := range g.moving {
		c, h := g.box.Normal(q)
		d, w := box.Normal(q)
		z.at[q], z.by[q] = (d-c)/h, h/w
	}
}

// upper is a bound of f over the poses of the box that belong to the region: of the linear part the lesser of its bounds over
// the box and over the ball.
func (b *bench) upper(f *enclose.Form) float64 {
	high := f.Upper()
	if !b.region.ball || !(high < math.Inf(1)) {
		return high
	}
	sum, at, size := 0.0, f.C, math.Abs(f.C)
	for _, q := range b.region.moving {
		g := f.G[q] * b.ball.by[q]
		at -= g * b.ball.at[q]
		size += math.Abs(g)
		sum += g * g
	}
	return min(high, at+math.Sqrt(sum)*(1+1e-9)+f.R+slack*(size+f.R))
}

// lower is a bound as upper is.
func (b *bench) lower(f *enclose.Form) float64 {
	if !b.region.ball {
		return f.Lower()
	}
	n := *f
	n.Neg(f)
	return -b.upper(&n)
}
