package kin_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// tripodOf is a 3-RPS with legs at the azimuths.
func tripodOf(ra, rb, height float64, azimuths [3]float64, s *kin.Setup) kin.Machine {
	f := kin.FamilyNamed("3-RPS")
	d := midRange(f)
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_height")] = ra, rb, height
	copy(d[f.Index("leg_azimuths_1"):], azimuths[:])
	return f.Build(d, s)
}

// e3 is the tripod of check E3.
type e3 struct {
	Data struct {
		Rb    float64 `json:"platform_radius"`
		Ra    float64 `json:"base_radius"`
		Z     float64
		Phi   float64 `json:"azimuth_phi_deg"`
		Theta float64 `json:"tilt_theta_deg"`
	}
	Expected struct {
		P       []float64
		Lengths []float64 `json:"leg_lengths"`
	}
}

func readE3(t *testing.T, s *kin.Setup) (e3, kin.Machine) {
	var c e3
	readCheck(t, "E_other_architectures.json", "E3", &c)
	return c, tripodOf(c.Data.Ra, c.Data.Rb, c.Data.Z, [3]float64{0, 120 * deg, 240 * deg}, s)
}

// tilted is Rz(φ) Ry(θ) Rz(-φ): a tilt by θ without torsion.
func tilted(phi, theta float64) kin.Rot {
	a, b, c := kin.RPY(0, 0, phi), kin.RPY(0, theta, 0), kin.RPY(0, 0, -phi)
	ab := a.Mul(&b)
	return ab.Mul(&c)
}

// E3 (Bonev 2002): legs at 0°, 120° and 240° leave the platform no torsion, and
// move it by x = -(r/2)(1-cos θ) cos 2φ, y = (r/2)(1-cos θ) sin 2φ. 200 poses, told with any
// x, y and yaw, which are not looked at. 1e-14, as tan(θ/2) stays below 4.
func TestParasiticMotionOfTheTripod(t *testing.T) {
	c, m := readE3(t, offCentre())
	rng := seeded(31)
	check := func(phi, theta, z float64, want *kin.Vec) {
		rot := tilted(phi, theta)
		tool := rot.Apply(offCentre().Tool)
		roll, pitch, _ := rot.RPY()
		p := kin.NewPose(kin.Coords{between(rng, -1, 1), between(rng, -1, 1), z + tool.Z - offCentre().Tool.Z, roll, pitch, between(rng, -3, 3)})
		origin, got := m.Place(&p)
		if want == nil {
			k := c.Data.Rb / 2 * (1 - math.Cos(theta))
			want = &kin.Vec{X: -k * math.Cos(2*phi), Y: k * math.Sin(2*phi), Z: c.Data.Z + z}
		}
		near(t, "origin", r3.Norm(r3.Sub(origin, *want)), 0, 1e-14)
		near(t, "rotation", farthest(got, rot), 0, 1e-14)
	}
	for range 200 {
		check(between(rng, -math.Pi, math.Pi), between(rng, 0, 150*deg), between(rng, -0.3, 0.3), nil)
	}
	example := vec(c.Expected.P)
	check(c.Data.Phi*deg, c.Data.Theta*deg, 0, &example)
}

// The definition of the family for legs 120° apart: tan yaw = sin pitch sin roll/(cos pitch + cos roll). 1e-15.
func TestParasiticTurnOfTheTripod(t *testing.T) {
	rng := seeded(32)
	for range 200 {
		first := between(rng, -math.Pi, math.Pi)
		m := tripodOf(0.4, 0.2, 0.6, [3]float64{first, first + 120*deg, first + 240*deg}, offCentre())
		roll, pitch := between(rng, -1.3, 1.3), between(rng, -1.3, 1.3)
		p := kin.NewPose(kin.Coords{kin.Roll: roll, kin.Pitch: pitch})
		_, rot := m.Place(&p)
		r, q, yaw := rot.RPY()
		near(t, "yaw", yaw, math.Atan(math.Sin(pitch)*math.Sin(roll)/(math.Cos(pitch)+math.Cos(roll))), 1e-14)
		near(t, "roll", r, roll, 1e-14)
		near(t, "pitch", q, pitch, 1e-14)
	}
}

// E3's leg lengths, of an example and of its eight real postures (polynomial homotopy and
// Newton, printed to 12 digits): 1e-11. Locate, started beside each, finds it to 1e-9.
func TestPosturesOfTheTripod(t *testing.T) {
	c, m := readE3(t, &kin.Setup{Length: 0.3})
	example := kin.Pose{R: tilted(c.Data.Phi*deg, c.Data.Theta*deg)}
	for i, q := range moved(t, m, example).Q[:3] {
		near(t, "length", q, c.Expected.Lengths[i], 1e-14)
	}
	rows, col := readTable(t, "E3_3rps_fk.csv")
	if len(rows) != 8 {
		t.Fatalf("%d postures", len(rows))
	}
	rng := seeded(33)
	for k, row := range rows {
		p := kin.Pose{P: vec(row[col["px"] : col["px"]+3]), R: quaternion(row[col["q0"] : col["q0"]+4])}
		p.P.Z -= c.Data.Z
		for i, q := range moved(t, m, p).Q[:3] {
			near(t, "length", q, c.Expected.Lengths[i], 1e-11)
		}
		got, ok := kin.Locate(m, c.Expected.Lengths, beside(rng, m.Frame().Freedoms, p, 1e-3))
		if !ok {
			t.Errorf("posture %d: not located, residual %g after %d steps", k+1, got.Residual, got.Steps)
			continue
		}
		near(t, "located", apart(got.Pose, p), 0, 1e-9)
	}
}

