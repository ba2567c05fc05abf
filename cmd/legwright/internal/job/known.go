// Package job joins a brief to the kinematics, the objectives and the search: it
// tells the brief reader what names there are, makes the task and the search
// spaces out of a brief, runs the search and judges what it found.
package job

import (
	"strings"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
)

// Known lists the families, dimensions and measures of the registries for the brief reader.
func Known() *brief.Known {
	k := new(brief.Known)
	for _, f := range kin.Families() {
		k.Families = append(k.Families, knownFamily(f))
	}
	for _, m := range objective.Measures() {
		km := brief.KnownMeasure{Name: m.Name, Kind: study.UnitKind(m.Unit), Needs: m.Inputs, Share: m.Most == 1}
		if m.Rotary != 0 {
			km.Turn = study.UnitKind(m.Rotary)
		}
		switch m.Sense {
		case objective.Larger:
			km.Sense = brief.Maximise
		case objective.Smaller:
			km.Sense = brief.Minimise
		}
		if m.Has != nil {
			km.Families = []string{}
			for _, f := range kin.Families() {
				if m.Has(f) {
					km.Families = append(km.Families, f.Name)
				}
			}
		}
		k.Measures = append(k.Measures, km)
	}
	return k
}

func knownFamily(f *kin.Family) brief.KnownFamily {
	k := brief.KnownFamily{Name: f.Name, Rotary: f.Drive == kin.Rotary}
	if f.Outright != nil {
		k.Legs = f.Legs
		k.Rails = f.Rails
	}
	for _, q := range f.Freedoms {
		k.Freedoms = append(k.Freedoms, q.String())
	}
	for i := range f.Dimensions {
		d := &f.Dimensions[i]
		name, _, listed := eachOf(d.Name)
		if listed && name == lastName(k.Dimensions) {
			k.Dimensions[len(k.Dimensions)-1].Each++
			continue
		}
		kd := brief.KnownDimension{
			Name: d.Name, Kind: study.DimensionUnit(d.Unit), Optional: d.Optional,
			Sizable: d.Role != kin.Shape, Positive: d.Unit == kin.Metre && d.Low > 0 && !d.Zero, Zero: d.Zero,
		}
		if listed {
			kd.Name, kd.Each = name, 1
		}
		if d.Joints {
			kd.Places = brief.PlacesJoints
			if strings.HasPrefix(d.Name, "home_") {
				kd.Places = brief.PlacesHome
			}
		}
		k.Dimensions = append(k.Dimensions, kd)
	}
	return k
}

// eachOf splits the name of a dimension that briefs give as a list with one item for each leg.
func eachOf(name string) (list string, item int, ok bool) {
	for _, l := range []string{"leg_azimuths", "modes"} {
		if rest, found := strings.CutPrefix(name, l+"_"); found {
			return l, int(rest[0] - '1'), true
		}
	}
	return "", 0, false
}

func lastName(ds []brief.KnownDimension) string {
	if len(ds) == 0 {
		return ""
	}
	return ds[len(ds)-1].Name
}
