package kin_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// armOf is a level-arm with the named dimensions, stops far away unless given.
func armOf(dims map[string]float64, s *kin.Setup) (kin.Machine, []float64) {
	f := kin.FamilyNamed("level-arm")
	d := midRange(f)
	for _, stop := range []string{"upper_angle", "forearm_angle", "elbow_angle"} {
		d[f.Index(stop+"_min")], d[f.Index(stop+"_range")] = -180*deg, 360*deg
	}
	for name, v := range dims {
		d[f.Index(name)] = v
	}
	return f.Build(d, s), d
}

// randomArm is a level-arm without stops and a pose that it reaches, not stretched or folded.
func randomArm(rng *rand.Rand, mode float64) (m kin.Machine, d []float64, c kin.Coords) {
	for {
		dims := map[string]float64{"mode": mode, "wrist_drop": between(rng, -0.1, 0.2)}
		f := kin.FamilyNamed("level-arm")
		for i, v := range randomDesign(rng, f) {
			if n := &f.Dimensions[i]; !n.Optional {
				dims[n.Name] = v
			}
		}
		m, d = armOf(dims, offCentre())
		c = kin.Coords{kin.X: between(rng, -0.6, 0.6), kin.Y: between(rng, -1, 1), kin.Z: between(rng, -0.6, 0.6), kin.Yaw: between(rng, -3, 3)}
		if reaches(m, kin.NewPose(c)) {
			return m, d, c
		}
	}
}

// E7 (two links driven by absolute angles; inverse after forward to 2e-16): the pose of the
// example has the angles of the file, and det of (r, z) by them is a2 a3 sin(θ3-θ2); that of
// (x, y, z, yaw) by all four is -r times it. 1e-14.
func TestLevelArm(t *testing.T) {
	var e7 struct {
		Data     map[string]any
		Expected struct {
			X   []float64
			IK  []float64 `json:"ik_elbow_up_deg"`
			Det float64   `json:"det_value"`
		}
	}
	readCheck(t, "E_other_architectures.json", "E7", &e7)
	v := func(name string) float64 { return e7.Data[name].(float64) }
	m, _ := armOf(map[string]float64{
		"base_offset": v("a1"), "upper_arm": v("a2"), "forearm": v("a3"), "wrist_offset": v("dw"), "base_height": v("d1"),
		"wrist_drop": v("hw"), "home_reach": 0.7, "home_height": 0.5, "mode": 1,
	}, &kin.Setup{Length: 1})
	x := e7.Expected.X
	s := moved(t, m, kin.NewPose(kin.Coords{x[0] - 0.7, x[1], x[2] - 0.5, 0, 0, x[3]}))
	for i, want := range e7.Expected.IK {
		near(t, "angle", s.Q[i], want*deg, 1e-14)
	}
	r := math.Hypot(x[0], x[1])
	near(t, "determinant", 1/kin.Determinant(m, s), -r*e7.Expected.Det, 1e-14)
}

// Inverse kinematics against the forward kinematics of E7, r = a1 + a2 cos θ2 + a3 cos θ3 + dw, z = d1 +
// a2 sin θ2 + a3 sin θ3 - hw, yaw = θ1 + θ4, for arms anywhere, in both modes. 1e-14 m, 1e-13 rad.
func TestLevelArmForward(t *testing.T) {
	rng := seeded(41)
	for k := range 400 {
		mode := float64(1 - k%2*2)
		m, d, c := randomArm(rng, mode)
		f := kin.FamilyNamed("level-arm")
		v := func(name string) float64 { return d[f.Index(name)] }
		p := kin.NewPose(c)
		s := moved(t, m, p)
		origin, rot := m.Place(&p)
		q := &s.Q
		r := v("base_offset") + v("upper_arm")*math.Cos(q[1]) + v("forearm")*math.Cos(q[2]) + v("wrist_offset")
		z := v("base_height") + v("upper_arm")*math.Sin(q[1]) + v("forearm")*math.Sin(q[2]) - v("wrist_drop")
		want := kin.Vec{X: r * math.Cos(q[0]), Y: r * math.Sin(q[0]), Z: z}
		near(t, "origin", r3.Norm(r3.Sub(origin, want)), 0, 1e-14)
		near(t, "rotation", farthest(rot, kin.RPY(0, 0, q[0]+q[3])), 0, 1e-13)
		if up := math.Sin(q[1] - q[2]); up*mode <= 0 {
			t.Errorf("mode %g: sine of the elbow %g", mode, up)
		}
		level := v("base_offset") + v("upper_arm") + v("forearm") + v("wrist_offset")
		near(t, "serial", m.Serial(s), math.Min(math.Abs(math.Sin(q[1]-q[2])), math.Abs(r)/level), 1e-14)
		det := -r * v("upper_arm") * v("forearm") * math.Sin(q[2]-q[1])
		near(t, "determinant", det*kin.Determinant(m, s), 1, 1e-11)
	}
}

