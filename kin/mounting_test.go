package kin_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// chord is the squared distance of two unit vectors.
func chord(a, b kin.Vec) float64 { return r3.Norm2(r3.Sub(a, b)) }

// Swings that Move gives are measured from the axes that Mountings gives, found here by the platform's
// own rotation and the ends of rods: of all legs at the platform at any pose, at the base at any pose for what does not
// turn with a crank, at home for what does. 1e-12, as both are differences of unit vectors.
func TestMountingsAreWhatSwingIsMeasuredFrom(t *testing.T) {
	axes := []kin.Axis{{Kind: kin.AxisHomeLeg}, {Kind: kin.AxisPlate}, {Kind: kin.AxisVector, Vec: kin.Vec{X: 0.2, Y: -0.3, Z: 0.9}}}
	eachMachine(t, 10, func(t *testing.T, _ *rand.Rand, x trial) {
		for _, axis := range axes {
			setup := offCentre()
			setup.Axis = axis
			m := x.f.Build(x.d, setup)
			mounts, fr := kin.Mountings(m), m.Frame()
			if len(mounts) != x.f.Legs {
				t.Fatalf("%d mountings for %d legs", len(mounts), x.f.Legs)
			}
			s, home := moved(t, m, x.p), moved(t, m, atHome())
			origin, rot := m.Place(&x.p)
			for i, mt := range mounts {
				if x.f.Name == "level-arm" || x.f.Free > 0 && i == x.f.Legs-1 {
					continue // no swing is measured
				}
				from := func(s *kin.State, at kin.Vec) kin.Vec {
					if fr.Rods != nil {
						return s.Rod[i]
					}
					return r3.Unit(r3.Sub(at, fr.Base[i]))
				}
				u := from(s, r3.Add(origin, rot.Apply(fr.Platform[i])))
				u0 := from(home, r3.Add(fr.Home, fr.HomeRot.Apply(fr.Platform[i])))
				if side := r3.Norm(mt.Side); side > 0 {
					sine := r3.Dot(u, r3.Scale(1/side, mt.Side))
					near(t, "rods' swing", s.BaseChord[i], 2-2*math.Sqrt(1-sine*sine), 1e-12)
					continue
				}
				near(t, "platform swing", s.PlatformChord[i], chord(u, rot.Apply(mt.Platform)), 1e-12)
				near(t, "base swing at home", home.BaseChord[i], chord(u0, mt.Base), 1e-12)
				if fr.Rods == nil || fr.Rails != nil {
					near(t, "base swing", s.BaseChord[i], chord(u, mt.Base), 1e-12)
				}
			}
		}
	})
}

// A crank's end moves counter-clockwise about its hinge as the angle grows, and a leg that swings in a plane stays
// square to its hinge. 1e-13 m for what must vanish; the step is differentiated to 1e-6.
func TestHinges(t *testing.T) {
	eachMachine(t, 10, func(t *testing.T, _ *rand.Rand, x trial) {
		fr, s := x.m.Frame(), moved(t, x.m, x.p)
		for i, mt := range kin.Mountings(x.m) {
			h := mt.Hinge
			if h == (kin.Vec{}) || x.f.Name == "level-arm" {
				continue
			}
			near(t, "length of a hinge", r3.Norm(h), 1, 1e-14)
			if x.f.Drive != kin.Rotary {
				u := s.Rod[i]
				if !fr.Tied {
					u = kin.Vec{X: s.J[6*i], Y: s.J[6*i+1], Z: s.J[6*i+2]}
				}
				near(t, "leg along its hinge", r3.Dot(u, h), 0, 1e-13)
				continue
			}
			q := s.Q
			q[i] += 1e-7
			arm := r3.Sub(s.End[i], fr.Base[i])
			step := r3.Scale(1e7, r3.Sub(kin.Ends(x.m, q[:x.f.Legs])[i], s.End[i]))
			near(t, "crank along its hinge", r3.Dot(arm, h), 0, 1e-13)
			near(t, "way of a crank's end", r3.Norm(r3.Sub(step, r3.Cross(h, arm))), 0, 1e-6)
		}
	})
}
