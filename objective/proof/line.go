package proof

import (
	"math"

	"legwright/kin"
	"legwright/kin/enclose"
)

// line is an enclose.Form over the moving coordinates alone, with the spread w = Σ|g| beside it, and a coarser product
// that costs a fraction: what follows from the forms of a machine is worked out for many legs, cases and loads.
type line struct {
	c float64
	g [6]float64
	w float64
	r float64
}

// vector is a vector of lines.
type vector [3]line

// take reads a form.
func (z *line) take(f *enclose.Form, moving []int) {
	z.c, z.r, z.w = f.C, f.R, 0
	z.g = [6]float64{}
	for k, q := range moving {
		z.g[k] = f.G[q]
		z.w += math.Abs(f.G[q])
	}
}

// spread brings w up to date.
func (z *line) spread() {
	g := &z.g
	z.w = (math.Abs(g[0]) + math.Abs(g[1]) + math.Abs(g[2])) + (math.Abs(g[3]) + math.Abs(g[4]) + math.Abs(g[5]))
}

// add adds s·x, s a number.
func (z *line) add(s float64, x *line) {
	z.c += s * x.c
	for k := range z.g {
		z.g[k] += s * x.g[k]
	}
	a := math.Abs(s)
	z.w += a * x.w // an upper bound until spread is called
	z.r += a * (x.r + slack*(math.Abs(x.c)+x.w))
}

// addMul adds s·x·y, s being 1 or -1, with all terms of second degree in the remainder.
func (z *line) addMul(s float64, x, y *line) {
	a, b := s*x.c, s*y.c
	z.c += a * y.c
	for k := range z.g {
		z.g[k] += a*y.g[k] + b*x.g[k]
	}
	mx, my := math.Abs(a)+x.w, math.Abs(b)+y.w
	z.w += mx*y.w + my*x.w
	z.r += x.w*y.w + mx*y.r + my*x.r + x.r*y.r + slack*mx*my
}

// cross sets z to x×y.
func (z *vector) cross(x, y *vector) {
	for c := range z {
		a, b := (c+1)%3, (c+2)%3
		z[c] = line{}
		z[c].addMul(1, &x[a], &y[b])
		z[c].addMul(-1, &x[b], &y[a])
		z[c].spread()
	}
}

// turn sets z to R·v.
func (z *vector) turn(rot *[9]line, v kin.Vec) {
	for c := range z {
		z[c] = line{}
		z[c].add(v.X, &rot[3*c])
		z[c].add(v.Y, &rot[3*c+1])
		z[c].add(v.Z, &rot[3*c+2])
		z[c].spread()
	}
}

// tensor is a symmetric 3×3 matrix of lines: xx, yy, zz, xy, xz, yz.
type tensor [6]line

// turn sets z to R·t·Rᵀ.
func (z *tensor) turn(rot *[9]line, t *[6]float64) {
	var m [9]line // R·t
	for i := range 3 {
		for j, row := range [3][3]float64{{t[0], t[3], t[4]}, {t[3], t[1], t[5]}, {t[4], t[5], t[2]}} {
			o := &m[3*i+j]
			for k, x := range row {
				if x != 0 {
					o.add(x, &rot[3*i+k])
				}
			}
			o.spread()
		}
	}
	for at, p := range [6][2]int{{0, 0}, {1, 1}, {2, 2}, {0, 1}, {0, 2}, {1, 2}} {
		z[at] = line{}
		for k := range 3 {
			z[at].addMul(1, &m[3*p[0]+k], &rot[3*p[1]+k])
		}
		z[at].spread()
	}
}

// apply sets y to z·x.
func (z *tensor) apply(x, y *vector) {
	for i, row := range [3][3]int{{0, 3, 4}, {3, 1, 5}, {4, 5, 2}} {
		y[i] = line{}
		for k, at := range row {
			y[i].addMul(1, &z[at], &x[k])
		}
		y[i].spread()
	}
}
