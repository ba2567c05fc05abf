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

// joints are the leg's two ends in the base frame, found through Place, which Move does not use.
func joints(f *kin.Frame, p *kin.Pose, leg int) (base, platform kin.Vec) {
	origin, rot := f.Place(p)
	return f.Base[leg], r3.Add(origin, rot.Apply(f.Platform[leg]))
}

// Lengths of prismatic legs are distances of joint centres; the tool point is
// where the pose says. Two routes to one number: rounding only, 1e-14 m.
func TestLengthsAreDistances(t *testing.T) {
	eachMachine(t, 50, func(t *testing.T, _ *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		if !prismatic(m) {
			t.Skip("not a family of prismatic legs")
		}
		s, fr := moved(t, m, p), m.Frame()
		for i := range f.Legs {
			a, b := joints(fr, &p, i)
			near(t, "length", s.Q[i], r3.Norm(r3.Sub(b, a)), 1e-14)
		}
		origin, rot := fr.Place(&p)
		home := r3.Add(fr.Home, fr.HomeRot.Apply(fr.Tool))
		near(t, "tool point", r3.Norm(r3.Sub(r3.Add(origin, rot.Apply(fr.Tool)), r3.Add(home, p.P))), 0, 1e-15)
	})
}

// The rows of J against central differences of Q (gonum) over a small motion of
// the tool point and a small turn about base axes, each angular column divided
// by the characteristic length. The formula is of fourth order, as coordinates of
// cranks and carriages bend sharply where the serial measure is small; with a step of
// 1e-5 rounding gives an error of about 2e-11 for lengths of a metre and radians.
// Tolerance 1e-9, relative above 1. Columns of freedoms that the family lacks are zero.
func TestJacobianAgainstDifferences(t *testing.T) {
	eachMachine(t, 50, func(t *testing.T, _ *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		s, fr := moved(t, m, p), m.Frame()
		n := len(f.Freedoms)
		want := mat.NewDense(f.Legs, n, nil)
		fd.Jacobian(want, func(q, step []float64) {
			var c kin.Coords
			for k, freedom := range f.Freedoms {
				c[freedom] = step[k]
			}
			e := kin.Exp(kin.Vec{X: c[kin.Roll], Y: c[kin.Pitch], Z: c[kin.Yaw]})
			beside := kin.Pose{P: r3.Add(p.P, kin.Vec{X: c[kin.X], Y: c[kin.Y], Z: c[kin.Z]}), R: e.Mul(&p.R)}
			copy(q, moved(t, m, beside).Q[:f.Legs])
		}, make([]float64, n), &fd.JacobianSettings{Formula: fd.Formula{
			Stencil:    []fd.Point{{Loc: -2, Coeff: 1. / 12}, {Loc: -1, Coeff: -8. / 12}, {Loc: 1, Coeff: 8. / 12}, {Loc: 2, Coeff: -1. / 12}},
			Derivative: 1, Step: 1e-5,
		}})
		for i := range f.Legs {
			k := 0
			for q := kin.X; q <= kin.Yaw; q++ {
				got := s.J[6*i+int(q)]
				if !f.Has(q) {
					near(t, "J in "+q.String(), got, 0, 0)
					continue
				}
				if q.Angular() {
					got *= fr.Length
				}
				near(t, "J in "+q.String(), got, want.At(i, k), 1e-9*math.Max(1, math.Abs(got)))
				k++
			}
		}
	})
}

// chordOf is 2-2cos of the angle between two vectors, by way of the angle.
func chordOf(u, v kin.Vec) float64 {
	a := math.Atan2(r3.Norm(r3.Cross(u, v)), r3.Dot(u, v))
	return 2 - 2*math.Cos(a)
}

// The swing chords for each choice of mounting axis, against the angle between
// leg and axis taken from the joint centres. 1e-14 absolute.
func TestSwingChords(t *testing.T) {
	vector := kin.Vec{X: 0.3, Y: -0.2, Z: 2}
	for _, f := range kin.Families() {
		if !prismatic(f.Build(midRange(f), offCentre())) {
			continue // see rods_test.go
		}
		rng := seeded(5)
		for _, kind := range []kin.AxisKind{kin.AxisHomeLeg, kin.AxisPlate, kin.AxisVector} {
			setup := offCentre()
			setup.Axis = kin.Axis{Kind: kind, Vec: vector}
			for k := range 20 {
				d := randomDesign(rng, f)
				m := f.Build(d, setup)
				if k%2 == 1 && f.Outright != nil && f.Has(kin.Roll) { // tilted at home
					j := outright(f, d, m)
					j.HomeRot = kin.RPY(0.2, -0.3, 0.4)
					m = f.Outright(j, setup)
				}
				p, home := settled(m, randomCoords(rng, f, 1.5)), atHome()
				s, fr := moved(t, m, p), m.Frame()
				_, rot := fr.Place(&p)
				for i := range f.Legs {
					a, b := joints(fr, &p, i)
					a0, b0 := joints(fr, &home, i)
					leg := r3.Sub(b, a)
					onBase, onPlatform := vector, vector
					switch kind {
					case kin.AxisHomeLeg:
						onBase = r3.Sub(b0, a0)
						onPlatform = fr.HomeRot.Unapply(onBase)
					case kin.AxisPlate:
						onBase, onPlatform = kin.Vec{Z: 1}, kin.Vec{Z: 1}
					}
					near(t, f.Name+" base chord", s.BaseChord[i], chordOf(leg, onBase), 1e-14)
					near(t, f.Name+" platform chord", s.PlatformChord[i], chordOf(leg, rot.Apply(onPlatform)), 1e-14)
				}
			}
		}
	}
}

