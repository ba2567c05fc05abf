package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// W7 (numpy; closed form): worst pose errors of the platform C5 for leg errors of 0.1 mm about its stiffness
// centre: the row sums of the inverse, 1e-12 relative. Norms are at least as large as the errors along any direction.
func TestErrorsInClosedForm(t *testing.T) {
	var w struct {
		Expected struct {
			Worst struct {
				Z    float64
				Turn float64 `json:"rz_rad"`
				X, Y float64
			} `json:"worst_case"`
		}
	}
	readCheck(t, "W_workspace_loads.json", "W7", &w)
	worst := &w.Expected.Worst
	task, _, _, _ := exampleTask(t)
	task.Actuator.Error = 1e-4
	task.Prepare()
	f := kin.FamilyNamed("6-UPS")
	a := appraise(task, f, exampleC5())
	v := newView(task)
	v.begin(a.Machine)
	v.at(&task.samples[0], 0, NeedMatrix)
	rows := func(direction [6]float64) float64 {
		sum := 0.0
		for i := range 6 {
			s := 0.0
			for k, e := range direction {
				s += e * v.x[6*k+i]
			}
			sum += math.Abs(s)
		}
		return 1e-4 * sum
	}
	sin, cos := math.Sincos(60 * deg) // the check's x is our direction 60°, see W1
	for _, c := range []struct {
		what      string
		direction [6]float64
		want      float64
	}{
		{"z", [6]float64{0, 0, 1}, worst.Z}, {"x", [6]float64{cos, sin}, worst.X},
		{"y", [6]float64{-sin, cos}, worst.Y}, {"rz", [6]float64{5: 1}, worst.Turn},
	} {
		near(t, c.what, rows(c.direction), c.want, 1e-12*c.want)
	}
	if p := value(t, a, "position_error"); p < worst.Z || p < worst.X || p < worst.Y {
		t.Errorf("position_error %g is less than a component of %+v", p, *worst)
	}
	if p := value(t, a, "angle_error"); p < worst.Turn {
		t.Errorf("angle_error %g is less than that about z, %g", p, worst.Turn)
	}
}

// exactErrors solves the forward kinematics for every pattern of signs.
func exactErrors(t *testing.T, m kin.Machine, c kin.Coords, e float64) (shift, turn float64) {
	from := kin.NewPose(c)
	var s kin.State
	m.Move(&from, &s)
	n := m.Frame().Legs()
	for pattern := range 1 << n {
		q := make([]float64, n)
		for i := range q {
			q[i] = s.Q[i] + e
			if pattern>>i&1 == 1 {
				q[i] = s.Q[i] - e
			}
		}
		p, ok := kin.Locate(m, q, from)
		if !ok {
			t.Fatalf("no pose for errors %d at %v", pattern, c)
		}
		d := sub(p.Pose.P, from.P)
		if len(m.Frame().Freedoms) == 3 {
			d.Z = 0
		}
		shift = math.Max(shift, norm(d))
		back := kin.Rot{from.R[0], from.R[3], from.R[6], from.R[1], from.R[4], from.R[7], from.R[2], from.R[5], from.R[8]}
		r := p.Pose.R.Mul(&back)
		turn = math.Max(turn, norm(kin.Vec{X: r[7] - r[5], Y: r[2] - r[6], Z: r[3] - r[1]})/2) // sine of the angle
	}
	return shift, turn
}

// position_error and angle_error are the largest over all signs by exact forward kinematics (kin.Locate, from the joint
// centres alone), to first order: the difference falls with the error itself, ten times smaller for an
// error ten times smaller, and is below 1e-3 for 10 µm.
func TestErrorsByForwardKinematics(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(81)
		for range 4 {
			c := randomCoords(rng, f, 1)
			task := richTask(rng, f)
			task.Zones, task.Cases = []Zone{{Kind: Listed, Poses: []kin.Coords{c}}}, nil
			d := soundDesign(f)
			for i := range d {
				d[i] *= between(rng, 0.95, 1.05)
			}
			off := [2][2]float64{}
			for k, e := range [2]float64{1e-4, 1e-5} {
				task.Actuator.Error = e
				task.Prepare()
				a := appraise(task, f, d)
				shift, turn := exactErrors(t, a.Machine, c, e)
				off[k] = [2]float64{value(t, a, "position_error")/shift - 1, value(t, a, "angle_error")/turn - 1}
			}
			for i, name := range [2]string{"position_error", "angle_error"} {
				if math.Abs(off[1][i]) > 1e-3 || math.Abs(off[1][i]) > 0.15*math.Abs(off[0][i])+1e-7 {
					t.Errorf("%s differs from the exact one by %.2g at 0.1 mm, %.2g at 0.01 mm", name, off[0][i], off[1][i])
				}
			}
		}
	})
}
