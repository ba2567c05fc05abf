package kin_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// toSegment is the distance of a point from the segment p q.
func toSegment(x, p, q kin.Vec) float64 {
	d := r3.Sub(q, p)
	t := math.Max(0, math.Min(1, r3.Dot(r3.Sub(x, p), d)/r3.Norm2(d)))
	return r3.Norm(r3.Sub(x, r3.Add(p, r3.Scale(t, d))))
}

// enumerated is the distance of two segments as the least over all that it can
// be: the common normal of the two lines where it meets both segments, or an end
// of one and the nearest point of the other.
func enumerated(p1, q1, p2, q2 kin.Vec) float64 {
	best := math.Min(
		math.Min(toSegment(p1, p2, q2), toSegment(q1, p2, q2)),
		math.Min(toSegment(p2, p1, q1), toSegment(q2, p1, q1)))
	u, v, w := r3.Sub(q1, p1), r3.Sub(q2, p2), r3.Sub(p2, p1)
	n := r3.Cross(u, v)
	n2 := r3.Norm2(n)
	if n2 < 1e-14*r3.Norm2(u)*r3.Norm2(v) {
		return best
	}
	s := r3.Dot(r3.Cross(w, v), n) / n2
	t := r3.Dot(r3.Cross(w, u), n) / n2
	if s < 0 || s > 1 || t < 0 || t > 1 {
		return best
	}
	return math.Min(best, math.Abs(r3.Dot(w, n))/math.Sqrt(n2))
}

// bruteGap is the least gap of all pairs that share no joint, with joint
// centres from Place: no bound, no order, no rows of J.
func bruteGap(f *kin.Frame, p *kin.Pose, diameter float64) float64 {
	best := math.Inf(1)
	for i := range f.Legs() {
		a, b := joints(f, p, i)
		for j := i + 1; j < f.Legs(); j++ {
			c, d := joints(f, p, j)
			if a == c || f.Platform[i] == f.Platform[j] {
				continue
			}
			best = math.Min(best, enumerated(a, b, c, d))
		}
	}
	return best - diameter
}

// checkGap compares Gap and the legs that it names with the brute force. The
// two round differently; 1e-12 m.
func checkGap(t *testing.T, m kin.Machine, p kin.Pose, diameter float64) {
	t.Helper()
	s, f := moved(t, m, p), m.Frame()
	gap, i, j := m.Gap(s)
	near(t, "gap", gap, bruteGap(f, &p, diameter), 1e-12)
	if i < 0 || j < 0 || i == j {
		t.Fatalf("nearest legs %d and %d", i, j)
	}
	a, b := joints(f, &p, i)
	c, d := joints(f, &p, j)
	near(t, "gap of the named legs", gap, enumerated(a, b, c, d)-diameter, 1e-12)
}

func TestGapAgainstBruteForce(t *testing.T) {
	eachMachine(t, 300, func(t *testing.T, _ *rand.Rand, x trial) {
		if !prismatic(x.m) {
			t.Skip("not a family of prismatic legs")
		}
		checkGap(t, x.m, x.p, offCentre().Diameter)
	})
}

// The bound that skips pairs uses a direction fixed at home. Legs anywhere and
// poses far from home, where legs cross and swap sides, must not fool it.
func TestGapFarFromHome(t *testing.T) {
	six := kin.FamilyNamed("6-UPS")
	rng := seeded(3)
	crossed := 0
	for range 500 {
		j := &kin.Joints{Home: ball(rng, 1), HomeRot: kin.Exp(ball(rng, 3))}
		for range 6 {
			j.Base = append(j.Base, ball(rng, 1))
			j.Platform = append(j.Platform, ball(rng, 1))
		}
		setup := &kin.Setup{Tool: ball(rng, 0.5), Diameter: 0.01, Length: 1}
		m := six.Outright(j, setup)
		p := kin.Pose{P: ball(rng, 1), R: kin.Exp(ball(rng, 3))}
		checkGap(t, m, p, setup.Diameter)
		if gap, _, _ := m.Gap(moved(t, m, p)); gap < 0 {
			crossed++
		}
		if t.Failed() {
			return
		}
	}
	if crossed < 50 {
		t.Errorf("only %d of 500 machines had legs that touch: the test is not hard enough", crossed)
	}
}

// Legs that share a joint are no pair, also where the joint's two azimuths
// differ by a whole turn and their sines by rounding: 6-UPS with the pairs
// closed to points (half-angles of 0 or 60 degrees) has the nine pairs of the
// octahedron, all clear of each other. All pairs share a joint: no gap at all.
func TestLegsThatShareAJoint(t *testing.T) {
	const deg = math.Pi / 180
	six := kin.FamilyNamed("6-UPS")
	for _, angles := range [][2]float64{{0, 0}, {60, 60}, {0, 20}, {20, 0}, {60, 20}, {20, 60}} {
		d := midRange(six)
		d[six.Index("base_half_angle")] = angles[0] * deg
		d[six.Index("platform_half_angle")] = angles[1] * deg
		m := six.Build(d, &kin.Setup{Diameter: 0.01})
		gap, i, j := m.Gap(moved(t, m, atHome()))
		if gap < 0.1 {
			t.Errorf("half-angles %v: gap %g between legs %d and %d, which share a joint", angles, gap, i+1, j+1)
		}
	}
	point := &kin.Joints{Home: kin.Vec{Z: 1}, HomeRot: kin.Identity(), Base: make([]kin.Vec, 6), Platform: make([]kin.Vec, 6)}
	for i := range point.Platform {
		point.Platform[i] = kin.Vec{X: 1 + float64(i)}
	}
	m := six.Outright(point, &kin.Setup{Diameter: 0.01})
	if gap, i, j := m.Gap(moved(t, m, atHome())); !math.IsInf(gap, 1) || i != -1 || j != -1 {
		t.Errorf("no pair: Gap = %g, %d, %d", gap, i, j)
	}
}

// GapBelow is Gap where that is below keep, and nothing less than keep elsewhere but by 1e-11 m; the least gap over many poses
// comes out the same with the least so far as keep, and most poses are then passed over.
func TestGapBelow(t *testing.T) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(77)
			m := f.Build(sound(f), offCentre())
			least, kept := math.Inf(1), math.Inf(1)
			passed := 0
			for range 300 {
				s := moved(t, m, kin.NewPose(randomCoords(rng, f, 1)))
				gap, i, j := m.Gap(s)
				least = math.Min(least, gap)
				g, _, _ := m.GapBelow(s, kept)
				kept = math.Min(kept, g)
				if math.IsInf(g, 1) {
					passed++
				}
				if math.IsInf(gap, 1) {
					continue
				}
				for _, off := range []float64{-0.01, -1e-11, 1e-11, 0.001, 1} {
					g, k, l := m.GapBelow(s, gap+off)
					switch {
					case off > 0 && (math.Abs(g-gap) > 1e-15 || k != i || l != j) && !(off < 1e-3 && g <= gap+1e-15):
						t.Errorf("gap %v of legs %d, %d; kept %g above it: %v of %d, %d", gap, i, j, off, g, k, l)
					case off < 0 && g < gap-1e-15:
						t.Errorf("gap %v; kept %g below it: %v", gap, -off, g)
					}
				}
			}
			if math.Abs(kept-least) > 1e-11 {
				t.Errorf("least gap %v, with keep %v", least, kept)
			}
			if passed < 200 {
				t.Errorf("only %d of 300 poses passed over", passed)
			}
		})
	}
}