// A small swing keeps its digits: at a tilt of 1e-9 rad about home the chord is
// 1e-18 to 1e-6 of itself, where a cosine would give 0.
func TestSmallSwingKeepsItsDigits(t *testing.T) {
	j := &kin.Joints{
		Base:     []kin.Vec{{}, {X: 1}, {Y: 1}, {X: -1}, {Y: -1}, {X: 1, Y: 1}},
		Platform: []kin.Vec{{}, {X: 1}, {Y: 1}, {X: -1}, {Y: -1}, {X: 1, Y: 1}},
		Home:     kin.Vec{Z: 1}, HomeRot: kin.Identity(),
	}
	m := kin.FamilyNamed("6-UPS").Outright(j, &kin.Setup{Length: 1})
	const swing = 1e-9
	s := moved(t, m, kin.Pose{P: kin.Vec{X: swing}, R: kin.Identity()})
	near(t, "chord", s.BaseChord[0]/(swing*swing), 1, 1e-6)
	near(t, "chord", s.PlatformChord[0]/(swing*swing), 1, 1e-6)
}

// Move and Gap are the inner loop.
func TestInnerLoopAllocatesNothing(t *testing.T) {
	for _, f := range kin.Families() {
		m := f.Build(midRange(f), offCentre())
		p := kin.NewPose(f.Starter.Box)
		var (
			s    kin.State
			rows [36]float64
			sum  float64
		)
		if n := testing.AllocsPerRun(100, func() {
			m.Move(&p, &s)
			gap, _, _ := m.Gap(&s)
			sum += gap + float64(m.Constraints(&s, &rows)) + m.Serial(&s)
			kin.Wrenches(m, &s, &rows)
		}); n != 0 {
			t.Errorf("%s: %g allocations a pose", f.Name, n)
		}
	}
}

// ownTwists are the twists (v, Lc·ω) of the tool point in each of the family's own freedoms.
func ownTwists(m kin.Machine, p *kin.Pose) []*mat.VecDense {
	var tie [36]float64
	f := m.Frame()
	for k, q := range f.Freedoms {
		tie[6*int(q)+k] = 1
	}
	if f.Tied {
		m.Tie(p, &tie)
	}
	out := make([]*mat.VecDense, len(f.Freedoms))
	for k := range out {
		out[k] = mat.VecDenseCopyOf(mat.NewDense(6, 6, tie[:]).ColView(k))
	}
	return out
}

// The constraint wrenches complete the legs' wrenches: they do no work in the
// family's own freedoms, are unit wrenches, and stale contents of the buffer do
// not show.
func TestConstraintsCompleteTheLegs(t *testing.T) {
	eachMachine(t, 10, func(t *testing.T, _ *rand.Rand, x trial) {
		f, m, p := x.f, x.m, x.p
		s := moved(t, m, p)
		var rows [36]float64
		for k := range rows {
			rows[k] = math.NaN()
		}
		n := m.Constraints(s, &rows)
		if n != 6-len(f.Freedoms) {
			t.Fatalf("%d constraints beside %d freedoms", n, len(f.Freedoms))
		}
		full := mat.NewDense(6, 6, nil)
		for i := range f.Legs {
			full.SetRow(i, s.J[6*i:6*i+6])
		}
		for i := range n {
			row := rows[6*i : 6*i+6]
			full.SetRow(f.Legs+i, row)
			force := math.Sqrt(row[0]*row[0] + row[1]*row[1] + row[2]*row[2])
			if force == 0 {
				force = math.Sqrt(row[3]*row[3] + row[4]*row[4] + row[5]*row[5])
			}
			near(t, "constraint wrench", force, 1, 1e-14)
			for k, twist := range ownTwists(m, &p) {
				near(t, "power of a constraint in "+f.Freedoms[k].String(), mat.Dot(mat.NewVecDense(6, row), twist), 0, 1e-14)
			}
		}
		// The 6×6 has the legs' determinant where the constraints are unit vectors of the other freedoms.
		if prismatic(m) && !m.Frame().Tied {
			near(t, "determinant of all six wrenches", math.Abs(mat.Det(full)), math.Abs(mat.Det(ownJacobian(m, s))), 1e-12)
		}
	})
}