// planarOf is the part of J for θ2 and θ3 against r and z, in the plane of the arm.
func planarOf(s *kin.State) *mat.Dense {
	sin, cos := math.Sincos(s.Q[0])
	out := mat.NewDense(2, 2, nil)
	for i := range 2 {
		row := s.J[6*(1+i):]
		out.SetRow(i, []float64{cos*row[0] + sin*row[1], row[2]})
	}
	return out
}

// E7 (Salisbury and Craig 1982 for two links): equal links at right angles are isotropic in r and z, wherever
// they point; unequal ones are not. 1e-14.
func TestIsotropicLevelArm(t *testing.T) {
	rng := seeded(42)
	for range 50 {
		a := between(rng, 0.3, 0.9)
		dims := map[string]float64{"base_offset": 0.1, "base_height": 0.5, "upper_arm": a, "forearm": a, "wrist_offset": 0.1, "home_reach": 0.8, "home_height": 0.5, "mode": 1}
		for _, c := range []struct{ ratio, elbow float64 }{{1, 90 * deg}, {1, 70 * deg}, {0.8, 90 * deg}} {
			dims["forearm"] = c.ratio * a
			m, _ := armOf(dims, offCentre())
			up := between(rng, 20*deg, 120*deg)
			r := 0.2 + a*math.Cos(up) + c.ratio*a*math.Cos(up-c.elbow)
			z := 0.5 + a*math.Sin(up) + c.ratio*a*math.Sin(up-c.elbow)
			q := between(rng, -1, 1)
			heading := kin.RPY(0, 0, q)
			tool := heading.Apply(offCentre().Tool)
			s := moved(t, m, kin.Pose{P: kin.Vec{X: r*math.Cos(q) - 0.8 + tool.X - offCentre().Tool.X, Y: r*math.Sin(q) + tool.Y - offCentre().Tool.Y, Z: z - 0.5}, R: heading})
			v := singularValues(t, planarOf(s))
			k := v[1] / v[0]
			if c.ratio == 1 && c.elbow == 90*deg {
				near(t, "1/kappa", k, 1, 1e-14)
			} else if k > 0.95 {
				t.Errorf("links %g to 1 at %g°: 1/kappa %g", c.ratio, c.elbow/deg, k)
			}
		}
	}
}

// E7's closure: from the angles of Move the pins of both parallelograms are laid out with rods as long as
// the links, the plates at elbow and wrist are turned by Newton's method until the rods fit, and
// neither turns; the wrist plate carries the platform origin to where Place has it. 1e-14.
func TestWristStaysLevel(t *testing.T) {
	rng := seeded(43)
	for range 100 {
		m, d, c := randomArm(rng, 1)
		f := kin.FamilyNamed("level-arm")
		v := func(name string) float64 { return d[f.Index(name)] }
		p := kin.NewPose(c)
		s := moved(t, m, p)
		origin, _ := m.Place(&p)
		turned := func(a float64, p [2]float64) [2]float64 {
			sin, cos := math.Sincos(a)
			return [2]float64{cos*p[0] - sin*p[1], sin*p[0] + cos*p[1]}
		}
		// fit turns the plate at `to` until its pin is as far from the pin of the plate at `from` as the link is
		// long. Where pins lie along the link, which is the parallelogram's dead point, a second answer is near.
		fit := func(from, to, pin [2]float64, lower, link float64) float64 {
			a := 0.05
			for range 50 {
				near := func(a float64) float64 {
					b, e := turned(lower, pin), turned(a, pin)
					return math.Hypot(to[0]+e[0]-from[0]-b[0], to[1]+e[1]-from[1]-b[1]) - link
				}
				a -= near(a) * 2e-6 / (near(a+1e-6) - near(a-1e-6))
			}
			return a
		}
		shoulder := [2]float64{v("base_offset"), v("base_height")}
		along := func(from [2]float64, length, angle float64) [2]float64 {
			return [2]float64{from[0] + length*math.Cos(angle), from[1] + length*math.Sin(angle)}
		}
		elbow := along(shoulder, v("upper_arm"), s.Q[1])
		wrist := along(elbow, v("forearm"), s.Q[2])
		a := fit(shoulder, elbow, along([2]float64{}, 0.1, s.Q[1]+80*deg), 0, v("upper_arm"))
		b := fit(elbow, wrist, along([2]float64{}, 0.1, s.Q[2]+110*deg), a, v("forearm"))
		near(t, "turn of the elbow plate", a, 0, 1e-13)
		near(t, "turn of the wrist plate", b, 0, 1e-13)
		tip := turned(b, [2]float64{v("wrist_offset"), -v("wrist_drop")})
		near(t, "reach", math.Hypot(origin.X, origin.Y), wrist[0]+tip[0], 1e-13)
		near(t, "height", origin.Z, wrist[1]+tip[1], 1e-13)
	}
}

