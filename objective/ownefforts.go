package objective

// ownEfforts are trackers of the push and of the pull of every leg by itself, which the measures know of the worst leg alone:
// legs that a machine's symmetry makes alike then come to the same figures between the samples too.
func ownEfforts(legs int) []tracker {
	var out []tracker
	own := func(leg int, part func(lo, hi float64) float64) {
		m := &Measure{Sense: Smaller, Need: NeedEfforts, Lost: inf(), Scan: func(v *View, w *Worst) {
			for _, c := range v.active[v.pose.Zone] {
				if f := part(v.lo[c][leg], v.hi[c][leg]); f > w.Value {
					w.set(v, f, leg, c)
				}
			}
		}}
		out = append(out, tracker{m: m, own: true})
	}
	for i := range legs {
		own(i, func(_, hi float64) float64 { return hi })
		own(i, func(lo, _ float64) float64 { return -lo })
	}
	return out
}
