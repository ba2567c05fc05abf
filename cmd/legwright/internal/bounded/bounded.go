// Package bounded holds the readers of files and flags to their bounds in tests: what one input may cost,
// however it was made.
package bounded

import (
	"runtime/metrics"
	"testing"
	"time"
)

// What reading an input of n bytes may cost. A sensible file of that size costs less than a tenth of it; time is for
// what would never end, on a busy machine too.
const (
	memory  = 64 << 20 // bytes allocated in all, whatever the size
	perByte = 1 << 10  // bytes more for each byte of the input
	longest = 20 * time.Second
)

// Read calls read, which reads an input of n bytes, and fails the test where that costs more than it may.
func Read(t testing.TB, n int, read func()) {
	t.Helper()
	before, begun := allocated(), time.Now()
	read()
	if most, got := uint64(memory+n*perByte), allocated()-before; got > most {
		t.Errorf("%d bytes were read with %d bytes of memory, more than %d", n, got, most)
	}
	if d := time.Since(begun); d > longest {
		t.Errorf("%d bytes were read in %v, more than %v", n, d, longest)
	}
}

// allocated is the sum of all memory that was ever asked for.
func allocated() uint64 {
	s := []metrics.Sample{{Name: "/gc/heap/allocs:bytes"}}
	metrics.Read(s)
	return s[0].Value.Uint64()
}
