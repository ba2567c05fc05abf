package assembly

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// stage is the planar machine of check B1, home at its mode 5 (φ = 57.4°).
func stage(t testing.TB) (kin.Machine, Result) {
	base := []kin.Vec{{}, {X: 15.91}, {Y: 10}}
	platform := []kin.Vec{{}, {X: 17.04}, {X: 13.23637323943662, Y: 16.096708466836507}}
	r := ThreePlanar([3][2]float64{{0, 0}, {15.91, 0}, {0, 10}}, [3][2]float64{{0, 0}, {17.04, 0}, {platform[2].X, platform[2].Y}},
		[3]float64{14.98, 15.38, 12})
	k, far := nearest(r.Modes, &Mode{Origin: kin.Vec{X: 14.9201332471544, Y: -1.33791774304623}, Rot: kin.RPY(0, 0, 1.00203853990225)})
	if far > 1e-9 {
		t.Fatal("mode 5 is missing")
	}
	home := r.Modes[k]
	return kin.FamilyNamed("3-RPR").Outright(
		&kin.Joints{Base: base, Platform: platform, Home: home.Origin, HomeRot: home.Rot},
		&kin.Setup{Length: 10}), r
}

// There and back again, and a mode of the other sign of the determinant is not reached by going through
// the singular posture between.
func TestFollow(t *testing.T) {
	m, r := stage(t)
	f := m.Frame()
	home := kin.Pose{R: kin.Identity()}
	q0 := []float64{14.98, 15.38, 12}
	rng := rand.New(rand.NewPCG(2, 2))
	arrived, blocked := 0, 0
	for range 60 {
		q1 := []float64{uniform(rng, 5, 25), uniform(rng, 5, 25), uniform(rng, 5, 30)}
		p, ok := Follow(m, home, q0, q1)
		var s kin.State
		m.Move(&p, &s)
		if d := kin.Determinant(m, &s); !(d < 0) { // that of mode 5 is -16.6
			t.Fatalf("determinant %g on the way to %v", d, q1)
		}
		if !ok {
			blocked++
			// The posture is at the singular surface: the determinant is far below home's.
			if d := kin.Determinant(m, &s); math.Abs(d) > 0.1 {
				t.Errorf("blocked at the determinant %g on the way to %v", d, q1)
			}
			continue
		}
		arrived++
		for i, want := range q1 {
			if !(math.Abs(s.Q[i]-want) < 1e-9) {
				t.Errorf("arrived with %v, want %v", s.Q[:3], q1)
			}
		}
		back, ok := Follow(m, p, q1, q0)
		if !ok || Distance(f, &back, &home) > 1e-9 {
			t.Errorf("back from %v: %v, %g off", q1, ok, Distance(f, &back, &home))
		}
		modes, _ := Modes(f, nil, q1, 0)
		if k := Reached(m, modes.Modes, q1); k < 0 || modes.Modes[k].Determinant >= 0 {
			t.Errorf("mode %d is reached at %v", k, q1)
		}
	}
	if arrived < 10 || blocked < 10 {
		t.Errorf("%d arrived, %d were blocked: too few of one sort to be a test", arrived, blocked)
	}
	if k := Reached(m, r.Modes, q0); k < 0 || Separation(m, r.Modes)[k] == 0 {
		t.Errorf("home is mode %d", k)
	} else if at := r.Modes[k].Pose(f); Distance(f, &at, &home) > 1e-9 {
		t.Errorf("home is not the mode reached without moving")
	}
	if _, ok := Follow(m, home, []float64{10, 15, 12}, q0); ok {
		t.Error("a start that does not belong to the pose is taken")
	}
	if _, ok := Follow(m, home, q0, []float64{100, 15, 12}); ok {
		t.Error("a leg far too long is reached")
	}
}

