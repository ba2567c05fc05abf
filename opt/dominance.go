package opt

// compare relates two goal vectors, all minimised: -1 if a dominates b or
// equals it, 1 if b dominates a, 0 if neither beats the other.
func compare(a, b []float64) int {
	if len(a) == 3 && len(b) == 3 {
		a0, a1, a2 := a[0], a[1], a[2]
		b0, b1, b2 := b[0], b[1], b[2]
		if a0 <= b0 {
			if a1 <= b1 && a2 <= b2 {
				return -1
			}
			if a0 < b0 {
				return 0
			}
		}
		if b1 <= a1 && b2 <= a2 {
			return 1
		}
		return 0
	}
	le, ge := true, true
	for k, v := range a {
		if w := b[k]; v > w {
			if le = false; !ge {
				return 0
			}
		} else if v < w {
			if ge = false; !le {
				return 0
			}
		}
	}
	switch {
	case le:
		return -1
	case ge:
		return 1
	}
	return 0
}
