package kin_test

import (
	"encoding/json"
	"math"
	"strconv"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// hexagon is a 6-UPS with the given dimensions, the tool point on its axis.
func hexagon(ra, rb, alpha, beta, h, toolZ, length float64) kin.Machine {
	f := kin.FamilyNamed("6-UPS")
	d := make([]float64, len(f.Dimensions))
	for name, v := range map[string]float64{
		"base_radius": ra, "platform_radius": rb, "base_half_angle": alpha, "platform_half_angle": beta, "home_height": h,
	} {
		d[f.Index(name)] = v
	}
	return f.Build(d, &kin.Setup{Tool: kin.Vec{Z: toolZ}, Length: length})
}

// checkGram compares JᵀJ with a diagonal matrix.
func checkGram(t *testing.T, j *mat.Dense, diag []float64, tol float64) {
	t.Helper()
	var g mat.Dense
	g.Mul(j.T(), j)
	for r := range diag {
		for c := range diag {
			want := 0.0
			if r == c {
				want = diag[r]
			}
			near(t, "JᵀJ["+strconv.Itoa(r)+","+strconv.Itoa(c)+"]", g.At(r, c), want, tol)
		}
	}
}

// cubic is the platform C1 with the cube's edge L: the file's joints scaled.
func cubic(t *testing.T, edge, length float64) kin.Machine {
	var c1 struct{ Data struct{ A, B [][]float64 } }
	readCheck(t, "C_sixleg_closed_forms.json", "C1", &c1)
	j := &kin.Joints{Base: vecs(c1.Data.A), Platform: vecs(c1.Data.B), HomeRot: kin.Identity()}
	for i := range j.Base {
		a, b := &j.Base[i], &j.Platform[i]
		*a = kin.Vec{X: edge * a.X, Y: edge * a.Y, Z: edge * a.Z}
		*b = kin.Vec{X: edge * b.X, Y: edge * b.Y, Z: edge * b.Z}
	}
	return kin.FamilyNamed("6-UPS").Outright(j, &kin.Setup{Length: length})
}

// C1 (Geng and Haynes 1994, Preumont et al. 2007): the cubic platform about the
// cube's centre has JᵀJ = diag(2, 2, 2, 1/2, 1/2, 2), conditioning 1/2 and legs
// as long as the edge. 1e-12.
func TestCubicPlatform(t *testing.T) {
	m := cubic(t, 1, 1)
	s := moved(t, m, atHome())
	checkGram(t, ownJacobian(m, s), []float64{2, 2, 2, 0.5, 0.5, 2}, 1e-12)
	near(t, "conditioning", conditioning(t, m, s), 0.5, 1e-12)
	for i := range 6 {
		near(t, "length", s.Q[i], 1, 1e-12)
		near(t, "elevation", math.Asin(s.J[6*i+2])*180/math.Pi, 35.26438968275466, 1e-12)
	}
}

// W6: without a characteristic length (Lc = 1 m) the conditioning of the cubic
// platform depends on its size; divided by k times the edge it is 1/2 for every
// k in [1/2, 1] at every size. Relative 1e-12.
func TestConditioningAndTheUnitOfLength(t *testing.T) {
	var w6 struct {
		Expected struct{ Values map[string]float64 }
	}
	readCheck(t, "W_workspace_loads.json", "W6", &w6)
	if len(w6.Expected.Values) == 0 {
		t.Fatal("no check values")
	}
	for text, want := range w6.Expected.Values {
		edge, err := strconv.ParseFloat(text, 64)
		if err != nil {
			t.Fatal(err)
		}
		m := cubic(t, edge, 1)
		near(t, "condition number at edge "+text, 1/conditioning(t, m, moved(t, m, atHome()))/want, 1, 1e-12)
		for _, k := range []float64{0.5, 0.7, 1} {
			m := cubic(t, edge, k*edge)
			near(t, "conditioning at edge "+text, conditioning(t, m, moved(t, m, atHome())), 0.5, 1e-12)
		}
	}
}

// C2 (derived and checked with numpy): any three-fold symmetric platform has a
// diagonal JᵀJ about the height where its leg lines pass nearest the axis. 1e-12.
func TestStiffnessCentre(t *testing.T) {
	var c2 struct {
		Data     map[string]json.RawMessage // it has both B and b
		Expected struct {
			Centre float64   `json:"centre_offset_z_from_platform_plane"`
			Diag   []float64 `json:"K_over_k_diag"`
		}
	}
	readCheck(t, "C_sixleg_closed_forms.json", "C2", &c2)
	var a, b [][]float64
	into(t, c2.Data, "A", &a)
	into(t, c2.Data, "B", &b)
	m := kin.FamilyNamed("6-UPS").Outright(
		&kin.Joints{Base: vecs(a), Platform: vecs(b), HomeRot: kin.Identity()},
		&kin.Setup{Tool: kin.Vec{Z: c2.Expected.Centre}, Length: 1})
	checkGram(t, ownJacobian(m, moved(t, m, atHome())), c2.Expected.Diag, 1e-12)
}

// C2 on built hexagons and C3 (Pittens and Podhorodeski 1993): with legs at 45°
// and Lc the distance ρ of the leg lines from the axis the conditioning about the
// stiffness centre is 1/√2, whatever the rest. 1e-12.
func TestBestSymmetricPlatform(t *testing.T) {
	rng := seeded(8)
	for range 50 {
		ra, rb := between(rng, 0.4, 1.2), between(rng, 0.2, 0.8)
		alpha, beta := between(rng, 4*deg, 26*deg), between(rng, 4*deg, 26*deg)
		gap := 60*deg - alpha - beta // azimuth from a base joint to its platform joint
		plan := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(gap))
		rho := ra * rb * math.Sin(gap) / plan
		h := plan // legs at 45°
		// In plan the foot of the axis on the leg line lies the part `at` of the way up.
		at := (ra*ra - ra*rb*math.Cos(gap)) / (plan * plan)
		m := hexagon(ra, rb, alpha, beta, h, (at-1)*h, rho)
		s := moved(t, m, atHome())
		checkGram(t, ownJacobian(m, s), []float64{1.5, 1.5, 3, 1.5, 1.5, 3}, 1e-12)
		near(t, "conditioning", conditioning(t, m, s), math.Sqrt2/2, 1e-12)
	}
}

