package objective

import "math"

// The rule of a climb.
const (
	climbStep  = 2e-5  // of a half range, for differences
	climbGain  = 1e-11 // relative: the least gain worth a further step
	climbSteps = 60
	climbCuts  = 8
	climbBasin = 0.02 // half ranges: how near to an end that was found before a climb is given up
)

// climb drives a property from u, where it is f bad, to a local worst within the region and returns how bad that is:
// spectral projected gradient with one-sided differences (E. G. Birgin, J. M. Martínez and M. Raydan 2000, SIAM J. Optim.
// 10:1196; monotone, from memory), tried first at the farthest point of the region in the direction of the slope, where
// nearly every worst case lies. A start at a corner whose slopes all point outward costs one gradient. It stops at
// a pose that is out of reach or singular: that is +Inf bad.
func (r *Refiner) climb(u *[6]float64, f float64) float64 {
	var g, g0, u0 [6]float64
	step := 0.0
	for it := range climbSteps {
		if it > 0 && r.known(u, f) {
			return f
		}
		if r.slope(u, &f, &g) {
			return f
		}
		steepest := 0.0
		for _, x := range g {
			steepest = math.Max(steepest, math.Abs(x))
		}
		idle := climbGain * math.Abs(f)
		if steepest <= idle {
			return f
		}
		if it == 0 {
			t := r.reg.farthest(u, &g, 1e2*idle)
			if t == *u {
				return f
			}
			if ft := r.bad(&t); ft > f {
				u0, g0 = *u, g
				*u, f = t, ft
				if math.IsInf(f, 1) {
					return f
				}
				continue
			}
			step = 0.5 / steepest
		} else {
			ss, sy := 0.0, 0.0
			for k := range u {
				s := u[k] - u0[k]
				ss += s * s
				sy -= s * (g[k] - g0[k])
			}
			step = 2 / steepest
			if sy > 0 {
				step = math.Max(1e-3/steepest, math.Min(1e3/steepest, ss/sy))
			}
		}
		before := f
		for range climbCuts { // along the projected path, which follows the surface of a ball
			t := *u
			for k := range r.reg.n {
				t[k] += step * g[k]
			}
			r.reg.project(&t)
			rise := 0.0
			for k := range t {
				rise += (t[k] - u[k]) * g[k]
			}
			if rise <= idle {
				return f
			}
			ft := r.bad(&t)
			if ft > f+1e-4*rise {
				u0, g0 = *u, g
				*u, f = t, ft
				break
			}
			// the top of the parabola through the value and the slope here and the value there
			step *= math.Max(0.1, math.Min(0.5, 0.5*rise/(f+rise-ft)))
		}
		if math.IsInf(f, 1) || f-before <= climbGain*math.Abs(f) {
			return f
		}
	}
	return f
}

// slope fills the gradient at u by differences to the side on which the region lies. It reports true, with
// u moved there, if it meets a pose that is out of reach or singular.
func (r *Refiner) slope(u *[6]float64, f *float64, g *[6]float64) bool {
	*g = [6]float64{}
	for k := range r.reg.n {
		h := climbStep
		if u[k] > 0 {
			h = -h
		}
		t := *u
		t[k] += h
		r.reg.project(&t)
		ft := r.bad(&t)
		if math.IsInf(ft, 1) {
			*u, *f = t, ft
			return true
		}
		if g[k] = (ft - *f) / h; math.IsNaN(g[k]) || math.IsInf(g[k], 0) {
			g[k] = 0
		}
	}
	return false
}

// known tells whether the climb has come near to an end that was found before, from below: it would end there too.
func (r *Refiner) known(u *[6]float64, f float64) bool {
next:
	for i := range r.ends {
		if f > r.ends[i].bad {
			continue
		}
		for k := range r.reg.n {
			if math.Abs(u[k]-r.ends[i].u[k]) > climbBasin {
				continue next
			}
		}
		return true
	}
	return false
}
