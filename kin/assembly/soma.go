package assembly

import "legwright/kin"

// complexVec is a vector of three complex components.
type complexVec [3]complex128

func (a complexVec) dot(b complexVec) complex128 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

func (a complexVec) cross(b complexVec) complexVec {
	return complexVec{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
}

func (a complexVec) plus(s complex128, b complexVec) complexVec {
	return complexVec{a[0] + s*b[0], a[1] + s*b[1], a[2] + s*b[2]}
}

func toComplex(v kin.Vec) complexVec {
	return complexVec{complex(v.X, 0), complex(v.Y, 0), complex(v.Z, 0)}
}

// leg holds the parameters of one leg: the difference and the sum of its platform
// joint (platform frame) and its base joint (base frame), and the square of its length.
type leg struct {
	less, sum complexVec
	square    complex128
}

// legs are the parameters of a six-legged platform.
type legs [6]leg

// soma is the forward kinematics of a six-legged platform in the eight
// homogeneous coordinates (e0, e, d0, d) of a displacement (E. Study's; "soma
// coordinates" with C. Wampler 1996, Mechanism and Machine Theory 31:331): the
// quaternion (e0, e) of the platform's rotation R, and the quaternion (d0, d) = p·(e0, e),
// p the platform's origin. A leg from a to p + R b of length l obeys
//
//	|p + R b − a|² |e|² = |d + e b − a e|² = l² |e|²   (quaternion products),
//
// a quadric, and p is a vector if d0 e0 + d·e = 0. The seven quadrics meet in 40
// points besides the three-space e = 0, on which all of them are d0² + d·d = 0.
//
// The parameters move from those of `from` at t = 1 to those of `to` at t = 0 on
// an arc that gamma bends (A. Morgan, A. Sommese 1989, coefficient-parameter continuation).
type soma struct {
	from, to *legs
	gamma    complex128
}

func (s *soma) blocks() []int { return []int{8} }

// share is the part that `from` has in the parameters at t, and its derivative.
func (s *soma) share(t complex128) (tau, rate complex128) {
	inv := inverse(1 + (s.gamma-1)*t)
	return s.gamma * t * inv, s.gamma * inv * inv
}

func (s *soma) at(t complex128, x *point, w *workspace) {
	tau, rate := s.share(t)
	e0, e := x[0], complexVec{x[1], x[2], x[3]}
	d0, d := x[4], complexVec{x[5], x[6], x[7]}
	ee := e0*e0 + e.dot(e)
	for i := range s.from {
		f, g := &s.from[i], &s.to[i]
		var less, sum, lessRate, sumRate complexVec
		for k := range 3 {
			lessRate[k] = f.less[k] - g.less[k]
			sumRate[k] = f.sum[k] - g.sum[k]
			less[k] = g.less[k] + tau*lessRate[k]
			sum[k] = g.sum[k] + tau*sumRate[k]
		}
		squareRate := f.square - g.square
		square := g.square + tau*squareRate

		// u = e b − a e, q = d + u
		u0 := -less.dot(e)
		u := e.cross(sum).plus(e0, less)
		q0, q := d0+u0, d.plus(1, u)
		w.f[i] = d0*u0 + d.dot(u) + 0.5*(u0*u0+u.dot(u)-square*ee)
		qe := sum.cross(q).plus(-q0, less).plus(-square, e)
		w.lu.a[i] = [order]complex128{
			q.dot(less) - square*e0, qe[0], qe[1], qe[2],
			u0, u[0], u[1], u[2],
		}
		ur := e.cross(sumRate).plus(e0, lessRate)
		w.ft[i] = rate * (q.dot(ur) - q0*lessRate.dot(e) - 0.5*squareRate*ee)
	}
	for i := 1; i < 6; i++ {
		w.f[i] -= w.f[0]
		w.ft[i] -= w.ft[0]
		for k := range w.lu.a[i] {
			w.lu.a[i][k] -= w.lu.a[0][k]
		}
	}
	w.f[0] += 0.5 * (d0*d0 + d.dot(d))
	w.lu.a[0][4] += d0
	for k := range 3 {
		w.lu.a[0][5+k] += d[k]
	}
	w.f[6] = e0*d0 + e.dot(d)
	w.ft[6] = 0
	w.lu.a[6] = [order]complex128{d0, d[0], d[1], d[2], e0, e[0], e[1], e[2]}
}
