package opt

import "math"

// shares keeps a set of mutually non-dominated points with the hypervolume
// that each of them covers alone, up to date under insertion and removal.
//
// What a point p covers alone lies in the box between p and its upper corner
// u, where u[k] is the least q[k] of the other points q that are no worse
// than p in every goal but k (ref[k] if there are none). Only points q < u cut
// into that box, so a newcomer q changes p's volume only if q < u, and the
// loss of q only if q <= u. Few points are touched by each step.
type shares struct {
	ref   []float64
	pts   [][]float64
	upper [][]float64 // corner of the box that holds all p covers alone
	alone []float64   // hypervolume that p covers alone

	vol  volume
	flat []float64
	lim  [][]float64
	free [][]float64 // corners to use again
}

// reset empties the set and takes a new reference.
func (s *shares) reset(ref []float64) {
	s.ref = append(s.ref[:0], ref...)
	s.free = append(s.free, s.upper...)
	s.pts, s.upper, s.alone = s.pts[:0], s.upper[:0], s.alone[:0]
}

// fill replaces the set by pts.
func (s *shares) fill(pts [][]float64, ref []float64) {
	s.reset(ref)
	for _, p := range pts {
		s.push(p)
	}
	for i := range s.pts {
		s.alone[i] = s.volume(i)
	}
}

func (s *shares) push(p []float64) {
	var u []float64
	if n := len(s.free); n > 0 {
		u, s.free = s.free[n-1], s.free[:n-1]
	} else {
		u = make([]float64, len(s.ref))
	}
	s.pts = append(s.pts, p)
	s.upper = append(s.upper, u)
	s.alone = append(s.alone, 0)
}

// add inserts p as the last point. Every point of the set has to be
// non-dominated by p and the other way round.
func (s *shares) add(p []float64) {
	s.push(p)
	last := len(s.pts) - 1
	s.alone[last] = s.volume(last)
	for i := range last {
		if below(p, s.upper[i]) {
			s.alone[i] = s.volume(i)
		}
	}
}

// remove drops point i; the last point takes its place.
func (s *shares) remove(i int) {
	q, last := s.pts[i], len(s.pts)-1
	s.free = append(s.free, s.upper[i])
	s.pts[i], s.upper[i], s.alone[i] = s.pts[last], s.upper[last], s.alone[last]
	s.pts, s.upper, s.alone = s.pts[:last], s.upper[:last], s.alone[:last]
	for j, u := range s.upper {
		if within(q, u) {
			s.alone[j] = s.volume(j)
		}
	}
}

// move changes the reference; only points that reach up to it are touched.
func (s *shares) move(ref []float64) {
	var changed bool
	old := s.ref
	for k, r := range ref {
		changed = changed || r != old[k]
	}
	if !changed {
		return
	}
	s.ref = append([]float64(nil), ref...)
	for i, u := range s.upper {
		for k, r := range ref {
			if r != old[k] && (u[k] == old[k] || u[k] > r || s.alone[i] == 0) {
				s.alone[i] = s.volume(i)
				break
			}
		}
	}
}

// least returns the index of the point that covers least alone, the last of
// equals.
func (s *shares) least() int {
	b := 0
	for i, v := range s.alone {
		if v <= s.alone[b] {
			b = i
		}
	}
	return b
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

// volume computes what point i covers alone, and its corner.
func (s *shares) volume(i int) float64 { return s.gain(s.pts[i], i, s.upper[i]) }

// gain computes what p covers that no point of the set but the one at skip
// (-1 for none) covers, and leaves p's corner in u. It is 0 for a point that
// is dominated.
func (s *shares) gain(p []float64, skip int, u []float64) float64 {
	copy(u, s.ref)
	if !s.corner(p, skip, u) || !below(p, u) {
		copy(u, p)
		return 0
	}
	m := len(u)
	if m <= 2 { // nothing but its neighbours cuts into a plane box
		return box(p, u)
	}
	flat, lim := s.flat[:0], s.lim[:0]
	for j, q := range s.pts {
		if j == skip || !below(q, u) {
			continue
		}
		at := len(flat)
		for k := range m {
			flat = append(flat, max(p[k], q[k]))
		}
		lim = append(lim, flat[at:len(flat):len(flat)])
	}
	s.flat, s.lim = flat, lim
	if m > 3 {
		keep := lim[:0:0]
		for _, q := range lim {
			keep = insert(keep, q)
		}
		lim = keep
	}
	return math.Max(0, box(p, u)-s.vol.sweep(lim, u))
}

// corner lowers u to the corner of p's box; it returns false if p is
// dominated or equalled.
func (s *shares) corner(p []float64, skip int, u []float64) bool {
	if len(p) == 3 {
		p0, p1, p2 := p[0], p[1], p[2]
		u0, u1, u2 := u[0], u[1], u[2]
		for j, q := range s.pts {
			q0, q1, q2 := q[0], q[1], q[2]
			if q0 <= p0 {
				if q1 <= p1 {
					if q2 < u2 && j != skip {
						u2 = q2
					}
				} else if q2 <= p2 && q1 < u1 {
					u1 = q1
				}
			} else if q1 <= p1 && q2 <= p2 && q0 < u0 {
				u0 = q0
			}
		}
		u[0], u[1], u[2] = u0, u1, u2
		return u2 > p2
	}
	for j, q := range s.pts {
		if j == skip {
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
			u[at] = min(u[at], q[at])
		}
	}
	return true
}
