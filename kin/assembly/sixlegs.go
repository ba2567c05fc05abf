package assembly

import (
	"math"
	"math/cmplx"
	"math/rand/v2"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// The rules by which the ends of the 40 paths are judged. A point has length 1, and lengths are over the machine's size.
const (
	attempts      = 5     // sets of paths at most, each from another start
	samePoint     = 1e-7  // angle of two ends that are one
	infinite      = 1e-12 // |e·e| of a regular end at infinity
	infiniteLimit = 1e-7  // the same of an end found as a limit
	realRegular   = 1e-6  // imaginary part of a regular end that may be real: the real corrector decides
	realLimit     = 1e-4  // the same of an end found as a limit
	nearby        = 1e-3  // how far the real corrector may move
	sameMode      = 1e-6  // distance of two modes that are one
)

// SixLegs finds all assembly modes of a six-legged platform from its joints (base
// frame, platform frame) and the distances of their centres, all of them positive.
// It serves every machine with six legs once the ends of its rods are known: a
// 6-RUS with its crank ends, a 6-PUS with its carriages in place of base joints.
//
// The 40 complex solutions of a general platform with complex parameters are known;
// they are followed while the parameters move to the given ones (coefficient-parameter
// continuation). Ends that are real are corrected by Newton's method on the lengths.
// If a path is lost, or two paths end at one simple solution, or the ends are not
// closed under conjugation, all are run again from another start, five times at most;
// what then is missing is counted as Lost. Other seeds choose other starts, a
// check on the result; seed 0 is the fastest. The cost is some 0.05 s on one core
// for a general platform, several times that for one with solutions at infinity.
//
// Special platforms have fewer solutions, the others being counted as Infinite: those
// of the family 6-UPS have 28, those with three platform joints (6-3, 3-3) 16. A solution
// farther away than some 10⁵ of the machine's size counts as infinite too; no real one is.
// At a singular posture, or where the locked drives leave the platform a curve of postures (at
// every pose of similar hexagons, for one), solutions are Singular: a real one
// among them is given as found, which of a curve is a point, and may be none.
//
// The determinant is that of the rows [n, (R b)×n], n along the leg from base to platform.
func SixLegs(base, platform [6]kin.Vec, length [6]float64, seed uint64) Result {
	h := newHexapod(&base, &platform, &length)
	out := Result{Paths: sixLegPaths, Lost: sixLegPaths}
	if math.IsNaN(h.size) || math.IsInf(h.size, 0) || h.size == 0 {
		return out
	}
	var (
		target = h.legs()
		k      = newTracker(&soma{from: &target, to: &target, gamma: 1})
		simple []point
	)
	for try := range uint64(attempts) {
		from, starts := startSystem(seed + 1e9*try)
		rng := rand.New(rand.NewPCG(seed, try))
		sys := &soma{from: from, to: &target, gamma: cmplx.Rect(1, 2*(2*rng.Float64()-1))}
		ends := follow(sys, starts)
		c := count(k, ends)
		simple = union(k, simple, ends)
		if missing := max(0, sixLegPaths-len(simple)-c.Infinite-c.Singular); try == 0 || missing < out.Lost {
			out.Infinite, out.Singular, out.Lost = c.Infinite, c.Singular, missing
		}
		out.Modes = h.merge(out.Modes, ends)
		if out.Lost == 0 && conjugate(k, simple) {
			break
		}
	}
	out.Complex = len(simple)
	sortModes(out.Modes, h.size)
	return out
}

// atInfinity tells whether the rotation of an end has no measure.
func atInfinity(e *end) bool {
	var ee complex128
	for _, z := range e.x[:4] {
		ee += z * z
	}
	if e.outcome == singular {
		return cmplx.Abs(ee) < infiniteLimit
	}
	return cmplx.Abs(ee) < infinite
}

// count tells how many ends are of which sort; a regular end met twice counts as lost the second time.
func count(k *tracker, ends []end) (c Result) {
	for i := range ends {
		e := &ends[i]
		switch {
		case e.outcome == lost:
			c.Lost++
		case atInfinity(e):
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
func union(k *tracker, known []point, ends []end) []point {
	for i := range ends {
		if e := &ends[i]; e.outcome == regular && !atInfinity(e) && !holds(k, known, &e.x) {
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

// hexapod is a six-legged platform moved and scaled to a usual place and size.
type hexapod struct {
	base, platform     [6]kin.Vec // as given
	length             [6]float64
	baseMean, platMean kin.Vec // of the joints
	size               float64 // root mean square of a leg and of its joints' distances from their means
}

func newHexapod(base, platform *[6]kin.Vec, length *[6]float64) *hexapod {
	h := &hexapod{base: *base, platform: *platform, length: *length}
	for i := range 6 {
		h.baseMean = r3.Add(h.baseMean, r3.Scale(1./6, base[i]))
		h.platMean = r3.Add(h.platMean, r3.Scale(1./6, platform[i]))
	}
	for i := range 6 {
		h.size += r3.Norm2(r3.Sub(base[i], h.baseMean)) + r3.Norm2(r3.Sub(platform[i], h.platMean)) + length[i]*length[i]
	}
	h.size = math.Sqrt(h.size / 18)
	return h
}

// legs are the parameters of the moved and scaled platform.
func (h *hexapod) legs() legs {
	var out legs
	for i := range out {
		a := r3.Scale(1/h.size, r3.Sub(h.base[i], h.baseMean))
		b := r3.Scale(1/h.size, r3.Sub(h.platform[i], h.platMean))
		l := h.length[i] / h.size
		out[i] = leg{less: toComplex(r3.Sub(b, a)), sum: toComplex(r3.Add(b, a)), square: complex(l*l, 0)}
	}
	return out
}

// merge adds the real ends to the modes that are known.
func (h *hexapod) merge(modes []Mode, ends []end) []Mode {
	for i := range ends {
		e := &ends[i]
		if e.outcome == lost || atInfinity(e) {
			continue
		}
		m, ok := h.real(e)
		if !ok {
			continue
		}
		known := false
		for j := range modes {
			known = known || distance(m.Origin, modes[j].Origin, &m.Rot, &modes[j].Rot, h.size) < sameMode*h.size
		}
		if !known {
			modes = append(modes, m)
		}
	}
	return modes
}

// real is the mode of an end, if it is real.
func (h *hexapod) real(e *end) (Mode, bool) {
	// A real point times a phase: the sum of its squares has twice the phase.
	var sum complex128
	for _, z := range e.x {
		sum += z * z
	}
	turn := conj(cmplx.Sqrt(sum))
	turn *= complex(1/cmplx.Abs(turn), 0)
	var re [8]float64
	im := 0.0
	for i, z := range e.x {
		z *= turn
		re[i] = real(z)
		im += imag(z) * imag(z)
	}
	limit := realRegular
	if e.outcome == singular {
		limit = realLimit
	}
	if !(math.Sqrt(im) < limit) {
		return Mode{}, false
	}
	rot := rotation([4]float64(re[:4]))
	q := kin.Vec{X: re[1], Y: re[2], Z: re[3]}
	d := kin.Vec{X: re[5], Y: re[6], Z: re[7]}
	// p = d ē / |e|²
	p := r3.Sub(r3.Add(r3.Scale(re[0], d), r3.Scale(-re[4], q)), r3.Cross(d, q))
	p = r3.Scale(h.size/(re[0]*re[0]+r3.Norm2(q)), p)
	origin := r3.Sub(r3.Add(p, h.baseMean), rot.Apply(h.platMean))
	m, ok := h.correct(origin, rot)
	return m, ok && distance(m.Origin, origin, &m.Rot, &rot, h.size) < nearby*h.size
}
