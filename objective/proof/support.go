package proof

import (
	"math"

	"legwright/objective"
)

// support is an effort or a rate as a convex function over a box, as exact as its lines: mid ± half, where half is
// Σ|each| + Σ|norms|, the support function of the sets of loads or speeds.
type support struct {
	mid   line
	each  []line
	norms []vector

	at  []float64 // each and norms at the vertex in work
	pos [][3]float64
}

// reset empties s, which keeps its slices.
func (s *support) reset() { s.mid, s.each, s.norms = line{}, s.each[:0], s.norms[:0] }

// along adds |f·x| to half.
func (s *support) along(f float64, x *line) {
	if f == 0 {
		return
	}
	var z line
	z.add(f, x)
	z.spread()
	s.each = append(s.each, z)
}

// over adds f times the reach of the set in direction v to half.
func (s *support) over(set *objective.Set, f float64, v *vector) {
	switch set.Kind {
	case objective.AnyWay:
		var z vector
		for c := range z {
			z[c].add(f*set.Radius, &v[c])
			z[c].spread()
		}
		s.norms = append(s.norms, z)
	case objective.PerAxis:
		s.along(f*set.Half.X, &v[0])
		s.along(f*set.Half.Y, &v[1])
		s.along(f*set.Half.Z, &v[2])
	}
}

// half is a line that half does not exceed anywhere on the box, and a bound of how far it may lie above half's values at
// the vertices. Terms that change sign are taken by their chord, norms by their tangent, |u+δ| ≤ |u| + u·δ/|u| + |δ|²/(2|u|).
func (s *support) half() (h line, excess float64) {
	for i := range s.each {
		x := &s.each[i]
		switch f := x.c / x.w; {
		case x.c >= x.w:
			h.add(1, x)
		case -x.c >= x.w:
			h.add(-1, x)
		default:
			h.add(f, x)
			h.c += x.w - f*x.c
			h.r += (1 - math.Abs(f)) * (x.r + slack*x.w)
			excess += x.w - f*x.c
		}
	}
	for i := range s.norms {
		u := &s.norms[i]
		l := math.Sqrt(u[0].c*u[0].c + u[1].c*u[1].c + u[2].c*u[2].c)
		sum := 0.0
		for k := range u[0].g {
			a, b, c := u[0].g[k], u[1].g[k], u[2].g[k]
			sum += math.Sqrt(a*a + b*b + c*c)
		}
		d2 := min(sum*sum, u[0].w*u[0].w+u[1].w*u[1].w+u[2].w*u[2].w)
		r := math.Sqrt(u[0].r*u[0].r + u[1].r*u[1].r + u[2].r*u[2].r)
		h.r += r + slack*(l+math.Sqrt(d2))
		if d2 >= 4*l*l {
			d := math.Sqrt(d2)
			h.c += l + d
			excess += l + d
			continue
		}
		for c := range u {
			f := u[c].c / l
			for k := range h.g {
				h.g[k] += f * u[c].g[k]
			}
		}
		h.c += l + 0.5*d2/l
		excess += 0.5 * d2 / l
	}
	h.spread()
	return h, excess
}

// most is the largest value of a line over the box.
func (z *line) most() float64 { return z.c + z.w + z.r + slack*(math.Abs(z.c)+z.w) }

// vertices gives the largest mid + half and the largest -mid + half over the box, at whose vertices a convex function is
// largest. d coordinates move.
func (s *support) vertices(d int) (high, low float64) {
	s.at, s.pos = s.at[:0], s.pos[:0]
	mid, size, rest := s.mid.c, math.Abs(s.mid.c)+s.mid.w, s.mid.r
	for k := range d {
		mid -= s.mid.g[k]
	}
	for i := range s.each {
		x := &s.each[i]
		a := x.c
		for k := range d {
			a -= x.g[k]
		}
		s.at = append(s.at, a)
		size += math.Abs(x.c) + x.w
		rest += x.r
	}
	for i := range s.norms {
		r2 := 0.0
		var p [3]float64
		for c := range p {
			x := &s.norms[i][c]
			p[c] = x.c
			for k := range d {
				p[c] -= x.g[k]
			}
			size += math.Abs(x.c) + x.w
			r2 += x.r * x.r
		}
		s.pos = append(s.pos, p)
		rest += math.Sqrt(r2)
	}
	high, low = math.Inf(-1), math.Inf(-1)
	var sign [6]bool
	for c := 1; ; c++ {
		half := 0.0
		for _, x := range s.at {
			half += math.Abs(x)
		}
		for i := range s.pos {
			p := &s.pos[i]
			half += math.Sqrt(p[0]*p[0] + p[1]*p[1] + p[2]*p[2])
		}
		high, low = max(high, half+mid), max(low, half-mid)
		if c == 1<<d {
			rest += slack * size
			return high + rest, low + rest
		}
		k := turn(c)
		f := 2.0
		if sign[k] {
			f = -2
		}
		sign[k] = !sign[k]
		mid += f * s.mid.g[k]
		for i := range s.at {
			s.at[i] += f * s.each[i].g[k]
		}
		for i := range s.pos {
			p, u := &s.pos[i], &s.norms[i]
			p[0] += f * u[0].g[k]
			p[1] += f * u[1].g[k]
			p[2] += f * u[2].g[k]
		}
	}
}
