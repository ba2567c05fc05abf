package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// The modes of a linear delta are the two points where three spheres meet, mirrored in the plane of their centres: they
// are apart by twice the distance of the platform origin from that plane, by hand, 1e-9.
func TestSeparationOfDelta(t *testing.T) {
	f := kin.FamilyNamed("linear-delta")
	task := atHome()
	task.Prepare()
	a := appraise(task, f, soundDesign(f))
	var s kin.State
	home := kin.NewPose(kin.Coords{})
	a.Machine.Move(&home, &s)
	frame := a.Machine.Frame()
	var centre [3]kin.Vec
	for i, e := range kin.Ends(a.Machine, s.Q[:3]) {
		centre[i] = sub(e, frame.HomeRot.Apply(frame.Platform[i]))
	}
	u, v := sub(centre[1], centre[0]), sub(centre[2], centre[0])
	n := kin.Vec{X: u.Y*v.Z - u.Z*v.Y, Y: u.Z*v.X - u.X*v.Z, Z: u.X*v.Y - u.Y*v.X}
	r := sub(frame.Home, centre[0])
	want := 2 * math.Abs(r.X*n.X+r.Y*n.Y+r.Z*n.Z) / norm(n)
	near(t, "mode_separation", value(t, a, "mode_separation"), want, 1e-9)
}

// Solutions that are missing make the distance unknown, which no later pose makes known again.
func TestUnknownSeparation(t *testing.T) {
	f := kin.FamilyNamed("3-RPR")
	task := atHome()
	task.Prepare()
	d := soundDesign(f)
	v := newView(task)
	v.begin(sizedPlan(task, f, d).build(task, d))
	home := kin.NewPose(kin.Coords{})
	if x := v.separation(&home, &v.S); !(x > 0) {
		t.Errorf("at home %g", x)
	}
	lost := v.S
	lost.Q[1] = math.NaN()
	if x := v.separation(&home, &lost); !math.IsNaN(x) {
		t.Errorf("with a length that is no number: %g", x)
	}
	// Away from the posture that the coordinates belong to, the nearest solution counts, not the second.
	c := kin.Coords{0.05}
	p := kin.NewPose(c)
	near(t, "nearest of another posture", v.separation(&p, &v.S), 0.05, 1e-9)
	m := modeSeparation()
	w := Worst{Value: math.NaN()}
	v.pose, v.index = &task.samples[0], 0
	m.Scan(v, &w)
	m.lost(v, &w)
	if !math.IsNaN(w.Value) {
		t.Errorf("known again: %g", w.Value)
	}
}

// A measure that is asked at the scouts is asked there, in order, and at home before, and nowhere else.
func TestAskedAtScouts(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := richTask(seeded(201), f)
	task.Prepare()
	d := soundDesign(f)
	v := newView(task)
	v.begin(sizedPlan(task, f, d).build(task, d))
	var at []int
	m := &Measure{Name: "asked", Sense: Larger, Scouts: true, Scan: func(v *View, _ *Worst) { at = append(at, v.index) }}
	v.walk(0, len(task.samples), 0, []tracker{{m: m}})
	if len(at) != task.scouts+1 || len(at) >= len(task.samples) {
		t.Fatalf("asked %d times, %d scouts", len(at), task.scouts)
	}
	for i, k := range at {
		if k != i-1 {
			t.Errorf("call %d at pose %d", i, k)
		}
	}
}
