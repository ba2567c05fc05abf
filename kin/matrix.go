package kin

import "gonum.org/v1/gonum/mat"

// Own gathers the n×n inverse Jacobian in the family's own freedoms from the
// padded rows of a State: out is row-major with stride n.
func Own(freedoms []Freedom, j, out *[36]float64) {
	n := len(freedoms)
	for i := range n {
		for k, f := range freedoms {
			out[n*i+k] = j[6*i+int(f)]
		}
	}
}

// Determinant is that of the family's own inverse Jacobian with rotations in
// radians (not divided by the characteristic length).
func Determinant(m Machine, s *State) float64 {
	f := m.Frame()
	n := len(f.Freedoms)
	var own [36]float64
	Own(f.Freedoms, &s.J, &own)
	det := mat.Det(mat.NewDense(n, n, own[:n*n]))
	for _, q := range f.Freedoms {
		if q.Angular() {
			det *= f.Length
		}
	}
	return det
}
