package kin_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// Lengths scale with the machine, and nothing without a length changes.
// Rounding only: 1e-14 relative.
func TestScaling(t *testing.T) {
	const by = 7.3
	eachMachine(t, 20, func(t *testing.T, rng *rand.Rand, x trial) {
		f, p := x.f, x.p
		small, large := x.d, make([]float64, len(f.Dimensions))
		for i, d := range f.Dimensions {
			large[i] = small[i]
			if d.Unit == kin.Metre {
				large[i] *= by
			}
		}
		setup, grown := offCentre(), offCentre()
		grown.Tool = r3.Scale(by, grown.Tool)
		grown.Diameter *= by
		grown.Length *= by
		a, b := f.Build(small, setup), f.Build(large, grown)
		s, l := moved(t, a, p), moved(t, b, kin.Pose{P: r3.Scale(by, p.P), R: p.R})
		lengths := by
		if f.Drive == kin.Rotary {
			lengths = 1
		}
		for i := range f.Legs {
			near(t, "Q", l.Q[i], lengths*s.Q[i], 1e-13)
			near(t, "base chord", l.BaseChord[i], s.BaseChord[i], 1e-14)
			near(t, "platform chord", l.PlatformChord[i], s.PlatformChord[i], 1e-14)
			for k := range 6 {
				near(t, "J", l.J[6*i+k]*by/lengths, s.J[6*i+k], 1e-13)
			}
		}
		gs, _, _ := a.Gap(s)
		gl, _, _ := b.Gap(l)
		if gl != by*gs { // both +Inf where there is no pair
			near(t, "gap", gl, by*gs, 1e-12)
		}
	})
}

// sameLegs checks that leg i of one machine is leg match(i) of another whose
// frame is turned by g against the first's.
func sameLegs(t *testing.T, f *kin.Family, a, b kin.Machine, s, o *kin.State, g kin.Rot, match func(int) int) {
	t.Helper()
	for i := range f.Legs {
		k := match(i)
		near(t, "Q", o.Q[k], s.Q[i], 1e-13)
		near(t, "base chord", o.BaseChord[k], s.BaseChord[i], 1e-13)
		near(t, "platform chord", o.PlatformChord[k], s.PlatformChord[i], 1e-13)
		for _, part := range [2]int{0, 3} {
			x := s.J[6*i+part:]
			y := o.J[6*k+part:]
			want := g.Apply(kin.Vec{X: x[0], Y: x[1], Z: x[2]})
			near(t, "J", r3.Norm(r3.Sub(kin.Vec{X: y[0], Y: y[1], Z: y[2]}, want)), 0, 1e-13*math.Max(1, r3.Norm(want)))
		}
	}
	gap, i, j := a.Gap(s)
	other, k, l := b.Gap(o)
	near(t, "gap", other, gap, 1e-12)
	if !prismatic(a) {
		return // TestGapOfDrivesAndRods looks at the legs that Gap names
	}
	// Symmetric machines have several nearest pairs; only where there is one must it be the same.
	mi, mj := min(match(i), match(j)), max(match(i), match(j))
	if (k != mi || l != mj) && math.Abs(pairGap(b, o, mi, mj)-other) > 1e-12 {
		t.Errorf("nearest legs %d and %d, want %d and %d", k, l, mi, mj)
	}
}

// pairGap is the gap between two legs, from a sampling-free enumeration (see enumerated).
func pairGap(m kin.Machine, s *kin.State, i, j int) float64 {
	f := m.Frame()
	tip := func(k int) kin.Vec {
		row := s.J[6*k:]
		return r3.Add(f.Base[k], r3.Scale(s.Q[k], kin.Vec{X: row[0], Y: row[1], Z: row[2]}))
	}
	return enumerated(f.Base[i], tip(i), f.Base[j], tip(j)) - offCentre().Diameter
}

// The whole machine, turned and moved in space with its poses, is the same
// machine: same lengths, swings and gaps, and rows turned along.
func TestTurningAndMovingTheWhole(t *testing.T) {
	eachMachine(t, 20, func(t *testing.T, rng *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		if f.Outright == nil {
			t.Skip("no joints outright")
		}
		shift, turn := ball(rng, 2), ball(rng, 2)
		if !f.Has(kin.Roll) { // a planar machine stays in its plane
			shift.Z, turn = 0, kin.Vec{Z: turn.Z}
		}
		g := kin.Exp(turn)
		j := outright(f, x.d, m)
		for i := range j.Base {
			j.Base[i] = r3.Add(shift, g.Apply(j.Base[i]))
		}
		for i := range j.Rails {
			j.Rails[i] = kin.Rail{Point: j.Base[i], Direction: g.Apply(j.Rails[i].Direction)}
		}
		j.Home = r3.Add(shift, g.Apply(j.Home))
		j.HomeRot = g.Mul(&j.HomeRot)
		other := f.Outright(j, offCentre())
		back := kin.Rot{g[0], g[3], g[6], g[1], g[4], g[7], g[2], g[5], g[8]}
		r := g.Mul(&p.R)
		q := kin.Pose{P: g.Apply(p.P), R: r.Mul(&back)}
		s, o := moved(t, m, p), moved(t, other, q)
		if f.Drive == kin.Rotary { // angles from the outward direction
			for i := range f.Legs {
				a, b := m.Frame().Base[i], j.Base[i]
				s.Q[i] = math.Remainder(s.Q[i]+math.Atan2(a.Y, a.X)+turn.Z, 2*math.Pi)
				o.Q[i] = math.Remainder(o.Q[i]+math.Atan2(b.Y, b.X), 2*math.Pi)
			}
		}
		sameLegs(t, f, m, other, s, o, g, func(i int) int { return i })
	})
}

