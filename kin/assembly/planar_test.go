package assembly

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// B1 (Innocenti and Parenti-Castelli 1992, modes recomputed at 40 digits): six
// postures, and the polynomial in tan(φ/2).
func TestSixPlanarPostures(t *testing.T) {
	var b1 struct {
		Base       map[string][2]float64
		Platform   [3][2]float64 `json:"platform_points_moving_frame"`
		Lengths    [3]float64    `json:"leg_lengths"`
		Univariate struct {
			C []float64 `json:"monic_coeffs_degree6_to_0"`
		}
	}
	readJSON(t, "B1_3rpr6.json", &b1)
	base := [3][2]float64{b1.Base["A1"], b1.Base["A2"], b1.Base["A3"]}
	c := PlanarPolynomial(base, b1.Platform, b1.Lengths)
	for i, want := range b1.Univariate.C {
		if got := c[6-i] / c[6]; !(math.Abs(got-want) < 1e-9) {
			t.Errorf("coefficient of t^%d is %.12g, want %.12g", 6-i, got, want)
		}
	}
	got := ThreePlanar(base, b1.Platform, b1.Lengths)
	if len(got.Modes) != 6 || got.Complex != 6 || got.Singular != 0 || got.Lost != 0 {
		t.Errorf("%d modes, %d simple solutions, want 6", len(got.Modes), got.Complex)
	}
	rows, col := readTable(t, "B1_3rpr6_modes.csv")
	for _, row := range rows {
		want := Mode{Origin: kin.Vec{X: row[col["x"]], Y: row[col["y"]]}, Rot: kin.RPY(0, 0, row[col["phi_rad"]])}
		k, far := nearest(got.Modes, &want)
		if !(far < 1e-10) {
			t.Errorf("posture at %g is missed by %g", row[col["phi_rad"]], far)
			continue
		}
		// Printed to 10 digits.
		if d := got.Modes[k].Determinant; !(math.Abs(d-row[col["detJ"]]) < 1e-8) {
			t.Errorf("determinant %.12g, want %.12g", d, row[col["detJ"]])
		}
	}
}

// E1 (computed with scipy, phc finds 6 complex and 2 real): a 3-RRR with its cranks held.
func TestThreeRRRForward(t *testing.T) {
	theta := [3]float64{1.5559264321177615, -2.4308070393690864, -0.33895071115056297}
	var ends, platform [3][2]float64
	for i, az := range [3]float64{210, 330, 90} {
		sin, cos := math.Sincos(az * math.Pi / 180)
		s, c := math.Sincos(theta[i])
		ends[i] = [2]float64{0.5*cos + 0.35*c, 0.5*sin + 0.35*s}
		platform[i] = [2]float64{0.2 * cos, 0.2 * sin}
	}
	got := ThreePlanar(ends, platform, [3]float64{0.4, 0.4, 0.4})
	if len(got.Modes) != 2 || got.Complex != 6 {
		t.Fatalf("%d modes of %d, want 2 of 6", len(got.Modes), got.Complex)
	}
	for _, w := range [2][3]float64{{0.046870694688, 0.009392792524, -1.655211629221}, {0.03, -0.02, 0.209439510239}} {
		want := Mode{Origin: kin.Vec{X: w[0], Y: w[1]}, Rot: kin.RPY(0, 0, w[2])}
		if _, far := nearest(got.Modes, &want); !(far < 2e-12) { // printed to 12 decimals
			t.Errorf("posture %v is missed by %g", w, far)
		}
	}
}

// planarMultistart finds postures by Newton's method from random starts.
func planarMultistart(rng *rand.Rand, base, platform [3][2]float64, length [3]float64, starts int) []Mode {
	var out []Mode
	for range starts {
		x := []float64{uniform(rng, -2, 2), uniform(rng, -2, 2), uniform(rng, -math.Pi, math.Pi)}
		res := math.Inf(1)
		for range 50 {
			jac, f := mat.NewDense(3, 3, nil), mat.NewVecDense(3, nil)
			s, c := math.Sincos(x[2])
			for i := range 3 {
				bx, by := platform[i][0], platform[i][1]
				dx, dy := x[0]+c*bx-s*by-base[i][0], x[1]+s*bx+c*by-base[i][1]
				f.SetVec(i, length[i]*length[i]-dx*dx-dy*dy)
				jac.SetRow(i, []float64{2 * dx, 2 * dy, 2*dx*(-s*bx-c*by) + 2*dy*(c*bx-s*by)})
			}
			res = mat.Norm(f, math.Inf(1))
			step := mat.NewVecDense(3, nil)
			if res < 1e-14 || step.SolveVec(jac, f) != nil {
				break
			}
			for k := range x {
				x[k] += step.AtVec(k)
			}
		}
		if res < 1e-13 {
			out = append(out, Mode{Origin: kin.Vec{X: x[0], Y: x[1]}, Rot: kin.RPY(0, 0, x[2])})
		}
	}
	return out
}

// planarLengths are those of the rods at a placement.
func planarLengths(base, platform [3][2]float64, p complex128, phi float64) (l [3]float64) {
	for i := range l {
		l[i] = cmplx.Abs(p + cmplx.Rect(1, phi)*complex(platform[i][0], platform[i][1]) - complex(base[i][0], base[i][1]))
	}
	return l
}

