package objective

import (
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"

	"legwright/kin"
)

// omega tells whether a note speaks of the terms in ω².
func omega(a *Appraisal) bool {
	for _, n := range a.Notes {
		if strings.Contains(n, "ω²") {
			return true
		}
	}
	return false
}

// gains are how much effort a unit force at the tool point can ask of each leg at home: the norms of the columns of the
// inverse of J, by gonum, forces alone; in the plane alone if the platform only turns about z.
func gains(t *testing.T, f *kin.Family, m kin.Machine) []float64 {
	t.Helper()
	home := kin.NewPose(kin.Coords{})
	var s kin.State
	m.Move(&home, &s)
	n := len(f.Freedoms)
	j := mat.NewDense(n, n, nil)
	for i := range n {
		for k, q := range f.Freedoms {
			j.Set(i, k, s.J[6*i+int(q)])
		}
	}
	var x mat.Dense
	if err := x.Inverse(j); err != nil {
		t.Fatal(err)
	}
	out := make([]float64, n)
	for i := range out {
		for k, q := range f.Freedoms {
			if !q.Angular() && (q != kin.Z || f.Has(kin.Roll)) {
				out[i] = math.Hypot(out[i], x.At(k, i))
			}
		}
	}
	return out
}

// The note on terms in ω² comes where mass ω² |r| may add more than 5 % to the counted effort of a leg, force or torque: 1 % below that
// speed it is not there, 1 % above it is. |r| is from the tool point, square to z if the platform turns about z
// alone; ω the largest angular speed of the set, the diagonal of a box.
func TestNoteOnSpinning(t *testing.T) {
	arm := kin.Vec{X: 0.3, Z: 0.4} // 0.5 m from the tool point, 0.3 m in plan
	for name, far := range map[string]float64{"6-UPS": 0.5, "3-RRR": 0.3, "delta-4": 0.3} {
		f := kin.FamilyNamed(name)
		tool := kin.Vec{X: 0.05, Y: 0.02, Z: -0.1}
		with := func(angular Set, mass float64) *Appraisal {
			task := atHome()
			task.Tool = tool
			task.Cases = []Case{{Name: "spin", Loads: []Load{
				{Mass: mass, Centre: kin.Vec{X: tool.X + arm.X, Y: tool.Y, Z: tool.Z + arm.Z}},
				{ForceSpread: kin.Vec{X: 400, Y: 300}},
			}, Angular: angular}}
			task.Prepare()
			return appraise(task, f, soundDesign(f))
		}
		rest := with(Set{}, 100)
		if omega(rest) {
			t.Error("a note without any speed")
		}
		limit := math.Inf(1)
		for i, g := range gains(t, f, rest.Machine) {
			effort := math.Max(rest.Legs[i].Push, rest.Legs[i].Pull)
			if g > 1e-9 {
				limit = math.Min(limit, math.Sqrt(0.05*effort/(100*far*g)))
			}
		}
		box := kin.Vec{Z: limit}
		if f.Has(kin.Roll) {
			box = kin.Vec{X: limit / math.Sqrt(3), Y: limit / math.Sqrt(3), Z: limit / math.Sqrt(3)}
		}
		for _, c := range []struct {
			part float64
			want bool
		}{{0.99, false}, {1.01, true}} {
			for _, s := range []Set{
				{Kind: AnyWay, Radius: c.part * limit},
				{Kind: PerAxis, Half: kin.Vec{X: c.part * box.X, Y: c.part * box.Y, Z: c.part * box.Z}},
			} {
				if got := omega(with(s, 100)); got != c.want {
					t.Errorf("%s, %+v: a note %v, want %v", name, s, got, c.want)
				}
				if omega(with(s, 0)) {
					t.Error("a note without any mass")
				}
			}
		}
	}
}

// A planar stage turns about z alone: neither the height of a mass nor speeds about x and y count.
func TestNoteOnSpinningInThePlane(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	with := func(centre kin.Vec, angular Set) bool {
		task := atHome()
		task.Cases = []Case{{Name: "spin", Loads: []Load{{Mass: 20, Centre: centre, Linear: Set{Kind: AnyWay, Radius: 1}}}, Angular: angular}}
		task.Prepare()
		return omega(appraise(task, f, soundDesign(f)))
	}
	fast := Set{Kind: AnyWay, Radius: 20}
	if !with(kin.Vec{X: 0.1}, fast) {
		t.Error("no note on a mass off the axis")
	}
	if with(kin.Vec{Z: 0.5}, fast) {
		t.Error("a note on a mass above the tool point")
	}
	if with(kin.Vec{X: 0.1}, Set{Kind: PerAxis, Half: kin.Vec{X: 20, Y: 20}}) {
		t.Error("a note on turning about x and y")
	}
}

// A stroke that is given and none of the stock strokes is noted; one of them, or one that the duty sizes, is not.
func TestNoteOnAnOddStroke(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	_, span := f.Range()
	for _, c := range []struct {
		stroke float64
		sized  bool
		want   string
	}{
		{0.7123, false, "stroke 712.3 mm is not one of the stock strokes"},
		{0.8, false, ""}, {1.2, false, ""},
		{0.7123, true, ""},
	} {
		task := atHome()
		task.Actuator.Strokes = []float64{0.4, 0.8, 1.2}
		task.Prepare()
		d := soundDesign(f)
		d[span] = c.stroke
		p := fixedRange(task, f, d)
		if c.sized {
			p = sizedPlan(task, f, d)
		}
		got := ""
		for _, n := range Appraise(task, p, d).Notes {
			if strings.Contains(n, "stock") {
				got = n
			}
		}
		if got != c.want {
			t.Errorf("stroke %g, sized %v: note %q, want %q", c.stroke, c.sized, got, c.want)
		}
	}
}
