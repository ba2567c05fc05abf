package opt

import (
	"math"
	"slices"
)

// linear is a model of limits and goals about an evaluated design, its centre:
// exact there, linear in the real variables, fitted to evaluated designs that
// lie near, the nearer the more they count (local regression: Cleveland 1979).
// The variables are scaled to ranges of [0, 1].
type linear struct {
	n      int // real variables
	centre []float64
	pool   *pool
	near   []int     // in pool, nearest first
	square []float64 // of their distances
	limits []int     // that matter: broken, or within reach of the near designs
	m      int       // goals, 0 if the centre is infeasible and has none
	slope  []float64 // n numbers per limit that matter, then per goal

	normal []float64 // the matrix of the normal equations, then its Cholesky factor
	step   []float64
}

const (
	nearBase, nearPerReal = 2, 2 // designs that a model is fitted to: base + per variable
	ridge                 = 1e-3 // of the mean diagonal: directions that no near design shows are flat
	evenness              = 0.05 // of the greatest squared distance: nearer ones do not count more
)

// fit makes the model about g. It reports false if too few designs lie around.
func (l *linear) fit(p *pool, g *genome) bool {
	l.pool, l.n = p, len(p.dom.real)
	l.centre = p.dom.unit(l.centre[:0], g.x)
	l.seek(g, nearBase+nearPerReal*l.n)
	if len(l.near) < 4 {
		return false
	}
	l.m = 0
	if g.feasible() {
		l.m = len(g.goals)
	}
	l.choose(g)
	l.gather(g)
	l.solve()
	return true
}

// seek finds the k designs nearest to the centre. Where that is feasible, so
// are they; where it is not, their goals are unknown.
func (l *linear) seek(g *genome, k int) {
	n := l.n
	l.near, l.square = l.near[:0], l.square[:0]
	for i, q := range l.pool.all {
		if q == g || g.feasible() && !q.feasible() || !l.pool.dom.alike(q.x, g.x) {
			continue
		}
		d := 0.0
		for c, v := range l.pool.x[i*n : i*n+n] {
			t := v - l.centre[c]
			d += float64(t * t)
		}
		j := len(l.near)
		if j < k {
			l.near, l.square = append(l.near, 0), append(l.square, 0)
		} else if j--; d >= l.square[j] {
			continue
		}
		for ; j > 0 && l.square[j-1] > d; j-- {
			l.near[j], l.square[j] = l.near[j-1], l.square[j-1]
		}
		l.near[j], l.square[j] = i, d
	}
}

// choose lists the limits that a step about as long as the distances of the
// near designs could break.
func (l *linear) choose(g *genome) {
	l.limits = l.limits[:0]
	for e, at := range g.excess {
		most := 0.0
		for _, i := range l.near {
			most = max(most, math.Abs(l.pool.all[i].excess[e]-at))
		}
		if at+2*most > 0 {
			l.limits = append(l.limits, e)
		}
	}
}

// gather sums up the normal equations.
func (l *linear) gather(g *genome) {
	n, outs := l.n, len(l.limits)+l.m
	l.normal = slices.Grow(l.normal[:0], n*n)[:n*n]
	l.slope = slices.Grow(l.slope[:0], outs*n)[:outs*n]
	l.step = slices.Grow(l.step[:0], n)[:n]
	clear(l.normal)
	clear(l.slope)
	far := l.square[len(l.square)-1]
	z := l.step
	add := func(o int, dy float64) {
		for c, v := range z {
			l.slope[o*n+c] += float64(dy * v)
		}
	}
	for k, i := range l.near {
		q := l.pool.all[i]
		for c, v := range l.pool.x[i*n : i*n+n] {
			z[c] = v - l.centre[c]
		}
		w := 1 / (l.square[k] + float64(evenness*far) + math.SmallestNonzeroFloat64)
		for r, v := range z {
			v *= w
			for c := 0; c <= r; c++ {
				l.normal[r*n+c] += float64(v * z[c])
			}
		}
		for o, e := range l.limits {
			if q.feasible() || q.excess[e] != 0 { // 0 of an infeasible design: not looked at
				add(o, w*(q.excess[e]-g.excess[e]))
			}
		}
		for o := range l.m {
			add(len(l.limits)+o, w*(q.goals[o]-g.goals[o]))
		}
	}
}

// solve turns the normal equations into slopes, by Cholesky's method.
func (l *linear) solve() {
	n, a := l.n, l.normal
	trace := 0.0
	for r := range n {
		trace += a[r*n+r]
	}
	lift := float64(ridge/float64(n)*trace) + math.SmallestNonzeroFloat64
	for r := range n {
		a[r*n+r] += lift
		for c := 0; c <= r; c++ {
			s := a[r*n+c]
			for k := range c {
				s -= float64(a[r*n+k] * a[c*n+k])
			}
			if c < r {
				a[r*n+c] = s * a[c*n+c]
			} else {
				a[r*n+r] = 1 / math.Sqrt(max(s, lift)) // the diagonal keeps reciprocals
			}
		}
	}
	for o := 0; o < len(l.slope); o += n {
		y := l.slope[o : o+n]
		for r := range n {
			s := y[r]
			for k := range r {
				s -= float64(a[r*n+k] * y[k])
			}
			y[r] = s * a[r*n+r]
		}
		for r := n - 1; r >= 0; r-- {
			s := y[r]
			for k := r + 1; k < n; k++ {
				s -= float64(a[k*n+r] * y[k])
			}
			y[r] = s * a[r*n+r]
		}
	}
}

// along is how much output o, a limit that matters or a goal, changes along a step.
func (l *linear) along(o int, step []float64) float64 {
	sum := 0.0
	for c, v := range l.slope[o*l.n : (o+1)*l.n] {
		sum += float64(v * step[c])
	}
	return sum
}

// violation predicts that of the centre g moved by step.
func (l *linear) violation(g *genome, step []float64) float64 {
	v := 0.0
	for o, e := range l.limits {
		v += max(0, g.excess[e]+l.along(o, step))
	}
	return v
}

// goals predicts those of the centre g moved by step into dst.
func (l *linear) goals(dst []float64, g *genome, step []float64) []float64 {
	dst = dst[:0]
	for o, v := range g.goals {
		dst = append(dst, v+l.along(len(l.limits)+o, step))
	}
	return dst
}
