package assembly

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// gough40 is check A1: P. Dietmaier's platform with 40 real postures (SOURCES.md).
func gough40(t testing.TB) (base, platform [6]kin.Vec, length [6]float64, modes []Mode) {
	var a1 struct {
		A       [][]float64 `json:"base_points_A"`
		B       [][]float64 `json:"platform_points_B"`
		Lengths []float64   `json:"leg_lengths"`
	}
	readJSON(t, "A1_gough40.json", &a1)
	for i := range 6 {
		base[i], platform[i] = vec(a1.A[i]), vec(a1.B[i])
	}
	copy(length[:], a1.Lengths)
	rows, col := readTable(t, "A1_gough40_poses.csv")
	for _, row := range rows {
		m := Mode{Origin: vec(row[col["px"]:]), Determinant: row[col["detJ"]]}
		copy(m.Rot[:], row[col["R11"]:])
		modes = append(modes, m)
	}
	return base, platform, length, modes
}

// farthest is the largest difference of an element of two placements.
func farthest(a, b *Mode) float64 {
	d := r3.Sub(a.Origin, b.Origin)
	worst := math.Max(math.Abs(d.X), math.Max(math.Abs(d.Y), math.Abs(d.Z)))
	for i := range a.Rot {
		worst = math.Max(worst, math.Abs(a.Rot[i]-b.Rot[i]))
	}
	return worst
}

// nearest is the mode that is the nearest to m, element by element, and its distance.
func nearest(modes []Mode, m *Mode) (index int, far float64) {
	index, far = -1, math.Inf(1)
	for i := range modes {
		if d := farthest(&modes[i], m); d < far {
			index, far = i, d
		}
	}
	return index, far
}

// A1, recomputed at 50 digits: all 40 postures to 1e-9 (single ones are
// conditioned up to 7e4) with their determinants, from ten starts and the committed one.
func TestFortyPostures(t *testing.T) {
	base, platform, length, want := gough40(t)
	seeds := uint64(11)
	if testing.Short() {
		seeds = 2
	}
	for seed := range seeds {
		r := SixLegs(base, platform, length, seed)
		if len(r.Modes) != 40 || r.Complex != 40 || r.Lost != 0 || r.Paths != 40 || r.Infinite != 0 || r.Singular != 0 {
			t.Errorf("seed %d: %d modes of %d complex solutions, %d infinite, %d singular, %d lost", seed,
				len(r.Modes), r.Complex, r.Infinite, r.Singular, r.Lost)
		}
		positive := 0
		for i := range want {
			k, far := nearest(r.Modes, &want[i])
			if !(far < 1e-9) {
				t.Errorf("seed %d: posture %d is missed by %g", seed, i+1, far)
				continue
			}
			m := &r.Modes[k]
			// The file's determinants have 11 digits.
			if !(math.Abs(m.Determinant/want[i].Determinant-1) < 1e-8) || !(m.Residual < 1e-14) {
				t.Errorf("seed %d: posture %d: determinant %g, want %g; residual %g", seed, i+1, m.Determinant, want[i].Determinant, m.Residual)
			}
			if m.Determinant > 0 {
				positive++
			}
		}
		if positive != 20 {
			t.Errorf("seed %d: %d positive determinants, want 20", seed, positive)
		}
	}
}

// uniform is a number in [low, high].
func uniform(rng *rand.Rand, low, high float64) float64 { return low + (high-low)*rng.Float64() }

// ball is a vector with each component in [-r, r].
func ball(rng *rand.Rand, r float64) kin.Vec {
	return kin.Vec{X: uniform(rng, -r, r), Y: uniform(rng, -r, r), Z: uniform(rng, -r, r)}
}

// hexagon puts six joints on a circle in pairs, at so many degrees from three directions.
func hexagon(radius, first, half float64) (out [6]kin.Vec) {
	for i := range 3 {
		for k, sign := range [2]float64{-1, 1} {
			sin, cos := math.Sincos((first + 120*float64(i) + sign*half) * math.Pi / 180)
			out[2*i+k] = kin.Vec{X: radius * cos, Y: radius * sin}
		}
	}
	return out
}

// hexagons are the joints of a 6-UPS, legs 6 1 2 3 4 5.
func hexagons(rng *rand.Rand, baseHalf, platformHalf float64) (a, b [6]kin.Vec) {
	a, b = hexagon(uniform(rng, 0.4, 1.2), 0, baseHalf), hexagon(uniform(rng, 0.2, 0.8), 60, platformHalf)
	last := b[5]
	copy(b[1:], b[:5])
	b[0] = last
	return a, b
}

