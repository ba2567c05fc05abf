package assembly

import (
	"math"
	"math/cmplx"
	"math/rand/v2"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// ThreeRPS finds all assembly modes of a platform on three legs that each swing about a
// hinge at the base and end in a spherical joint: a 3-RPS with its drives held. A 6-3
// platform is the same machine, the hinge of a pair of legs being the line of their
// base joints and the length its distance from their platform joint. Base joints and hinge axes (of any
// length) are in the base frame; legs stand at right angles to their hinges.
//
// Each platform joint is on a circle; their three distances are three equations, quadratic
// in the tangent of half the swing of two legs each, with 16 solutions
// (L.-W. Tsai 1996; M. Husty and co-workers find the 16 in two operation modes of
// eight, from memory). They are the ends of 16 paths from equations that are products, by
// the rules of SixLegs. The cost is some 6 ms of processor time.
//
// The determinant is that of the six rows [n, (R b)×n] of the legs and [h, (R b)×h] of the hinges,
// h the unit hinge axis: the wrenches of the drives and of the hinges. No platform is found if the
// platform joints are in line.
func ThreeRPS(base, hinge, platform [3]kin.Vec, length [3]float64, seed uint64) Result {
	h := &tripod{base: base, platform: platform, length: length, seed: seed}
	for i := range 3 {
		h.hinge[i] = r3.Unit(hinge[i])
		h.across[i] = perpendicular(h.hinge[i])
		h.along[i] = r3.Cross(h.hinge[i], h.across[i])
		h.size += length[i]*length[i] + r3.Norm2(r3.Sub(base[i], base[(i+1)%3])) + r3.Norm2(r3.Sub(platform[i], platform[(i+1)%3]))
		h.size += 0 * h.across[i].X // a hinge without direction is no number
	}
	h.size = math.Sqrt(h.size / 9)
	if !(h.size > 0) || math.IsInf(h.size, 0) {
		return Result{Paths: circlePaths, Lost: circlePaths}
	}
	h.target = h.forms()
	return solve(h, circlePaths, h.size)
}

// tripod is a platform on three hinged legs. Leg i ends at base + length (cos θ across + sin θ along).
type tripod struct {
	base, hinge, across, along, platform [3]kin.Vec
	length                               [3]float64
	size                                 float64
	target                               forms
	seed                                 uint64
}

// perpendicular is a unit vector at right angles to the unit vector v.
func perpendicular(v kin.Vec) kin.Vec {
	e := kin.Vec{X: 1}
	if math.Abs(v.X) > 0.6 {
		e = kin.Vec{Y: 1}
	}
	return r3.Unit(r3.Cross(v, e))
}

// forms are those of the three distances squared, less the platform's.
func (h *tripod) forms() forms {
	var out forms
	for k := range out {
		i, j := k, (k+1)%3
		d := r3.Scale(1/h.size, r3.Sub(h.base[i], h.base[j]))
		li, lj := h.length[i]/h.size, h.length[j]/h.size
		side := r3.Norm(r3.Sub(h.platform[i], h.platform[j])) / h.size
		out[k][0][0] = complex(r3.Norm2(d)+li*li+lj*lj-side*side, 0)
		ui, uj := [2]kin.Vec{h.across[i], h.along[i]}, [2]kin.Vec{h.across[j], h.along[j]}
		for a := range 2 {
			out[k][a+1][0] = complex(2*li*r3.Dot(d, ui[a]), 0)
			out[k][0][a+1] = complex(-2*lj*r3.Dot(d, uj[a]), 0)
			for b := range 2 {
				out[k][a+1][b+1] = complex(-2*li*lj*r3.Dot(ui[a], uj[b]), 0)
			}
		}
	}
	return out
}

func (h *tripod) start(try uint64) (equations, []end) {
	rng := rand.New(rand.NewPCG(h.seed, try))
	from, points := startCircles(rng)
	return &circles{from: from, to: &h.target, gamma: bend(rng)}, points
}

// infinite tells whether a point of a circle is infinitely far.
func (h *tripod) infinite(e *end) bool {
	for i := range 3 {
		n := cmplx.Abs(e.x[2*i]*e.x[2*i] + e.x[2*i+1]*e.x[2*i+1])
		if n < infiniteEnd || e.outcome == singular && n < infiniteLimit {
			return true
		}
	}
	return false
}

func (h *tripod) mode(e *end) (Mode, bool) {
	var angle [3]float64
	for i := range angle {
		re, im := realBlock(e.x[2*i : 2*i+2])
		if !e.mayBeReal(im) {
			return Mode{}, false
		}
		angle[i] = 2 * math.Atan2(re[1], re[0])
	}
	return h.correct(angle)
}

// joints are the platform joints at the swings of the legs.
func (h *tripod) joints(angle *[3]float64) (p, rate [3]kin.Vec) {
	for i := range p {
		s, c := math.Sincos(angle[i])
		u := r3.Add(r3.Scale(c, h.across[i]), r3.Scale(s, h.along[i]))
		p[i] = r3.Add(h.base[i], r3.Scale(h.length[i], u))
		rate[i] = r3.Scale(h.length[i], r3.Cross(h.hinge[i], u))
	}
	return p, rate
}

// correct improves the swings by Newton's method on the platform's sides until the
// largest error falls no more, and tells whether they are then a solution nearby.
func (h *tripod) correct(angle [3]float64) (Mode, bool) {
	var (
		first, best = angle, angle
		least       = math.Inf(1)
		jac         = mat.NewDense(3, 3, nil)
		diff        = mat.NewVecDense(3, nil)
		step        = mat.NewVecDense(3, nil)
	)
	for range correctSteps {
		p, rate := h.joints(&angle)
		worst := 0.0
		jac.Zero()
		for i := range 3 {
			j := (i + 1) % 3
			d := r3.Sub(p[i], p[j])
			l := r3.Norm(d)
			miss := r3.Norm(r3.Sub(h.platform[i], h.platform[j])) - l
			jac.Set(i, i, r3.Dot(d, rate[i])/l)
			jac.Set(i, j, -r3.Dot(d, rate[j])/l)
			diff.SetVec(i, miss)
			worst = math.Max(worst, math.Abs(miss))
		}
		if !(worst < least) {
			break
		}
		least, best = worst, angle
		if !solved(step, jac, diff) {
			break
		}
		for i := range angle {
			angle[i] += step.AtVec(i)
		}
	}
	for i := range best {
		if !(math.Abs(best[i]-first[i]) < nearby) {
			return Mode{}, false
		}
	}
	p, _ := h.joints(&best)
	m, ok := h.place(&p)
	return m, ok && least <= accepted*h.size
}

// place is the placement that brings the platform joints to the points.
func (h *tripod) place(p *[3]kin.Vec) (Mode, bool) {
	a, ok := triad(&h.platform)
	b, _ := triad(p)
	m := Mode{Rot: times(&b, &a)}
	if !ok {
		return m, false
	}
	for i := range 3 {
		m.Origin = r3.Add(m.Origin, r3.Scale(1./3, r3.Sub(p[i], m.Rot.Apply(h.platform[i]))))
	}
	jac := mat.NewDense(6, 6, nil)
	for i := range 3 {
		r := m.Rot.Apply(h.platform[i])
		s := r3.Sub(r3.Add(m.Origin, r), h.base[i])
		m.Residual = math.Max(m.Residual, math.Abs(r3.Norm(s)-h.length[i]))
		for k, n := range [2]kin.Vec{r3.Unit(s), h.hinge[i]} {
			c := r3.Cross(r, n)
			jac.SetRow(i+3*k, []float64{n.X, n.Y, n.Z, c.X, c.Y, c.Z})
		}
	}
	m.Determinant = mat.Det(jac)
	return m, true
}

// triad has for columns the unit vectors along p₀p₁, in the plane of the three points, and normal to it.
func triad(p *[3]kin.Vec) (kin.Rot, bool) {
	d, e := r3.Sub(p[1], p[0]), r3.Sub(p[2], p[0])
	n := r3.Cross(d, e)
	if !(r3.Norm(n) > 1e-9*r3.Norm(d)*r3.Norm(e)) {
		return kin.Rot{}, false
	}
	x, z := r3.Unit(d), r3.Unit(n)
	y := r3.Cross(z, x)
	return kin.Rot{x.X, y.X, z.X, x.Y, y.Y, z.Y, x.Z, y.Z, z.Z}, true
}
