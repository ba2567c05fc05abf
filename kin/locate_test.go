package kin_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// apart are the differences of two poses: of the tool points, and of the matrices' elements.
func apart(a, b kin.Pose) float64 {
	return math.Max(r3.Norm(r3.Sub(a.P, b.P)), farthest(a.R, b.R))
}

// beside is a pose near p: moved by up to `far` and turned by as many radians, in the family's freedoms.
func beside(rng *rand.Rand, freedoms []kin.Freedom, p kin.Pose, far float64) kin.Pose {
	var c kin.Coords
	for _, q := range freedoms {
		c[q] = between(rng, -far, far)
	}
	e := kin.Exp(kin.Vec{X: c[3], Y: c[4], Z: c[5]})
	return kin.Pose{P: r3.Add(p.P, kin.Vec{X: c[0], Y: c[1], Z: c[2]}), R: e.Mul(&p.R)}
}

// A1 (Dietmaier 1998, poses recomputed at 50 digits): the general six-legged
// platform with 40 real postures. Each has the given lengths to 1e-12, the
// determinant of the file to its 10 digits, half of them positive; and Locate,
// started beside each, finds it to 1e-9 (conditions reach 7e4).
func TestFortyPostures(t *testing.T) {
	var a1 struct {
		A       [][]float64 `json:"base_points_A"`
		B       [][]float64 `json:"platform_points_B"`
		Lengths []float64   `json:"leg_lengths"`
	}
	readJSON(t, "A1_gough40.json", &a1)
	rows, col := readTable(t, "A1_gough40_poses.csv")
	if len(rows) != 40 {
		t.Fatalf("%d postures", len(rows))
	}
	// Home is anywhere: the platform frame on the base frame, turned to show that Place and Move agree.
	home := kin.RPY(0.3, -0.2, 0.5)
	m := kin.FamilyNamed("6-UPS").Outright(
		&kin.Joints{Base: vecs(a1.A), Platform: vecs(a1.B), Home: kin.Vec{X: 0.1, Y: 0.2, Z: 0.3}, HomeRot: home},
		&kin.Setup{Length: 1})
	f := m.Frame()
	back := kin.Rot{home[0], home[3], home[6], home[1], home[4], home[7], home[2], home[5], home[8]}
	rng := seeded(16)
	positive := 0
	for k, row := range rows {
		var rot kin.Rot
		copy(rot[:], row[col["R11"]:col["R11"]+9])
		origin := vec(row[col["px"] : col["px"]+3])
		p := kin.Pose{P: r3.Sub(origin, f.Home), R: rot.Mul(&back)}
		s := moved(t, m, p)
		for i, want := range a1.Lengths {
			near(t, "length", s.Q[i], want, 1e-12)
		}
		det := kin.Determinant(m, s)
		near(t, "determinant over the file's", det/row[col["detJ"]], 1, 1e-8)
		if det > 0 {
			positive++
		}
		got, ok := kin.Locate(m, a1.Lengths, beside(rng, f.Freedoms, p, 1e-3))
		if !ok {
			t.Errorf("posture %d: not located, residual %g after %d steps", k+1, got.Residual, got.Steps)
			continue
		}
		near(t, "located", apart(got.Pose, p), 0, 1e-9)
		near(t, "origin", r3.Norm(r3.Sub(got.Origin, origin)), 0, 1e-9)
		near(t, "rotation", farthest(got.Rot, rot), 0, 1e-9)
		near(t, "determinant located", got.Determinant/det, 1, 1e-4)
	}
	if positive != 20 {
		t.Errorf("%d positive determinants, want 20 of 40", positive)
	}
}

