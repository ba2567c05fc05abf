package assembly

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/mat"
)

// harmonics are the coefficients c₀ … c₃ of a real function c₀ + 2 Re Σ cₖ exp(ikφ).
type harmonics [4]complex128

// expand gives the coefficients of a function of order three, from eight of its values. It is
// zero if none of them stands out of the rounding of its terms.
func expand(function func(float64) (value, size float64)) (f harmonics, zero bool) {
	largest, term := 0.0, 0.0
	for s := range 8 {
		phi := float64(s) * math.Pi / 4
		v, size := function(phi)
		largest, term = math.Max(largest, math.Abs(v)), math.Max(term, size)
		for i := range f {
			f[i] += complex(v/8, 0) * cmplx.Rect(1, -float64(i)*phi)
		}
	}
	return f, !(largest > zeroFunction*math.Max(term, zeroFunction))
}

// at is the value at an angle.
func (f *harmonics) at(phi float64) float64 {
	v := real(f[0])
	for i := 1; i < 4; i++ {
		v += 2 * real(f[i]*cmplx.Rect(1, float64(i)*phi))
	}
	return v
}

// polynomial gives the coefficients, the constant first, of f·(1+t²)ⁿ in t = tan(φ/2), n being
// the order of f: exp(iφ) = (1+it)/(1−it).
func (f *harmonics) polynomial(order int) []float64 {
	c := make([]float64, 2*order+1)
	for i := range order + 1 {
		p := [7]complex128{1}
		for j := range 2 * order {
			s := 1i
			if j >= order+i {
				s = -1i
			}
			for d := j + 1; d > 0; d-- {
				p[d] += s * p[d-1]
			}
		}
		weight := f[i]
		if i > 0 {
			weight *= 2
		}
		for d := range c {
			c[d] += real(weight * p[d])
		}
	}
	return c
}

// roots are the complex angles at which f, of the order given, vanishes.
func (f *harmonics) roots(order int) (angles []complex128, ok bool) {
	// The angle at which |f| is the largest becomes π, t infinite.
	turn, most := 0.0, 0.0
	for s := range 24 {
		phi := float64(s) * math.Pi / 12
		if v := math.Abs(f.at(phi)); v > most {
			turn, most = phi-math.Pi, v
		}
	}
	g := *f
	for i := range g {
		g[i] *= cmplx.Rect(1, float64(i)*turn)
	}
	c := g.polynomial(order)
	n := 2 * order
	companion := mat.NewDense(n, n, nil)
	for i := range n {
		companion.Set(0, i, -c[n-1-i]/c[n])
		if i > 0 {
			companion.Set(i, i-1, 1)
		}
	}
	var eig mat.Eigen
	if !eig.Factorize(companion, mat.EigenNone) {
		return nil, false
	}
	angles = eig.Values(nil)
	for i, t := range angles {
		angles[i] = 2*cmplx.Atan(t) + complex(turn, 0)
	}
	return angles, true
}