// One leg's length moved to where the discriminant of the polynomial of degree six vanishes: the way ends
// there, for Follow stops where two modes merge (known without it, by bisection on their number).
func TestFollowStopsAtMerger(t *testing.T) {
	m, r := stage(t)
	home := kin.Pose{R: kin.Identity()}
	q0 := []float64{14.98, 15.38, 12}
	at := Reached(m, r.Modes, q0)
	near := func(l float64) bool { // whether the mode continued from home still exists at third length l
		_, ok := Follow(m, home, q0, []float64{14.98, 15.38, l})
		return ok
	}
	lo, hi := 12.0, 40.0
	if at < 0 || near(hi) {
		t.Fatal("no end on this way")
	}
	for hi-lo > 1e-6 {
		if mid := (lo + hi) / 2; near(mid) {
			lo = mid
		} else {
			hi = mid
		}
	}
	count := func(l float64) int {
		r, _ := Modes(m.Frame(), nil, []float64{14.98, 15.38, l}, 0)
		return len(r.Modes)
	}
	if before, after := count(lo-1e-3), count(hi+1e-3); before != after+2 {
		t.Errorf("%d modes before the end of the way at %g, %d after it, want two less", before, lo, after)
	}
}

// Distances between the six modes of B1, from the table's positions and headings.
func TestSeparation(t *testing.T) {
	m, r := stage(t)
	rows, col := readTable(t, "B1_3rpr6_modes.csv")
	sep := Separation(m, r.Modes)
	for i, a := range rows {
		want := math.Inf(1)
		for j, b := range rows {
			if i != j {
				turn := math.Remainder(a[col["phi_rad"]]-b[col["phi_rad"]], 2*math.Pi)
				want = math.Min(want, math.Sqrt(math.Pow(a[col["x"]]-b[col["x"]], 2)+math.Pow(a[col["y"]]-b[col["y"]], 2)+math.Pow(10*turn, 2)))
			}
		}
		k, _ := nearest(r.Modes, &Mode{Origin: kin.Vec{X: a[col["x"]], Y: a[col["y"]]}, Rot: kin.RPY(0, 0, a[col["phi_rad"]])})
		if !(math.Abs(sep[k]-want) < 1e-9) {
			t.Errorf("mode %d: separation %.12g, want %.12g", i+1, sep[k], want)
		}
	}
	if s := Separation(m, r.Modes[:1]); !math.IsInf(s[0], 1) {
		t.Errorf("a single mode: %v", s)
	}
	// Half a turn and a shift at right angles: 3-4-5 with Lc·angle = 4.
	f := &kin.Frame{Length: 4 / math.Pi}
	if d := Distance(f, &kin.Pose{R: kin.Identity()}, &kin.Pose{P: kin.Vec{Y: 3}, R: kin.RPY(math.Pi, 0, 0)}); !(math.Abs(d-5) < 1e-12) {
		t.Errorf("distance %g, want 5", d)
	}
}

// The quaternion of a random rotation gives it back, and the rotation vector its angle and axis, at the half turn too.
func TestRotations(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 4))
	for n := range 500 {
		w := ball(rng, 1)
		w = r3.Scale(uniform(rng, 0, math.Pi)/r3.Norm(w), w)
		if n%10 == 0 {
			w = r3.Scale(math.Pi/r3.Norm(w), w)
		}
		r := kin.Exp(w)
		back := rotation(quaternion(&r))
		got := rotationVector(&r)
		for i := range r {
			if !(math.Abs(back[i]-r[i]) < 1e-14) {
				t.Fatalf("rotation of the quaternion is off by %g", back[i]-r[i])
			}
		}
		if off := math.Min(r3.Norm(r3.Sub(got, w)), r3.Norm(r3.Add(got, w))); !(off < 1e-12) || math.Abs(r3.Norm(w)-math.Pi) > 1e-9 && r3.Norm(r3.Sub(got, w)) > 1e-12 {
			t.Fatalf("rotation vector %v, want %v", got, w)
		}
	}
}
