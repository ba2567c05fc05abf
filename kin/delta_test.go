package kin_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// with is the middle design of the named family with some dimensions set.
func with(name string, values map[string]float64) (*kin.Family, []float64) {
	f := kin.FamilyNamed(name)
	d := midRange(f)
	for k, v := range values {
		i := f.Index(k)
		if i < 0 {
			panic("no dimension " + k)
		}
		d[i] = v
	}
	return f, d
}

// built is that design's machine.
func built(name string, values map[string]float64, s *kin.Setup) kin.Machine {
	f, d := with(name, values)
	return f.Build(d, s)
}

// readText gives the rows of a reference file by column name.
func readText(t *testing.T, name string) []map[string]string {
	t.Helper()
	file, err := os.Open(referenceFile(name))
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	var out []map[string]string
	for _, row := range rows[1:] {
		m := map[string]string{}
		for k, text := range row {
			m[rows[0][k]] = text
		}
		out = append(out, m)
	}
	return out
}

// number reads a cell.
func number(t *testing.T, text string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// D1 (Williams 2015, recomputed): worked inverse and forward kinematics of a delta
// whose platform is at z < 0 in its own frame, z here reversed. Angles as printed 1e-9
// degrees, positions 1e-11 m (six of the twelve printed digits' rounding, times gains below 10).
func TestWorkedDelta(t *testing.T) {
	var d1 struct {
		Model struct {
			Shoulder float64   `json:"base_joint_radius_wB"`
			Platform float64   `json:"platform_joint_radius_uP"`
			Arm      float64   `json:"upper_arm"`
			Rod      float64   `json:"rod"`
			Azimuths []float64 `json:"arm_azimuth_deg"`
		}
	}
	readCheck(t, "D_delta.json", "D1", &d1)
	machine := func(mode, home float64) kin.Machine {
		return built("delta", map[string]float64{
			"shoulder_radius": d1.Model.Shoulder, "platform_radius": d1.Model.Platform, "arm": d1.Model.Arm, "rod": d1.Model.Rod,
			"leg_azimuths_1": d1.Model.Azimuths[0] * deg, "leg_azimuths_2": d1.Model.Azimuths[1] * deg, "leg_azimuths_3": d1.Model.Azimuths[2] * deg,
			"home_height": home, "mode": mode,
		}, &kin.Setup{})
	}
	out, in := machine(1, 1), machine(-1, -1)
	rows := readText(t, "D1_delta_worked.csv")
	if len(rows) != 6 {
		t.Fatalf("%d cases", len(rows))
	}
	for _, row := range rows {
		at := kin.Vec{X: number(t, row["x"]), Y: number(t, row["y"]), Z: -number(t, row["z"])}
		var q []float64
		for _, c := range []string{"th1_deg", "th2_deg", "th3_deg"} {
			q = append(q, number(t, row[c])*deg)
		}
		m := out
		if row["kind"] == "FK other mode" { // the platform on the other side of the base: there the knees are in
			m = in
		}
		p := kin.Pose{P: r3.Sub(at, m.Frame().Home), R: kin.Identity()}
		s := moved(t, m, p)
		for i := range 3 {
			near(t, row["case"]+" angle in degrees", s.Q[i]/deg, q[i]/deg, 1e-9)
		}
		got, ok := kin.Locate(m, q, kin.Pose{P: r3.Add(p.P, kin.Vec{X: 0.01, Y: 0.02, Z: -0.01}), R: kin.Identity()})
		if !ok {
			t.Errorf("%s: not located", row["case"])
		}
		near(t, row["case"]+" position", r3.Norm(r3.Sub(got.Origin, at)), 0, 1e-11)
	}
}

// deltaOnAxis is a delta with all its arms at the angle at home, effective radius R.
func deltaOnAxis(r, platform, arm, rod, angle, length float64) kin.Machine {
	height := arm*math.Sin(angle) + math.Sqrt(rod*rod-math.Pow(r+arm*math.Cos(angle), 2))
	return built("delta", map[string]float64{
		"shoulder_radius": r + platform, "platform_radius": platform, "arm": arm, "rod": rod, "home_height": height,
	}, &kin.Setup{Length: length})
}

// D2 and D3 (closed forms, checked with numpy): with all arms at one angle the platform
// is at L sin θ + √(l² - (R + L cos θ)²), and the singular values of the map from arm
// rates to velocity are |B|/(√(3/2) g) twice and |B|/(√3 √(1-g²)), g = (R + L cos θ)/l,
// |B| = L (g sin θ + √(1-g²) cos θ). 1e-13; the file's example too.
func TestDeltaOnItsAxis(t *testing.T) {
	check := func(r, arm, rod, angle float64) []float64 {
		t.Helper()
		m := deltaOnAxis(r, 0.05, arm, rod, angle, 1)
		s := moved(t, m, atHome())
		for i := range 3 {
			near(t, "arm angle", s.Q[i], angle, 1e-13)
		}
		g := (r + arm*math.Cos(angle)) / rod
		h := math.Sqrt(1 - g*g)
		b := arm * (g*math.Sin(angle) + h*math.Cos(angle))
		var inv mat.Dense
		if err := inv.Inverse(ownJacobian(m, s)); err != nil {
			t.Fatal(err)
		}
		got := singularValues(t, &inv)
		across, along := b/(math.Sqrt(1.5)*g), b/(math.Sqrt(3)*h)
		want := []float64{math.Max(across, along), across, math.Min(across, along)}
		for k := range 3 {
			near(t, "singular value", got[k], want[k], 1e-13)
		}
		return got
	}
	for k := range 25 {
		check(0.12, 0.3, 0.8, -0.6+0.06*float64(k))
	}
	var d struct {
		Model struct {
			Shoulder float64 `json:"base_joint_radius_wB"`
			Platform float64 `json:"platform_joint_radius_uP"`
			Arm      float64 `json:"upper_arm"`
			Rod      float64 `json:"rod"`
		}
		Example struct {
			Theta float64   `json:"theta_rad"`
			P     []float64 `json:"P"`
			J     []float64 `json:"singular_values_J"`
		}
	}
	readCheck(t, "D_delta.json", "D1", &d)
	readCheck(t, "D_delta.json", "D3", &d)
	r := d.Model.Shoulder - d.Model.Platform
	for k, v := range check(r, d.Model.Arm, d.Model.Rod, d.Example.Theta) {
		near(t, "example", v, d.Example.J[k], 1e-13)
	}
	near(t, "example height", deltaOnAxis(r, 0.05, d.Model.Arm, d.Model.Rod, d.Example.Theta, 1).Frame().Home.Z, -d.Example.P[2], 1e-14)
}

// D3: the delta is isotropic where g² = 2/3. Its conditioning is then 1; its 6×6 of unit
// wrenches is not as regular, by the statement of the families' definitions 0.50 with
// platform_radius 0 and 0.454 with 0.1 m at a characteristic length of 0.2 m. With
// platform_radius 0 forces and couples do not mix: forces have singular values 1, the
// couples, at atan √2 from the level, √(1/2) twice and √2, so that 1/2 is exact. 1e-13, and
// 0.454 as printed.
func TestRegularityOfTheIsotropicDelta(t *testing.T) {
	regularity := func(platform float64) float64 {
		t.Helper()
		const arm, rod, angle = 0.3, 0.6, 0.4
		m := deltaOnAxis(math.Sqrt(2./3)*rod-arm*math.Cos(angle), platform, arm, rod, angle, 0.2)
		s := moved(t, m, atHome())
		near(t, "conditioning", conditioning(t, m, s), 1, 1e-13)
		var a [36]float64
		kin.Wrenches(m, s, &a)
		v := singularValues(t, mat.NewDense(6, 6, a[:]))
		return v[5] / v[0]
	}
	near(t, "regularity with platform radius 0", regularity(0), 0.5, 1e-13)
	near(t, "regularity with platform radius 0.1 m", regularity(0.1), 0.454, 0.0005)
}

// The swing of a delta's rods is their angle from the plane in which the arm
// turns: none in the plane of symmetry of a leg, and the sine is the displacement square to
// it over the rod. The setup's mounting axis does not matter. Relative 1e-14; the sine itself is rounded at 1e-17.
func TestSwingOfDeltaRods(t *testing.T) {
	for _, name := range []string{"delta", "delta-4", "linear-delta"} {
		f, d := with(name, nil)
		rod := d[f.Index("rod")]
		for _, axis := range []kin.Axis{{}, {Kind: kin.AxisPlate}, {Kind: kin.AxisVector, Vec: kin.Vec{X: 1}}} {
			m := f.Build(d, &kin.Setup{Axis: axis, Length: 0.2})
			for _, x := range []float64{0, 1e-9, 0.02, -0.05} { // leg 1 stands at 90°: x is square to its plane
				s := moved(t, m, kin.NewPose(kin.Coords{kin.X: x, kin.Y: 0.01}))
				swing := math.Asin(x / rod)
				want := 4 * math.Pow(math.Sin(swing/2), 2) // 2-2cos
				near(t, name+" base chord", s.BaseChord[0], want, 1e-14*want+1e-25)
				near(t, name+" platform chord", s.PlatformChord[0], want, 1e-14*want+1e-25)
			}
		}
	}
}

// The couples of a delta's parallelograms hold the platform's rotation: each is square to
// its rods and to the direction of the short sides, about which its joints turn freely. 1e-14.
func TestCouplesOfParallelograms(t *testing.T) {
	eachRods(t, 20, func(t *testing.T, x trial, legs []rodLeg) {
		if r3.Norm(legs[0].side) == 0 || x.f.Has(kin.Yaw) {
			return
		}
		s := moved(t, x.m, x.p)
		var rows [36]float64
		if n := x.m.Constraints(s, &rows); n != 3 {
			t.Fatalf("%d constraints", n)
		}
		for i, l := range legs {
			c := kin.Vec{X: rows[6*i+3], Y: rows[6*i+4], Z: rows[6*i+5]}
			near(t, "couple along the rod", r3.Dot(c, s.Rod[i]), 0, 1e-14)
			near(t, "couple along the short side", r3.Dot(c, l.side), 0, 1e-14)
		}
	})
}

// The unit wrenches of the actuators are unit forces along the rods through the
// platform joints, about the tool point, couples divided by the characteristic length. 1e-14.
func TestWrenchesAreTheRods(t *testing.T) {
	eachRods(t, 20, func(t *testing.T, x trial, legs []rodLeg) {
		s, fr := moved(t, x.m, x.p), x.m.Frame()
		var a, rows [36]float64
		for k := range a {
			a[k] = math.NaN()
		}
		kin.Wrenches(x.m, s, &a)
		n := x.m.Constraints(s, &rows)
		for k, v := range rows[:6*n] {
			near(t, "constraint", a[6*(6-n)+k], v, 0)
		}
		origin, rot := fr.Place(&x.p)
		tool := r3.Add(origin, rot.Apply(fr.Tool))
		if x.f.Name == "delta-4" {
			near(t, "couple of the shaft", a[23], 1, 0)
			rot = kin.Identity() // the platform does not turn with the tool
		}
		for i := range legs {
			r := r3.Sub(r3.Add(origin, rot.Apply(fr.Platform[i])), tool)
			moment := r3.Scale(1/fr.Length, r3.Cross(r, s.Rod[i]))
			want := []float64{s.Rod[i].X, s.Rod[i].Y, s.Rod[i].Z, moment.X, moment.Y, moment.Z}
			if x.f.Name == "delta-4" { // the tool turns freely about the platform's z axis
				want[5] = r3.Cross(r3.Sub(origin, tool), s.Rod[i]).Z / fr.Length
			}
			for k, w := range want {
				if x.f.Name == "five-bar" && k > 2 {
					continue // of a point that does not turn
				}
				sign := 1.0
				if a[6*i]*want[0]+a[6*i+1]*want[1]+a[6*i+2]*want[2] < 0 {
					sign = -1 // rows of J may run against the rod
				}
				near(t, "wrench", sign*a[6*i+k], w, 1e-14)
			}
		}
	})
}

// The shaft of delta-4 stops the machine by its length and by its angle from the vertical, at
// the values given and not within a millionth of them; translation is that of the delta.
func TestShaftStops(t *testing.T) {
	const height, low, swing = 0.5, 0.45, 30 * deg
	values := map[string]float64{
		"shoulder_radius": 0.15, "platform_radius": 0.05, "arm": 0.3, "rod": 0.7, "home_height": height,
		"shaft_min": low, "shaft_stroke": 0.15, "shaft_swing": swing,
	}
	m := built("delta-4", values, &kin.Setup{Length: 0.2})
	plain := map[string]float64{}
	for k, v := range values {
		if k[:3] != "sha" {
			plain[k] = v
		}
	}
	d := built("delta", plain, &kin.Setup{Length: 0.2})
	const e = 1e-6
	lean := height * math.Tan(swing)
	for _, c := range []struct {
		p    kin.Coords
		what string
	}{
		{kin.Coords{}, ""},
		{kin.Coords{kin.Z: low - height + e}, ""},
		{kin.Coords{kin.Z: low - height - e}, "shaft length"},
		{kin.Coords{kin.Z: 0.1 - e}, ""},
		{kin.Coords{kin.Z: 0.1 + e}, "shaft length"},
		{kin.Coords{kin.X: lean - e, kin.Yaw: 2}, ""},
		{kin.Coords{kin.X: lean + e, kin.Yaw: 2}, "shaft swing"},
	} {
		p := kin.NewPose(c.p)
		var s, o kin.State
		m.Move(&p, &s)
		d.Move(&p, &o)
		if o.Fail != kin.Reached {
			t.Fatalf("%v: the delta itself does not reach it", c.p)
		}
		if c.what == "" && s.Fail != kin.Reached || c.what != "" && (s.Fail != kin.Stopped || s.What != c.what || s.Leg != 3) {
			t.Errorf("%v: fail %d at leg %d, %q, want %q", c.p, s.Fail, s.Leg, s.What, c.what)
		}
		for i := range 3 {
			near(t, "arm angle", s.Q[i], o.Q[i], 1e-15)
		}
		near(t, "yaw", s.Q[3], c.p[kin.Yaw], 1e-15)
	}
}
