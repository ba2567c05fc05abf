package proof

import "math"

// rests holds, for each leg, what the efforts of the linearised inverse leave out.
//
// With a matrix J of the family and w the wrench in the platform's own freedoms, the efforts are f = J⁻ᵀw. Let C be the
// centre, x_i column i of its inverse, E the linear part of J - C and P the rest, |P| ≤ r. Then exactly
//
//	f_i = w·(x_i - y) + fᴸᵀE y - fᵀP J_L⁻¹e_i,   y = C⁻¹E x_i,   J_L = C + E,   fᴸ = J_L⁻ᵀw,
//
// where |J_L⁻¹e_i - x_i| ≤ |y| + τ|y|/(1-τ), τ ≥ |C⁻¹E|. So |f_i - w·(x_i - y)| ≤ Σ_l F_l k_li, F_l being the largest
// |f_l| over the box and k known; as F_i ≤ M_i + Σ_l F_l k_li with M_i the largest |w·(x_i - y)|, F ≤ max M/(1 - max Σ_l k_li),
// and each further pass F ← M + kᵀF is a bound again.
type rests struct {
	k       matrix     // k_li in row l, column i
	far     matrix     // bounds of |J_L⁻¹|
	x       [6][6]line // x[i]: column i of the inverse, own freedoms, linear but for rounding
	largest float64    // max_i Σ_l k_li
}

// take works out the rests of the family whose centre is inverted in v. It reports false where the box is too large
// for any bound.
func (z *rests) take(m *family, v *inverse) bool {
	n := m.n
	tau := v.bound.norm() * (1 + slack)
	if !(tau < 0.9) || !(v.whole.norm() < 0.95) {
		return false
	}
	// What rounding does to x and y, and how far x is from C⁻¹: as if E were that much larger.
	var off, inv [6]float64
	for i := range n {
		s := 0.0
		for j := range n {
			s += v.x[6*j+i] * v.x[6*j+i]
		}
		inv[i] = math.Sqrt(s)
		off[i] = v.off * inv[i]
	}
	var span, y matrix // bounds of |E| and |y|
	for k := range m.d {
		var s matrix
		s.mul(&v.a[k], &v.x)
		for i := range n {
			for j := range n {
				at := 6*j + i
				z.x[i][j].g[k] = -s[at]
				y[at] += math.Abs(s[at])
				span[at] += math.Abs(m.g[k][at])
			}
		}
	}
	for i := range n {
		norm := 0.0
		for j := range n {
			at := 6*j + i
			l := &z.x[i][j]
			for k := m.d; k < 6; k++ {
				l.g[k] = 0
			}
			l.c, l.w, l.r = v.x[at], y[at]*(1+slack), off[i]
			y[at] += off[i]
			norm += y[at] * y[at]
			span[at] += 2 * m.size * v.off
		}
		norm = math.Sqrt(norm) * tau / (1 - tau)
		for j := range n {
			at := 6*j + i
			z.far[at] = math.Abs(v.x[at]) + y[at] + norm
		}
	}
	z.largest = 0
	for i := range n {
		sum := 0.0
		for l := range n {
			k := 0.0
			for b := range n {
				k += span[6*l+b]*y[6*b+i] + m.r[6*l+b]*z.far[6*b+i]
			}
			k *= 1 + slack
			z.k[6*l+i] = k
			sum += k
		}
		z.largest = max(z.largest, sum)
	}
	return z.largest < 0.9
}

// most turns bounds of |w·(x_i - y)| into bounds of what the efforts add to that.
func (z *rests) most(n int, m *[6]float64) (rest [6]float64) {
	f := [6]float64{}
	top := 0.0
	for i := range n {
		top = max(top, m[i])
	}
	for i := range n {
		f[i] = top / (1 - z.largest) * (1 + slack)
	}
	for range 3 {
		for i := range n {
			sum := 0.0
			for l := range n {
				sum += f[l] * z.k[6*l+i]
			}
			rest[i] = sum * (1 + slack)
		}
		for i := range n {
			f[i] = min(f[i], m[i]+rest[i])
		}
	}
	return rest
}
