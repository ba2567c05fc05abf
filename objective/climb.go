package objective

import (
	"math"

	"legwright/kin"
)

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
		if it > 0 && r.met(u, f) || r.slope(u, &f, &g) {
			return f
		}
		full := g
		if r.try.hope > 0 && f+r.try.hope*r.reg.rise(u, &g) < r.goal {
			return f
		}
		r.reg.tangent(u, &g)
		steepest := 0.0
		for _, x := range g {
			steepest = math.Max(steepest, math.Abs(x))
		}
		idle := climbGain * math.Abs(f)
		if steepest <= idle {
			return f
		}
		if it == 0 {
			t := r.reg.farthest(u, &full, 1e2*idle)
			if t == *u {
				return f
			}
			step = 0.5 / steepest
			if ft := r.bad(&t); ft > f {
				u0, g0 = *u, g
				*u, f = t, ft
				if math.IsInf(f, 1) {
					return f
				}
				continue
			}
		} else {
			ss, sy := 0.0, 0.0
			for k := range u {
				s := u[k] - u0[k]
				ss += s * s
				sy -= s * (g[k] - g0[k])
			}
			if step *= 4; sy > 0 {
				step = ss / sy
			}
			step = math.Max(1e-3/steepest, math.Min(1e3/steepest, step))
		}
		before := f
		for range climbCuts { // along the projected path
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

// first makes the first step of a climb alone: to the farthest point in the direction of the slope, if that is worse.
func (r *Refiner) first(u *[6]float64, f *float64) {
	var g [6]float64
	if r.slope(u, f, &g) || g == [6]float64{} {
		return
	}
	t := r.reg.farthest(u, &g, 0)
	if ft := r.bad(&t); ft > *f {
		*u, *f = t, ft
	}
}

// slope fills the gradient at u by differences to the side on which the region lies. It reports true, with
// u moved there, if it meets a pose that is out of reach or singular.
func (r *Refiner) slope(u *[6]float64, f *float64, g *[6]float64) bool {
	*g = [6]float64{}
	if r.m == nil && !r.v.frame.Tied {
		r.bad(u)
		r.legSlope(g)
		return false
	}
	for k := range r.reg.n {
		t, h := r.reg.aside(u, k)
		ft := r.bad(&t)
		if math.IsInf(ft, 1) {
			*u, *f = t, ft
			return true
		}
		g[k] = slopeOf(ft, *f, h)
	}
	return false
}

// legSlope is the gradient of an actuator coordinate at the pose in work: its row of the inverse Jacobian times the twist that
// each pose coordinate gives, whose rotation axes are z for yaw, y turned by yaw for pitch, x of the turned platform for roll.
func (r *Refiner) legSlope(g *[6]float64) {
	v := r.v
	row := (*[6]float64)(v.S.J[6*r.leg : 6*r.leg+6])
	rot := &r.here.Pose.R
	sy, cy := math.Sincos(r.here.Coords[kin.Yaw])
	lc := v.frame.Length
	for k := range r.reg.n {
		var d float64
		switch q := kin.Freedom(r.reg.at[k]); q {
		case kin.Roll:
			d = lc * (row[3]*rot[0] + row[4]*rot[3] + row[5]*rot[6])
		case kin.Pitch:
			d = lc * (row[4]*cy - row[3]*sy)
		case kin.Yaw:
			d = lc * row[5]
		default:
			d = row[q]
		}
		if d *= (r.reg.high[k] - r.reg.low[k]) / 2; !r.most {
			d = -d
		}
		g[k] = d
	}
}

// slopeOf is a difference quotient, 0 where there is none.
func slopeOf(there, here, h float64) float64 {
	if g := (there - here) / h; !math.IsNaN(g) && !math.IsInf(g, 0) {
		return g
	}
	return 0
}

// met tells whether the climb has come near to an end that was found before, from below: it would end there too.
func (r *Refiner) met(u *[6]float64, f float64) bool {
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
