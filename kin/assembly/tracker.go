package assembly

import "math"

// equations is a family of square systems, homogeneous in blocks of unknowns,
// that depends analytically on the complex parameter t.
type equations interface {
	// blocks gives the end of each block of homogeneous unknowns; the last end is
	// their number n. There are n less the number of blocks equations.
	blocks() []int

	// at fills w with the residuals at (t, x), their derivatives by t, and the rows of derivatives by x.
	at(t complex128, x *point, w *workspace)
}

// workspace is what equations.at fills.
type workspace struct {
	f, ft point
	lu    lu
}

// The step control. An error is the length of the corrector's first step, over |x|.
const (
	wantedError   = 1e-6  // of the predictor: the next step is chosen to meet it
	largestError  = 3e-5  // a step with a larger one is refused
	correctedWell = 1e-11 // the corrector stops here
	smallestStep  = 1e-9  // of the segment: below it the path is given up
	firstStep     = 0.05  // of the segment, where it is not a short one
	mostSteps     = 2000  // on the way to the endgame
)

// tracker follows one solution path of a system at a time. Each block of
// unknowns is kept on the affine patch patchᴴ·x = 1.
type tracker struct {
	sys   equations
	ends  []int
	n     int
	patch point
	here  point // where the system is evaluated
	work  workspace
}

func newTracker(sys equations) *tracker {
	k := &tracker{sys: sys, ends: sys.blocks()}
	k.n = k.ends[len(k.ends)-1]
	return k
}

// normalise scales each block of x to unit length and lays the patch through it.
func (k *tracker) normalise(x *point) {
	from := 0
	for _, to := range k.ends {
		s := 0.0
		for _, z := range x[from:to] {
			s += size2(z)
		}
		c := complex(1/math.Sqrt(s), 0)
		for i := from; i < to; i++ {
			x[i] *= c
			k.patch[i] = x[i]
		}
		from = to
	}
}

// linearise evaluates the system at (t, x), adds the rows of the patches and factors.
func (k *tracker) linearise(t complex128, x *point) bool {
	w := &k.work
	k.here = *x
	k.sys.at(t, &k.here, w)
	w.lu.n = k.n
	row, from := k.n-len(k.ends), 0
	for _, to := range k.ends {
		w.lu.a[row] = [order]complex128{}
		for i := from; i < to; i++ {
			w.lu.a[row][i] = conj(k.patch[i])
		}
		w.f[row], w.ft[row] = 0, 0
		row, from = row+1, to
	}
	return w.lu.factor()
}

// tangent is dx/dt·dt at (t, x).
func (k *tracker) tangent(t complex128, x *point, dt complex128) (d point, ok bool) {
	if !k.linearise(t, x) {
		return d, false
	}
	d.addScaled(-dt, &k.work.ft)
	k.work.lu.solve(&d)
	return d, true
}

// correct makes one Newton step at t and gives its length over |x|.
func (k *tracker) correct(t complex128, x *point) (float64, bool) {
	if !k.linearise(t, x) {
		return math.Inf(1), false
	}
	d := k.work.f
	k.work.lu.solve(&d)
	x.addScaled(-1, &d)
	return d.norm() / x.norm(), true
}

// predict is a step of the classical Runge-Kutta method of order four.
func (k *tracker) predict(t complex128, x *point, dt complex128) (y point, ok bool) {
	var d [4]point
	for i, part := range [4]complex128{0, 0.5, 0.5, 1} {
		y = *x
		if i > 0 {
			y.addScaled(part, &d[i-1])
		}
		if d[i], ok = k.tangent(t+part*dt, &y, dt); !ok {
			return y, false
		}
	}
	y = *x
	for i, weight := range [4]complex128{1. / 6, 1. / 3, 1. / 3, 1. / 6} {
		y.addScaled(weight, &d[i])
	}
	return y, true
}

// step makes one step from t to t+dt and gives the predictor's error.
func (k *tracker) step(t complex128, x *point, dt complex128) (y point, err float64, ok bool) {
	y, ok = k.predict(t, x, dt)
	if !ok {
		return y, math.Inf(1), false
	}
	err, ok = k.correct(t+dt, &y)
	if !ok || !(err <= largestError) {
		return y, err, false
	}
	last := err
	for range 3 {
		if last <= correctedWell {
			return y, err, true
		}
		now, ok := k.correct(t+dt, &y)
		if !ok || !(now <= 0.1*last || now <= 100*correctedWell) {
			return y, err, false
		}
		last = now
	}
	return y, err, last <= 100*correctedWell
}

// along follows the path on the straight segment of the complex plane from t=a to
// t=b. If hold is set the patch stays where it is, so that points of the path may
// be compared and averaged; otherwise it moves with the path. It reports false if
// the step becomes too small or `most` steps do not suffice.
func (k *tracker) along(x *point, a, b complex128, most int, hold bool) bool {
	if !hold {
		k.normalise(x)
	}
	u, h := 0.0, firstStep
	if hold { // a side of a small polygon
		h = 1
	}
	for range most {
		last := u+h >= 1
		if last {
			h = 1 - u
		}
		y, err, ok := k.step(a+complex(u, 0)*(b-a), x, complex(h, 0)*(b-a))
		if !ok {
			cut := 0.5
			if err > largestError {
				cut = math.Max(0.1, math.Min(0.5, math.Pow(wantedError/err, 0.2)))
			}
			if h *= cut; h < smallestStep {
				return false
			}
			continue
		}
		*x = y
		if !hold {
			k.normalise(x)
		}
		if last {
			return true
		}
		u += h
		h *= math.Max(0.3, math.Min(2.5, 0.9*math.Pow(wantedError/math.Max(err, 1e-16), 0.2)))
	}
	return false
}
