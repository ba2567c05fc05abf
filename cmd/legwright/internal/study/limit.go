package study

// Full tells whether the limit holds and could not hold by more: a share of everything.
func (l *Limit) Full() bool {
	return l.Measure == "coverage" && l.Sense == "at_least" && l.Bound >= 1 && l.Holds
}

// Tightest is the limit with the least margin, or nil if there is none. A coverage of 100 %, which
// leaves no margin by itself, counts only where it fails.
func (d *Design) Tightest() *Limit {
	var least *Limit
	for i := range d.Limits {
		l := &d.Limits[i]
		if l.Full() {
			continue
		}
		if least == nil || l.Margin < least.Margin {
			least = l
		}
	}
	return least
}

// Broken are the limits that the design breaks. Coverage counts only if it is broken alone: else it
// falls short because of the others.
func (d *Design) Broken() []Limit {
	var out []Limit
	var coverage *Limit
	for i := range d.Limits {
		l := &d.Limits[i]
		switch {
		case l.Holds:
		case l.Measure == "coverage":
			coverage = l
		default:
			out = append(out, *l)
		}
	}
	if len(out) == 0 && coverage != nil {
		out = append(out, *coverage)
	}
	return out
}

// StrokeUsed is the difference between the longest and the shortest that any leg must be (m, or rad
// of a crank); false if the record has no legs.
func (d *Design) StrokeUsed() (Number, bool) {
	if len(d.Legs) == 0 {
		return 0, false
	}
	low, high := d.Legs[0].Shortest, d.Legs[0].Longest
	for i := range d.Legs {
		low, high = min(low, d.Legs[i].Shortest), max(high, d.Legs[i].Longest)
	}
	return high - low, true
}
