package handover

import (
	"testing"

	"legwright/kin"
)

// BenchmarkFiles is all sheets of a design, of 100 poses and two cases.
func BenchmarkFiles(b *testing.B) {
	for _, name := range []string{"6-UPS", "delta", "3-RPS"} {
		b.Run(name, func(b *testing.B) {
			f := kin.FamilyNamed(name)
			task := starterTask(f)
			a := appraised(f, task, 0.3)
			for b.Loop() {
				Files(task, a, wicked)
			}
		})
	}
}
