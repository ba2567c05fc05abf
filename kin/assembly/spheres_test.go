package assembly

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// E2 (computed with scipy): all four working modes of a five-bar, both postures of each.
func TestFiveBarReference(t *testing.T) {
	rows, col := readTable(t, "E2_fivebar.csv")
	for _, row := range rows {
		var ends [2][2]float64
		for i, x := range [2]float64{-0.15, 0.15} {
			s, c := math.Sincos(row[col["th1"]+i])
			ends[i] = [2]float64{x + 0.25*c, 0.25 * s}
		}
		got := FiveBar(ends, [2]float64{0.38, 0.38})
		if len(got.Modes) != 2 || got.Complex != 2 {
			t.Fatalf("%d modes", len(got.Modes))
		}
		for _, k := range [2]int{col["fk+_x"], col["fk-_x"]} {
			want := Mode{Origin: kin.Vec{X: row[k], Y: row[k+1]}, Rot: kin.Identity()}
			if _, far := nearest(got.Modes, &want); !(far < 2e-12) { // angles printed to 12 decimals
				t.Errorf("posture %v is missed by %g", want.Origin, far)
			}
		}
		if d := got.Modes[0].Determinant * got.Modes[1].Determinant; !(d < 0) {
			t.Errorf("determinants of one sign: %g", d)
		}
	}
}

// D1 (R. L. Williams II 2015, recomputed): forward kinematics of a delta, both modes.
func TestDeltaReference(t *testing.T) {
	const shoulder, joint = 0.567 * 0.28867513459481287, 0.076 * 0.5773502691896258 // radii of the triangles' inscribed and circumscribed circle
	rows, col := readTable(t, "D1_delta_worked.csv")
	cases := map[[3]float64][]Mode{}
	for _, row := range rows[2:] { // the first two are inverse kinematics
		angles := [3]float64(row[col["th1_deg"] : col["th1_deg"]+3])
		cases[angles] = append(cases[angles], Mode{Origin: vec(row[col["x"]:]), Rot: kin.Identity()})
	}
	if len(cases) != 2 {
		t.Fatalf("%d cases", len(cases))
	}
	for angles, want := range cases {
		var centres [3]kin.Vec
		for i, az := range [3]float64{-90, 30, 150} {
			s, c := math.Sincos(az * math.Pi / 180)
			st, ct := math.Sincos(angles[i] * math.Pi / 180)
			r := shoulder + 0.524*ct - joint
			centres[i] = kin.Vec{X: r * c, Y: r * s, Z: -0.524 * st}
		}
		got := Delta(centres, [3]float64{1.244, 1.244, 1.244})
		if len(got.Modes) != 2 || len(want) != 2 {
			t.Fatalf("%v: %d modes, want %d", angles, len(got.Modes), len(want))
		}
		for _, w := range want {
			if _, far := nearest(got.Modes, &w); !(far < 1e-12) { // printed to 12 decimals
				t.Errorf("%v: posture %v is missed by %g", angles, w.Origin, far)
			}
		}
	}
}

// E6 (trilateration and Newton's method agree to 8e-17): a linear delta with upright rails.
func TestLinearDeltaReference(t *testing.T) {
	q := [3]float64{0.5028647415696738, 0.5078225568632354, 0.5672052676431776}
	var centres [3]kin.Vec
	for i, az := range [3]float64{90, 210, 330} {
		s, c := math.Sincos(az * math.Pi / 180)
		centres[i] = kin.Vec{X: 0.25 * c, Y: 0.25 * s, Z: q[i]}
	}
	got := Delta(centres, [3]float64{0.5, 0.5, 0.5})
	if len(got.Modes) != 2 {
		t.Fatalf("%d modes", len(got.Modes))
	}
	if _, far := nearest(got.Modes, &Mode{Origin: kin.Vec{X: 0.06, Y: -0.04, Z: 0.1}, Rot: kin.Identity()}); !(far < 1e-14) {
		t.Errorf("posture missed by %g", far)
	}
}

