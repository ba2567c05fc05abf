package kin_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// The lines of every family are as long as its links, end at its joints, and stand where the state says.
// 1e-9 m is what a drawing has to agree to; machines are about 1 m, so rounding is far less.
func TestOutlineOfEveryFamily(t *testing.T) {
	const tol = 1e-9
	eachMachine(t, 20, func(t *testing.T, rng *rand.Rand, x trial) {
		f := x.f
		m := f.Build(x.d, offCentre())
		least, span := f.Range()
		low, high := -1., 1.
		if least >= 0 {
			low, high = x.d[least], x.d[least]+x.d[span]
		}
		o := kin.NewOutline(m, low, high)
		at, s, ok := o.Points(&x.p)
		if !ok {
			t.Fatal("no posture")
		}
		if n := len(o.Fixed) + len(o.Platform) + o.Moving; len(at) != n {
			t.Fatalf("%d points, want %d", len(at), n)
		}
		if len(o.Base) != f.Legs || len(o.Joints) != f.Legs {
			t.Fatalf("%d base and %d platform joints of %d legs", len(o.Base), len(o.Joints), f.Legs)
		}
		origin, rot := m.Place(&x.p)
		frame := m.Frame()
		near(t, "origin", r3.Norm(r3.Sub(at[o.Origin], origin)), 0, tol)
		near(t, "tool point", r3.Norm(r3.Sub(at[o.Tool], r3.Add(origin, rot.Apply(frame.Tool)))), 0, tol)
		length := func(l *kin.Line) float64 { return r3.Norm(r3.Sub(at[l.A], at[l.B])) }
		seen := map[kin.LineKind]int{}
		for i := range o.Lines {
			l := &o.Lines[i]
			seen[l.Kind]++
			if l.Leg < -1 || l.Leg >= f.Legs {
				t.Errorf("line %d is of leg %d", i, l.Leg)
			}
			switch l.Kind {
			case kin.PrismaticLeg:
				near(t, "leg", length(l), s.Q[l.Leg], tol)
				near(t, "foot", r3.Norm(r3.Sub(at[l.A], frame.Base[l.Leg])), 0, tol)
			case kin.RodLine:
				near(t, "rod", length(l), frame.Rods[l.Leg], tol)
			case kin.CrankLine:
				if f.Name == "level-arm" {
					continue
				}
				near(t, "crank", length(l), x.d[f.Index(crankName(f))], tol)
				near(t, "pivot", r3.Norm(r3.Sub(at[l.A], frame.Base[l.Leg])), 0, tol)
			case kin.RailLine:
				near(t, "rail", length(l), high-low, tol)
				carriage := r3.Add(frame.Base[l.Leg], r3.Scale(s.Q[l.Leg], frame.Rails[l.Leg]))
				near(t, "carriage", r3.Norm(r3.Sub(carriage, s.End[l.Leg])), 0, tol)
				near(t, "rail's end", r3.Norm(r3.Sub(at[l.A], r3.Add(frame.Base[l.Leg], r3.Scale(low, frame.Rails[l.Leg])))), 0, tol)
			case kin.ShaftLine:
				near(t, "shaft", r3.Norm(r3.Sub(at[l.B], r3.Scale(r3.Norm(at[l.B]), s.Rod[3]))), 0, tol)
			}
		}
		want := map[string]map[kin.LineKind]int{
			"6-UPS": {kin.PrismaticLeg: 6, kin.BaseEdge: 6, kin.PlatformEdge: 6}, "3-RPR": {kin.PrismaticLeg: 3, kin.BaseEdge: 3, kin.PlatformEdge: 3},
			"3-RPS": {kin.PrismaticLeg: 3}, "6-RUS": {kin.CrankLine: 6, kin.RodLine: 6}, "6-PUS": {kin.RailLine: 6, kin.RodLine: 6},
			"3-RRR": {kin.CrankLine: 3, kin.RodLine: 3}, "five-bar": {kin.CrankLine: 2, kin.RodLine: 2, kin.BaseEdge: 1, kin.PlatformEdge: 0},
			"delta": {kin.CrankLine: 3, kin.RodLine: 6, kin.BarLine: 6}, "linear-delta": {kin.RailLine: 3, kin.RodLine: 6, kin.BarLine: 6},
			"delta-4": {kin.CrankLine: 3, kin.RodLine: 6, kin.BarLine: 6, kin.ShaftLine: 1}, "level-arm": {kin.LinkLine: 4, kin.CrankLine: 1, kin.BarLine: 7},
		}[f.Name]
		if want == nil {
			t.Error("no outline is known for the family")
		}
		for k, n := range want {
			if seen[k] != n {
				t.Errorf("%d lines of the kind %s, want %d", seen[k], k, n)
			}
		}
		if f.Name != "level-arm" && f.Name != "delta-4" {
			for i, j := range o.Joints {
				joint := r3.Add(at[o.Origin], rot.Apply(frame.Platform[i]))
				near(t, "joint", r3.Norm(r3.Sub(at[j], joint)), 0, tol)
			}
		}
	})
}

