package opt

import (
	"math"
	"slices"
)

// shares keeps a set of mutually non-dominated points with the hypervolume
// that each of them covers alone, under insertion and removal. Volumes are
// computed when they are asked for: a change only marks those that it touches.
//
// What a point p covers alone lies in the box between p and its upper corner
// u, where u[k] is the least q[k] of the other points q that are no worse
// than p in every goal but k (ref[k] if there are none). Only points q < u cut
// into that box, so a newcomer q changes p's volume only if q < u, and the
// loss of q only if q <= u. Few points are touched by each step.
//
// Points are kept in ascending order of their last goal, the direction of the
// sweeps.
type shares struct {
	m     int
	plain bool // keep points and corners only, no volumes
	ref   []float64
	pts   []float64 // m numbers per point, one after another
	upper []float64 // likewise: corners of the boxes, the points themselves where alone is 0
	alone []float64 // hypervolume that a point covers alone, no more than that where it is stale
	stale []bool    // the point's surroundings have changed; its corner is not too low

	vol   volume
	solid []xyz
	flat  []float64
	lim   [][]float64
	gone  []float64
}

// reset empties the set and takes a new reference.
func (s *shares) reset(ref []float64) {
	s.m = len(ref)
	s.ref = append(s.ref[:0], ref...)
	s.pts, s.upper, s.alone, s.stale = s.pts[:0], s.upper[:0], s.alone[:0], s.stale[:0]
}

// len returns the number of points.
func (s *shares) len() int { return len(s.alone) }

// point and corner are views.
func (s *shares) point(i int) []float64  { return s.pts[i*s.m : (i+1)*s.m : (i+1)*s.m] }
func (s *shares) corner(i int) []float64 { return s.upper[i*s.m : (i+1)*s.m : (i+1)*s.m] }

// add inserts p and returns its index. No point of the set may beat p or be
// beaten by it.
func (s *shares) add(p []float64) int {
	m, n := s.m, s.len()
	i := n
	for i > 0 && s.pts[i*m-1] > p[m-1] {
		i--
	}
	s.pts = slices.Insert(s.pts, i*m, p...)
	s.upper = slices.Insert(s.upper, i*m, s.ref...)
	s.alone = slices.Insert(s.alone, i, 0)
	s.stale = slices.Insert(s.stale, i, true)
	if s.plain {
		return i
	}
	for j := next(s.upper, p, 0, true); j <= n; j = next(s.upper, p, j+1, true) {
		if j != i {
			s.alone[j] = max(0, s.alone[j]-shared(s.point(j), p, s.corner(j)))
			s.stale[j] = true
		}
	}
	return i
}

// shared bounds what p loses of its box, up to u, to q: all that both cover.
func shared(p, q, u []float64) float64 {
	v := 1.0
	for k, r := range u {
		v *= r - max(p[k], q[k])
	}
	return v
}

// remove drops point i.
func (s *shares) remove(i int) {
	m := s.m
	s.gone = append(s.gone[:0], s.point(i)...)
	s.pts = slices.Delete(s.pts, i*m, (i+1)*m)
	s.upper = slices.Delete(s.upper, i*m, (i+1)*m)
	s.alone = slices.Delete(s.alone, i, i+1)
	s.stale = slices.Delete(s.stale, i, i+1)
	if s.plain {
		return
	}
	n := s.len()
	for j := next(s.upper, s.gone, 0, false); j < n; j = next(s.upper, s.gone, j+1, false) {
		loosen(s.corner(j), s.gone, s.ref)
		s.stale[j] = true
	}
}

// loosen raises corner u to where it may reach without q.
func loosen(u, q, ref []float64) {
	for k, v := range q {
		if u[k] == v {
			u[k] = ref[k]
		}
	}
}

// move changes the reference; only points that reach up to it are touched.
func (s *shares) move(ref []float64) {
	s.gone = append(s.gone[:0], s.ref...)
	old := s.gone
	same := true
	for k, r := range ref {
		same = same && r == old[k]
	}
	if same {
		return
	}
	copy(s.ref, ref)
	if s.plain {
		return
	}
	for i := range s.alone {
		u := s.corner(i)
		for k, r := range ref {
			if r != old[k] && (u[k] == old[k] || u[k] > r || s.alone[i] == 0 || s.stale[i]) {
				copy(u, ref)
				s.alone[i], s.stale[i] = 0, true
				break
			}
		}
	}
}

// settle computes what every point covers alone.
func (s *shares) settle() {
	for i := range s.stale {
		s.exact(i)
	}
}

// exact returns what point i covers alone.
func (s *shares) exact(i int) float64 {
	if s.stale[i] && !s.plain {
		s.update(i)
	}
	return s.alone[i]
}

// least returns the index of the point that covers least alone, the last of
// equals. Few have to be computed anew for that.
func (s *shares) least() int {
	for {
		b := 0
		for i, v := range s.alone {
			if v <= s.alone[b] {
				b = i
			}
		}
		if !s.stale[b] {
			return b
		}
		s.update(b)
	}
}

