package assembly

import (
	"runtime"
	"sync"
	"sync/atomic"
)

// runAll runs the paths that begin at the regular ones of the starts, on as many
// goroutines as there are processors to use. Results do not depend on their number.
func runAll(sys equations, starts []end) []end {
	out := make([]end, len(starts))
	var next atomic.Int64
	var wait sync.WaitGroup
	for range min(runtime.GOMAXPROCS(0), len(starts)) {
		wait.Go(func() {
			k := newTracker(sys)
			for {
				i := int(next.Add(1)) - 1
				if i >= len(starts) {
					return
				}
				if starts[i].outcome == regular {
					out[i] = k.run(starts[i].x)
				}
			}
		})
	}
	wait.Wait()
	return out
}
