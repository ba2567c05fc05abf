package objective

import (
	"math"
	"slices"

	"legwright/kin"
)

// PoseRow is everything about a design at one required pose.
type PoseRow struct {
	Sample                   *Sample
	Q, Effort, Rate          [6]float64 // effort and rate: largest absolute over the cases
	BaseSwing, PlatformSwing [6]float64
	Clearance, Conditioning  float64
	Fails                    string // the first pose limit that fails, "" if none does
	Reached                  bool
}

// Poses lists a design's poses by zone and in the order of generation or of the file.
func Poses(t *Task, a *Appraisal) []PoseRow {
	v := newView(t)
	v.serve(a.Plan.Family)
	v.begin(a.Machine)
	d := Design{Family: a.Plan.Family, Values: a.Values, Machine: a.Machine}
	l := newPoseLimits(t, v, a.Plan, &d)
	l.need |= NeedEfforts | NeedRates | NeedGap
	rows := make([]PoseRow, len(t.samples))
	for k := range t.samples {
		s := &t.samples[k]
		r := &rows[k]
		r.Sample = s
		r.Fails = l.fails(s)
		if r.Reached = v.S.Fail == kin.Reached; !r.Reached {
			continue
		}
		r.Q, r.Clearance, r.Conditioning = v.S.Q, v.gap, math.Sqrt(v.ratio2)
		for i := range v.n {
			r.BaseSwing[i], r.PlatformSwing[i] = swingOf(v.S.BaseChord[i]), swingOf(v.S.PlatformChord[i])
			for _, c := range v.active[s.Zone] {
				r.Effort[i] = math.Max(r.Effort[i], largest(v.lo[c][i], v.hi[c][i]))
				r.Rate[i] = math.Max(r.Rate[i], v.rate[c][i])
			}
		}
	}
	slices.SortStableFunc(rows, func(a, b PoseRow) int {
		if a.Sample.Zone != b.Sample.Zone {
			return a.Sample.Zone - b.Sample.Zone
		}
		return a.Sample.Row - b.Sample.Row
	})
	return rows
}