const deg = math.Pi / 180

// C5 (Fichter 1986 for the fact; the closed form was checked on 300 random
// geometries with numpy): the determinant of rows (d, r×d), not divided by the
// leg's length, of the hexagonal layout turned by θ is
// 54 (h Ra Rb)³ sin³(60°-α-β) cos θ: opposite signs at 0 and 180°, zero at ±90°.
// Relative 1e-12 of its greatest value, the file's example too.
func TestDeterminantOfTheHexagon(t *testing.T) {
	check := func(ra, rb, alpha, beta, h, theta float64) float64 {
		t.Helper()
		m := hexagon(ra, rb, alpha, beta, h, 0, 0.37)
		s := moved(t, m, kin.NewPose(kin.Coords{kin.Yaw: theta}))
		det := kin.Determinant(m, s)
		for _, q := range s.Q {
			det *= q
		}
		greatest := 54 * math.Pow(h*ra*rb, 3) * math.Pow(math.Sin(60*deg-alpha-beta), 3)
		near(t, "determinant", det/greatest, math.Cos(theta), 1e-12)
		return det
	}
	rng := seeded(10)
	for range 300 {
		ra, rb, h := between(rng, 0.4, 2), between(rng, 0.2, 1.5), between(rng, 0.3, 2)
		alpha, beta := between(rng, 0, 25*deg), between(rng, 0, 25*deg)
		check(ra, rb, alpha, beta, h, between(rng, -math.Pi, math.Pi))
		if a, b := check(ra, rb, alpha, beta, h, 0), check(ra, rb, alpha, beta, h, math.Pi); a <= 0 || b >= 0 {
			t.Errorf("determinants %g at 0, %g at 180°", a, b)
		}
		check(ra, rb, alpha, beta, h, 90*deg)
		check(ra, rb, alpha, beta, h, -90*deg)
	}
	var c5 struct {
		Expected struct {
			Det  []float64 `json:"example_det_theta_0_30_60_89_90_-90"`
			Unit []float64 `json:"example_det_unit_legs_theta_0_30_60_90"`
		}
	}
	readCheck(t, "C_sixleg_closed_forms.json", "C5", &c5)
	for k, theta := range []float64{0, 30, 60, 89, 90, -90} {
		near(t, "example", check(1.5, 1, 10*deg, 10*deg, 1.2, theta*deg), c5.Expected.Det[k], 1e-10)
	}
	for k, theta := range []float64{0, 30, 60, 90} {
		m := hexagon(1.5, 1, 10*deg, 10*deg, 1.2, 0, 0.37)
		near(t, "unit rows", kin.Determinant(m, moved(t, m, kin.NewPose(kin.Coords{kin.Yaw: theta * deg}))), c5.Expected.Unit[k], 1e-12)
	}
}
