package study

import (
	"math"

	"legwright/kin"
	"legwright/objective"
)

// FromAppraisal is the record of an appraised design, without id, rank, score and marks. Legs are
// numbered from 1. A dimension without a value (joints given outright) is left out.
func FromAppraisal(t *objective.Task, a *objective.Appraisal) Design {
	d := Design{
		Family:     a.Plan.Family.Name,
		Feasible:   a.Feasible,
		Dimensions: map[string]Number{},
		Measures:   map[string]Number{},
		Worst:      map[string]Worst{},
		Marks:      []string{},
		Joints:     jointsOf(a.Machine.Frame()),
		Notes:      append([]string(nil), a.Notes...),
		Poses:      a.Poses,
	}
	for i, v := range a.Values {
		if !math.IsNaN(v) {
			d.Dimensions[a.Plan.Family.Dimensions[i].Name] = Number(v)
		}
	}
	for i := range a.Readings {
		r := &a.Readings[i]
		name := r.Measure.Name
		d.Measures[name] = Number(r.Value)
		if unbounded(r.Value) {
			if d.Unbounded == nil {
				d.Unbounded = map[string]bool{}
			}
			d.Unbounded[name] = true
		}
		if w := worstOf(t, r); w != (Worst{}) {
			d.Worst[name] = w
		}
	}
	for i := range a.Verdicts {
		d.Limits = append(d.Limits, limitOf(&a.Verdicts[i]))
	}
	for i := range a.Legs {
		d.Legs = append(d.Legs, legOf(&a.Legs[i]))
	}
	for i := range a.Excursions {
		d.Excursions = append(d.Excursions, excursionOf(&a.Excursions[i]))
	}
	return d
}

func unbounded(v float64) bool { return math.IsInf(v, 0) || math.IsNaN(v) }

func worstOf(t *objective.Task, r *objective.Reading) Worst {
	w := Worst{Leg: r.Leg + 1, Mate: r.Mate + 1, Near: r.Kind}
	if r.Case >= 0 {
		w.Case = t.Cases[r.Case].Name
	}
	if s := r.Pose; s != nil {
		w.Pose = poseOf(s)
		if s.Zone < len(t.Zones) {
			w.Zone = t.Zones[s.Zone].Name
		}
	}
	return w
}

// poseOf is a sample's pose about home, nil for home itself.
func poseOf(s *objective.Sample) *Pose {
	if s == nil {
		return nil
	}
	c := s.Coords
	return &Pose{X: c[kin.X], Y: c[kin.Y], Z: c[kin.Z], Roll: c[kin.Roll], Pitch: c[kin.Pitch], Yaw: c[kin.Yaw]}
}

func limitOf(v *objective.Verdict) Limit {
	l := Limit{
		Measure: v.Name, Origin: v.Origin, Unit: UnitKind(v.Unit).SI(), Sense: "at_most",
		Bound: Number(v.Bound), Value: Number(v.Value), Holds: v.Holds, Margin: Number(v.Margin), Unbounded: unbounded(v.Value),
	}
	if v.AtLeast {
		l.Sense = "at_least"
	}
	return l
}

func legOf(l *objective.Leg) Leg {
	out := Leg{
		Shortest: Number(l.Least), Home: Number(l.Home), Longest: Number(l.Most),
		Push: Number(l.Push), Pull: Number(l.Pull), Speed: Number(l.Speed),
		BaseSwing: Number(l.BaseSwing), PlatformSwing: Number(l.PlatformSwing),
		ShortestAt: poseOf(l.LeastAt), LongestAt: poseOf(l.MostAt),
	}
	out.Unbounded = marked(map[string]Number{
		"shortest": out.Shortest, "home": out.Home, "longest": out.Longest, "push": out.Push, "pull": out.Pull,
		"speed": out.Speed, "base_swing": out.BaseSwing, "platform_swing": out.PlatformSwing,
	})
	return out
}

// marked tells which of the fields have no bound; nil if all have one.
func marked(fields map[string]Number) map[string]bool {
	var out map[string]bool
	for name, v := range fields {
		if unbounded(float64(v)) {
			if out == nil {
				out = map[string]bool{}
			}
			out[name] = true
		}
	}
	return out
}

func excursionOf(e *objective.Excursion) Excursion {
	out := Excursion{
		Coordinate: e.Freedom.String(),
		Low:        Number(e.Low), LowFails: e.LowFails,
		High: Number(e.High), HighFails: e.HighFails,
	}
	out.Unbounded = marked(map[string]Number{"low": out.Low, "high": out.High})
	return out
}

func jointsOf(f *kin.Frame) Joints {
	var j Joints
	for _, v := range f.Base {
		j.Base = append(j.Base, [3]float64{v.X, v.Y, v.Z})
	}
	for _, v := range f.Platform {
		j.Platform = append(j.Platform, [3]float64{v.X, v.Y, v.Z})
	}
	return j
}
