package kin

import "gonum.org/v1/gonum/mat"

// Own gathers the n×n inverse Jacobian in the family's own freedoms from the
// padded rows of a State: out is row-major with stride n.
func Own(freedoms []Freedom, j, out *[36]float64) {
	n := len(freedoms)
	if n == 3 {
		a, b, c := freedoms[0], freedoms[1], freedoms[2]
		out[0], out[1], out[2] = j[a], j[b], j[c]
		out[3], out[4], out[5] = j[6+a], j[6+b], j[6+c]
		out[6], out[7], out[8] = j[12+a], j[12+b], j[12+c]
		return
	}
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
