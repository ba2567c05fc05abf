package objective

import (
	"math"

	"legwright/kin"
)

// Run is where a platform goes when its actuators run from home to the ends of their strokes, all of them starting and
// arriving together.
type Run struct {
	Ends  []int   // of each actuator: -1 shortest, 1 longest, 0 held at home
	Share float64 // of the way that was gone: 1 to the end
	Stops string  // why it went no further: a singularity ("singular"), "reach", or a passive part at its stop; "" at the end
	Last  Sample  // the last pose

	Tilt, BaseSwing, PlatformSwing, Clearance float64 // the worst along the way
}

// Singular tells whether the way meets a singularity.
func (w *Run) Singular() bool { return w.Stops == failSingular }

// WholeStroke is what lies within the strokes, whatever the duty is: every combination of shortest and longest
// actuators, then each actuator that runs away alone to either end.
type WholeStroke struct {
	Low, High float64 // the actuators' range
	Runs      []Run   // the combinations, the parked machine first, then the single ones
	Both      int     // how many of Runs are combinations
	Tilts     bool    // the platform can tilt
	Legs      bool    // there are legs, whose swing and clearance are known
}

// The rule of following a platform by its actuators.
const (
	strokeStep  = 1.0 / 48 // of a way, at most; reports name it
	strokeLeast = 1e-10    // of a way: where a shorter step would be needed, the way ends
	strokeCuts  = 8        // Newton steps
	strokeExact = 1e-12    // of the largest coordinate
	strokeTurn  = 0.15     // rad, and of the machine's size, that one step may move the platform
	strokeFlat  = 1e-3     // of home's conditioning: below it a way that ends, ends at a singularity
)

// Strokes follows the platform along every way. It reports false where the family's actuators have no range that is known, or
// home is singular. Each way is followed from home by continuation: a step along the tangent, corrected by Newton's method
// on the actuator coordinates (E. L. Allgower and K. Georg 1990, Numerical Continuation Methods, from memory), in the working
// mode of home, and ends where the next step, however short, meets a singularity: there the platform could go either
// way. Singular means that the determinant changes its sign or that 1/kappa falls below Task.Singular. Worst values are those of poses
// at most 1/48 of a way apart, as far as each way goes. Actuators without a range (kin.Family.Free) stay at home. It costs some milliseconds.
func Strokes(t *Task, p *Plan, values []float64) (*WholeStroke, bool) {
	m := p.build(t, values)
	v := newView(t)
	v.serve(p.Family)
	v.begin(m)
	n := v.n - v.free
	if p.least < 0 || n < 1 || v.homeSign == 0 || math.IsNaN(values[p.least]) {
		return nil, false
	}
	w := &WholeStroke{Low: values[p.least], High: values[p.least] + values[p.span], Both: 1 << n,
		Tilts: p.Family.Has(kin.Roll), Legs: v.frame.Rods != nil || !v.legless}
	f := follower{v: v, w: w, rotary: p.Family.Drive == kin.Rotary, home: v.homeQ}
	f.size = norm(v.frame.Home) + enclosing(v.frame.Base)
	f.settled()
	f.flat = strokeFlat * math.Sqrt(v.ratio2)
	for k := range 1 << n {
		ends := make([]int, v.n)
		for i := range n {
			ends[i] = 2*(k>>i&1) - 1
		}
		w.Runs = append(w.Runs, f.follow(ends))
	}
	for k := range 2 * n {
		ends := make([]int, v.n)
		ends[k/2] = 2*(k%2) - 1
		w.Runs = append(w.Runs, f.follow(ends))
	}
	return w, true
}

// Nearest is the place in Runs of the combination that meets a singularity first, by the share of the way; -1 for none.
func (w *WholeStroke) Nearest() int {
	at := -1
	for i := range w.Runs[:w.Both] {
		if w.Runs[i].Singular() && (at < 0 || w.Runs[i].Share < w.Runs[at].Share) {
			at = i
		}
	}
	return at
}

// Crossing counts the combinations, and the actuators' single ways, that meet a singularity.
func (w *WholeStroke) Crossing() (both, alone int) {
	for i := range w.Runs {
		switch {
		case !w.Runs[i].Singular():
		case i < w.Both:
			both++
		default:
			alone++
		}
	}
	return both, alone
}

// follower follows ways. It is scratch for one goroutine.
type follower struct {
	v      *View
	w      *WholeStroke
	rotary bool
	home   [6]float64
	size   float64
	flat   float64 // conditioning
	s      Sample
	fail   string // why settled failed
}