// B1 (Innocenti and Parenti-Castelli 1992, roots at 40 digits): the 3-RPR with
// six assembly modes. Lengths to 1e-12 (15-digit poses of size 15), determinants to
// the file's 10 digits, three of each sign, and Locate beside each mode finds it to 1e-10.
func TestSixModesOfThePlanarStage(t *testing.T) {
	var b1 struct {
		Base     map[string][]float64
		Platform [][]float64 `json:"platform_points_moving_frame"`
		Lengths  []float64   `json:"leg_lengths"`
	}
	readJSON(t, "B1_3rpr6.json", &b1)
	rows, col := readTable(t, "B1_3rpr6_modes.csv")
	if len(rows) != 6 {
		t.Fatalf("%d modes", len(rows))
	}
	m := planar([]kin.Vec{vec(b1.Base["A1"]), vec(b1.Base["A2"]), vec(b1.Base["A3"])}, vecs(b1.Platform))
	rng := seeded(17)
	positive := 0
	for k, row := range rows {
		p := kin.NewPose(kin.Coords{row[col["x"]], row[col["y"]], 0, 0, 0, row[col["phi_rad"]]})
		s := moved(t, m, p)
		for i, want := range b1.Lengths {
			near(t, "length", s.Q[i], want, 1e-12)
		}
		det := kin.Determinant(m, s)
		near(t, "determinant", det, row[col["detJ"]], 1e-7)
		if det > 0 {
			positive++
		}
		got, ok := kin.Locate(m, b1.Lengths, beside(rng, m.Frame().Freedoms, p, 0.02))
		if !ok {
			t.Errorf("mode %d: not located, residual %g", k+1, got.Residual)
			continue
		}
		near(t, "located", apart(got.Pose, p), 0, 1e-10)
	}
	if positive != 3 {
		t.Errorf("%d positive determinants, want 3 of 6", positive)
	}
}

// Inverse after forward: from home the pose comes back, wherever the machine is
// not close to singular at the pose. 1e-9. The convergence rule is kept.
func TestLocateInvertsMove(t *testing.T) {
	tried := 0
	eachMachine(t, 100, func(t *testing.T, rng *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		s := moved(t, m, p)
		if conditioning(t, m, s) < 0.01 {
			return
		}
		tried++
		q := s.Q[:f.Legs]
		far := 0.02
		if !prismatic(m) { // assembly modes are closer to each other
			far = 0.002
		}
		from := beside(rng, f.Freedoms, p, far)
		for k := 0; !reaches(m, from); k++ {
			if k == 1000 {
				t.Fatalf("no start beside %v", p.Coords())
			}
			from = beside(rng, f.Freedoms, p, far)
		}
		got, ok := kin.Locate(m, q, from)
		if !ok {
			t.Errorf("not located: residual %g after %d steps", got.Residual, got.Steps)
			return
		}
		near(t, "located", apart(got.Pose, p), 0, 1e-9)
		greatest, worst := 0.0, 0.0
		again := moved(t, m, got.Pose)
		for i, v := range q {
			greatest = math.Max(greatest, math.Abs(v))
			worst = math.Max(worst, math.Abs(v-again.Q[i]))
		}
		near(t, "residual", got.Residual, worst, 0)
		if got.Residual > 1e-10*greatest {
			t.Errorf("residual %g of %g", got.Residual, greatest)
		}
		near(t, "determinant", got.Determinant, kin.Determinant(m, again), 0)
		origin, rot := m.Place(&got.Pose)
		if origin != got.Origin || rot != got.Rot {
			t.Error("origin and rotation are not those of the pose")
		}
	})
	if tried < 100 {
		t.Errorf("only %d machines are away from singularities", tried)
	}
}

// Where there is no posture, or none can be found, Locate says so.
func TestLocateFailsHonestly(t *testing.T) {
	for _, f := range kin.Families() {
		m := f.Build(sound(f), offCentre())
		q := append([]float64(nil), moved(t, m, atHome()).Q[:f.Legs]...)
		with := func(i int, v float64) []float64 {
			out := append([]float64(nil), q...)
			out[i] = v
			return out
		}
		nan, inf := math.NaN(), math.Inf(1)
		far := kin.NewPose(kin.Coords{kin.X: nan})
		turned := atHome()
		turned.R[4] = nan
		type try struct {
			q    []float64
			from kin.Pose
		}
		tries := map[string]try{
			"a leg of 10 m or 10 rad": {with(0, 10), atHome()},
			"a NaN coordinate":        {with(1, nan), atHome()},
			"an infinite coordinate":  {with(1, inf), atHome()},
			"a NaN start":             {q, far},
			"an infinite start":       {q, kin.NewPose(kin.Coords{kin.Y: inf})},
		}
		if prismatic(m) {
			tries["a leg of -1 m"] = try{with(0, -1), atHome()}
			tries["a leg of no length"] = try{with(f.Legs-1, 0), atHome()}
		}
		if slices.ContainsFunc(f.Freedoms, kin.Freedom.Angular) { // others do not look at the rotation
			tries["a NaN rotation"] = try{q, turned}
		}
		for name, c := range tries {
			p, ok := kin.Locate(m, c.q, c.from)
			if ok {
				t.Errorf("%s, %s: located with residual %g", f.Name, name, p.Residual)
			}
			if !ok && p.Residual < 1e-6 {
				t.Errorf("%s, %s: refused with residual %g", f.Name, name, p.Residual)
			}
		}
	}
}

