// Package known holds published multi-objective test problems whose Pareto
// fronts are known, to check searches by.
//
// ZDT: Zitzler, Deb, Thiele, Evol. Comput. 8 (2000) 173-195. DTLZ: Deb,
// Thiele, Laumanns, Zitzler, CEC 2002. UF: Zhang et al., CEC 2009 contest.
// Definitions from memory, checked against values in the tests.
package known

import "math"

// Problem is a box-bounded problem with goals to be minimised.
type Problem struct {
	Name      string
	Low, High []float64 // one per variable
	Goals     int
	Evaluate  func(x, goals []float64) // safe for concurrent use
}

// All returns every problem in its usual size.
func All() []Problem {
	return []Problem{
		ZDT1(30), ZDT2(30), ZDT3(30), ZDT4(10), ZDT6(10), UF1(30),
		DTLZ1(3, 5), DTLZ2(3, 10), DTLZ7(3, 20),
	}
}

// fill returns n equal numbers.
func fill(n int, v float64) []float64 {
	x := make([]float64, n)
	for i := range x {
		x[i] = v
	}
	return x
}

func sum(x []float64) float64 {
	s := 0.0
	for _, v := range x {
		s += v
	}
	return s
}

// linear is the distance function of ZDT1 to 3: 1 on the front.
func linear(x []float64) float64 { return 1 + 9*sum(x[1:])/float64(len(x)-1) }

// ZDT1 has n variables and the convex front f2 = 1 - sqrt(f1).
func ZDT1(n int) Problem {
	return Problem{"ZDT1", fill(n, 0), fill(n, 1), 2, func(x, f []float64) {
		g := linear(x)
		f[0], f[1] = x[0], g*(1-math.Sqrt(x[0]/g))
	}}
}

// ZDT2 has n variables and the concave front f2 = 1 - f1^2.
func ZDT2(n int) Problem {
	return Problem{"ZDT2", fill(n, 0), fill(n, 1), 2, func(x, f []float64) {
		g := linear(x)
		f[0], f[1] = x[0], g*(1-(x[0]/g)*(x[0]/g))
	}}
}

// ZDT3 has n variables and a front of five pieces.
func ZDT3(n int) Problem {
	return Problem{"ZDT3", fill(n, 0), fill(n, 1), 2, func(x, f []float64) {
		g := linear(x)
		r := x[0] / g
		f[0], f[1] = x[0], g*(1-math.Sqrt(r)-r*math.Sin(10*math.Pi*x[0]))
	}}
}

// ZDT4 has n variables, the front of ZDT1 and 21^(n-1) local fronts.
func ZDT4(n int) Problem {
	low, high := fill(n, -5), fill(n, 5)
	low[0], high[0] = 0, 1
	return Problem{"ZDT4", low, high, 2, func(x, f []float64) {
		g := 1 + 10*float64(n-1)
		for _, v := range x[1:] {
			g += v*v - 10*math.Cos(4*math.Pi*v)
		}
		f[0], f[1] = x[0], g*(1-math.Sqrt(x[0]/g))
	}}
}

// ZDT6 has n variables and a concave front whose designs are unevenly dense.
func ZDT6(n int) Problem {
	return Problem{"ZDT6", fill(n, 0), fill(n, 1), 2, func(x, f []float64) {
		g := 1 + 9*math.Pow(sum(x[1:])/float64(n-1), 0.25)
		f[0] = 1 - math.Exp(-4*x[0])*math.Pow(math.Sin(6*math.Pi*x[0]), 6)
		f[1] = g * (1 - (f[0]/g)*(f[0]/g))
	}}
}

// UF1 has n linked variables and the front of ZDT1.
func UF1(n int) Problem {
	low, high := fill(n, -1), fill(n, 1)
	low[0] = 0
	return Problem{"UF1", low, high, 2, func(x, f []float64) {
		var s, c [2]float64
		for j := 2; j <= n; j++ {
			y := x[j-1] - math.Sin(6*math.Pi*x[0]+float64(j)*math.Pi/float64(n))
			s[j%2] += y * y
			c[j%2]++
		}
		f[0] = x[0] + 2*s[1]/c[1]
		f[1] = 1 - math.Sqrt(x[0]) + 2*s[0]/c[0]
	}}
}

// DTLZ1 has m goals, m-1+k variables and the flat front sum f = 0.5 behind
// 11^k - 1 local ones.
func DTLZ1(m, k int) Problem {
	n := m - 1 + k
	return Problem{"DTLZ1", fill(n, 0), fill(n, 1), m, func(x, f []float64) {
		g := float64(k)
		for _, v := range x[m-1:] {
			g += (v-0.5)*(v-0.5) - math.Cos(20*math.Pi*(v-0.5))
		}
		g *= 100
		for i := range f {
			f[i] = 0.5 * (1 + g)
			for j := range m - 1 - i {
				f[i] *= x[j]
			}
			if i > 0 {
				f[i] *= 1 - x[m-1-i]
			}
		}
	}}
}

// DTLZ2 has m goals, m-1+k variables and the unit sphere as front.
func DTLZ2(m, k int) Problem {
	n := m - 1 + k
	return Problem{"DTLZ2", fill(n, 0), fill(n, 1), m, func(x, f []float64) {
		g := 0.0
		for _, v := range x[m-1:] {
			g += (v - 0.5) * (v - 0.5)
		}
		for i := range f {
			f[i] = 1 + g
			for j := range m - 1 - i {
				f[i] *= math.Cos(x[j] * math.Pi / 2)
			}
			if i > 0 {
				f[i] *= math.Sin(x[m-1-i] * math.Pi / 2)
			}
		}
	}}
}

// DTLZ7 has m goals, m-1+k variables and a front of 2^(m-1) pieces.
func DTLZ7(m, k int) Problem {
	n := m - 1 + k
	return Problem{"DTLZ7", fill(n, 0), fill(n, 1), m, func(x, f []float64) {
		g := 1 + 9*sum(x[m-1:])/float64(k)
		h := float64(m)
		for i := range m - 1 {
			f[i] = x[i]
			h -= f[i] / (1 + g) * (1 + math.Sin(3*math.Pi*f[i]))
		}
		f[m-1] = (1 + g) * h
	}}
}
