package assembly

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"slices"
)

// The rules by which the ends of paths are judged. Each block of a point has length 1; lengths are over the machine's size.
const (
	attempts      = 5     // sets of paths at most, each from another start
	samePoint     = 1e-7  // angle of two ends that are one
	infiniteEnd   = 1e-12 // measure of a regular end at infinity
	infiniteLimit = 1e-7  // the same of an end found as a limit
	realEnd       = 1e-6  // imaginary part of a regular end that may be real: the real corrector decides
	realLimit     = 1e-4  // the same of an end found as a limit
	nearby        = 1e-3  // how far the real corrector may move
	sameMode      = 1e-6  // distance of two modes that are one
)

// problem is a forward kinematics whose solutions are the ends of paths.
type problem interface {
	// start gives equations whose solutions at t = 0 are wanted, and all their solutions at t = 1: others for each try.
	start(try uint64) (equations, []end)
	// infinite tells whether an end is at infinity.
	infinite(e *end) bool
	// mode is the mode of a finite end, if that is real.
	mode(e *end) (Mode, bool)
}

// solve runs so many paths and collects the modes of a machine of the size. If a path is
// lost, or two paths end at one simple solution, or the ends are not closed under
// conjugation, all are run again from another start, five times at most, and
// what they find is added.
func solve(p problem, paths int, size float64) Result {
	out := Result{Paths: paths, Lost: paths}
	var simple []point
	for try := range uint64(attempts) {
		sys, starts := p.start(try)
		k := newTracker(sys)
		ends := runAll(sys, starts)
		c := count(p, k, ends)
		simple = union(p, k, simple, ends)
		if missing := max(0, paths-len(simple)-c.Infinite-c.Singular); try == 0 || missing < out.Lost {
			out.Infinite, out.Singular, out.Lost = c.Infinite, c.Singular, missing
		}
		out.Modes = merge(p, out.Modes, ends, size)
		if out.Lost == 0 && conjugate(k, simple) {
			break
		}
	}
	out.Complex = len(simple)
	sortModes(out.Modes, size)
	return out
}

// bend is a complex number of modulus 1 that is not near -1.
func bend(rng *rand.Rand) complex128 { return cmplx.Rect(1, 2*(2*rng.Float64()-1)) }

// count tells how many ends are of which sort; a regular end met twice counts as lost the second time.
func count(p problem, k *tracker, ends []end) (c Result) {
	for i := range ends {
		e := &ends[i]
		switch {
		case e.outcome == lost:
			c.Lost++
		case p.infinite(e):
			c.Infinite++
		case e.outcome == singular:
			c.Singular++
		default:
			c.Complex++
			for j := range i {
				if ends[j].outcome == regular && k.apart(&ends[j].x, &e.x) < samePoint {
					c.Complex--
					c.Lost++
					break
				}
			}
		}
	}
	return c
}

// union adds the regular finite ends to the points that are known.
func union(p problem, k *tracker, known []point, ends []end) []point {
	for i := range ends {
		if e := &ends[i]; e.outcome == regular && !p.infinite(e) && !holds(k, known, &e.x) {
			known = append(known, e.x)
		}
	}
	return known
}

func holds(k *tracker, points []point, x *point) bool {
	for i := range points {
		if k.apart(&points[i], x) < samePoint {
			return true
		}
	}
	return false
}

// conjugate tells whether the conjugates of all points are among them, as those of all solutions of a real system are.
func conjugate(k *tracker, points []point) bool {
	for _, x := range points {
		for i := range x {
			x[i] = conj(x[i])
		}
		if !holds(k, points, &x) {
			return false
		}
	}
	return true
}

// merge adds the real ends to the modes that are known.
func merge(p problem, modes []Mode, ends []end, size float64) []Mode {
	for i := range ends {
		e := &ends[i]
		if e.outcome == lost || p.infinite(e) {
			continue
		}
		m, ok := p.mode(e)
		if !ok {
			continue
		}
		modes = include(modes, m, size)
	}
	return modes
}

// include adds a mode to those that are known, if it is none of them.
func include(modes []Mode, m Mode, size float64) []Mode {
	if slices.ContainsFunc(modes, func(n Mode) bool {
		return distance(m.Origin, n.Origin, &m.Rot, &n.Rot, size) < sameMode*size
	}) {
		return modes
	}
	return append(modes, m)
}

// realBlock turns a block of unknowns by the phase that makes it real, and tells how large
// the imaginary part is that remains.
func realBlock(x []complex128) (re []float64, im float64) {
	// A real vector times a phase: the sum of its squares has twice the phase.
	var sum complex128
	for _, z := range x {
		sum += z * z
	}
	turn := conj(cmplx.Sqrt(sum))
	turn /= complex(cmplx.Abs(turn), 0)
	for _, z := range x {
		z *= turn
		re = append(re, real(z))
		im = math.Hypot(im, imag(z))
	}
	return re, im
}

// mayBeReal tells whether the real corrector is to decide.
func (e *end) mayBeReal(im float64) bool {
	return im < realEnd || e.outcome == singular && im < realLimit
}
