package linalg

import (
	"math"
	"math/rand/v2"
)

// legPose is the placement of a six-leg platform, height above the base.
type legPose struct{ x, y, z, roll, pitch, yaw float64 }

// sixLegs builds the rows [n, (r × n)/c] of a platform carried by six legs
// between paired joints on two circles: the kind of matrix the package is for.
type sixLegs struct {
	base, platform [6][3]float64
	length         float64 // characteristic length c
}

func newSixLegs(rng *rand.Rand) *sixLegs {
	deg := math.Pi / 180
	ra, rb := 0.4+0.6*rng.Float64(), 0.2+0.5*rng.Float64()
	alpha, beta := (4+28*rng.Float64())*deg, (4+28*rng.Float64())*deg
	l := &sixLegs{length: 0.15 + 0.5*rng.Float64()}
	for i := range 6 {
		third := float64((i+1)/2) * 120 * deg
		side := float64(1 - 2*(i%2))
		a := third + side*alpha
		b := float64(i/2)*120*deg + 60*deg - side*beta
		l.base[i] = [3]float64{ra * math.Cos(a), ra * math.Sin(a), 0}
		l.platform[i] = [3]float64{rb * math.Cos(b), rb * math.Sin(b), 0}
	}
	return l
}

// randomPose stays within size times 0.1 m and 10 degrees of a height of 0.8 m.
func randomPose(rng *rand.Rand, size float64) legPose {
	u := func(r float64) float64 { return size * r * (2*rng.Float64() - 1) }
	deg := math.Pi / 180
	return legPose{u(0.1), u(0.1), 0.8 + u(0.1), u(10 * deg), u(10 * deg), u(10 * deg)}
}

func (l *sixLegs) matrix(p legPose) (j [36]float64) {
	sr, cr := math.Sincos(p.roll)
	sp, cp := math.Sincos(p.pitch)
	sy, cy := math.Sincos(p.yaw)
	r := [3][3]float64{
		{cy * cp, cy*sp*sr - sy*cr, cy*sp*cr + sy*sr},
		{sy * cp, sy*sp*sr + cy*cr, sy*sp*cr - cy*sr},
		{-sp, cp * sr, cp * cr},
	}
	at := [3]float64{p.x, p.y, p.z}
	for i := range 6 {
		var u, n [3]float64
		sq := 0.0
		for k := range 3 {
			for m := range 3 {
				u[k] += r[k][m] * l.platform[i][m]
			}
			n[k] = at[k] + u[k] - l.base[i][k]
			sq += n[k] * n[k]
		}
		for k := range 3 {
			n[k] /= math.Sqrt(sq)
			j[6*i+k] = n[k]
		}
		j[6*i+3] = (u[1]*n[2] - u[2]*n[1]) / l.length
		j[6*i+4] = (u[2]*n[0] - u[0]*n[2]) / l.length
		j[6*i+5] = (u[0]*n[1] - u[1]*n[0]) / l.length
	}
	return j
}

// legMatrices returns poses of random machines; the same list each time.
func legMatrices(machines, poses int, size float64) [][36]float64 {
	rng := rand.New(rand.NewPCG(7, 11))
	var out [][36]float64
	for range machines {
		l := newSixLegs(rng)
		for range poses {
			out = append(out, l.matrix(randomPose(rng, size)))
		}
	}
	return out
}

// rowDot returns the scalar product of rows p and q of w.
func rowDot(n int, w *[36]float64, p, q int) float64 {
	sum := 0.0
	for k := range n {
		sum += w[n*p+k] * w[n*q+k]
	}
	return sum
}

// orthogonal returns a random orthogonal matrix of order n, by Gram-Schmidt
// done twice.
func orthogonal(rng *rand.Rand, n int) (q [36]float64) {
	for i := range n {
		for k := range n {
			q[n*i+k] = rng.NormFloat64()
		}
		for range 2 {
			for m := range i {
				s := rowDot(n, &q, i, m)
				for k := range n {
					q[n*i+k] -= s * q[n*m+k]
				}
			}
		}
		s := math.Sqrt(rowDot(n, &q, i, i))
		for k := range n {
			q[n*i+k] /= s
		}
	}
	return q
}

// withSingularValues returns U diag(s) V with random orthogonal U, V.
func withSingularValues(rng *rand.Rand, n int, s [6]float64) (a [36]float64) {
	u, v := orthogonal(rng, n), orthogonal(rng, n)
	for i := range n {
		for k := range n {
			for m := range n {
				a[n*i+k] += u[n*i+m] * s[m] * v[n*m+k]
			}
		}
	}
	return a
}

// withKappa returns a random matrix of order n and condition number kappa, its
// singular values spread evenly in the logarithm.
func withKappa(rng *rand.Rand, n int, kappa float64) [36]float64 {
	s := [6]float64{1}
	for k := 1; k < n; k++ {
		s[k] = math.Pow(kappa, -rng.Float64())
	}
	if n > 1 {
		s[n-1] = 1 / kappa
	}
	return withSingularValues(rng, n, s)
}
