package proof

import (
	"math/big"

	"legwright/kin"
	"legwright/kin/enclose"
)

// certifier finds the sign of the determinant of the inverse Jacobian at single poses beyond doubt.
type certifier struct {
	*subject
	e   kin.Enclosure
	j   family
	inv inverse
}

func newCertifier(s *subject) *certifier { return &certifier{subject: s} }

// sign is the sign at the pose, 0 where it is in doubt. The enclosure of the one pose holds the matrix; if no matrix in
// it is singular, all have the sign of its centre, whose determinant is worked out without rounding.
func (z *certifier) sign(c kin.Coords) int {
	z.machine.Enclose(&enclose.Box{Low: c, High: c}, &z.e)
	if z.e.Reach == kin.NoReach || !z.j.take(&z.e.J, z.legs, z.own, nil) || !z.inv.take(&z.j) || !(z.inv.regular(&z.j) > 0) {
		return 0
	}
	return determinant(z.j.n, &z.j.c)
}

// determinant is the sign of the determinant of a, of order n, exactly.
func determinant(n int, a *matrix) int {
	m := make([][]*big.Rat, n)
	for i := range m {
		m[i] = make([]*big.Rat, n)
		for j := range m[i] {
			if m[i][j] = new(big.Rat).SetFloat64(a[6*i+j]); m[i][j] == nil {
				return 0
			}
		}
	}
	sign := 1
	for k := range n {
		p := k
		for p < n && m[p][k].Sign() == 0 {
			p++
		}
		if p == n {
			return 0
		}
		if p != k {
			m[p], m[k] = m[k], m[p]
			sign = -sign
		}
		sign *= m[k][k].Sign()
		for i := k + 1; i < n; i++ {
			f := new(big.Rat).Quo(m[i][k], m[k][k])
			for j := k; j < n; j++ {
				m[i][j].Sub(m[i][j], new(big.Rat).Mul(f, m[k][j]))
			}
		}
	}
	return sign
}
