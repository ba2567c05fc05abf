package enclose_test

import (
	"math/rand/v2"
	"testing"

	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

func BenchmarkForms(b *testing.B) {
	rng := rand.New(rand.NewPCG(4, 6))
	x, y := someForm(rng, 0, 0.01), someForm(rng, 0, 0.01)
	v, w := someVec(rng, 0.01), someVec(rng, 0.01)
	box := someBox(rng, 0.1)
	var (
		z    enclose.Form
		u    enclose.Vec
		r    [9]enclose.Form
		turn enclose.Turn
		arm  enclose.Arm
	)
	for _, o := range []struct {
		name string
		do   func()
	}{
		{"add", func() { z.Add(&x, &y) }},
		{"mul", func() { z.Mul(&x, &y) }},
		{"div", func() { z.Div(&x, &y) }},
		{"sqrt", func() { z.Sqrt(&x) }},
		{"sin", func() { z.Sin(&x) }},
		{"atan2", func() { z.Atan2(&x, &y) }},
		{"dot", func() { z.Dot(&v, &w) }},
		{"cross", func() { u.Cross(&v, &w) }},
		{"norm", func() { z.Norm(&v) }},
		{"unit", func() { u.Unit(&v) }},
		{"rotation", func() { enclose.Rotation(&box, &r) }},
		{"turn and arm", func() {
			turn.Set(&box, [3]bool{true, true, true})
			turn.Apply(r3.Vec{X: 0.3, Y: 0.1, Z: 0.2}, &arm)
		}},
	} {
		b.Run(o.name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				o.do()
			}
		})
	}
}

// Operations take no memory.
func TestFormsAllocateNothing(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 7))
	v, w := someVec(rng, 0.01), someVec(rng, 0.01)
	box := someBox(rng, 0.1)
	var (
		u enclose.Vec
		r [9]enclose.Form
	)
	if n := testing.AllocsPerRun(100, func() {
		enclose.Rotation(&box, &r)
		u.Unit(u.Cross(&v, &w))
		u[0].Atan2(u[1].Div(&v[0], &w[0]), u[2].Sqrt(u[0].Dot(&v, &v)))
		u[0].Acos(u[1].Sin(&u[0]))
	}); n != 0 {
		t.Errorf("%g allocations", n)
	}
}
