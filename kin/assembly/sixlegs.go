package assembly

import (
	"math"
	"math/cmplx"
	"math/rand/v2"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
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
// check on the result; seed 0 is the fastest. The cost is some 70 ms of processor
// time for a general platform, twice that for one with solutions at infinity or with another seed.
//
// Special platforms have fewer solutions, the others being counted as Infinite: those
// of the family 6-UPS have 28, those with three platform joints (6-3, 3-3) 16.
// At a singular posture, or where the locked drives leave the platform a curve of postures (at
// every pose of similar hexagons, for one), solutions are Singular: a real one
// among them is given as found, which of a curve is a point, and may be none.
//
// The determinant is that of the rows [n, (R b)×n], n along the leg from base to platform.
func SixLegs(base, platform [6]kin.Vec, length [6]float64, seed uint64) Result {
	h := newHexapod(&base, &platform, &length)
	if !(h.size > 0) || math.IsInf(h.size, 0) {
		return Result{Paths: sixLegPaths, Lost: sixLegPaths}
	}
	h.seed, h.target = seed, h.legs()
	return solve(h, sixLegPaths, h.size)
}

// start gives the paths to the platform from another one that is generic.
func (h *hexapod) start(try uint64) (equations, []end) {
	from, points := startSystem(h.seed + try<<32)
	rng := rand.New(rand.NewPCG(h.seed, try))
	return &soma{from: from, to: &h.target, gamma: bend(rng)}, points
}

// infinite tells whether the rotation of an end has no measure.
func (h *hexapod) infinite(e *end) bool {
	var ee complex128
	size := 0.0
	for _, z := range e.x[:4] {
		ee += z * z
		size += size2(z)
	}
	if e.outcome == regular {
		return cmplx.Abs(ee) < infiniteEnd*size
	}
	return cmplx.Abs(ee) < infiniteLimit
}

// hexapod is a six-legged platform moved and scaled to a usual place and size.
type hexapod struct {
	base, platform     [6]kin.Vec // as given
	length             [6]float64
	target             legs
	seed               uint64
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

// mode is the mode of an end, if it is real.
func (h *hexapod) mode(e *end) (Mode, bool) {
	re, im := realBlock(e.x[:])
	if !e.mayBeReal(im) {
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
