package kin_test

import (
	"encoding/json"
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// readW fills the data and the expected values of the check with that id.
func readW(t *testing.T, id string) (data, expected map[string]json.RawMessage) {
	t.Helper()
	var check struct{ Data, Expected map[string]json.RawMessage }
	readCheck(t, "W_workspace_loads.json", id, &check)
	return check.Data, check.Expected
}

// into decodes the entry of that name.
func into(t *testing.T, from map[string]json.RawMessage, name string, out any) {
	t.Helper()
	if err := json.Unmarshal(from[name], out); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
}

// worked is the example of C5 with the tool point at its stiffness centre, as W1 and W7 use it. Lc = 1 m.
func worked(t *testing.T) (kin.Machine, *kin.State) {
	data, _ := readW(t, "W1")
	var centre, length float64
	into(t, data, "stiffness_centre_height_above_platform", &centre)
	into(t, data, "leg_length", &length)
	m := hexagon(1.5, 1, 10*deg, 10*deg, 1.2, centre, 1)
	s := moved(t, m, atHome())
	for _, q := range s.Q {
		near(t, "length", q, length, 1e-14)
	}
	return m, s
}

// W1 (closed forms, checked with numpy): efforts that carry a load solve
// Jᵀτ = w, τ > 0 where the leg is compressed. The file's layout is turned by 60°
// against the family's, and with it the direction of the lateral force. 1e-9 N.
func TestLegForces(t *testing.T) {
	m, s := worked(t)
	_, expected := readW(t, "W1")
	solve := func(w ...float64) []float64 {
		x := mat.NewVecDense(6, nil)
		if err := x.SolveVec(ownJacobian(m, s).T(), mat.NewVecDense(6, w)); err != nil {
			t.Fatal(err)
		}
		return x.RawVector().Data
	}
	var weight, twist float64
	var lateral []float64
	into(t, expected, "vertical W=1000 on the axis: every leg carries W/(6 sin gamma)", &weight)
	into(t, expected, "moment Mz=100: +-Mz/(6 rho cos gamma)", &twist)
	into(t, expected, "lateral Fx=300 through the stiffness centre: f_i = s_ix Fx/(3 cos^2 gamma)", &lateral)
	for i, f := range solve(0, 0, 1000, 0, 0, 0) {
		near(t, "weight", f, weight, 1e-9)
		if f < 0 {
			t.Errorf("leg %d is pulled by a weight", i+1)
		}
	}
	for _, f := range solve(0, 0, 0, 0, 0, 100) {
		near(t, "moment about z", math.Abs(f), twist, 1e-9)
	}
	for i, f := range solve(300*math.Cos(60*deg), 300*math.Sin(60*deg), 0, 0, 0, 0) {
		near(t, "lateral force", f, lateral[i], 1e-9)
	}
}

// W7 (inverse of J by numpy): tool displacement at the stiffness centre for leg
// errors of ±0.1 mm, worst case and 1σ of independent errors, to first order;
// x and y of the file's layout lie at 60° and 150° of the family's. 1e-15 m.
func TestPoseErrors(t *testing.T) {
	m, s := worked(t)
	data, expected := readW(t, "W7")
	var e float64
	into(t, data, "leg_error", &e)
	var worst, sigma map[string]float64
	into(t, expected, "worst_case", &worst)
	into(t, expected, "one_sigma_if_independent", &sigma)
	var inv mat.Dense
	if err := inv.Inverse(ownJacobian(m, s)); err != nil {
		t.Fatal(err)
	}
	cos, sin := math.Cos(60*deg), math.Sin(60*deg)
	for name, row := range map[string][]float64{
		"x": {cos, sin, 0, 0, 0, 0}, "y": {-sin, cos, 0, 0, 0, 0}, "z": {0, 0, 1, 0, 0, 0}, "rz_rad": {0, 0, 0, 0, 0, 1},
	} {
		var along mat.Dense
		along.Mul(mat.NewDense(1, 6, row), &inv)
		near(t, "worst "+name, e*mat.Norm(&along, math.Inf(1)), worst[name], 1e-15)
	}
	for name, k := range map[string]int{"z": 2, "x=y": 0, "rz": 5, "rx=ry": 3} {
		near(t, "1σ of "+name, e*mat.Norm(inv.RowView(k), 2), sigma[name], 1e-15)
	}
}

// W7's exact value: with all legs longer by 0.1 mm the platform rises by
// 0.12887775354941677 mm, found here by Locate. 1e-14 m.
func TestAllLegsLonger(t *testing.T) {
	m, s := worked(t)
	q := s.Q
	for i := range q {
		q[i] += 1e-4
	}
	p, ok := kin.Locate(m, q[:], atHome())
	if !ok {
		t.Fatalf("not located: residual %g", p.Residual)
	}
	near(t, "rise", p.Pose.P.Z, 0.00012887775354941677, 1e-14)
}
