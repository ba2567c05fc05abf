package assembly

import (
	"math"
	"math/cmplx"
)

// outcome tells how a path ended.
type outcome int

const (
	lost     outcome = iota // the path could not be followed to its end
	regular                 // at an isolated simple solution, found by Newton's method
	singular                // at a multiple solution or on a curve of solutions, found as a limit
)

// end is the end of a path at t = 0.
type end struct {
	x       point
	outcome outcome
	cycle   int // loops about t = 0 after which the path closes: above 1 only at a multiple solution
}

// The rules of the endgame. Lengths are over |x|, which is 1.
const (
	endgameStart  = 0.02  // t at which it takes over
	straightSteps = 40    // on the straight way from there to t = 0
	loopSteps     = 100   // on a side of a loop's polygon, and from one loop to the next
	illPosed      = 1e9   // norm of the inverse matrix from which on a solution counts as multiple
	corners       = 12    // of the polygon about t = 0
	mostCycles    = 12    // loops before the path is taken not to close
	closed        = 1e-7  // distance at which a loop is closed
	settled       = 1e-8  // angle between two limits in turn, the radius quartered in between
	solution      = 1e-10 // residual of a limit
	smallestLoop  = 1e-10 // radius
)

// run follows the path of x from t = 1 to its end at t = 0. Where the straight
// way to the end fails or ends at an ill-conditioned point, the end is found by
// Cauchy's integral over loops about t = 0 (A. Morgan, A. Sommese, C. Wampler
// 1991, Numerische Mathematik 58:669).
func (k *tracker) run(x point) end {
	if !k.along(&x, 1, endgameStart, mostSteps, false) {
		return end{x: x}
	}
	y := x
	if k.along(&y, endgameStart, 0, straightSteps, false) && k.settle(&y) {
		return end{x: y, outcome: regular, cycle: 1}
	}
	return k.circle(x)
}

// settle corrects x at t = 0 and tells whether it is a regular solution there.
func (k *tracker) settle(x *point) bool {
	k.normalise(x)
	last := math.Inf(1)
	for range 6 {
		d, ok := k.correct(0, x)
		if !ok || d > 1e-3 {
			return false
		}
		if d >= 0.5*last {
			break
		}
		last = d
	}
	k.normalise(x)
	return last < 1e-9 && k.linearise(0, x) && k.work.lu.inverseNorm() < illPosed
}

// circle finds the end of the path of x, which is at t = endgameStart, as the limit on
// which loops of two radii agree. Where rounding ends the path before that, at an end of high
// multiplicity, the last limit counts that is a solution itself.
func (k *tracker) circle(x point) end {
	var last point
	out := end{x: x}
	for r := endgameStart; r > smallestLoop; r /= 4 {
		limit, cycle, ok := k.mean(x, r)
		if ok && k.holds(&limit) {
			out = end{x: limit, outcome: singular, cycle: cycle}
			if r < endgameStart && k.apart(&last, &limit) < settled {
				break
			}
		}
		last = limit
		if !k.along(&x, complex(r, 0), complex(r/4, 0), loopSteps, false) {
			break
		}
	}
	y := out.x
	if out.outcome == singular && out.cycle == 1 && k.settle(&y) && k.apart(&y, &out.x) < 1e-5 {
		return end{x: y, outcome: regular, cycle: 1}
	}
	return out
}

// holds tells whether x, of unit blocks, is a solution at t = 0.
func (k *tracker) holds(x *point) bool {
	k.here = *x
	k.sys.at(0, &k.here, &k.work)
	for _, f := range k.work.f[:k.n-len(k.ends)] {
		if !(size2(f) < solution*solution) {
			return false
		}
	}
	return true
}

// mean is the mean of x over as many loops of radius r about t = 0 as close the
// path: the value at t = 0, but for what the corners of the polygon miss, which
// falls with the power `corners` of r.
func (k *tracker) mean(x point, r float64) (limit point, cycle int, ok bool) {
	k.normalise(&x)
	start, t := x, complex(r, 0)
	for cycle = 1; cycle <= mostCycles; cycle++ {
		for c := 1; c <= corners; c++ {
			limit.addScaled(1, &x)
			next := cmplx.Rect(r, 2*math.Pi*float64(c)/corners)
			if !k.along(&x, t, next, loopSteps, true) {
				return limit, cycle, false
			}
			t = next
		}
		d := x
		d.addScaled(-1, &start)
		if d.norm() < closed {
			k.normalise(&limit)
			return limit, cycle, true
		}
	}
	return limit, cycle, false
}

// apart is the sine of the largest angle between the blocks of two points of unit blocks.
func (k *tracker) apart(x, y *point) float64 {
	worst, from := 0.0, 0
	for _, to := range k.ends {
		var inner complex128
		for i := from; i < to; i++ {
			inner += conj(x[i]) * y[i]
		}
		s := 0.0
		for i := from; i < to; i++ {
			s += size2(y[i] - inner*x[i])
		}
		worst, from = math.Max(worst, s), to
	}
	return math.Sqrt(worst)
}
