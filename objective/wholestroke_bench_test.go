package objective

import (
	"testing"

	"legwright/kin"
)

func BenchmarkStrokes(b *testing.B) {
	f := kin.FamilyNamed("6-UPS")
	d := soundDesign(f)
	task := atHome()
	task.Prepare()
	q := appraise(task, f, d).Legs[0].Home
	p := sizedPlan(task, f, d)
	least, span := f.Range()
	d[least], d[span] = q-0.2, 0.4
	for b.Loop() {
		Strokes(task, p, d)
	}
}