// follow goes along one way.
func (f *follower) follow(ends []int) Run {
	v := f.v
	w := Run{Ends: ends, Clearance: math.Inf(1)}
	var way [6]float64
	for i, e := range ends {
		switch e {
		case -1:
			way[i] = f.w.Low - f.home[i]
		case 1:
			way[i] = f.w.High - f.home[i]
		}
	}
	f.s = Sample{Pose: kin.NewPose(kin.Coords{}), Zone: len(v.task.Zones), Row: -1}
	f.settled()
	f.note(&w)
	step := strokeStep
	for w.Share < 1 {
		from, x := f.s, v.x
		to := math.Min(1, w.Share+step)
		var q [6]float64
		for i := range v.n {
			q[i] = f.home[i] + to*way[i]
		}
		if f.correct(&x, &way, to-w.Share, &q) {
			w.Share = to
			f.note(&w)
			step = math.Min(strokeStep, 2*step)
			continue
		}
		why := f.fail
		f.s = from
		f.settled()
		if step /= 2; step > strokeLeast {
			continue
		}
		if w.Stops = why; why == "" || math.Sqrt(v.ratio2) < f.flat {
			w.Stops = failSingular
		}
		break
	}
	w.Last = f.s
	w.Last.Coords = f.s.Pose.Coords()
	return w
}

// correct steps along the tangent and then to the pose with the actuator coordinates q. It reports false where it does not
// get there without a jump, a singularity or leaving reach.
func (f *follower) correct(x *[36]float64, way *[6]float64, part float64, q *[6]float64) bool {
	v := f.v
	f.fail = ""
	if f.move(x, way, part) > strokeTurn {
		return false
	}
	scale := 1.0
	if !f.rotary {
		scale = math.Max(math.Abs(f.w.Low), math.Abs(f.w.High))
	}
	for range strokeCuts {
		if !f.settled() {
			return false
		}
		var d [6]float64
		worst := 0.0
		for i := range v.n {
			if d[i] = q[i] - v.S.Q[i]; f.rotary {
				d[i] = math.Remainder(d[i], 2*math.Pi)
			}
			worst = math.Max(worst, math.Abs(d[i]))
		}
		if worst <= strokeExact*scale {
			return true
		}
		if f.move(&v.x, &d, 1) > strokeTurn {
			return false
		}
	}
	return false
}

// settled looks at the pose and reports false where it is out of reach or singular.
func (f *follower) settled() bool {
	v := f.v
	v.keep, v.near = math.Inf(1), math.Inf(1)
	if !v.at(&f.s, -1, NeedMatrix) {
		if f.fail = failReach; v.S.Fail == kin.Stopped {
			f.fail = v.S.What
		}
		return false
	}
	f.s.Pose = *v.stand
	f.fail = ""
	if v.isSingular() {
		f.fail = failSingular
		return false
	}
	return true
}

// move moves the pose by a part of the actuator differences d, x being the inverse of the Jacobian there, and tells
// how far that is: the larger of the turn in radians and the shift over the machine's size.
func (f *follower) move(x *[36]float64, d *[6]float64, part float64) float64 {
	v := f.v
	var t [6]float64
	for k := range t {
		for i := range v.n {
			t[k] += x[6*k+i] * d[i] * part
		}
	}
	turn := kin.Vec{X: t[3] * v.invLc, Y: t[4] * v.invLc, Z: t[5] * v.invLc}
	shift := kin.Vec{X: t[0], Y: t[1], Z: t[2]}
	far := math.Max(norm(turn), norm(shift)/f.size)
	if far > strokeTurn || math.IsNaN(far) {
		return math.Inf(1)
	}
	p := &f.s.Pose
	e := kin.Exp(turn)
	*p = kin.Pose{P: kin.Vec{X: p.P.X + shift.X, Y: p.P.Y + shift.Y, Z: p.P.Z + shift.Z}, R: e.Mul(&p.R)}
	return far
}

// note takes the pose in work into the worst values of the way.
func (f *follower) note(w *Run) {
	v := f.v
	if f.w.Tilts { // of the platform's normal from home's
		h := v.frame.HomeRot.Apply(kin.Vec{Z: 1})
		n := v.stand.R.Apply(h)
		d := sub(n, h)
		w.Tilt = math.Max(w.Tilt, swingOf(d.X*d.X+d.Y*d.Y+d.Z*d.Z))
	}
	if !f.w.Legs {
		return
	}
	for i := range v.n {
		w.BaseSwing = math.Max(w.BaseSwing, swingOf(v.S.BaseChord[i]))
		w.PlatformSwing = math.Max(w.PlatformSwing, swingOf(v.S.PlatformChord[i]))
	}
	gap, _, _ := v.machine.Gap(&v.S)
	w.Clearance = math.Min(w.Clearance, gap)
}