// Random points are found again from their distances, with residuals of rounding.
func TestSpheresRandom(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 9))
	for n := range 1000 {
		p := ball(rng, 1)
		var c [3]kin.Vec
		var l [3]float64
		for i := range c {
			c[i] = ball(rng, 1)
			l[i] = r3.Norm(r3.Sub(p, c[i]))
		}
		got := Delta(c, l)
		k, far := nearest(got.Modes, &Mode{Origin: p, Rot: kin.Identity()})
		if k < 0 || !(far < 1e-14/math.Abs(got.Modes[k].Determinant)) {
			t.Errorf("three spheres %d: missed by %g", n, far)
		}
		flat := kin.Vec{X: p.X, Y: p.Y}
		var e [2][2]float64
		var r [2]float64
		for i := range e {
			e[i] = [2]float64{c[i].X, c[i].Y}
			r[i] = math.Hypot(p.X-c[i].X, p.Y-c[i].Y)
		}
		got = FiveBar(e, r)
		k, far = nearest(got.Modes, &Mode{Origin: flat, Rot: kin.Identity()})
		if k < 0 || !(far < 1e-14/math.Abs(got.Modes[k].Determinant)) {
			t.Errorf("two circles %d: missed by %g", n, far)
		}
		for _, m := range got.Modes {
			if !(m.Residual < 1e-14) {
				t.Errorf("two circles %d: residual %g", n, m.Residual)
			}
		}
	}
}

func TestSpheresSpecial(t *testing.T) {
	x := func(d float64) kin.Vec { return kin.Vec{X: d} }
	tri := [3]kin.Vec{{X: 1}, {X: -0.5, Y: math.Sqrt(3) / 2}, {X: -0.5, Y: -math.Sqrt(3) / 2}}
	nan := math.NaN()
	for _, c := range []struct {
		name                                     string
		got                                      Result
		modes, complex, infinite, singular, lost int
	}{
		{"circles apart", FiveBar([2][2]float64{{0, 0}, {3, 0}}, [2]float64{1, 1}), 0, 2, 0, 0, 0},
		{"circles touch", FiveBar([2][2]float64{{0, 0}, {2, 0}}, [2]float64{1, 1}), 1, 0, 0, 2, 0},
		{"circles touch inside", FiveBar([2][2]float64{{0, 0}, {1, 0}}, [2]float64{2, 1}), 1, 0, 0, 2, 0},
		{"circles about one centre", FiveBar([2][2]float64{{1, 1}, {1, 1}}, [2]float64{2, 1}), 0, 0, 2, 0, 0},
		{"one circle", FiveBar([2][2]float64{{1, 1}, {1, 1}}, [2]float64{1, 1}), 0, 0, 0, 2, 0},
		{"no number", FiveBar([2][2]float64{{1, 1}, {0, 1}}, [2]float64{1, nan}), 0, 0, 0, 0, 2},
		{"spheres meet in the centres' plane", Delta(tri, [3]float64{1, 1, 1}), 1, 0, 0, 2, 0},
		{"spheres do not meet", Delta(tri, [3]float64{0.5, 0.5, 0.5}), 0, 2, 0, 0, 0},
		{"centres in line", Delta([3]kin.Vec{x(0), x(1), x(2)}, [3]float64{1, 1, 1}), 0, 0, 2, 0, 0},
		{"spheres with a circle", Delta([3]kin.Vec{x(0), x(1), x(2)}, [3]float64{math.Sqrt2, 1, math.Sqrt2}), 0, 0, 0, 2, 0},
		{"spheres about one centre", Delta([3]kin.Vec{x(0), x(0), x(2)}, [3]float64{1, 2, 1}), 0, 0, 2, 0, 0},
		{"shells", Delta([3]kin.Vec{x(1), x(1), x(1)}, [3]float64{1, 2, 3}), 0, 0, 2, 0, 0},
		{"one sphere", Delta([3]kin.Vec{x(1), x(1), x(1)}, [3]float64{1, 1, 1}), 0, 0, 0, 2, 0},
		{"no number", Delta([3]kin.Vec{x(0), x(nan), x(2)}, [3]float64{1, 2, 1}), 0, 0, 0, 0, 2},
	} {
		g := c.got
		if len(g.Modes) != c.modes || g.Complex != c.complex || g.Infinite != c.infinite || g.Singular != c.singular || g.Lost != c.lost {
			t.Errorf("%s: %+v", c.name, g)
		}
	}
}