func crankName(f *kin.Family) string {
	for _, n := range []string{"crank_length", "arm", "proximal"} {
		if f.Index(n) >= 0 {
			return n
		}
	}
	panic("no crank")
}

// The links of an arm, each of its stated length, end at the platform, and its bars make parallelograms.
func TestOutlineOfTheArm(t *testing.T) {
	const tol = 1e-9
	eachMachine(t, 40, func(t *testing.T, rng *rand.Rand, x trial) {
		f := x.f
		if f.Name != "level-arm" {
			t.Skip("no arm")
		}
		m := f.Build(x.d, offCentre())
		o := kin.NewOutline(m, 0, 0)
		at, s, ok := o.Points(&x.p)
		if !ok {
			t.Fatal("no posture")
		}
		dim := func(name string) float64 { return x.d[f.Index(name)] }
		moving := at[len(o.Fixed)+len(o.Platform):]
		shoulder, elbow, wrist, flange := moving[0], moving[1], moving[2], moving[3]
		near(t, "upper arm", r3.Norm(r3.Sub(elbow, shoulder)), dim("upper_arm"), tol)
		near(t, "forearm", r3.Norm(r3.Sub(wrist, elbow)), dim("forearm"), tol)
		near(t, "wrist", r3.Norm(r3.Sub(flange, wrist)), dim("wrist_offset"), tol)
		near(t, "level", flange.Z-wrist.Z, 0, tol)
		near(t, "drop", r3.Norm(r3.Sub(r3.Sub(flange, kin.Vec{Z: dim("wrist_drop")}), at[o.Origin])), 0, tol)
		near(t, "shoulder", math.Hypot(shoulder.X, shoulder.Y), dim("base_offset"), tol)
		near(t, "shoulder's height", shoulder.Z, dim("base_height"), tol)
		_, rot := m.Place(&x.p)
		hand := r3.Sub(moving[9], at[o.Origin])
		near(t, "hand", r3.Norm(r3.Sub(rot.Unapply(r3.Unit(hand)), kin.Vec{X: 1})), 0, tol)
		near(t, "angle of the upper arm", math.Atan2(elbow.Z-shoulder.Z, r3.Dot(r3.Sub(elbow, shoulder), kin.Vec{X: math.Cos(s.Q[0]), Y: math.Sin(s.Q[0])})), s.Q[1], tol)
		for _, q := range [][4]int{{0, 1, 4, 5}, {0, 1, 6, 7}, {1, 2, 7, 8}} {
			a, b := r3.Sub(moving[q[1]], moving[q[0]]), r3.Sub(moving[q[3]], moving[q[2]])
			near(t, "parallelogram", r3.Norm(r3.Sub(a, b)), 0, tol)
		}
	})
}

// The platform of a delta-4 stays as it is while its tool turns.
func TestOutlineOfATurningTool(t *testing.T) {
	m := built("delta-4", nil, &kin.Setup{Tool: kin.Vec{X: 0.02, Z: 0.1}})
	o := kin.NewOutline(m, 0, 0)
	home := kin.NewPose(kin.Coords{})
	a, _, _ := o.Points(&home)
	// The tool turns about the platform's axis: its point, 20 mm off, goes round with it.
	turned := kin.NewPose(kin.Coords{kin.X: -0.02, kin.Y: 0.02, kin.Yaw: math.Pi / 2})
	b, _, ok := o.Points(&turned)
	if !ok {
		t.Fatal("no posture")
	}
	for _, j := range o.Joints {
		near(t, "joint", r3.Norm(r3.Sub(a[j], b[j])), 0, 1e-12)
	}
	near(t, "tool point", r3.Norm(r3.Sub(b[o.Tool], r3.Add(a[o.Tool], kin.Vec{X: -0.02, Y: 0.02}))), 0, 1e-12)
	if r3.Norm(r3.Sub(a[len(a)-1], b[len(b)-1])) < 0.01 {
		t.Error("the hand does not turn")
	}
}