// quaternion is the rotation of a unit quaternion, scalar first.
func quaternion(q []float64) kin.Rot {
	w, x, y, z := q[0], q[1], q[2], q[3]
	return kin.Rot{
		1 - 2*(y*y+z*z), 2 * (x*y - w*z), 2 * (x*z + w*y),
		2 * (x*y + w*z), 1 - 2*(x*x+z*z), 2 * (y*z - w*x),
		2 * (x*z - w*y), 2 * (y*z + w*x), 1 - 2*(x*x+y*y),
	}
}

// anyTripod is a 3-RPS with legs anywhere around, at least 40° apart.
func anyTripod(rng *rand.Rand) (kin.Machine, [3]float64) {
	a := [3]float64{between(rng, -math.Pi, math.Pi)}
	a[1] = a[0] + between(rng, 40, 140)*deg
	a[2] = a[1] + between(rng, 40, 140)*deg
	return tripodOf(between(rng, 0.2, 0.6), between(rng, 0.1, 0.4), between(rng, 0.4, 0.9), a, offCentre()), a
}

// What defines the family holds wherever the legs stand: a spherical joint stays in the
// vertical plane through the z axis at its azimuth, the tool point has the height of the pose and the
// platform its roll and pitch, and home is level and centred. 1e-15 m.
func TestLegsOfTheTripodStayInTheirPlanes(t *testing.T) {
	rng := seeded(34)
	for range 300 {
		m, azimuths := anyTripod(rng)
		f := m.Frame()
		home := atHome()
		if origin, rot := m.Place(&home); r3.Norm(r3.Sub(origin, f.Home)) > 1e-16 || rot != kin.Identity() {
			t.Errorf("home at %v, turned %v", origin, rot)
		}
		c := kin.Coords{kin.Z: between(rng, -0.2, 0.2), kin.Roll: between(rng, -0.7, 0.7), kin.Pitch: between(rng, -0.7, 0.7)}
		p := kin.NewPose(c)
		origin, rot := m.Place(&p)
		for i, a := range azimuths {
			joint := r3.Add(origin, rot.Apply(f.Platform[i]))
			near(t, "joint out of its plane", joint.Y*math.Cos(a)-joint.X*math.Sin(a), 0, 1e-15)
		}
		near(t, "height", r3.Add(origin, rot.Apply(f.Tool)).Z, f.Home.Z+f.Tool.Z+c[kin.Z], 1e-15)
		roll, pitch, _ := rot.RPY()
		near(t, "roll", roll, c[kin.Roll], 1e-14)
		near(t, "pitch", pitch, c[kin.Pitch], 1e-14)
	}
}

// x, y and yaw of a pose are not looked at; no number in them is told.
func TestTripodTakesThreeCoordinates(t *testing.T) {
	rng := seeded(35)
	for range 50 {
		m, _ := anyTripod(rng)
		c := kin.Coords{kin.Z: between(rng, -0.1, 0.1), kin.Roll: between(rng, -0.4, 0.4), kin.Pitch: between(rng, -0.4, 0.4)}
		a := moved(t, m, kin.NewPose(c))
		c[kin.X], c[kin.Y], c[kin.Yaw] = between(rng, -9, 9), between(rng, -9, 9), between(rng, -3, 3)
		b := moved(t, m, kin.NewPose(c))
		for i := range 18 {
			near(t, "J", b.J[i], a.J[i], 1e-13)
		}
		for i := range 3 {
			near(t, "length", b.Q[i], a.Q[i], 1e-14)
			near(t, "base chord", b.BaseChord[i], a.BaseChord[i], 1e-14)
			near(t, "platform chord", b.PlatformChord[i], a.PlatformChord[i], 1e-14)
		}
	}
	m, _ := anyTripod(rng)
	p := kin.NewPose(kin.Coords{kin.Y: math.NaN()})
	var s kin.State
	if m.Move(&p, &s); s.Fail != kin.NotFinite {
		t.Errorf("NaN in y: fail %d", s.Fail)
	}
}

// Two legs in one plane leave the platform a freedom more, and no pose decides its posture.
func TestTripodWithTwoLegsInOnePlane(t *testing.T) {
	m := tripodOf(0.4, 0.2, 0.6, [3]float64{0, 90 * deg, 90 * deg}, offCentre())
	for _, c := range []kin.Coords{{}, {kin.Roll: 0.2, kin.Pitch: 0.1}} {
		p := kin.NewPose(c)
		var s kin.State
		if m.Move(&p, &s); s.Fail == kin.Reached {
			t.Errorf("reached %v with lengths %v", c, s.Q[:3])
		}
	}
}

