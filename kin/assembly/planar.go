package assembly

import (
	"math"
	"math/cmplx"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// The rules by which the roots of a planar platform's equation are judged; headings in radians, lengths over the machine's size.
const (
	realHeading  = 1e-4  // imaginary part of a heading that may be real: the corrector decides
	sameHeading  = 2e-4  // difference of two headings that may be one
	farHeading   = 12    // imaginary part of a heading at infinity, exp(iφ) being 0 or infinite
	similarity   = 1e-10 // difference of triangles that are similar
	zeroFunction = 1e-13 // largest value over the largest term of a function that vanishes
)

// ThreePlanar finds all assembly modes of a planar platform on three rods, six at
// most. Base holds the rods' ends away from the platform, in the base frame: the
// base joints of a 3-RPR, the crank ends of a 3-RRR. Platform holds their ends on the
// platform, in the platform frame. Lengths are positive.
//
// The method is C. Gosselin and J. Sefrioui's (1991, Fifth Int. Conf. Advanced Robotics; from
// memory): the rods' three circles leave two equations linear in the position, and so
// one in the heading φ alone, of degree six in tan(φ/2): see PlanarPolynomial. Its
// roots are the eigenvalues of the companion matrix, the heading counted from where no root is near
// φ = π; real ones are corrected by Newton's method on the lengths.
//
// Roots that coincide are Singular, unless as many postures belong to them. So are all if the
// equation vanishes, and those of a heading at which the platform may translate along a
// circle (congruent triangles, equal parallel rods): of such a curve no point is given.
// Similar triangles, as most designs have them, have two solutions at infinity.
//
// The determinant is that of the rows [n, ((R b)×n)z], n along the rod from base to platform. The
// cost is some 0.15 ms.
func ThreePlanar(base, platform [3][2]float64, length [3]float64) Result {
	out := Result{Paths: 6, Lost: 6}
	h := newTriangle(&base, &platform, &length)
	if !(h.size > 0) || math.IsInf(h.size, 0) {
		return out
	}
	f, order := h.equation()
	if order == 0 {
		out.Singular, out.Lost = 6, 0
		return out
	}
	headings, ok := f.roots(order)
	if !ok {
		return out
	}
	out.Infinite, out.Lost = 6-2*order, 0
	done := make([]bool, len(headings))
	for i, c := range headings {
		if done[i] {
			continue
		}
		if !(math.Abs(imag(c)) < farHeading) {
			out.Infinite++
			continue
		}
		group, before, curve := 0, len(out.Modes), false
		for j, d := range headings[i:] {
			if turn := math.Remainder(real(d-c), 2*math.Pi); math.Hypot(turn, imag(d-c)) < sameHeading {
				group++
				done[i+j] = true
				if math.Abs(imag(d)) < realHeading && !curve {
					out.Modes, curve = h.merge(out.Modes, real(d))
				}
			}
		}
		if n := len(out.Modes) - before; curve || n > 0 && n < group {
			out.Singular += group
		} else {
			out.Complex += group
		}
	}
	sortModes(out.Modes, h.size)
	return out
}

// PlanarPolynomial gives the coefficients, the constant first, of the polynomial whose roots are t = tan(φ/2)
// of the headings φ of a planar platform on three rods (see ThreePlanar). Where a
// solution has φ = π the last coefficient is zero.
func PlanarPolynomial(base, platform [3][2]float64, length [3]float64) [7]float64 {
	h := newTriangle(&base, &platform, &length)
	f, _ := expand(h.general)
	c := f.polynomial(3)
	return [7]float64(c)
}

// triangle is a planar platform on three rods. Vectors are complex numbers.
type triangle struct {
	base, platform [3]complex128
	length         [3]float64
	size           float64
}

func newTriangle(base, platform *[3][2]float64, length *[3]float64) *triangle {
	h := &triangle{length: *length}
	for i := range 3 {
		h.base[i] = complex(base[i][0], base[i][1])
		h.platform[i] = complex(platform[i][0], platform[i][1])
		h.size = math.Max(h.size, length[i])
		for k := range i {
			h.size = math.Max(h.size, math.Max(cmplx.Abs(h.base[i]-h.base[k]), cmplx.Abs(h.platform[i]-h.platform[k])))
		}
	}
	if math.IsNaN(real(h.base[0] + h.base[1] + h.base[2] + h.platform[0] + h.platform[1] + h.platform[2])) {
		h.size = math.NaN()
	}
	return h
}

// cross is the z component of a×b.
func cross(a, b complex128) float64 { return imag(conj(a) * b) }

// lines gives at a heading the vectors w and numbers k of the equations 2 p·w = k,
// over the size, for p from the first base joint to the first platform joint:
// |p + w|² = l² of legs 2 and 3, less |p|² = l² of leg 1.
func (h *triangle) lines(heading float64) (w [2]complex128, k [2]float64) {
	turn := cmplx.Rect(1/h.size, heading)
	l0 := h.length[0] / h.size
	for i := range w {
		l := h.length[i+1] / h.size
		w[i] = turn*(h.platform[i+1]-h.platform[0]) - (h.base[i+1]-h.base[0])/complex(h.size, 0)
		k[i] = l*l - l0*l0 - size2(w[i])
	}
	return w, k
}

// general is |k₁w₂ − k₂w₁|² − 4 l² (w₁×w₂)² at a heading, which vanishes where both lines
// meet on the first leg's circle: a trigonometric polynomial of order three. The second
// number is the sum of its terms' sizes.
func (h *triangle) general(heading float64) (value, size float64) {
	w, k := h.lines(heading)
	d := 2 * h.length[0] / h.size * cross(w[0], w[1])
	n := size2(complex(k[0], 0)*w[1] - complex(k[1], 0)*w[0])
	return n - d*d, n + d*d
}

// similar is general without the factor that similar triangles give it, the square
// of the w's common factor, which has no real root or, if they are congruent, a
// double one that is no solution: of order two.
func (h *triangle) similar(heading float64) (value, size float64) {
	w, k := h.lines(heading)
	b1, b2 := (h.platform[1]-h.platform[0])/complex(h.size, 0), (h.platform[2]-h.platform[0])/complex(h.size, 0)
	d := 2 * h.length[0] / h.size * cross(b1, b2)
	n := size2(complex(k[0], 0)*b2 - complex(k[1], 0)*b1)
	f := (size2(w[0]) + size2(w[1])) / (size2(b1) + size2(b2))
	return n - f*d*d, n + f*d*d
}

// equation is the function of the heading that vanishes at the solutions, and its order; 0 if it is zero everywhere.
func (h *triangle) equation() (f harmonics, order int) {
	a1, a2 := h.base[1]-h.base[0], h.base[2]-h.base[0]
	b1, b2 := h.platform[1]-h.platform[0], h.platform[2]-h.platform[0]
	function := h.general
	if cmplx.Abs(a1*b2-a2*b1) < similarity*h.size*h.size && (b1 != 0 || b2 != 0) {
		function = h.similar
	}
	f, zero := expand(function)
	if zero {
		return f, 0
	}
	most := 0.0
	for _, c := range f {
		most = math.Max(most, cmplx.Abs(c))
	}
	for order = 3; order > 0 && cmplx.Abs(f[order]) < zeroFunction*most; order-- {
	}
	return f, order
}

// merge adds the postures near the heading to the modes that are known: the corrector
// starts from both points that the first leg's circle and one line have in common.
// It tells whether there is a circle of postures instead.
func (h *triangle) merge(modes []Mode, heading float64) (_ []Mode, curve bool) {
	w, k := h.lines(heading)
	i := 0
	if size2(w[1]) > size2(w[0]) {
		i = 1
	}
	l, s := h.length[0]/h.size, cmplx.Abs(w[i])
	if s < sameHeading && math.Abs(k[0])+math.Abs(k[1]) < sameHeading*sameHeading {
		return modes, true
	}
	n := w[i] / complex(s, 0)
	along := k[i] / (2 * s)
	across := math.Sqrt(math.Max(0, (l-along)*(l+along)))
	for _, side := range [2]float64{-1, 1} {
		p := n*complex(along, side*across)*complex(h.size, 0) + h.base[0] - cmplx.Rect(1, heading)*h.platform[0]
		m, ok := h.correct(p, heading)
		if ok {
			modes = include(modes, m, h.size)
		}
	}
	return modes, false
}

// correct improves a placement by Newton's method on the three lengths until its
// residual falls no more, and tells whether it is then a solution near the heading.
func (h *triangle) correct(p complex128, heading float64) (Mode, bool) {
	var (
		best = Mode{Residual: math.Inf(1)}
		phi  = heading
		at   = phi
		jac  = mat.NewDense(3, 3, nil)
		diff = mat.NewVecDense(3, nil)
		step = mat.NewVecDense(3, nil)
	)
	for range correctSteps {
		turn := cmplx.Rect(1, phi)
		worst := 0.0
		for i := range 3 {
			r := turn * h.platform[i]
			s := p + r - h.base[i]
			l := cmplx.Abs(s)
			n := s / complex(l, 0)
			jac.SetRow(i, []float64{real(n), imag(n), cross(r, n)})
			diff.SetVec(i, h.length[i]-l)
			worst = math.Max(worst, math.Abs(h.length[i]-l))
		}
		if !(worst < best.Residual) || worst > nearby*h.size {
			break
		}
		at = phi
		best = Mode{Origin: kin.Vec{X: real(p), Y: imag(p)}, Rot: kin.RPY(0, 0, phi), Residual: worst, Determinant: mat.Det(jac)}
		if !solved(step, jac, diff) {
			break
		}
		p += complex(step.AtVec(0), step.AtVec(1))
		phi += step.AtVec(2)
	}
	return best, best.Residual <= accepted*h.size && math.Abs(at-heading) < nearby
}
