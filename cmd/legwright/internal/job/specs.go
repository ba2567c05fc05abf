package job

import (
	"math"
	"slices"

	"legwright/cmd/legwright/internal/brief"
	"legwright/kin"
	"legwright/objective"
)

// specs puts the brief's dimensions into the family's order; optional ones that are not given are fixed at their defaults.
func specs(f *kin.Family, given *brief.Family) []objective.Spec {
	out := make([]objective.Spec, len(f.Dimensions))
	for i := range f.Dimensions {
		out[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{f.Dimensions[i].Default}}
	}
	put := func(d *brief.Dimension) {
		at := f.Index(d.Name)
		if at < 0 {
			panic("job: a dimension that the family does not have")
		}
		out[at] = spec(d)
	}
	for i := range given.Dimensions {
		d := &given.Dimensions[i]
		if d.Form != brief.PerLeg {
			put(d)
			continue
		}
		for k := range d.Each {
			put(&d.Each[k])
		}
	}
	return out
}

func spec(d *brief.Dimension) objective.Spec {
	switch d.Form {
	case brief.Ranged:
		return objective.Spec{Kind: objective.Range, Low: d.Low, High: d.High}
	case brief.Stepped:
		n := int(math.Floor((d.High-d.Low)/d.Step*(1+objective.Tolerance))) + 1
		return objective.Spec{Kind: objective.Steps, Low: d.Low, High: d.High, Step: d.Step, Levels: n}
	case brief.Chosen:
		return objective.Spec{Kind: objective.Choices, Values: slices.Sorted(slices.Values(d.Choices))}
	case brief.Sized:
		return objective.Spec{Kind: objective.Sized}
	}
	return objective.Spec{Kind: objective.Fixed, Values: []float64{d.Value}}
}

// singularEverywhere refuses planar stages with similar triangles whose zones
// hold the heading 0 or 180°, where the three leg lines meet in a point whatever
// the position (J. Sefrioui and C. Gosselin 1995: the determinant has the factor sin φ).
func singularEverywhere(b *brief.Brief, given *brief.Family) brief.Faults {
	f := kin.FamilyNamed(given.Name)
	heading := f.Index("home_heading")
	if heading < 0 || f.Index("leg_min") < 0 { // other legs than prismatic ones have another determinant
		return nil
	}
	ss := specs(f, given)
	for i := 1; i <= 3; i++ {
		for _, plate := range [2]string{"base_offset_", "platform_offset_"} {
			s := ss[f.Index(plate+string(rune('0'+i)))]
			if s.Kind != objective.Fixed || s.Values[0] != 0 {
				return nil
			}
		}
	}
	low, high := bounds(&ss[heading])
	var faults brief.Faults
	for i := range b.Duty.Zones {
		z := zone(&b.Duty.Zones[i])
		yl, yh := z.Low[kin.Yaw], z.High[kin.Yaw]
		for _, p := range z.Poses {
			yl, yh = math.Min(yl, p[kin.Yaw]), math.Max(yh, p[kin.Yaw])
		}
		for _, bad := range [3]float64{0, math.Pi, -math.Pi} {
			if high+yl <= bad && bad <= low+yh {
				faults = append(faults, b.Fault(b.DimensionPath(given.Name, "home_heading"),
					"with similar triangles the stage is singular at every position where heading plus yaw is 0 or 180 deg, and zone "+quote(b.Duty.Zones[i].Name)+" holds such yaw for every heading allowed here",
					"choose a home_heading farther from 0 than the zone's yaw (60 to 90 deg conditions best), narrow the yaw, or give the joints different offsets"))
				break
			}
		}
	}
	return faults
}

// bounds are the least and the greatest value of a specification.
func bounds(s *objective.Spec) (low, high float64) {
	switch s.Kind {
	case objective.Fixed, objective.Choices:
		low, high = s.Values[0], s.Values[0]
		for _, v := range s.Values {
			low, high = math.Min(low, v), math.Max(high, v)
		}
		return low, high
	case objective.Steps:
		return s.Low, s.Low + float64(s.Levels-1)*s.Step
	}
	return s.Low, s.High
}

func quote(s string) string { return "\"" + s + "\"" }