// The platform's own frame is a convention: shifted and turned, with the tool
// point and home along, it changes nothing.
func TestMovingThePlatformFrame(t *testing.T) {
	eachMachine(t, 20, func(t *testing.T, rng *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		if f.Outright == nil {
			t.Skip("no joints outright")
		}
		shift, turn := ball(rng, 0.5), ball(rng, 2)
		if !f.Has(kin.Roll) {
			shift.Z, turn = 0, kin.Vec{Z: turn.Z}
		}
		g := kin.Exp(turn)
		j, setup := outright(f, x.d, m), offCentre()
		// The new frame's origin lies at `shift` of the old one, its axes are turned by g.
		inNew := func(v kin.Vec) kin.Vec { return g.Unapply(r3.Sub(v, shift)) }
		for i := range j.Platform {
			j.Platform[i] = inNew(j.Platform[i])
		}
		setup.Tool = inNew(setup.Tool)
		j.Home = r3.Add(j.Home, j.HomeRot.Apply(shift))
		j.HomeRot = j.HomeRot.Mul(&g)
		other := f.Outright(j, setup)
		sameLegs(t, f, m, other, moved(t, m, p), moved(t, other, p), kin.Identity(), func(i int) int { return i })
	})
}

// Renumbering the legs renumbers the answers.
func TestRenumberingLegs(t *testing.T) {
	eachMachine(t, 20, func(t *testing.T, rng *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		if f.Outright == nil {
			t.Skip("no joints outright")
		}
		order := rng.Perm(f.Legs)
		j := outright(f, x.d, m)
		for i, k := range order {
			j.Base[k], j.Platform[k] = m.Frame().Base[i], m.Frame().Platform[i]
			if first := f.Index("modes_1"); first >= 0 {
				j.Values[first+k] = x.d[first+i]
			}
		}
		rails := slices.Clone(j.Rails)
		for i := range rails {
			j.Rails[order[i]] = rails[i]
		}
		other := f.Outright(j, offCentre())
		sameLegs(t, f, m, other, moved(t, m, p), moved(t, other, p), kin.Identity(), func(i int) int { return order[i] })
	})
}

// twinOf are the pairs of base and platform azimuths of a six-legged machine, turned by an angle about z.
func turnedJoints(f *kin.Frame, angle float64) (base, platform []kin.Vec) {
	g := kin.RPY(0, 0, angle)
	for i := range f.Base {
		base = append(base, g.Apply(f.Base[i]))
		platform = append(platform, g.Apply(f.Platform[i]))
	}
	return base, platform
}

// A twin is the same machine turned by half a turn about z: the joints
// coincide, legs renumbered, and every pose of the twin answers to the pose
// with x, y, roll and pitch reversed. As a box of ± ranges is its own image
// under that, twins are equally good for it. For 6-UPS a turn by 60° gives the
// same joints, but not the same box. Rounding only: 1e-13.
func TestTwinIsTheMachineHalfATurnOn(t *testing.T) {
	for _, f := range kin.Families() {
		if f.Twin == nil {
			continue
		}
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(11)
			for range 50 {
				setup, turned := offCentre(), offCentre()
				x := postured(t, rng, f, setup, 1.5)
				d, w := x.d, f.Twin(x.d)
				for i, v := range f.Twin(w) {
					near(t, f.Dimensions[i].Name+" of the twin's twin", v, d[i], 1e-15)
				}
				half := kin.RPY(0, 0, math.Pi)
				turned.Tool = half.Apply(setup.Tool)
				m, twin := f.Build(d, setup), f.Build(w, turned)
				match := matchJoints(t, m.Frame(), twin.Frame(), math.Pi)
				c := x.p.Coords()
				o := kin.Coords{-c[0], -c[1], c[2], -c[3], -c[4], c[5]}
				sameLegs(t, f, m, twin, moved(t, m, kin.NewPose(c)), moved(t, twin, kin.NewPose(o)), half,
					func(i int) int { return match[i] })
				if f.Name == "6-UPS" {
					matchJoints(t, m.Frame(), twin.Frame(), math.Pi/3)
				}
			}
		})
	}
}

// matchJoints gives for each leg of f, turned by the angle, the leg of g with the same joints.
func matchJoints(t *testing.T, f, g *kin.Frame, angle float64) []int {
	t.Helper()
	base, platform := turnedJoints(f, angle)
	match := make([]int, len(base))
	for i := range base {
		match[i] = -1
		for k := range g.Base {
			if r3.Norm(r3.Sub(base[i], g.Base[k])) < 1e-13 && r3.Norm(r3.Sub(platform[i], g.Platform[k])) < 1e-13 {
				match[i] = k
			}
		}
		if match[i] < 0 {
			t.Fatalf("turned by %g rad, leg %d is no leg of the twin", angle, i)
		}
	}
	return match
}
