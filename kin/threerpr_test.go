package kin_test

import (
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// stage is a 3-RPR with equilateral triangles, turned by heading at home.
func stage(ra, rb, heading, length float64) kin.Machine {
	f := kin.FamilyNamed("3-RPR")
	d := midRange(f)
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = ra, rb, heading
	return f.Build(d, &kin.Setup{Length: length})
}

// planar is a 3-RPR by its joint centres, all in the base frame at home.
func planar(base, platform []kin.Vec) kin.Machine {
	j := &kin.Joints{Base: base, Platform: platform, HomeRot: kin.Identity()}
	return kin.FamilyNamed("3-RPR").Outright(j, &kin.Setup{Length: 1})
}

// C7 (Hunt 1978, Gosselin and Angeles 1990): determinant of the 3-RPR at its
// centre, (3√3/2) Ra Rb sin φ / √(Ra²+Rb²-2 Ra Rb cos φ). 1e-12.
func TestDeterminantOfThePlanarStage(t *testing.T) {
	rng := seeded(12)
	for range 100 {
		ra, rb, phi := between(rng, 0.3, 3), between(rng, 0.1, 2), between(rng, -3, 3)
		m := stage(ra, rb, phi, 0.7)
		want := 1.5 * math.Sqrt(3) * ra * rb * math.Sin(phi) / math.Sqrt(ra*ra+rb*rb-2*ra*rb*math.Cos(phi))
		near(t, "determinant", kin.Determinant(m, moved(t, m, atHome())), want, 1e-12)
	}
	m := stage(2, 1, 40*deg, 1)
	near(t, "example", kin.Determinant(m, moved(t, m, atHome())), 2.400582538214465, 1e-12)
	m = stage(2, 1, 180*deg, 1)
	near(t, "at 180°", kin.Determinant(m, moved(t, m, atHome())), 0, 1e-12)
}

// C7: legs whose lines meet in a point, and parallel legs, are singular. 1e-14.
func TestPlanarSingularities(t *testing.T) {
	var c7 struct {
		Data struct {
			Concurrent struct {
				Base [][]float64 `json:"A"`
				Tips [][]float64 `json:"B_world"`
			} `json:"concurrent_example"`
			Parallel struct {
				Base [][]float64 `json:"A"`
				Tips [][]float64 `json:"B_world"`
			} `json:"parallel_example"`
		}
	}
	readCheck(t, "C_sixleg_closed_forms.json", "C7", &c7)
	for name, m := range map[string]kin.Machine{
		"concurrent": planar(vecs(c7.Data.Concurrent.Base), vecs(c7.Data.Concurrent.Tips)),
		"parallel":   planar(vecs(c7.Data.Parallel.Base), vecs(c7.Data.Parallel.Tips)),
	} {
		s := moved(t, m, atHome())
		near(t, name+" determinant", kin.Determinant(m, s), 0, 1e-14)
		near(t, name+" conditioning", conditioning(t, m, s), 0, 1e-14)
		// Moved off, they are regular: the test would fail on a machine that is singular everywhere.
		if k := conditioning(t, m, moved(t, m, kin.NewPose(kin.Coords{0.3, 0.2, 0, 0, 0, 0.4}))); k < 1e-3 {
			t.Errorf("%s, moved off: conditioning %g", name, k)
		}
	}
}

// C8 (Chablat, Wenger, Caro and Angeles 2002): legs tangential to the platform
// circle, cos φ = Rb/Ra, give JᵀJ = diag(3/2, 3/2, 3Rb²), and conditioning 1 with
// Lc = √2 Rb. 1e-12.
func TestIsotropicStage(t *testing.T) {
	const ra, rb = 2.0, 1.0
	m := stage(ra, rb, math.Acos(rb/ra), 1)
	s := moved(t, m, atHome())
	checkGram(t, ownJacobian(m, s), []float64{1.5, 1.5, 3 * rb * rb}, 1e-12)
	near(t, "determinant", kin.Determinant(m, s), 2.5980762113533165, 1e-12)
	for i := range 3 {
		near(t, "length", s.Q[i], math.Sqrt(3), 1e-14)
	}
	m = stage(ra, rb, math.Acos(rb/ra), math.Sqrt2*rb)
	near(t, "conditioning", conditioning(t, m, moved(t, m, atHome())), 1, 1e-12)
}

// C9 (classical): congruent triangles on equal parallel legs move on a circle
// with all drives locked: lengths stay, and every posture is singular. 1e-14.
func TestSelfMotion(t *testing.T) {
	triangle := []kin.Vec{{}, {X: 3}, {X: 1, Y: 2}}
	m := planar(triangle, triangle)
	for k := range 72 {
		sin, cos := math.Sincos(float64(k) * 5 * deg)
		s := moved(t, m, kin.NewPose(kin.Coords{1.3 * cos, 1.3 * sin}))
		for i := range 3 {
			near(t, "length", s.Q[i], 1.3, 1e-14)
		}
		near(t, "conditioning", conditioning(t, m, s), 0, 1e-14)
	}
}

// H6 (Sefrioui and Gosselin 1995; closed form derived with sympy): at constant
// heading φ the determinant of rows (d, r×d) is
// -(3√3/2) Ra Rb sin φ (x²+y²-ρ²), ρ² = Ra²+Rb²-2RaRb cos φ: singular on a circle
// of radius ρ about the centre. Relative 1e-12; on the circle conditioning < 1e-12.
func TestSingularCircle(t *testing.T) {
	rng := seeded(13)
	for range 200 {
		ra, rb, phi := between(rng, 0.3, 2), between(rng, 0.1, 1), between(rng, 0.2, 2.8)
		rho := math.Sqrt(ra*ra + rb*rb - 2*ra*rb*math.Cos(phi))
		m := stage(ra, rb, phi, 1)
		x, y := between(rng, -2, 2), between(rng, -2, 2)
		s := moved(t, m, kin.NewPose(kin.Coords{x, y}))
		det := kin.Determinant(m, s) * s.Q[0] * s.Q[1] * s.Q[2]
		factor := 1.5 * math.Sqrt(3) * ra * rb * math.Sin(phi)
		near(t, "determinant", det/factor, rho*rho-x*x-y*y, 1e-12)
		sin, cos := math.Sincos(between(rng, 0, 2*math.Pi))
		near(t, "conditioning on the circle", conditioning(t, m, moved(t, m, kin.NewPose(kin.Coords{rho * cos, rho * sin}))), 0, 1e-12)
	}
}

// Similar triangles at heading 0 are singular at every position (H6 with φ = 0),
// which is why home_heading has no default. Conditioning < 1e-12.
func TestSimilarTrianglesAreSingularEverywhere(t *testing.T) {
	rng := seeded(14)
	for range 200 {
		m := stage(between(rng, 0.3, 2), between(rng, 0.1, 1), 0, 1)
		near(t, "conditioning", conditioning(t, m, moved(t, m, kin.NewPose(kin.Coords{between(rng, -2, 2), between(rng, -2, 2)}))), 0, 1e-12)
	}
	f := kin.FamilyNamed("3-RPR")
	if h := f.Dimensions[f.Index("home_heading")]; h.Optional || h.Low <= 0 {
		t.Errorf("home_heading has a default or its range starts at %g", h.Low)
	}
}

// Parallel legs, legs through one point, and similar hexagons (α+β = 60°, C5) are
// singular six-legged platforms. Conditioning < 1e-14, and regular once moved off
// where the singularity is not of the architecture.
func TestSpatialSingularities(t *testing.T) {
	six := kin.FamilyNamed("6-UPS")
	built := six.Build(sound(six), &kin.Setup{})
	fr := built.Frame()
	moveOff := kin.NewPose(kin.Coords{0.1, 0.07, 0.05, 0.3, -0.2, 0.25})
	parallel, meeting := outright(six, sound(six), built), outright(six, sound(six), built)
	point := kin.Vec{X: 0.1, Y: -0.2, Z: 2}
	rng := seeded(15)
	for i, a := range fr.Base {
		b := r3.Scale(0.6, a)
		parallel.Base[i], parallel.Platform[i] = b, b
		meeting.Platform[i] = r3.Sub(r3.Add(a, r3.Scale(between(rng, 0.3, 0.6), r3.Sub(point, a))), fr.Home)
	}
	for name, j := range map[string]*kin.Joints{"parallel": parallel, "meeting": meeting} {
		m := six.Outright(j, &kin.Setup{Length: 0.3})
		near(t, name+" legs", conditioning(t, m, moved(t, m, atHome())), 0, 1e-14)
		if k := conditioning(t, m, moved(t, m, moveOff)); name == "meeting" && k < 1e-3 {
			t.Errorf("%s legs, moved off: conditioning %g", name, k)
		}
	}
	similar := hexagon(0.8, 0.5, 20*deg, 40*deg, 0.9, 0, 0.5)
	for range 20 {
		p := kin.NewPose(randomCoords(rng, six, 1.5))
		near(t, "similar hexagons", conditioning(t, similar, moved(t, similar, p)), 0, 1e-14)
	}
}

// The joints stand where the picture says: at the leg azimuths plus their
// offsets, counter-clockwise, the platform's in the frame turned by the heading. 1e-15.
func TestJointsOfThePlanarStage(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	d := midRange(f)
	const heading = 0.7
	d[f.Index("home_heading")] = heading
	var base, platform []float64
	for i, azimuth := range []float64{80 * deg, 200 * deg, 350 * deg} {
		leg := string(rune('1' + i))
		a, b := 0.1*float64(i+1), -0.07*float64(i+2)
		d[f.Index("base_offset_1")-3+i] = azimuth // the three azimuths come before the offsets
		d[f.Index("base_offset_"+leg)], d[f.Index("platform_offset_"+leg)] = a, b
		base, platform = append(base, azimuth+a), append(platform, azimuth+b+heading)
	}
	m := f.Build(d, &kin.Setup{})
	p := atHome()
	for i := range 3 {
		a, b := joints(m.Frame(), &p, i)
		sa, ca := math.Sincos(base[i])
		sb, cb := math.Sincos(platform[i])
		ra, rb := d[f.Index("base_radius")], d[f.Index("platform_radius")]
		near(t, "base joint", r3.Norm(r3.Sub(a, kin.Vec{X: ra * ca, Y: ra * sa})), 0, 1e-15)
		near(t, "platform joint", r3.Norm(r3.Sub(b, kin.Vec{X: rb * cb, Y: rb * sb})), 0, 1e-15)
	}
}
