package brief

import (
	"os"
	"strings"
	"testing"
)

func BenchmarkParse(b *testing.B) {
	text, err := os.ReadFile("testdata/whole.yaml")
	if err != nil {
		b.Fatal(err)
	}
	k := known()
	for b.Loop() {
		if _, err := Parse("testdata/whole.yaml", text, k); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParsePoses(b *testing.B) {
	const rows = 1000
	text := []byte("x_mm,y_mm,z_mm,roll_deg,pitch_deg,yaw_deg\n" + strings.Repeat("1.25,2.5,-3.75,0.1,0.2,0.3\n", rows))
	for b.Loop() {
		if _, err := posesFor(text, nil); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/rows, "ns/pose")
}
