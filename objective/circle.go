package objective

import (
	"math"

	"legwright/kin"
)

// enclosing is the diameter of the smallest circle in plan that holds the
// points. Some two or three of them lie on it; with few points all are tried.
func enclosing(p []kin.Vec) float64 {
	best := inf
	try := func(x, y, r float64) {
		if r >= best {
			return
		}
		for _, q := range p {
			if math.Hypot(q.X-x, q.Y-y) > r*(1+1e-12) {
				return
			}
		}
		best = r
	}
	if len(p) == 1 {
		return 0
	}
	for i, a := range p {
		for j, b := range p[:i] {
			x, y := (a.X+b.X)/2, (a.Y+b.Y)/2
			try(x, y, math.Hypot(a.X-b.X, a.Y-b.Y)/2)
			for _, c := range p[:j] {
				ux, uy, vx, vy := b.X-a.X, b.Y-a.Y, c.X-a.X, c.Y-a.Y
				d := 2 * (ux*vy - uy*vx)
				if d == 0 {
					continue
				}
				u2, v2 := ux*ux+uy*uy, vx*vx+vy*vy
				dx, dy := (vy*u2-uy*v2)/d, (ux*v2-vx*u2)/d
				try(a.X+dx, a.Y+dy, math.Hypot(dx, dy))
			}
		}
	}
	return 2 * best
}