// Tie against differences of fourth order (gonum) of the platform as Place puts it, over the
// height of the tool point and turns about x and y: 1e-9, see TestJacobianAgainstDifferences.
// The columns are those that the joints admit and the legs' wrenches times them are J: 1e-14.
func TestTieOfTheTripod(t *testing.T) {
	rng := seeded(36)
	for range 100 {
		m, _ := anyTripod(rng)
		f := m.Frame()
		p := settled(m, kin.Coords{kin.Z: between(rng, -0.1, 0.1), kin.Roll: between(rng, -0.6, 0.6), kin.Pitch: between(rng, -0.6, 0.6)})
		_, here := m.Place(&p)
		back := kin.Rot{here[0], here[3], here[6], here[1], here[4], here[7], here[2], here[5], here[8]}
		want := mat.NewDense(6, 3, nil)
		fd.Jacobian(want, func(y, step []float64) {
			e := kin.Exp(kin.Vec{X: step[1] / f.Length, Y: step[2] / f.Length})
			beside := kin.Pose{P: r3.Add(p.P, kin.Vec{Z: step[0]}), R: e.Mul(&p.R)}
			origin, rot := m.Place(&beside)
			tool := r3.Add(origin, rot.Apply(f.Tool))
			turn := rot.Mul(&back)
			copy(y, []float64{tool.X, tool.Y, tool.Z,
				f.Length * (turn[7] - turn[5]) / 2, f.Length * (turn[2] - turn[6]) / 2, f.Length * (turn[3] - turn[1]) / 2})
		}, make([]float64, 3), &fd.JacobianSettings{Formula: fd.Formula{
			Stencil:    []fd.Point{{Loc: -2, Coeff: 1. / 12}, {Loc: -1, Coeff: -8. / 12}, {Loc: 1, Coeff: 8. / 12}, {Loc: 2, Coeff: -1. / 12}},
			Derivative: 1, Step: 1e-4,
		}})
		var tie, wrenches [36]float64
		m.Tie(&p, &tie)
		s := moved(t, m, p)
		kin.Wrenches(m, s, &wrenches)
		var power mat.Dense
		power.Mul(mat.NewDense(6, 6, wrenches[:]), mat.NewDense(6, 6, tie[:]))
		for r := range 6 {
			for k := range 3 {
				near(t, "tie", tie[6*r+k], want.At(r, k), 1e-9)
				near(t, "beyond the own freedoms", tie[6*r+3+k], 0, 0)
				if r < 3 {
					near(t, "J", power.At(r, k), s.J[6*r+int(f.Freedoms[k])], 1e-14)
				} else {
					near(t, "power of a constraint", power.At(r, k), 0, 1e-14)
				}
			}
		}
	}
}

// The unit wrenches against the joint centres: a force along the leg, and one along the
// revolute axis at the base, both through the spherical joint. 1e-14.
func TestWrenchesOfTheTripod(t *testing.T) {
	rng := seeded(37)
	for range 50 {
		m, azimuths := anyTripod(rng)
		f := m.Frame()
		p := settled(m, kin.Coords{kin.Z: 0.05, kin.Roll: between(rng, -0.6, 0.6), kin.Pitch: between(rng, -0.6, 0.6)})
		var rows [36]float64
		kin.Wrenches(m, moved(t, m, p), &rows)
		tool := r3.Add(r3.Add(f.Home, f.Tool), p.P)
		for i := range 3 {
			a, b := joints(f, &p, i)
			for k, u := range []kin.Vec{r3.Unit(r3.Sub(b, a)), {X: -math.Sin(azimuths[i]), Y: math.Cos(azimuths[i])}} {
				mo := r3.Cross(r3.Sub(b, tool), u)
				for n, want := range []float64{u.X, u.Y, u.Z, mo.X / f.Length, mo.Y / f.Length, mo.Z / f.Length} {
					near(t, "wrench", rows[6*(i+3*k)+n], want, 1e-14)
				}
			}
		}
	}
}

// Steps about axes in the base plane gather a turn about z, and a start may have any: Locate drops
// both, so that Newton's method converges as fast as where all freedoms are free. 1e-9.
func TestLocateDropsTheTurn(t *testing.T) {
	_, m := readE3(t, offCentre())
	goal := settled(m, kin.Coords{kin.Z: 0.05, kin.Roll: 0.5, kin.Pitch: -0.4})
	q := moved(t, m, goal).Q[:3]
	for _, yaw := range []float64{0, 1, -2.5} {
		got, ok := kin.Locate(m, q, kin.NewPose(kin.Coords{kin.X: 0.3, kin.Yaw: yaw}))
		if !ok {
			t.Fatalf("from yaw %g: not located, residual %g", yaw, got.Residual)
		}
		near(t, "located", apart(got.Pose, goal), 0, 1e-9)
		if got.Steps > 8 {
			t.Errorf("%d steps: Newton's method should end in a few", got.Steps)
		}
	}
}
