package brief

import (
	"fmt"

	"legwright/cmd/legwright/internal/units"
)

// LongestTime bounds how long a search may be asked to run, in seconds: ten years.
const LongestTime = 10 * 365.25 * 24 * 3600

// readTime reads the time after which a search ends.
func readTime(r *reader, n *node) any {
	v, _, ok := r.quantity(n, units.Duration)
	if !ok || !r.signed(n, v, aboveZero) {
		return nil
	}
	if v > LongestTime {
		r.refuse(n, n.text+" is longer than ten years", "write a time such as 2 h, or leave it out for no end")
		return nil
	}
	return v
}

// stallKeys are the keys under search.stall, which needs both.
func stallKeys() []key {
	return []key{
		{name: "evaluations", need: true, read: counted(1, 1_000_000_000)},
		{name: "gain", need: true, read: readGain},
	}
}

// readGain reads the least growth of the hypervolume, a share.
func readGain(r *reader, n *node) any {
	v, _, ok := r.quantity(n, units.Ratio)
	if !ok {
		return nil
	}
	if !(v > 0 && v < 1) {
		r.refuse(n, fmt.Sprintf("%s is no gain that a search could fall short of", n.text), "write a share between 0 and 1, such as 0.1 %")
		return nil
	}
	return v
}