// workPose is a pose above the base as machines have it.
func workPose(rng *rand.Rand) (kin.Vec, kin.Rot) {
	p := r3.Add(kin.Vec{Z: uniform(rng, 0.5, 1.4)}, ball(rng, 0.1))
	return p, kin.RPY(uniform(rng, -0.2, 0.2), uniform(rng, -0.2, 0.2), uniform(rng, -0.2, 0.2))
}

// scattered are joints anywhere, in planes if flat, and a pose anywhere.
func scattered(rng *rand.Rand, flat bool) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
	for i := range 6 {
		a[i], b[i] = ball(rng, 1), ball(rng, 1)
		if flat {
			a[i].Z, b[i].Z = 0, 0
		}
	}
	return a, b, ball(rng, 1), kin.Exp(ball(rng, 3))
}

// layouts are kinds of six-legged platforms with the number of their complex solutions.
var layouts = []struct {
	name    string
	complex int
	why     string
	make    func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot)
}{
	{"general", 40, "M. Raghavan 1993", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		return scattered(rng, false)
	}},
	{"plates", 40, "joints in planes: 20 pairs of mirror images", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		return scattered(rng, true)
	}},
	{"6-5", 40, "two legs share a platform joint", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		a, b, p, r = scattered(rng, false)
		b[1] = b[0]
		return a, b, p, r
	}},
	{"6-3", 16, "three points on circles: C0, C. Innocenti and V. Parenti-Castelli 1990", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		a, b, p, r = scattered(rng, false)
		b[1], b[3], b[5] = b[0], b[2], b[4]
		return a, b, p, r
	}},
	{"3-3", 16, "octahedron: C0, P. Nanua, K. Waldron and V. Murthy 1990", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		a, b = hexagons(rng, 0, 0)
		p, r = workPose(rng)
		return a, b, p, r
	}},
	{"6-UPS", 28, "hexagons with threefold symmetry: counted here, 12 at infinity", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		a, b = hexagons(rng, uniform(rng, 5, 25), uniform(rng, 5, 25))
		p, r = workPose(rng)
		return a, b, p, r
	}},
	{"6-UPS at home", 28, "all lengths equal", func(rng *rand.Rand) (a, b [6]kin.Vec, p kin.Vec, r kin.Rot) {
		a, b = hexagons(rng, uniform(rng, 5, 25), uniform(rng, 5, 25))
		return a, b, kin.Vec{Z: uniform(rng, 0.5, 1.4)}, kin.Identity()
	}},
}

// lengths are those of the legs at a placement.
func lengths(a, b *[6]kin.Vec, p kin.Vec, r *kin.Rot) (l [6]float64) {
	for i := range l {
		l[i] = r3.Norm(r3.Sub(r3.Add(p, r.Apply(b[i])), a[i]))
	}
	return l
}

// Of each layout the complex solutions are as many as its theory says, and every
// posture that kin.Locate finds from random starts is among the modes, the posture that
// gave the lengths too.
func TestLayouts(t *testing.T) {
	machines, starts := 6, 300
	if testing.Short() {
		machines, starts = 1, 60
	}
	for _, y := range layouts {
		t.Run(y.name, func(t *testing.T) {
			rng := rand.New(rand.NewPCG(3, 4))
			for range machines {
				a, b, p, r := y.make(rng)
				l := lengths(&a, &b, p, &r)
				got := SixLegs(a, b, l, 0)
				if got.Complex != y.complex || got.Infinite != 40-y.complex || got.Lost != 0 {
					t.Errorf("%d complex solutions, %d infinite, %d singular, %d lost; want %d (%s)",
						got.Complex, got.Infinite, got.Singular, got.Lost, y.complex, y.why)
				}
				if _, far := nearest(got.Modes, &Mode{Origin: p, Rot: r}); !(far < 1e-8) {
					t.Errorf("the posture that gave the lengths is missed by %g", far)
				}
				for _, m := range multistart(rng, a[:], b[:], l[:], starts) {
					if _, far := nearest(got.Modes, &m); !(far < 1e-7) {
						t.Errorf("a posture found by random starts is missed by %g", far)
					}
				}
				for i, m := range got.Modes {
					if now := lengths(&a, &b, m.Origin, &m.Rot); !close6(now, l, 1e-12) {
						t.Errorf("mode %d has the lengths %v, want %v", i, now, l)
					}
					if _, far := nearest(got.Modes[:i], &m); far < 1e-6 {
						t.Errorf("mode %d is listed twice", i)
					}
				}
			}
		})
	}
}

func close6(a, b [6]float64, tol float64) bool {
	for i := range a {
		if !(math.Abs(a[i]-b[i]) <= tol) {
			return false
		}
	}
	return true
}

