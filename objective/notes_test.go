package objective

import (
	"math"
	"strings"
	"testing"

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

// The note on terms in ω² comes where mass ω² |r| passes 5 % of the counted effort: 1 % below that speed it is not there, 1 %
// above it is. |r| is from the tool point; ω the largest angular speed of the set, the diagonal of a box.
func TestNoteOnSpinning(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	arm := kin.Vec{X: 0.3, Z: 0.4} // 0.5 m from the tool point
	tool := kin.Vec{X: 0.05, Y: 0.02, Z: -0.1}
	with := func(angular Set, mass float64) *Appraisal {
		task := atHome()
		task.Tool = tool
		task.Cases = []Case{{Name: "spin", Loads: []Load{{Mass: mass, Centre: kin.Vec{X: tool.X + arm.X, Y: tool.Y, Z: tool.Z + arm.Z}}}, Angular: angular}}
		task.Prepare()
		return appraise(task, f, soundDesign(f))
	}
	rest := with(Set{}, 100)
	if omega(rest) {
		t.Error("a note without any speed")
	}
	limit := math.Sqrt(0.05 * value(t, rest, "leg_force") / (100 * 0.5))
	third := limit / math.Sqrt(3)
	for _, c := range []struct {
		part float64
		want bool
	}{{0.99, false}, {1.01, true}} {
		ball := Set{Kind: AnyWay, Radius: c.part * limit}
		box := Set{Kind: PerAxis, Half: kin.Vec{X: c.part * third, Y: c.part * third, Z: c.part * third}}
		for _, s := range []Set{ball, box} {
			if got := omega(with(s, 100)); got != c.want {
				t.Errorf("%+v: a note %v, want %v", s, got, c.want)
			}
		}
		if omega(with(ball, 0)) {
			t.Error("a note without any mass")
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
