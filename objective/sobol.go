package objective

import "math/bits"

// Sobol numbers: primitive polynomials and initial direction numbers of
// S. Joe and F. Y. Kuo 2008, Constructing Sobol sequences with better
// two-dimensional projections, SIAM J. Sci. Comput. 30:2635, first seven
// dimensions (from memory, checked against scipy's generator).
var sobolInit = [7]struct {
	degree, poly uint
	m            [4]uint32
}{
	{},
	{1, 0, [4]uint32{1}},
	{2, 1, [4]uint32{1, 3}},
	{3, 1, [4]uint32{1, 3, 1}},
	{3, 2, [4]uint32{1, 1, 1}},
	{4, 1, [4]uint32{1, 1, 3, 3}},
	{4, 4, [4]uint32{1, 3, 5, 13}},
}

// sobol is the unscrambled Sobol sequence in up to 7 dimensions, in Gray-code order.
type sobol struct {
	v [7][32]uint32
	x [7]uint32
	n uint32
}

func newSobol() *sobol {
	s := new(sobol)
	for d := range s.v {
		v := &s.v[d]
		if d == 0 {
			for k := range v {
				v[k] = 1 << (31 - k)
			}
			continue
		}
		in := &sobolInit[d]
		deg := int(in.degree)
		for k := range v {
			if k < deg {
				v[k] = in.m[k] << (31 - k)
				continue
			}
			v[k] = v[k-deg] ^ v[k-deg]>>in.degree
			for j := 1; j < deg; j++ {
				if in.poly>>(deg-1-j)&1 == 1 {
					v[k] ^= v[k-j]
				}
			}
		}
	}
	return s
}

// next puts the next point of the unit cube into u; the first one is the origin.
func (s *sobol) next(u []float64) {
	for d := range u {
		u[d] = float64(s.x[d]) / (1 << 32)
	}
	k := bits.TrailingZeros32(^s.n)
	s.n++
	for d := range s.x {
		s.x[d] ^= s.v[d][k&31]
	}
}
