package linalg

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// BenchmarkSix times each step on poses of random six-leg machines, all in one
// run so that the ratios mean something on a shared machine.
func BenchmarkSix(b *testing.B) {
	js := legMatrices(20, 50, 1)
	var s Six
	var x, g [36]float64
	var tri tridiagonal
	tris := make([]tridiagonal, len(js))
	for i := range js {
		gram(&js[i], &g)
		tridiagonalise(&g, &tris[i])
	}
	sum, keep := 0.0, 2.0
	m, svd, inv := mat.NewDense(6, 6, nil), new(mat.SVD), new(mat.Dense)
	steps := []struct {
		name string
		run  func(i int)
	}{
		{"sweep", func(i int) { d, _ := sweep(&js[i], &x); sum += d }},
		{"Factor", func(i int) { sum += float64(s.Factor(&js[i])) }},
		{"Inverse", func(i int) { sum += float64(Inverse(6, &js[i], &x)) }},
		{"gram", func(i int) { gram(&js[i], &g) }},
		{"gram+tridiagonalise", func(i int) { gram(&js[i], &g); tridiagonalise(&g, &tri) }},
		{"extremes", func(i int) { r, _ := tris[i].extremes(2); sum += r }},
		{"Ratio2Six", func(i int) { sum += Ratio2Six(&js[i], 2) }},
		{"Factor+Ratio2", func(i int) { sum += float64(s.Factor(&js[i])) + s.Ratio2(&js[i], 2) }},
		{"Factor+Ratio2/keep", func(i int) {
			if i%50 == 0 { // the next machine
				keep = 2
			}
			keep = min(keep, s.Ratio2(&js[i], keep))
			sum += float64(s.Factor(&js[i]))
		}},
		{"Jacobi", func(i int) { lo, _ := Singular(6, &js[i]); sum += lo }},
		{"gonum-SVD", func(i int) { copy(m.RawMatrix().Data, js[i][:]); svd.Factorize(m, mat.SVDNone) }},
		{"gonum-Inverse", func(i int) { copy(m.RawMatrix().Data, js[i][:]); _ = inv.Inverse(m) }},
	}
	for _, step := range steps {
		b.Run(step.name, func(b *testing.B) {
			for b.Loop() {
				for i := range js {
					step.run(i)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(len(js)), "ns/matrix")
		})
	}
	if math.IsNaN(sum) {
		b.Error("NaN")
	}
}

// BenchmarkSmall times Ratio2 at each order, on condition numbers of 2 to 20.
func BenchmarkSmall(b *testing.B) {
	rng := rand.New(rand.NewPCG(51, 52))
	js := make([][36]float64, 1000)
	sum := 0.0
	for n := 2; n <= 6; n++ {
		for i := range js {
			js[i] = withKappa(rng, n, 2+18*rng.Float64())
		}
		b.Run("Ratio2/"+string(rune('0'+n)), func(b *testing.B) {
			for b.Loop() {
				for i := range js {
					sum += Ratio2(n, &js[i])
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(len(js)), "ns/matrix")
		})
	}
	b.Run("Sym3Largest", func(b *testing.B) {
		for b.Loop() {
			for i := range js {
				sum += Sym3Largest((*[6]float64)(js[i][:6]))
			}
		}
		b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(len(js)), "ns/matrix")
	})
	if math.IsNaN(sum) {
		b.Error("NaN")
	}
}
