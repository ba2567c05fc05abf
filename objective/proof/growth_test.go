package proof

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"legwright/kin"
)

// The growth of a proof of every limit, and of those without efforts and clearance, with the size of study A's box and
// with the distance of the limits from the true extremes.
func BenchmarkGrowth(b *testing.B) {
	for _, c := range []struct {
		name     string
		measures []string
	}{{"all", everyLimit}, {"regular", []string{"base_swing", "platform_swing"}}} {
		for _, size := range []float64{0.5, 1, 1.5} {
			for _, far := range []float64{0.1, 0.03, 0.01} {
				b.Run(fmt.Sprintf("%s/size=%g/slack=%g", c.name, size, far), func(b *testing.B) {
					task := studyA(size)
					v := front(b, 30)
					p := slackened(b, task, "6-UPS", v, far, c.measures...)
					boxes := int64(0)
					for b.Loop() {
						r := prove(b, task, p, v, Settings{Workers: 1, Gap: 1e-3})
						if boxes = r.Boxes; r.Answer != Proved {
							b.Fatal(r.Answer)
						}
					}
					b.ReportMetric(float64(boxes), "boxes")
					b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/float64(boxes), "µs/box")
				})
			}
		}
	}
}

// The proof of every limit of a design of each family over the starter's box, the limits 3 % beyond the true extremes.
func BenchmarkFamilies(b *testing.B) {
	for _, f := range kin.Families() {
		b.Run(f.Name, func(b *testing.B) {
			task, v := some(b, rand.New(rand.NewPCG(3, 14)), f, allMeasures...)
			p := slackened(b, task, f.Name, v, 0.03, allMeasuresOf(f)...)
			var r *Result
			for b.Loop() {
				r = prove(b, task, p, v, Settings{Workers: 1})
			}
			b.ReportMetric(float64(r.Boxes), "boxes")
			b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/float64(r.Boxes), "µs/box")
			if testing.Verbose() {
				report(b, r)
			}
		})
	}
}
