package assembly

import (
	"math/cmplx"
	"math/rand/v2"
)

// circlePaths is the number of solutions of circles' general equations: bidegree (2, 2) in pairs of three unknowns.
const circlePaths = 16

// forms are three real or complex bilinear forms, in the vectors m₀ and m₁, m₁ and m₂, m₂ and m₀
// of three points on circles: mᵢ = (x²+y², x²−y², 2xy) at the point with (1, cos θ, sin θ) in its ratio,
// y/x = tan(θ/2).
type forms [3][3][3]complex128

// circles are the equations that forms vanish, in the homogeneous unknowns (x₀, y₀), (x₁, y₁),
// (x₂, y₂). The forms move on a straight line from those of `from`, times gamma, at t = 1 to those of `to` at t = 0.
type circles struct {
	from, to *forms
	gamma    complex128
}

func (s *circles) blocks() []int { return []int{2, 4, 6} }

func (s *circles) at(t complex128, x *point, w *workspace) {
	var m, mx, my [3][3]complex128
	for i := range 3 {
		p, q := x[2*i], x[2*i+1]
		m[i] = [3]complex128{p*p + q*q, p*p - q*q, 2 * p * q}
		mx[i] = [3]complex128{2 * p, 2 * p, 2 * q}
		my[i] = [3]complex128{2 * q, -2 * q, 2 * p}
	}
	for k := range 3 {
		i, j := k, (k+1)%3
		var value, rate, dxi, dyi, dxj, dyj complex128
		for a := range 3 {
			var row, ratesRow complex128 // the form times m of j
			for b := range 3 {
				f := s.gamma * s.from[k][a][b]
				g := s.to[k][a][b]
				c := g + t*(f-g)
				row += c * m[j][b]
				ratesRow += (f - g) * m[j][b]
				dxj += m[i][a] * c * mx[j][b]
				dyj += m[i][a] * c * my[j][b]
			}
			value += m[i][a] * row
			rate += m[i][a] * ratesRow
			dxi += mx[i][a] * row
			dyi += my[i][a] * row
		}
		w.f[k], w.ft[k] = value, rate
		w.lu.a[k] = [order]complex128{}
		w.lu.a[k][2*i], w.lu.a[k][2*i+1] = dxi, dyi
		w.lu.a[k][2*j], w.lu.a[k][2*j+1] = dxj, dyj
	}
}

// startCircles are forms that are products of two random ones, one for each of their
// two points, and the 16 solutions: each form vanishes by another point, which it
// leaves two places.
func startCircles(rng *rand.Rand) (*forms, []end) {
	var factor [3][2][3]complex128 // of form k, in its first and in its second point
	out := new(forms)
	for k := range factor {
		for side := range 2 {
			for a := range 3 {
				factor[k][side][a] = complex(rng.NormFloat64(), rng.NormFloat64())
			}
		}
		for a := range 3 {
			for b := range 3 {
				out[k][a][b] = factor[k][0][a] * factor[k][1][b]
			}
		}
	}
	var ends []end
	for side := range 2 {
		for choice := range 8 {
			var e end
			e.outcome = regular
			for k := range 3 {
				// f·m = (f₀+f₁) x² + 2 f₂ x y + (f₀−f₁) y² with x = 1
				f := factor[k][side]
				root := cmplx.Sqrt(f[2]*f[2] - (f[0]+f[1])*(f[0]-f[1]))
				if choice>>k&1 == 1 {
					root = -root
				}
				i := (k + side) % 3
				e.x[2*i], e.x[2*i+1] = 1, (root-f[2])/(f[0]-f[1])
			}
			ends = append(ends, e)
		}
	}
	return out, ends
}