// multistart finds postures by kin.Locate from random poses.
func multistart(rng *rand.Rand, a, b []kin.Vec, l []float64, starts int) []Mode {
	m := kin.FamilyNamed("6-UPS").Outright(&kin.Joints{Base: a, Platform: b, HomeRot: kin.Identity()}, &kin.Setup{Length: 1})
	var out []Mode
	for range starts {
		from := kin.Pose{P: ball(rng, 1.5), R: kin.Exp(ball(rng, 3))}
		if got, ok := kin.Locate(m, l, from); ok && math.Abs(got.Determinant) > 1e-6 {
			out = append(out, Mode{Origin: got.Origin, Rot: got.Rot})
		}
	}
	return out
}

// A machine in millimetres, away from the origin, has the same modes.
func TestUnitsAndPlace(t *testing.T) {
	rng := rand.New(rand.NewPCG(8, 8))
	a, b, p, r := layouts[0].make(rng)
	l := lengths(&a, &b, p, &r)
	want := SixLegs(a, b, l, 0)
	shift, shape := kin.Vec{X: 3000, Y: -2000, Z: 500}, kin.Vec{X: 100, Y: 700, Z: -300}
	for i := range 6 {
		a[i] = r3.Add(r3.Scale(1000, a[i]), shift)
		b[i] = r3.Add(r3.Scale(1000, b[i]), shape)
		l[i] *= 1000
	}
	got := SixLegs(a, b, l, 0)
	if len(got.Modes) != len(want.Modes) || got.Complex != want.Complex {
		t.Fatalf("%d modes of %d, want %d of %d", len(got.Modes), got.Complex, len(want.Modes), want.Complex)
	}
	for _, m := range got.Modes {
		m.Origin = r3.Scale(1e-3, r3.Sub(r3.Add(m.Origin, m.Rot.Apply(shape)), shift))
		if _, far := nearest(want.Modes, &m); !(far < 1e-9) {
			t.Errorf("a mode is off by %g", far)
		}
	}
}

// Hexagons turned by a quarter are singular (E. Fichter 1986, check C5): the posture is
// found as a double solution without determinant.
func TestSixLegsAtSingularPosture(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 11))
	a, b := hexagons(rng, 15, 20)
	p, r := kin.Vec{Z: 0.8}, kin.RPY(0, 0, math.Pi/2)
	got := SixLegs(a, b, lengths(&a, &b, p, &r), 0)
	if got.Singular < 2 || got.Lost != 0 || got.Complex+got.Infinite+got.Singular != 40 {
		t.Errorf("%d simple, %d infinite, %d singular, %d lost", got.Complex, got.Infinite, got.Singular, got.Lost)
	}
	k, far := nearest(got.Modes, &Mode{Origin: p, Rot: r})
	if !(far < 1e-5) { // half the digits are lost at a double solution
		t.Fatalf("the posture is missed by %g", far)
	}
	if d := got.Modes[k].Determinant; !(math.Abs(d) < 1e-5) {
		t.Errorf("determinant %g, want 0", d)
	}
}

// What cannot be solved is said to be lost or singular, not left out.
func TestSixLegsDegenerate(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 5))
	a, b := hexagons(rng, 20, 20)
	p, r := workPose(rng)
	l := lengths(&a, &b, p, &r)
	bad := l
	bad[2] = math.NaN()
	if got := SixLegs(a, b, bad, 0); got.Lost != 40 || got.Modes != nil {
		t.Errorf("a length that is no number: %+v", got)
	}
	far := l
	far[0] += 10
	if got := SixLegs(a, b, far, 0); len(got.Modes) != 0 || got.Lost != 0 {
		t.Errorf("a leg too long: %d modes, %d lost", len(got.Modes), got.Lost)
	}
	// Two legs that are one leave the platform free to move.
	a[1], b[1], l[1] = a[0], b[0], l[0]
	if got := SixLegs(a, b, l, 0); got.Complex != 0 || got.Singular == 0 {
		t.Errorf("five legs: %d simple solutions, %d singular", got.Complex, got.Singular)
	}
}

func BenchmarkSixLegs(b *testing.B) {
	for _, y := range layouts {
		b.Run(y.name, func(b *testing.B) {
			rng := rand.New(rand.NewPCG(3, 4))
			lost := 0
			for b.Loop() {
				base, platform, p, r := y.make(rng)
				lost += SixLegs(base, platform, lengths(&base, &platform, p, &r), 0).Lost
			}
			b.ReportMetric(float64(lost)/float64(b.N), "lost/op")
		})
	}
}
