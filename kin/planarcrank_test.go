package kin_test

import (
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// stageE1 is the 3-RRR of E1 in the given modes.
func stageE1(t *testing.T, modes [3]float64) (kin.Machine, kin.Pose) {
	t.Helper()
	var e1 struct {
		Data struct {
			Base     float64   `json:"base_radius"`
			Platform float64   `json:"platform_radius"`
			Crank    float64   `json:"l1_crank"`
			Rod      float64   `json:"l2_rod"`
			Azimuths []float64 `json:"joint_azimuth_deg"`
			Pose     []float64 `json:"pose"`
		}
	}
	readCheck(t, "E_cranks_carriages.json", "E1", &e1)
	d := e1.Data
	m := built("3-RRR", map[string]float64{
		"base_radius": d.Base, "platform_radius": d.Platform, "proximal": d.Crank, "distal": d.Rod, "home_heading": 0,
		"leg_azimuths_1": d.Azimuths[0] * deg, "leg_azimuths_2": d.Azimuths[1] * deg, "leg_azimuths_3": d.Azimuths[2] * deg,
		"modes_1": modes[0], "modes_2": modes[1], "modes_3": modes[2],
	}, &kin.Setup{Length: 1})
	return m, kin.NewPose(kin.Coords{kin.X: d.Pose[0], kin.Y: d.Pose[1], kin.Yaw: d.Pose[2] * deg})
}

// azimuthE1 is the direction of a pivot of E1 from +x, from where E1 counts the angle of its crank.
func azimuthE1(m kin.Machine, leg int) float64 {
	p := m.Frame().Base[leg]
	return math.Atan2(p.Y, p.X)
}

// modeOf reads a sign of E1 or E2, which label modes the other way round.
func modeOf(label string) float64 {
	if label == "+" || label == "1" {
		return -1
	}
	return 1
}

// E1 (formulas of Gosselin and Angeles 1988, two independent ways): the eight working
// modes of a 3-RRR at one pose, as printed 1e-11 rad; u·c'(q) and the determinant of
// the unit rows in one of them, 1e-13.
func TestWorkingModesOfThePlanarCrankStage(t *testing.T) {
	rows := readText(t, "E1_3rrr_ik.csv")
	if len(rows) != 8 {
		t.Fatalf("%d modes", len(rows))
	}
	var e1 struct {
		Expected struct {
			Det float64   `json:"det_A_unit_rows"`
			B   []float64 `json:"B"`
		}
	}
	readCheck(t, "E_cranks_carriages.json", "E1", &e1)
	for _, row := range rows {
		label := row["mode"]
		m, p := stageE1(t, [3]float64{modeOf(label[:1]), modeOf(label[1:2]), modeOf(label[2:])})
		s := moved(t, m, p)
		for i, c := range []string{"th1", "th2", "th3"} {
			near(t, label+" angle", math.Remainder(s.Q[i]+azimuthE1(m, i)-number(t, row[c]), 2*math.Pi), 0, 1e-11)
		}
		if label != "+++" {
			continue
		}
		det := kin.Determinant(m, s)
		for i, want := range e1.Expected.B {
			b := 1 / (s.J[6*i]*s.Rod[i].X + s.J[6*i+1]*s.Rod[i].Y)
			near(t, "u·c'", b, want, 1e-13)
			det *= b
		}
		near(t, "determinant", det, e1.Expected.Det, 1e-13)
	}
}

// E1: both real forward solutions, as printed 1e-11.
func TestForwardSolutionsOfThePlanarCrankStage(t *testing.T) {
	var e1 struct {
		Expected struct {
			Angles []float64 `json:"thetas_used_for_fk"`
		}
	}
	readCheck(t, "E_cranks_carriages.json", "E1", &e1)
	rows, col := readTable(t, "E1_3rrr_fk.csv")
	if len(rows) != 2 {
		t.Fatalf("%d solutions", len(rows))
	}
	for _, row := range rows {
		want := kin.NewPose(kin.Coords{kin.X: row[col["x"]], kin.Y: row[col["y"]], kin.Yaw: row[col["phi_rad"]]})
		found := false
		for k := range 8 { // the angles belong to some working mode of the pose
			m, _ := stageE1(t, [3]float64{float64(k&1)*2 - 1, float64(k&2) - 1, float64(k&4)/2 - 1})
			q := moved(t, m, want).Q
			same := true
			for i, a := range e1.Expected.Angles {
				a -= azimuthE1(m, i)
				turns := math.Round((q[i] - a) / (2 * math.Pi))
				same = same && math.Abs(q[i]-a-2*math.Pi*turns) < 1e-10
				q[i] = a + 2*math.Pi*turns
			}
			if !same {
				continue
			}
			from := kin.NewPose(kin.Coords{kin.X: row[col["x"]] + 0.005, kin.Y: row[col["y"]] - 0.005, kin.Yaw: row[col["phi_rad"]] + 0.02})
			got, ok := kin.Locate(m, q[:3], from)
			found = found || ok && apart(got.Pose, want) < 1e-11
		}
		if !found {
			t.Errorf("not located: %v", want.Coords())
		}
	}
}

// Cranks of a machine that is its own image under a third of a turn stand at one angle at home, whatever the azimuths.
func TestCrankAnglesOfASymmetricStage(t *testing.T) {
	for _, first := range []float64{90, -17, 200} {
		values := map[string]float64{"base_radius": 0.4, "platform_radius": 0.1, "proximal": 0.25, "distal": 0.25, "home_heading": 20 * deg}
		for i := range 3 {
			leg := string(rune('1' + i))
			values["leg_azimuths_"+leg] = (first + 120*float64(i)) * deg
			values["base_offset_"+leg], values["platform_offset_"+leg] = 5*deg, -10*deg
		}
		m := built("3-RRR", values, &kin.Setup{})
		s := moved(t, m, atHome())
		near(t, "second crank", s.Q[1], s.Q[0], 1e-14)
		near(t, "third crank", s.Q[2], s.Q[0], 1e-14)
		// The angle at a pivot between the outward direction and the elbow.
		for i, p := range m.Frame().Base {
			arm := r3.Sub(s.End[i], p)
			angle := math.Atan2(p.X*arm.Y-p.Y*arm.X, p.X*arm.X+p.Y*arm.Y)
			near(t, "angle from the outward direction", s.Q[i], angle, 1e-14)
		}
	}
}

// barE2 is the five-bar of E2.
func barE2(t *testing.T, modes [2]float64, homeY float64) (kin.Machine, []float64) {
	t.Helper()
	var e2 struct {
		Data struct {
			Base   [][]float64 `json:"base_joints"`
			L1, L2 float64
			P      []float64
		}
	}
	readCheck(t, "E_cranks_carriages.json", "E2", &e2)
	m := built("five-bar", map[string]float64{
		"spacing": e2.Data.Base[1][0] - e2.Data.Base[0][0], "proximal": e2.Data.L1, "distal": e2.Data.L2, "home_y": homeY,
		"modes_1": modes[0], "modes_2": modes[1],
	}, &kin.Setup{})
	return m, e2.Data.P
}

// E2 (closed form and Newton): the four working modes of a five-bar at one point, and the
// two points for each pair of angles. As printed, 1e-11.
func TestWorkingModesOfTheFiveBar(t *testing.T) {
	rows := readText(t, "E2_fivebar.csv")
	if len(rows) != 4 {
		t.Fatalf("%d modes", len(rows))
	}
	for _, row := range rows {
		label := row["mode(left,right)"] // (1, -1)
		modes := [2]float64{1, 1}
		if label[1] == '1' {
			modes[0] = -1
		}
		if label[len(label)-3] == ' ' {
			modes[1] = -1
		}
		m, p := barE2(t, modes, 0.4)
		q := []float64{number(t, row["th1"]), number(t, row["th2"])}
		at := kin.NewPose(kin.Coords{kin.X: p[0], kin.Y: p[1] - 0.4})
		s := moved(t, m, at)
		for i := range 2 {
			near(t, label+" angle", s.Q[i], q[i], 1e-11)
		}
		for _, sign := range []string{"+", "-"} {
			want := kin.NewPose(kin.Coords{kin.X: number(t, row["fk"+sign+"_x"]), kin.Y: number(t, row["fk"+sign+"_y"]) - 0.4})
			found := false
			for k := range 4 { // the other point belongs to some working mode
				m, _ := barE2(t, [2]float64{float64(k&1)*2 - 1, float64(k&2) - 1}, 0.4)
				for _, turn := range []float64{-2 * math.Pi, 0, 2 * math.Pi} {
					goal := []float64{q[0], q[1] + turn}
					if math.Abs(moved(t, m, want).Q[0]-goal[0]) > 4 {
						goal[0] += 2 * math.Pi * math.Copysign(1, moved(t, m, want).Q[0]-goal[0])
					}
					got, ok := kin.Locate(m, goal, kin.NewPose(kin.Coords{kin.X: want.P.X + 0.002, kin.Y: want.P.Y - 0.002}))
					found = found || ok && apart(got.Pose, want) < 1e-11
				}
			}
			if !found {
				t.Errorf("mode %s, solution %s: not located", label, sign)
			}
		}
	}
}

// E2: singular values of the map from crank rates to velocity on the axis, 1e-14; links in
// line (where y = l1 sin θ2, cos θ2 = (l2-d)/l1, printed to 1e-10) are an actuator
// singularity; the edge of reach, l1+l2 from a pivot, is a serial one.
func TestSingularitiesOfTheFiveBar(t *testing.T) {
	var e2 struct {
		Expected struct {
			Y04 []float64 `json:"example_y0.4"`
		}
	}
	readCheck(t, "E_cranks_carriages.json", "E2", &e2)
	m, _ := barE2(t, [2]float64{-1, 1}, 0.4)
	var inv mat.Dense
	if err := inv.Inverse(ownJacobian(m, moved(t, m, atHome()))); err != nil {
		t.Fatal(err)
	}
	v := singularValues(t, &inv)
	near(t, "singular value", v[1], e2.Expected.Y04[0], 1e-14)
	near(t, "singular value", v[0], e2.Expected.Y04[1], 1e-14)
	const flat = 0.0979795897
	m, _ = barE2(t, [2]float64{-1, 1}, flat)
	s := moved(t, m, atHome())
	near(t, "elbows level with the point", s.End[0].Y, flat, 1e-9)
	near(t, "conditioning with links in line", conditioning(t, m, s), 0, 1e-8)
	edge := math.Sqrt(math.Pow(0.25+0.38, 2) - 0.15*0.15)
	m, _ = barE2(t, [2]float64{-1, 1}, edge-1e-9)
	if serial := m.Serial(moved(t, m, atHome())); serial > 1e-3 {
		t.Errorf("serial %g at the edge of reach", serial)
	}
	m, _ = barE2(t, [2]float64{-1, 1}, edge+1e-9)
	home := atHome()
	var o kin.State
	if m.Move(&home, &o); o.Fail != kin.OutOfReach {
		t.Errorf("beyond the edge: fail %d", o.Fail)
	}
}
