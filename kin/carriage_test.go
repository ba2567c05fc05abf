package kin_test

import (
	"encoding/json"
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// upright is a linear-delta on upright rails with the effective radius r.
func upright(r, rod, height float64) kin.Machine {
	return built("linear-delta", map[string]float64{
		"rail_radius": r + 0.1, "platform_radius": 0.1, "rail_slant": 0, "rod": rod, "home_height": height,
	}, &kin.Setup{Length: 0.2})
}

// E6 (trilateration and Newton agree to 1e-16): carriages of a delta on upright rails,
// q = z + √(l² - (x-Tx)² - (y-Ty)²); isotropic on the axis where R/l = √(2/3). 1e-14.
func TestDeltaOnUprightRails(t *testing.T) {
	var e6 struct {
		Data struct {
			R   float64 `json:"effective_radius (rail radius - platform radius)"`
			Rod float64
			P   []float64
		}
		Expected struct{ Q []float64 }
	}
	readCheck(t, "E_cranks_carriages.json", "E6", &e6)
	m := upright(e6.Data.R, e6.Data.Rod, 0.3)
	p := kin.NewPose(kin.Coords{e6.Data.P[0], e6.Data.P[1], e6.Data.P[2] - 0.3})
	for i, want := range e6.Expected.Q {
		near(t, "carriage", moved(t, m, p).Q[i], want, 1e-14)
		near(t, "carriage on the axis", moved(t, m, atHome()).Q[i], 0.3+math.Sqrt(0.5*0.5-0.25*0.25), 1e-14)
	}
	got, ok := kin.Locate(m, e6.Expected.Q, atHome())
	if !ok {
		t.Fatal("not located")
	}
	near(t, "located", apart(got.Pose, p), 0, 1e-14)
	m = upright(0.4*math.Sqrt(2./3), 0.4, 0.3)
	near(t, "conditioning", conditioning(t, m, moved(t, m, atHome())), 1, 1e-14)
}

// Upright rails given outright have the short sides of their parallelograms along the
// circle, as those that dimensions place: same swings and gaps. 1e-15.
func TestUprightRailsOutright(t *testing.T) {
	f, d := with("linear-delta", map[string]float64{"rail_slant": 0, "rod_spacing": 0.1})
	setup := &kin.Setup{Length: 0.2, Diameter: 0.01}
	m := f.Build(d, setup)
	o := f.Outright(outright(f, d, m), setup)
	p := kin.NewPose(kin.Coords{0.06, -0.04, 0.02})
	a, b := moved(t, m, p), moved(t, o, p)
	// leg 1 stands at 90°, so that x is along its short sides; leg 2 at 210°
	rod := d[f.Index("rod")]
	near(t, "swing of leg 1", a.BaseChord[0], 2-2*math.Cos(math.Asin(0.06/rod)), 1e-15)
	near(t, "swing of leg 2", a.BaseChord[1], 2-2*math.Cos(math.Asin((0.06*math.Cos(300*deg)-0.04*math.Sin(300*deg))/rod)), 1e-15)
	for i := range 3 {
		near(t, "swing", b.BaseChord[i], a.BaseChord[i], 1e-15)
	}
	ga, _, _ := m.Gap(a)
	gb, _, _ := o.Gap(b)
	near(t, "gap", gb, ga, 1e-15)
}

// gains are the singular values of the map from rates to velocity, falling.
func gains(t *testing.T, m kin.Machine, p kin.Pose) []float64 {
	t.Helper()
	var inv mat.Dense
	if err := inv.Inverse(ownJacobian(m, moved(t, m, p))); err != nil {
		t.Fatal(err)
	}
	return singularValues(t, &inv)
}

// H1 (Chablat and Wenger 2003, recomputed): three rails at right angles, all joints of
// the platform in one point. With the rod for a cube of 200 mm every gain within the
// cube is in [1/2, 2], and both bounds are met at its corners. 1e-12.
func TestThreeRailsAtRightAngles(t *testing.T) {
	var h1 struct {
		Recomputed struct {
			L   float64   `json:"L_mm"`
			Q1  float64   `json:"Q1_mm"`
			Q2  float64   `json:"Q2_mm"`
			At1 []float64 `json:"vaf_at_q1"`
			At2 []float64 `json:"vaf_at_q2"`
		}
	}
	readCheck(t, "H_carriages.json", "H1", &h1)
	r := h1.Recomputed
	near(t, "published rod in mm", r.L, 310.58, 0.005)
	near(t, "edge of the cube in mm", r.Q1-r.Q2, 200, 1e-12)
	f, d := with("linear-delta", map[string]float64{"rod": r.L / 1000, "rod_spacing": 0.05, "mode": 1})
	m := f.Outright(&kin.Joints{
		Rails:    []kin.Rail{{Direction: kin.Vec{X: 2}}, {Direction: kin.Vec{Y: 1}}, {Direction: kin.Vec{Z: 1}}},
		Platform: make([]kin.Vec, 3), HomeRot: kin.Identity(), Values: d,
	}, &kin.Setup{})
	at := func(x, y, z float64) kin.Pose { return kin.NewPose(kin.Coords{x / 1000, y / 1000, z / 1000}) }
	s := moved(t, m, at(30, -20, 10))
	near(t, "carriage", s.Q[0], 0.030+math.Sqrt(r.L*r.L/1e6-0.02*0.02-0.01*0.01), 1e-15)
	for k, v := range gains(t, m, at(r.Q1, r.Q1, r.Q1)) {
		near(t, "gain at the corner q1", v, r.At1[k], 1e-12)
	}
	for k, v := range gains(t, m, at(r.Q2, r.Q2, r.Q2)) {
		near(t, "gain at the corner q2", v, r.At2[k], 1e-12)
	}
	for i := range 9 {
		for j := range 9 {
			for k := range 9 {
				c := func(n int) float64 { return r.Q2 + (r.Q1-r.Q2)*float64(n)/8 }
				v := gains(t, m, at(c(i), c(j), c(k)))
				if v[0] > 2+1e-12 || v[2] < 0.5-1e-12 {
					t.Fatalf("gains %v at %g, %g, %g mm", v, c(i), c(j), c(k))
				}
			}
		}
	}
}

// H5 (after Jafari and McInroy 2003): six rods in three orthogonal pairs, each offset by
// ±a, are isotropic with the characteristic length a, J Jᵀ = 2I. Carriages that move
// along their rods have the same rows as prismatic legs. 1e-14.
func TestOrthogonalPairsOfCarriages(t *testing.T) {
	var h5 struct{ Data map[string]json.RawMessage }
	readCheck(t, "H_carriages.json", "H5", &h5)
	var (
		a    float64
		legs [][][]float64
	)
	into(t, h5.Data, "a", &a)
	into(t, h5.Data, "legs (point, direction)", &legs)
	const rod = 0.5
	f, d := with("6-PUS", map[string]float64{"rod_length": rod, "mode": -1})
	j := &kin.Joints{HomeRot: kin.Identity(), Values: d}
	for _, l := range legs {
		point, along := vec(l[0]), vec(l[1])
		j.Platform = append(j.Platform, point)
		j.Rails = append(j.Rails, kin.Rail{Point: r3.Sub(point, r3.Scale(0.7, along)), Direction: along})
	}
	m := f.Outright(j, &kin.Setup{Length: a})
	s := moved(t, m, atHome())
	for i := range 6 {
		near(t, "carriage", s.Q[i], 0.7-rod, 1e-15)
	}
	jac := ownJacobian(m, s)
	near(t, "conditioning", conditioning(t, m, s), 1, 1e-14)
	var g mat.Dense
	g.Mul(jac, jac.T())
	for i := range 6 {
		for k := range 6 {
			want := 0.0
			if i == k {
				want = 2
			}
			near(t, "J Jᵀ", g.At(i, k), want, 1e-14)
		}
	}
	near(t, "serial", m.Serial(s), 1, 1e-15)
}