// Random machines, some with heading π and some with special triangles: the posture
// that gave the lengths and all that random starts find are among the modes.
func TestThreePlanarRandom(t *testing.T) {
	machines, starts := 2000, 40
	if testing.Short() {
		machines = 200
	}
	rng := rand.New(rand.NewPCG(6, 6))
	counts := map[int]int{}
	for n := range machines {
		var a, b [3][2]float64
		for i := range 3 {
			a[i] = [2]float64{uniform(rng, -1, 1), uniform(rng, -1, 1)}
			b[i] = [2]float64{uniform(rng, -1, 1), uniform(rng, -1, 1)}
		}
		phi := uniform(rng, -math.Pi, math.Pi)
		switch n % 5 {
		case 1:
			phi = math.Pi
		case 2: // joints in lines
			for i := range 3 {
				a[i][1], b[i][1] = 0, 0
			}
		case 3: // similar triangles
			for i := range 3 {
				b[i] = [2]float64{0.6 * a[i][0], 0.6 * a[i][1]}
			}
		case 4: // two joints in one
			b[1] = b[0]
		}
		p := complex(uniform(rng, -1, 1), uniform(rng, -1, 1))
		l := planarLengths(a, b, p, phi)
		got := ThreePlanar(a, b, l)
		counts[len(got.Modes)]++
		if got.Complex+got.Infinite+got.Singular+got.Lost != 6 || got.Lost > 0 {
			t.Errorf("machine %d: %d simple, %d infinite, %d singular, %d lost do not make 6", n, got.Complex, got.Infinite, got.Singular, got.Lost)
		}
		want := append(planarMultistart(rng, a, b, l, starts), Mode{Origin: kin.Vec{X: real(p), Y: imag(p)}, Rot: kin.RPY(0, 0, phi)})
		for _, w := range want {
			if _, far := nearest(got.Modes, &w); !(far < 1e-7) {
				t.Errorf("machine %d: a posture is missed by %g (%d modes, %+v)", n, far, len(got.Modes), w)
			}
		}
		for i, m := range got.Modes {
			if _, far := nearest(got.Modes[:i], &m); far < 1e-6 {
				t.Errorf("machine %d: mode %d is listed twice", n, i)
			}
			if !(m.Residual < 1e-14) {
				t.Errorf("machine %d: residual %g", n, m.Residual)
			}
		}
	}
	t.Logf("machines by number of modes: %v", counts)
}

// What is special is answered as such.
func TestThreePlanarSpecial(t *testing.T) {
	tri := [3][2]float64{{0, 0}, {1, 0}, {0.3, 0.8}}
	// Congruent triangles on equal parallel rods: a circle of positions at heading 0.
	got := ThreePlanar(tri, tri, [3]float64{0.7, 0.7, 0.7})
	if got.Singular < 2 || got.Lost != 0 {
		t.Errorf("parallelograms: %+v", got)
	}
	for _, m := range got.Modes {
		if math.Abs(m.Determinant) < 1e-9 {
			t.Errorf("parallelograms: a point of the curve is given as a mode: %+v", m)
		}
	}
	// Congruent triangles, other rods: two mirrored positions at heading 0 may exist, both regular.
	p := complex(0.4, 0.2)
	got = ThreePlanar(tri, tri, planarLengths(tri, tri, p, 0.3))
	if _, far := nearest(got.Modes, &Mode{Origin: kin.Vec{X: 0.4, Y: 0.2}, Rot: kin.RPY(0, 0, 0.3)}); !(far < 1e-9) {
		t.Errorf("congruent triangles: posture missed by %g", far)
	}
	// Similar triangles, heading 0: singular at every position.
	small := [3][2]float64{{0, 0}, {0.5, 0}, {0.15, 0.4}}
	got = ThreePlanar(tri, small, planarLengths(tri, small, p, 0))
	k, far := nearest(got.Modes, &Mode{Origin: kin.Vec{X: 0.4, Y: 0.2}, Rot: kin.Identity()})
	if !(far < 1e-6) || got.Singular < 2 {
		t.Errorf("similar triangles: posture missed by %g, %d singular", far, got.Singular)
	} else if d := got.Modes[k].Determinant; math.Abs(d) > 1e-6 {
		t.Errorf("similar triangles: determinant %g", d)
	}
	if got := ThreePlanar(tri, small, [3]float64{9, 1, 1}); len(got.Modes) != 0 || got.Complex != 4 || got.Infinite != 2 {
		t.Errorf("a rod too long: %+v", got)
	}
	if got := ThreePlanar(tri, small, [3]float64{1, math.NaN(), 1}); len(got.Modes) != 0 || got.Lost != 6 {
		t.Errorf("a length that is no number: %+v", got)
	}
}

func BenchmarkThreePlanar(b *testing.B) {
	base := [3][2]float64{{0, 0}, {15.91, 0}, {0, 10}}
	platform := [3][2]float64{{0, 0}, {17.04, 0}, {13.23637323943662, 16.096708466836507}}
	for b.Loop() {
		if r := ThreePlanar(base, platform, [3]float64{14.98, 15.38, 12}); len(r.Modes) != 6 {
			b.Fatal(len(r.Modes))
		}
	}
}
