package opt

import "math"

// compare relates two goal vectors, all minimised: -1 if a dominates b or
// equals it, 1 if b dominates a, 0 if neither beats the other.
func compare(a, b []float64) int {
	le, ge := true, true
	for k, v := range a {
		if w := b[k]; v > w {
			if le = false; !ge {
				return 0
			}
		} else if v < w {
			if ge = false; !le {
				return 0
			}
		}
	}
	switch {
	case le:
		return -1
	case ge:
		return 1
	}
	return 0
}

// related returns the first point at or after index from that beats p or is
// beaten by it, and compare's word on the two; len(set)/len(p) and 0 if there
// is none. The points lie in set one after another. All values are finite.
//
// Which goals are better is a coin toss for points of a front, so the usual
// cases look at signs of differences instead of branching.
func related(set []float64, p []float64, from int) (at, relation int) {
	m := len(p)
	switch m {
	case 2:
		p0, p1 := p[0], p[1]
		for i := 2 * from; i+1 < len(set); i += 2 {
			q0, q1 := set[i], set[i+1]
			if int64(math.Float64bits(p0-q0)|math.Float64bits(p1-q1)) >= 0 {
				return i / 2, -1
			}
			if int64(math.Float64bits(q0-p0)|math.Float64bits(q1-p1)) >= 0 {
				return i / 2, 1
			}
		}
	case 3:
		p0, p1, p2 := p[0], p[1], p[2]
		for i := 3 * from; i+2 < len(set); i += 3 {
			q0, q1, q2 := set[i], set[i+1], set[i+2]
			if int64(math.Float64bits(p0-q0)|math.Float64bits(p1-q1)|math.Float64bits(p2-q2)) >= 0 {
				return i / 3, -1
			}
			if int64(math.Float64bits(q0-p0)|math.Float64bits(q1-p1)|math.Float64bits(q2-p2)) >= 0 {
				return i / 3, 1
			}
		}
	case 4:
		p0, p1, p2, p3 := p[0], p[1], p[2], p[3]
		for i := 4 * from; i+3 < len(set); i += 4 {
			q0, q1, q2, q3 := set[i], set[i+1], set[i+2], set[i+3]
			if int64(math.Float64bits(p0-q0)|math.Float64bits(p1-q1)|math.Float64bits(p2-q2)|math.Float64bits(p3-q3)) >= 0 {
				return i / 4, -1
			}
			if int64(math.Float64bits(q0-p0)|math.Float64bits(q1-p1)|math.Float64bits(q2-p2)|math.Float64bits(q3-p3)) >= 0 {
				return i / 4, 1
			}
		}
	default:
		for i := m * from; i < len(set); i += m {
			if r := compare(set[i:i+m], p); r != 0 {
				return i / m, r
			}
		}
	}
	return len(set) / m, 0
}