// A start that already answers is returned as it is, without a step; a start at a
// posture of another, singular, kind is refused.
func TestLocateFromTheAnswerAndFromASingularity(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	m := f.Build(sound(f), offCentre())
	p := kin.NewPose(kin.Coords{0.03, -0.02, 0, 0, 0, 0.1})
	got, ok := kin.Locate(m, moved(t, m, p).Q[:3], p)
	if !ok || got.Steps != 0 || got.Pose != p {
		t.Errorf("from the answer: %v after %d steps", ok, got.Steps)
	}
	square := []kin.Vec{{}, {Y: 1}, {Y: 3}}
	singular := planar(square, square)
	from := kin.NewPose(kin.Coords{2})
	if got, ok := kin.Locate(singular, []float64{2.1, 2, 2}, from); ok {
		t.Errorf("from a singular pose: located with residual %g", got.Residual)
	}
}

// Legs at the edge of what three equal legs can reach: the platform is then
// centred and the cosine rule L² = Ra²+Rb²-2RaRb cos φ gives the heading, whose
// greatest length is Ra+Rb at 180°. A millionth below there is a posture, close to a
// fold; a millionth above there is none, although the residual is as small.
func TestLocateAtTheEdgeOfReach(t *testing.T) {
	const ra, rb, edge = 0.5, 0.25, 1e-6
	m := stage(ra, rb, 0, 0.25)
	from := kin.NewPose(kin.Coords{kin.Yaw: 175 * deg})
	equal := func(l float64) []float64 { return []float64{l, l, l} }
	l := ra + rb - edge
	got, ok := kin.Locate(m, equal(l), from)
	if !ok {
		t.Fatalf("below the edge: not located, residual %g", got.Residual)
	}
	// The heading's distance from 180° is about √(2·edge·(Ra+Rb)/(Ra·Rb)) = 3.5e-3 rad, so that
	// the convergence rule's 1e-13 of the length may be 1e-13·(Ra+Rb)/(Ra·Rb)/3.5e-3 < 2e-10 rad.
	near(t, "heading", got.Pose.Coords()[kin.Yaw], math.Acos((ra*ra+rb*rb-l*l)/(2*ra*rb)), 1e-9)
	near(t, "position", r3.Norm(got.Pose.P), 0, 1e-9)
	if got, ok := kin.Locate(m, equal(ra+rb+edge), from); ok {
		t.Errorf("above the edge: located with residual %g", got.Residual)
	}
}

// The residual never rises, so that a start far away, up to a metre and a
// radian from the answer, still finds a posture (perhaps in another mode). With
// whole Newton steps and no bound on the turn 960 of these 1000 starts do, and
// with steps that are never halved 771.
func TestLocateFromAfar(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	m := f.Build(sound(f), offCentre())
	rng := seeded(21)
	located := 0
	for range 1000 {
		p := kin.NewPose(randomCoords(rng, f, 1))
		q := moved(t, m, p).Q
		from := beside(rng, f.Freedoms, p, 1)
		got, ok := kin.Locate(m, q[:], from)
		if ok {
			located++
		}
		start := 0.0
		for i, l := range moved(t, m, from).Q {
			start = math.Max(start, math.Abs(l-q[i]))
		}
		if got.Residual > start {
			t.Errorf("residual %g from %g", got.Residual, start)
		}
	}
	if located < 985 {
		t.Errorf("%d of 1000 far starts find a posture", located)
	}
}