// next returns the first corner at or after index from that is beyond q: in
// every coordinate greater if strict, at least equal otherwise. It returns the
// number of corners if there is none.
func next(corners, q []float64, from int, strict bool) int {
	m := len(q)
	if m == 3 {
		q0, q1, q2 := q[0], q[1], q[2]
		for i := 3 * from; i+2 < len(corners); i += 3 {
			u0, u1, u2 := corners[i], corners[i+1], corners[i+2]
			if int64(math.Float64bits(u0-q0)|math.Float64bits(u1-q1)|math.Float64bits(u2-q2)) >= 0 &&
				(!strict || q0 < u0 && q1 < u1 && q2 < u2) {
				return i / 3
			}
		}
		return len(corners) / 3
	}
	for i := m * from; i < len(corners); i += m {
		if u := corners[i : i+m]; within(q, u) && (!strict || below(q, u)) {
			return i / m
		}
	}
	return len(corners) / m
}

// within reports q <= u in every coordinate.
func within(q, u []float64) bool {
	for k, v := range u {
		if q[k] > v {
			return false
		}
	}
	return true
}

// update computes what point i covers alone, and its corner, which must not be
// too low before.
func (s *shares) update(i int) {
	s.alone[i], s.stale[i] = s.gain(s.point(i), i, s.corner(i)), false
}

// gain computes what p covers that no point of the set but the one at skip
// (-1 for none) covers, and lowers u to p's corner; the nearer u is to it
// before, the less work. The gain is 0, and u is p, for a point that is beaten
// or beyond the reference.
func (s *shares) gain(p []float64, skip int, u []float64) float64 {
	switch s.m {
	case 2:
		return s.gain2(p[0], p[1], skip, u)
	case 3:
		return s.gain3(xyz(p), skip, (*xyz)(u))
	}
	if !s.bound(p, skip, u) || !below(p, u) {
		copy(u, p)
		return 0
	}
	if s.m == 1 {
		return u[0] - p[0]
	}
	flat, lim := s.flat[:0], s.lim[:0]
	for j := range s.alone {
		q := s.point(j)
		if j == skip || !below(q, u) {
			continue
		}
		at := len(flat)
		for k := range u {
			flat = append(flat, max(p[k], q[k]))
		}
		lim = insert(lim, flat[at:len(flat):len(flat)])
	}
	s.flat, s.lim = flat, lim
	return max(0, box(p, u)-s.vol.sweep(lim, u))
}

// bound lowers u to the corner of p's box; it returns false if p is beaten.
func (s *shares) bound(p []float64, skip int, u []float64) bool {
	for j := range s.alone {
		q := s.point(j)
		if j == skip || !below(q, u) {
			continue
		}
		worse, at := 0, 0
		for k, v := range p {
			if q[k] > v {
				if worse++; worse > 1 {
					break
				}
				at = k
			}
		}
		switch worse {
		case 0:
			return false
		case 1:
			u[at] = q[at]
		}
	}
	return true
}

// gain2 is gain for two goals. Along the second goal the first one descends, so
// nothing but the neighbours matters.
func (s *shares) gain2(p0, p1 float64, skip int, u []float64) float64 {
	lo, hi := 0, s.len() // first point with no less in the second goal
	for lo < hi {
		if h := (lo + hi) / 2; s.pts[2*h+1] < p1 {
			lo = h + 1
		} else {
			hi = h
		}
	}
	u0, u1 := s.ref[0], s.ref[1]
	if lo > 0 {
		u0 = min(u0, s.pts[2*lo-2])
	}
	if lo == skip {
		lo++
	}
	if lo < s.len() {
		u1 = min(u1, s.pts[2*lo+1])
	}
	if !(p0 < u0 && p1 < u1) {
		u[0], u[1] = p0, p1
		return 0
	}
	u[0], u[1] = u0, u1
	return (u0 - p0) * (u1 - p1)
}

// gain3 is gain for three goals.
func (s *shares) gain3(p xyz, skip int, u *xyz) float64 {
	p0, p1, p2 := p[0], p[1], p[2]
	u0, u1, u2 := u[0], u[1], u[2]
	pts, lim := s.pts, s.solid[:0]
	for i := 0; i+2 < len(pts); i += 3 {
		q0, q1, q2 := pts[i], pts[i+1], pts[i+2]
		if q2 >= u2 {
			break
		}
		if q0 >= u0 || q1 >= u1 || i == 3*skip {
			continue
		}
		switch {
		case q0 <= p0 && q1 <= p1:
			if u2 = q2; q2 <= p2 { // p is beaten
				*u = p
				return 0
			}
		case q0 <= p0 && q2 <= p2:
			u1 = q1
		case q1 <= p1 && q2 <= p2:
			u0 = q0
		default:
			lim = append(lim, xyz{q0, q1, q2})
		}
	}
	s.solid = lim
	if !(p0 < u0 && p1 < u1 && p2 < u2) {
		*u = p
		return 0
	}
	n := 0
	for _, q := range lim {
		if q[0] < u0 && q[1] < u1 && q[2] < u2 {
			lim[n] = xyz{max(p0, q[0]), max(p1, q[1]), max(p2, q[2])}
			n++
		}
	}
	lim = lim[:n]
	*u = xyz{u0, u1, u2}
	return max(0, (u0-p0)*(u1-p1)*(u2-p2)-s.vol.rise(lim, *u))
}
