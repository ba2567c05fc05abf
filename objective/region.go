package objective

import (
	"math"

	"legwright/kin"
)

// region is the set of poses of a zone in n coordinates u: a cube [-1, 1]ⁿ for a box, its one edge for a single
// excursion, the unit ball for an ellipsoid. Both ends of a coordinate are met exactly.
type region struct {
	n         int
	at        [6]int // the pose coordinates that move
	low, high [6]float64
	ball      bool
	fixed     kin.Coords
}

// regionOf is the set of poses that the zone lets the sample move in: of single excursions, the one on which it lies.
func regionOf(z *Zone, s *Sample) region {
	g := region{ball: z.Kind == Ellipsoid, fixed: z.fixed()}
	excursion := -1
	if z.Kind == Axes {
		excursion = s.Row / max(z.Samples, 2)
	}
	k := 0
	for q := range z.Low {
		if z.Low[q] == z.High[q] {
			continue
		}
		if excursion < 0 || excursion == k {
			g.at[g.n], g.low[g.n], g.high[g.n] = q, z.Low[q], z.High[q]
			g.n++
		}
		k++
	}
	return g
}

// coords are the pose coordinates at u.
func (g *region) coords(u *[6]float64) kin.Coords {
	c := g.fixed
	for k := range g.n {
		switch low, high := g.low[k], g.high[k]; {
		case u[k] <= -1:
			c[g.at[k]] = low
		case u[k] >= 1:
			c[g.at[k]] = high
		default:
			c[g.at[k]] = middle(low, high) + u[k]*(high-low)/2
		}
	}
	return c
}

// from is the inverse of coords.
func (g *region) from(c *kin.Coords) (u [6]float64) {
	for k := range g.n {
		switch v := c[g.at[k]]; v {
		case g.low[k]:
			u[k] = -1
		case g.high[k]:
			u[k] = 1
		default:
			u[k] = (v - middle(g.low[k], g.high[k])) / (g.high[k]/2 - g.low[k]/2)
		}
	}
	g.project(&u)
	return u
}

// project moves u to the nearest point of the region.
func (g *region) project(u *[6]float64) {
	if g.ball {
		if r := length6(u); r > 1 {
			for k := range u {
				u[k] /= r
			}
		}
		return
	}
	for k := range g.n {
		u[k] = math.Max(-1, math.Min(1, u[k]))
	}
}

// aside is the point by which the slope along coordinate k is found, on the side on which the region lies, and how far it is.
func (g *region) aside(u *[6]float64, k int) (t [6]float64, h float64) {
	h = climbStep
	if u[k] > 0 {
		h = -h
	}
	t = *u
	t[k] += h
	g.project(&t)
	return t, h
}

// farthest is the point of the region that lies farthest in the direction d. Of a cube, coordinates in
// which d is within idle of zero stay as they are in u.
func (g *region) farthest(u, d *[6]float64, idle float64) [6]float64 {
	t := *u
	if g.ball {
		r := length6(d)
		for k := range g.n {
			t[k] = d[k] / r
		}
		return t
	}
	for k := range g.n {
		if math.Abs(d[k]) > idle {
			t[k] = math.Copysign(1, d[k])
		}
	}
	return t
}

// rise is the most that a linear function with the gradient d gains from u to anywhere in a cube; without bound for a ball.
func (g *region) rise(u, d *[6]float64) float64 {
	if g.ball {
		return math.Inf(1)
	}
	sum := 0.0
	for k := range g.n {
		sum += math.Max(d[k]*(1-u[k]), -d[k]*(1+u[k]))
	}
	return sum
}

// tangent takes out of a gradient at a point of a ball's surface the part that points outward.
func (g *region) tangent(u, d *[6]float64) {
	if !g.ball || length6(u) < 1-1e-9 {
		return
	}
	out := 0.0
	for k := range u {
		out += u[k] * d[k]
	}
	for k := range u {
		d[k] -= math.Max(out, 0) * u[k]
	}
}

func length6(u *[6]float64) float64 {
	s := 0.0
	for _, v := range u {
		s += v * v
	}
	return math.Sqrt(s)
}
