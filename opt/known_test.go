package opt_test

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"legwright/opt"
	"legwright/opt/known"
)

// Hypervolumes of the true fronts with reference 1.1 in every goal (DTLZ1:
// 0.7). ZDT1, ZDT4: R^2 - 1/3; ZDT2: R^2 - 2/3; ZDT3 by quadrature of its five
// pieces; ZDT6 with least f1 m = 0.28077531881537: (R-m)R - (1-m) + (1-m^3)/3;
// DTLZ1: R^3 - 0.5^3/3!; DTLZ2: R^3 - pi/6. Formulas derived and checked by
// quadrature and by Monte Carlo apart from this program.
func TestReachesKnownFronts(t *testing.T) {
	for _, c := range []struct {
		p      known.Problem
		ref    float64
		budget int
		share  float64 // of the true hypervolume; 100 points cannot have all
		truth  float64
	}{
		{known.ZDT1(30), 1.1, 6000, 0.99, 1.1*1.1 - 1.0/3},
		{known.ZDT2(30), 1.1, 6000, 0.98, 1.1*1.1 - 2.0/3},
		{known.ZDT3(30), 1.1, 6000, 0.98, 1.33176290866},
		{known.ZDT6(10), 1.1, 10000, 0.98, 0.5078775146545907},
		{known.DTLZ2(3, 10), 1.1, 5000, 0.92, 0.8074012244177011},
	} {
		ref := slices.Repeat([]float64{c.ref}, c.p.Goals)
		o := mustSearch(t, problemOf(c.p), opt.Settings{Evaluations: c.budget, Front: 100, Reference: ref, Seed: 1})
		if o.Hypervolume < c.share*c.truth || o.Hypervolume > c.truth {
			t.Errorf("%s: %.5f of %.5f, want at least %.2f of it", c.p.Name, o.Hypervolume, c.truth, c.share)
		}
	}
}

// Medians of 11 seeds after 10,000 evaluations, polish included, at most 100
// designs: hypervolumes that an earlier trial of the same kind of search
// reached (for comparison, pagmo 2.18's NSGA-II with tuned
// parameters and all its points reduced to 100: 0.868, 0.839, 0.649, 0.750,
// 2.329), met within 0.5 %. The second half of the seeds was never used to
// choose a constant.
func TestMediansOnKnownProblems(t *testing.T) {
	if testing.Short() {
		t.Skip("110 searches of 10,000 evaluations")
	}
	for _, c := range []struct {
		p    known.Problem
		ref  []float64
		want float64
	}{
		{known.ZDT1(30), []float64{1.1, 1.1}, 0.8716},
		{known.ZDT4(10), []float64{1.1, 1.1}, 0.80},
		{known.UF1(30), []float64{1.1, 1.1}, 0.71},
		{known.DTLZ2(3, 10), []float64{1.1, 1.1, 1.1}, 0.7565},
		{known.DTLZ7(3, 20), []float64{1, 1, 7}, 2.384},
	} {
		line := fmt.Sprintf("%-6s want %.4f", c.p.Name, c.want)
		for _, first := range []uint64{1, 101} {
			var hv []float64
			for s := range uint64(11) {
				o := mustSearch(t, problemOf(c.p), opt.Settings{Evaluations: 10000, Front: 100, Reference: c.ref, Seed: first + s})
				hv = append(hv, o.Hypervolume)
			}
			slices.Sort(hv)
			line += fmt.Sprintf("   seeds %d..%d: %.4f [%.4f, %.4f]", first, first+10, hv[5], hv[0], hv[10])
			if hv[5] < 0.995*c.want {
				t.Errorf("%s, seeds from %d: median %.5f, want %.5f less 0.5 %%", c.p.Name, first, hv[5], c.want)
			}
		}
		t.Log(line)
	}
}

// ZDT and DTLZ fronts cannot be beaten: no design found lies below them.
func TestNothingBelowTheTrueFront(t *testing.T) {
	o := mustSearch(t, problemOf(known.DTLZ2(3, 10)), opt.Settings{Evaluations: 3000, Seed: 9})
	for _, d := range o.Front {
		r := 0.0
		for _, v := range d.Goals {
			r += v * v
		}
		if math.Sqrt(r) < 1-1e-12 {
			t.Errorf("%v is inside the unit sphere", d.Goals)
		}
	}
}

// BenchmarkSearch measures what the search itself costs: the objectives are
// next to free. Read the us/eval.
func BenchmarkSearch(b *testing.B) {
	for _, k := range []known.Problem{known.ZDT1(30), known.ZDT4(10), known.DTLZ2(3, 10), known.DTLZ7(3, 20), known.DTLZ2(4, 8)} {
		b.Run(fmt.Sprintf("%s-%d", k.Name, k.Goals), func(b *testing.B) {
			const budget = 20000
			for b.Loop() {
				if _, err := opt.Search(b.Context(), problemOf(k), opt.Settings{Evaluations: budget, Population: 60, Workers: 1}); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/budget, "us/eval")
		})
	}
}
