package kin_test

import (
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// The swing chords of single rods for each choice of mounting axis. The axis at the
// drive turns with the crank from home: the rod's direction at home, the way in which
// the crank's end moves with a growing angle (the base plate's normal for a carriage),
// or the vector in base axes; that at the platform as for prismatic legs. 1e-13 absolute, as
// rods and angles are each rounded.
func TestSwingOfSingleRods(t *testing.T) {
	vector := kin.Vec{X: 0.3, Y: -0.2, Z: 2}
	tested := 0
	eachRods(t, 30, func(t *testing.T, x trial, legs []rodLeg) {
		if r3.Norm(legs[0].side) != 0 {
			return // TestSwingOfDeltaRods
		}
		tested++
		for _, kind := range []kin.AxisKind{kin.AxisHomeLeg, kin.AxisPlate, kin.AxisVector} {
			setup := offCentre()
			setup.Axis = kin.Axis{Kind: kind, Vec: vector}
			m := x.f.Build(x.d, setup)
			home, s := moved(t, m, atHome()), moved(t, m, x.p)
			_, rot := m.Frame().Place(&x.p)
			for i, l := range legs {
				onDrive, onPlatform := vector, vector
				switch kind {
				case kin.AxisHomeLeg:
					onDrive = home.Rod[i]
					onPlatform = m.Frame().HomeRot.Unapply(home.Rod[i])
				case kin.AxisPlate:
					onDrive, onPlatform = kin.Vec{Z: 1}, kin.Vec{Z: 1}
					if l.crank { // a quarter turn on
						onDrive = r3.Sub(l.end(home.Q[i]+90*deg), l.foot)
					}
				}
				if l.crank {
					turn := kin.Exp(r3.Scale(s.Q[i]-home.Q[i], r3.Unit(l.normal)))
					onDrive = turn.Apply(onDrive)
				}
				near(t, "chord at the drive", s.BaseChord[i], chordOf(s.Rod[i], onDrive), 1e-13)
				near(t, "chord at the platform", s.PlatformChord[i], chordOf(s.Rod[i], rot.Apply(onPlatform)), 1e-13)
			}
		}
	})
	if tested < 100 {
		t.Errorf("only %d machines", tested)
	}
}

// With Neighbours, Gap looks at legs that follow each other, the last and the first
// too: the least over these pairs of single rods is the least over all where they are the nearest anyway.
func TestNeighboursOfRods(t *testing.T) {
	f := kin.FamilyNamed("6-PUS")
	rng := seeded(31)
	differ := 0
	for range 200 {
		x := postured(t, rng, f, offCentre(), 1)
		setup := offCentre()
		setup.Neighbours = true
		m := f.Build(x.d, setup)
		s := moved(t, m, x.p)
		gap, _, _ := m.Gap(s)
		all, _, _ := x.m.Gap(s)
		best := math.Inf(1)
		for i := range 6 {
			k := (i + 1) % 6
			end := func(n int) kin.Vec { return r3.Add(s.End[n], r3.Scale(m.Frame().Rods[n], s.Rod[n])) }
			best = math.Min(best, enumerated(s.End[i], end(i), s.End[k], end(k)))
		}
		near(t, "gap of neighbours", gap, best-setup.Diameter, 1e-12)
		if gap < all {
			t.Errorf("gap of neighbours %g below that of all %g", gap, all)
		}
		if gap > all+1e-6 {
			differ++
		}
	}
	if differ == 0 {
		t.Error("neighbours are the nearest everywhere: the test is not hard enough")
	}
}
