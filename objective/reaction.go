package objective

import (
	"math"

	"legwright/kin"
)

// generator is one set of a case at one pose, as wrenches (moments over Lc): three that may each be
// added or taken off in part (PerAxis), or a ball of the radius over three (AnyWay).
type generator struct {
	kind   SetKind
	radius float64
	g      [3][6]float64
}

// spread is the wrenches that a case asks for at one pose: what is always there, and its sets.
type spread struct {
	mid  [6]float64
	sets []generator
}

// at fills s with the wrenches of the case at the pose.
func (s *spread) at(d *demand, p *kin.Pose, g kin.Vec, inv float64) {
	s.mid = d.wrench(p, g, inv)
	s.sets = s.sets[:0]
	generators(d, p, inv, func(kind SetKind, radius float64, w [3][6]float64) {
		if w != [3][6]float64{} {
			s.sets = append(s.sets, generator{kind, radius, w})
		}
	})
}

// dot6 is the product of a row and a wrench.
func dot6(a, b *[6]float64) float64 {
	return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] + a[3]*b[3] + a[4]*b[4] + a[5]*b[5]
}

// extremes are the least and the greatest value of row·w over the sets, exactly, each load's sets taken independently.
func (s *spread) extremes(row *[6]float64) (least, most float64) {
	half := 0.0
	for i := range s.sets {
		g := &s.sets[i]
		x, y, z := dot6(row, &g.g[0]), dot6(row, &g.g[1]), dot6(row, &g.g[2])
		if g.kind == AnyWay {
			half += g.radius * math.Sqrt(x*x+y*y+z*z)
		} else {
			half += math.Abs(x) + math.Abs(y) + math.Abs(z)
		}
	}
	mid := dot6(row, &s.mid)
	return mid - half, mid + half
}

// attain is a wrench of the sets at which row·w is greatest. What the row does not see stays at the middle.
func (s *spread) attain(row *[6]float64) [6]float64 {
	w := s.mid
	for i := range s.sets {
		g := &s.sets[i]
		c := [3]float64{dot6(row, &g.g[0]), dot6(row, &g.g[1]), dot6(row, &g.g[2])}
		k := 1.0
		if g.kind == AnyWay {
			n := math.Sqrt(c[0]*c[0] + c[1]*c[1] + c[2]*c[2])
			if n == 0 {
				continue
			}
			k = g.radius / n
		} else {
			for j := range c {
				c[j] = signOf(c[j])
			}
		}
		for j := range c {
			for q := range w {
				w[q] += k * c[j] * g.g[j][q]
			}
		}
	}
	return w
}

// signOf is -1, 0 or 1.
func signOf(x float64) float64 {
	switch {
	case x < 0:
		return -1
	case x > 0:
		return 1
	}
	return 0
}

// reaction is the force and the moment about its own centre that one joint exerts on its plate, at one
// pose: six rows (base axes, N and N m) times the wrench, moments over Lc, that holds the platform.
type reaction [6][6]float64

// of is the reaction to a wrench.
func (r *reaction) of(w *[6]float64) (out [6]float64) {
	for k := range r {
		out[k] = dot6(&r[k], w)
	}
	return out
}

// bar adds the force φ·u, where φ is row·w, and its moment at the arm from the joint's centre.
func (r *reaction) bar(row *[6]float64, u, arm kin.Vec) {
	m := cross(arm, u)
	for k, x := range [6]float64{u.X, u.Y, u.Z, m.X, m.Y, m.Z} {
		for q := range row {
			r[k][q] += x * row[q]
		}
	}
}

// along is the row of the force's part in the direction d.
func (r *reaction) along(d *[3]float64) (row [6]float64) {
	for k, x := range d {
		for q := range row {
			row[q] += x * r[k][q]
		}
	}
	return row
}

// farthest looks for the wrench of the sets under which the joint's force is largest. It climbs
// from the three axes and the eight directions between them: towards the force met last, as far as the sets go in that direction, until
// it grows no more (the norm is convex, so every step is upward). It is exact for a joint whose force has one
// direction; else the force found is attained, but another end of the sets might give a larger one. Where nothing exceeds
// least it gives up and answers false.
func (s *spread) farthest(r *reaction, ends *[6]float64, least float64) (w [6]float64, force float64, ok bool) {
	sum := 0.0
	for k := range 3 {
		x := math.Max(math.Abs(ends[k]), math.Abs(ends[3+k]))
		sum += x * x
	}
	if !(math.Sqrt(sum) > least) {
		return w, least, false
	}
	force = least
	for start := range 27 {
		d := [3]float64{float64(start%3 - 1), float64(start/3%3 - 1), float64(start/9 - 1)}
		if n := math.Abs(d[0]) + math.Abs(d[1]) + math.Abs(d[2]); n == 0 || n == 2 {
			continue // no direction, or one between two axes
		}
		for range 50 {
			row := r.along(&d)
			at := s.attain(&row)
			f := r.of(&at)
			n := math.Sqrt(f[0]*f[0] + f[1]*f[1] + f[2]*f[2])
			if n > force {
				w, force, ok = at, n, true
			}
			if n == 0 {
				break
			}
			next := [3]float64{f[0] / n, f[1] / n, f[2] / n}
			if math.Abs(next[0]-d[0])+math.Abs(next[1]-d[1])+math.Abs(next[2]-d[2]) < 1e-9 {
				break
			}
			d = next
		}
	}
	return w, force, ok
}

func cross(a, b kin.Vec) kin.Vec {
	return kin.Vec{X: a.Y*b.Z - a.Z*b.Y, Y: a.Z*b.X - a.X*b.Z, Z: a.X*b.Y - a.Y*b.X}
}

func add(a, b kin.Vec) kin.Vec { return kin.Vec{X: a.X + b.X, Y: a.Y + b.Y, Z: a.Z + b.Z} }

func times(k float64, a kin.Vec) kin.Vec { return kin.Vec{X: k * a.X, Y: k * a.Y, Z: k * a.Z} }