// The stops: each names what is at its stop, and holds a little inside.
func TestLevelArmStops(t *testing.T) {
	base := map[string]float64{"base_offset": 0.1, "base_height": 0.5, "upper_arm": 0.5, "forearm": 0.5, "wrist_offset": 0.1,
		"home_reach": 0.7, "home_height": 0.5, "mode": 1}
	m, _ := armOf(base, offCentre())
	q := moved(t, m, atHome()).Q // an equilateral triangle: 60°, -60°
	near(t, "upper arm", q[1], 60*deg, 1e-14)
	near(t, "forearm", q[2], -60*deg, 1e-14)
	for _, c := range []struct {
		stop, what string
		angle      float64
		leg        int
	}{{"upper_angle", "upper arm", 60, 1}, {"forearm_angle", "forearm", -60, 2}, {"elbow_angle", "parallelogram", 120, 1}} {
		for _, at := range []struct {
			least, span float64
			ok          bool
		}{{c.angle, 10, true}, {c.angle - 10, 10, true}, {c.angle + 1e-3, 10, false}, {c.angle - 10, 9.999, false}, {c.angle - 100, 50, false}} {
			dims := map[string]float64{c.stop + "_min": at.least * deg, c.stop + "_range": at.span * deg}
			for k, v := range base {
				dims[k] = v
			}
			m, _ := armOf(dims, offCentre())
			var s kin.State
			p := atHome()
			m.Move(&p, &s)
			switch {
			case at.ok && s.Fail != kin.Reached:
				t.Errorf("%s from %g° by %g°: fail %d at %s", c.stop, at.least, at.span, s.Fail, s.What)
			case !at.ok && (s.Fail != kin.Stopped || s.What != c.what || s.Leg != c.leg):
				t.Errorf("%s from %g° by %g°: fail %d at leg %d, %q", c.stop, at.least, at.span, s.Fail, s.Leg, s.What)
			}
		}
	}
	// A range beyond 180° is one range: the angle is told on its turn.
	dims := map[string]float64{"forearm_angle_min": -270 * deg, "forearm_angle_range": 250 * deg}
	for k, v := range base {
		dims[k] = v
	}
	dims["base_offset"] = 0.6
	dims["home_reach"] = 0.7 + 0.5*math.Cos(80*deg) + 0.5*math.Cos(-200*deg)
	dims["home_height"] = 0.5 + 0.5*math.Sin(80*deg) + 0.5*math.Sin(-200*deg)
	dims["mode"] = -1
	m, _ = armOf(dims, offCentre())
	near(t, "forearm", moved(t, m, atHome()).Q[2], -200*deg, 1e-13)
}

// Beyond reach, too near, on the column's axis and stretched out there is no posture; just inside there is.
func TestLevelArmOutOfReach(t *testing.T) {
	m, _ := armOf(map[string]float64{"base_offset": 0, "base_height": 0.5, "upper_arm": 0.5, "forearm": 0.25, "wrist_offset": 0,
		"home_reach": 0.5, "home_height": 0.5, "mode": 1}, &kin.Setup{Length: 0.3})
	for _, c := range []struct {
		r, z float64
		fail kin.Fail
		leg  int
	}{
		{0.75, 0, kin.OutOfReach, 1}, {0.7499999, 0, kin.Reached, -1}, {0.8, 0, kin.OutOfReach, 1},
		{0.25, 0, kin.OutOfReach, 1}, {0.2500001, 0, kin.Reached, -1}, {0.1, 0, kin.OutOfReach, 1},
		{0, 0.5, kin.OutOfReach, 0}, {1e-6, 0.5, kin.Reached, -1},
	} {
		p := kin.NewPose(kin.Coords{kin.X: c.r - 0.5, kin.Z: c.z})
		var s kin.State
		if m.Move(&p, &s); s.Fail != c.fail || s.Leg != c.leg {
			t.Errorf("r %g, z %g: fail %d at leg %d, want %d at %d", c.r, c.z, s.Fail, s.Leg, c.fail, c.leg)
		}
	}
}

// The shoulder describes a circle about the column's axis.
func TestLevelArmSweep(t *testing.T) {
	m, _ := armOf(map[string]float64{"base_offset": 0.2}, offCentre())
	points := kin.Sweep(m, 0, 1)
	if len(points) != 4 {
		t.Fatalf("%d points", len(points))
	}
	sum := kin.Vec{}
	for _, p := range points {
		near(t, "radius", math.Hypot(p.X, p.Y), 0.2, 1e-15)
		sum = r3.Add(sum, p)
	}
	near(t, "balance", math.Hypot(sum.X, sum.Y), 0, 1e-15)
}
