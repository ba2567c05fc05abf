package kin_test

import (
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// leastOfParts is the least gap of all links of different legs by brute force. No two legs may share a joint.
func leastOfParts(legs []rodLeg, s *kin.State, setup *kin.Setup) float64 {
	best := math.Inf(1)
	for i := range legs {
		for j := range i {
			a, ta := legs[i].parts(s.Q[i], r3.Add(s.End[i], r3.Scale(legs[i].rod, s.Rod[i])), setup)
			b, tb := legs[j].parts(s.Q[j], r3.Add(s.End[j], r3.Scale(legs[j].rod, s.Rod[j])), setup)
			for k := range a {
				for n := range b {
					best = math.Min(best, enumerated(a[k][0], a[k][1], b[n][0], b[n][1])-(ta[k]+tb[n])/2)
				}
			}
		}
	}
	return best
}

// The bounds that skip links use directions fixed at home. Rails and joints anywhere,
// wide parallelograms and poses far from home must not fool them. 1e-12 m.
func TestGapOfParallelogramsAnywhere(t *testing.T) {
	rng := seeded(41)
	setup := &kin.Setup{Diameter: 0.01, Length: 1}
	f, d := with("linear-delta", nil)
	tried := 0
	for tried < 500 {
		d[f.Index("rod")], d[f.Index("rod_spacing")] = between(rng, 0.5, 2), between(rng, 0.05, 1)
		j := &kin.Joints{HomeRot: kin.Identity(), Values: d}
		var legs []rodLeg
		for range 3 {
			point, along := ball(rng, 1), r3.Unit(ball(rng, 1))
			j.Rails = append(j.Rails, kin.Rail{Point: point, Direction: along})
			j.Platform = append(j.Platform, ball(rng, 1))
			legs = append(legs, rodLeg{
				foot: point, rod: d[f.Index("rod")],
				end:  func(q float64) kin.Vec { return r3.Add(point, r3.Scale(q, along)) },
				side: r3.Scale(d[f.Index("rod_spacing")]/2, r3.Unit(r3.Cross(kin.Vec{Z: 1}, along))),
			})
		}
		m := f.Outright(j, setup)
		var s kin.State
		p := kin.Pose{P: ball(rng, 1), R: kin.Identity()}
		if m.Move(&p, &s); s.Fail != kin.Reached {
			continue
		}
		tried++
		gap, _, _ := m.Gap(&s)
		near(t, "gap", gap, leastOfParts(legs, &s, setup), 1e-12)
	}
}

// The same for cranks, in a plane, where links cross often, and with cranks thicker than links.
func TestGapOfPlanarCranksAnywhere(t *testing.T) {
	rng := seeded(42)
	setup := &kin.Setup{Diameter: 0.01, Crank: 0.03, Length: 1}
	f, d := with("3-RRR", nil)
	tried, clear := 0, 0
	for tried < 500 {
		d[f.Index("proximal")], d[f.Index("distal")] = between(rng, 0.1, 0.6), between(rng, 0.1, 0.6)
		j := &kin.Joints{HomeRot: kin.Identity(), Values: d}
		var legs []rodLeg
		flat := func() kin.Vec { v := ball(rng, 1); v.Z = 0; return v }
		for range 3 {
			pivot, r := flat(), d[f.Index("proximal")]
			j.Base, j.Platform = append(j.Base, pivot), append(j.Platform, flat())
			legs = append(legs, rodLeg{
				crank: true, foot: pivot, rod: d[f.Index("distal")],
				end: func(q float64) kin.Vec { return r3.Add(pivot, polar(r, math.Atan2(pivot.Y, pivot.X)+q, 0)) },
			})
		}
		m := f.Outright(j, setup)
		var s kin.State
		p := kin.NewPose(kin.Coords{kin.X: between(rng, -0.5, 0.5), kin.Y: between(rng, -0.5, 0.5), kin.Yaw: between(rng, -2, 2)})
		if m.Move(&p, &s); s.Fail != kin.Reached {
			continue
		}
		tried++
		gap, _, _ := m.Gap(&s)
		near(t, "gap", gap, leastOfParts(legs, &s, setup), 1e-12)
		if gap > 0 {
			clear++
		}
	}
	if clear < 50 {
		t.Errorf("only %d of %d postures are clear", clear, tried)
	}
}

// A crank that points backward at home counts its angle from 180°, not from -180°,
// whichever way its sine is rounded.
func TestCrankPointingBackward(t *testing.T) {
	rng := seeded(43)
	f, d := with("five-bar", map[string]float64{"spacing": 0.2, "home_y": 0.3, "modes_1": -1, "modes_2": -1})
	exact := 0
	for range 300 {
		r := between(rng, 0.1, 0.3)
		d[f.Index("proximal")], d[f.Index("distal")] = r, math.Hypot(0.1+r, 0.3)
		s := moved(t, f.Build(d, &kin.Setup{}), atHome())
		if q := s.Q[0]; q <= -math.Pi || math.Abs(math.Abs(q)-math.Pi) > 1e-13 {
			t.Fatalf("crank at %.17g", q)
		}
		if s.Q[0] == math.Pi {
			exact++
		}
	}
	if exact < 20 {
		t.Errorf("only %d cranks point backward exactly", exact)
	}
}
