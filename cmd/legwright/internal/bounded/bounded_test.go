package bounded

import (
	"testing"
)

// told counts the faults that a test would report.
type told struct {
	testing.TB
	n int
}

func (t *told) Helper()               {}
func (t *told) Errorf(string, ...any) { t.n++ }

var kept []byte

// A reader that takes more memory than its input allows is told of, one that takes less is not.
func TestRead(t *testing.T) {
	for _, c := range []struct{ n, take, want int }{{10, 1 << 20, 0}, {10, 80 << 20, 1}, {1 << 20, 80 << 20, 0}, {1 << 10, 80 << 20, 1}} {
		got := &told{TB: t}
		Read(got, c.n, func() { kept = make([]byte, c.take) })
		if got.n != c.want {
			t.Errorf("%d bytes read with %d: %d faults, want %d", c.n, c.take, got.n, c.want)
		}
	}
}
