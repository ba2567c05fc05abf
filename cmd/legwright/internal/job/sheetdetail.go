package job

import (
	"fmt"
	"math"
	"slices"

	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

const (
	pathPoses   = 200
	crankedPath = 120 // where drives and rods are drawn too
	cornerPoses = 64
	mapPoints   = 21
	mapsShown   = 3
)

// way chooses the poses that designs in full are shown at, and these designs.
func (b *sheetBuilder) way(d *sheet.Data) {
	t, n := b.study.Tasks[0], pathPoses
	for i := range d.Families {
		if d.Families[i].Skeleton.Moving > 0 {
			n = crankedPath
		}
	}
	b.path = objective.Pathway(t, n)
	b.scout = t.Scouted(cornerPoses)
	d.Path, d.Way, d.Corners = flat(b.path.Coords), b.path.Required, flat(b.scout)
	b.full = make([]bool, len(b.front.Designs))
	for _, i := range b.front.HandedOver() {
		b.full[i] = true
	}
	for i := range b.full {
		b.full[i] = b.full[i] || slices.Contains(b.run.Detail, b.front.Designs[i].ID)
	}
}

func flat(poses []kin.Coords) []int {
	out := []int{}
	for _, c := range poses {
		for _, x := range c {
			out = append(out, sheet.Count(x, sheet.Step))
		}
	}
	return out
}

// detail fills what is shown of a design in full.
func (b *sheetBuilder) detail(d *sheet.Data, v *sheet.Design, plan int, a *objective.Appraisal, o *kin.Outline) {
	t := b.study.Tasks[plan]
	out := &sheet.Detail{
		Path: track(t, a, o, b.path.Coords), Corners: track(t, a, o, b.scout),
		Excursions: []sheet.Excursion{}, Together: []sheet.Together{}, Maps: []sheet.Map{}, Sensitivity: []sheet.Change{},
	}
	for _, e := range objective.Excurse(t, a) {
		unit := units.Length
		if e.Freedom.Angular() {
			unit = units.Angle
		}
		out.Excursions = append(out.Excursions, sheet.Excursion{Coordinate: e.Freedom.String(), Unit: unit.SI(),
			Low: sheet.Pointer(e.Low), LowFails: e.LowFails, High: sheet.Pointer(e.High), HighFails: e.HighFails})
	}
	for _, g := range objective.Simultaneous(t, a) {
		out.Together = append(out.Together, sheet.Together{Zone: g.Zone, Factor: sheet.Pointer(g.Factor), Fails: g.Fails, At: coordinates(g.At)})
	}
	pairs := objective.MapAxes(t)
	if !slices.Contains(b.run.Detail, v.ID) {
		pairs = pairs[:min(mapsShown, len(pairs))]
	}
	for _, xy := range pairs {
		out.Maps = append(out.Maps, mapped(objective.ConditioningMap(t, a, xy[0], xy[1], mapPoints)))
	}
	for _, c := range objective.Sensitivities(t, a.Plan, a.Values) {
		out.Sensitivity = append(out.Sensitivity, b.change(d, v, a.Plan, &c))
	}
	v.Detail = out
}

func coordinates(c kin.Coords) (out [6]sheet.Num) {
	for k, x := range c {
		out[k] = sheet.Num(x)
	}
	return out
}

// track holds the postures at poses about home.
func track(t *objective.Task, a *objective.Appraisal, o *kin.Outline, poses []kin.Coords) sheet.Track {
	out := sheet.Track{Place: []int{}, Moving: []int{}, Q: []int{}, Conditioning: []int{}}
	count := func(x float64) int { return sheet.Count(x, sheet.Step) }
	legs := a.Machine.Frame().Legs()
	for i, s := range objective.Standings(t, a, poses) {
		p := kin.NewPose(poses[i])
		for _, x := range place(o, &p) {
			out.Place = append(out.Place, count(float64(x)))
		}
		moving := make([]kin.Vec, o.Moving)
		if s.Reached {
			var state kin.State
			a.Machine.Move(&p, &state)
			moving = o.Move(&p, &state)
		} else {
			out.Lost = append(out.Lost, i)
		}
		for _, m := range moving {
			out.Moving = append(out.Moving, count(m.X), count(m.Y), count(m.Z))
		}
		for _, q := range s.Q[:legs] {
			out.Q = append(out.Q, count(q))
		}
		out.Conditioning = append(out.Conditioning, sheet.Count(s.Conditioning, 1e-4))
		if s.Fails != "" {
			out.Fails = append(out.Fails, sheet.Failure{Pose: i, Limit: s.Fails})
		}
	}
	return out
}

func mapped(m *objective.Map) sheet.Map {
	out := sheet.Map{
		X: m.X.String(), Y: m.Y.String(), N: m.N, At: coordinates(m.At),
		XRange: [2]sheet.Num{sheet.Num(m.Low[m.X]), sheet.Num(m.High[m.X])}, YRange: [2]sheet.Num{sheet.Num(m.Low[m.Y]), sheet.Num(m.High[m.Y])},
	}
	fails := make([]byte, 0, len(m.Standings))
	for _, s := range m.Standings {
		value, letter := -1, byte('.')
		if s.Reached {
			value = sheet.Count(s.Conditioning, 1e-4)
		}
		if s.Fails != "" {
			letter = 'x'
		}
		out.Values = append(out.Values, value)
		fails = append(fails, letter)
	}
	out.Fails = string(fails)
	return out
}

// change is what moving a dimension does, relative to the values of the goals on the front.
func (b *sheetBuilder) change(d *sheet.Data, v *sheet.Design, p *objective.Plan, s *objective.Sensitivity) sheet.Change {
	dim, spec := &p.Family.Dimensions[s.Dimension], &p.Specs[s.Dimension]
	out := sheet.Change{
		Dimension: s.Dimension, Down: sheet.Num(s.Down.By), Up: sheet.Num(s.Up.By),
		LowerFails: s.Down.Fails, HigherFails: s.Up.Fails, Text: moveInWords(dim, spec, float64(v.Dimensions[s.Dimension]), s),
	}
	for k := range d.Goals {
		base := float64(v.Measures[d.Goals[k].Measure])
		relative := func(m *objective.Moved) float64 {
			if m.By == 0 {
				return math.NaN()
			}
			if m.Goals[k] == base {
				return 0
			}
			return (m.Goals[k] - base) / math.Abs(base)
		}
		low, high := relative(&s.Down), relative(&s.Up)
		out.Lower, out.Higher = append(out.Lower, share(low)), append(out.Higher, share(high))
	}
	return out
}

// share is a relative change, to five digits and not finer than 1e-7.
func share(v float64) sheet.Num {
	if math.Abs(v) < 1e9 {
		v = math.Round(v*1e7) / 1e7
	}
	return sheet.Num(sheet.Rounded(v, 5))
}

// moveInWords says how a dimension was moved.
func moveInWords(dim *kin.Dimension, spec *objective.Spec, x float64, s *objective.Sensitivity) string {
	k := study.DimensionUnit(dim.Unit)
	switch {
	case spec.Kind == objective.Steps:
		return "one step of " + amount(spec.Step, k)
	case spec.Kind == objective.Choices && s.Down.By != 0 && s.Up.By != 0:
		return fmt.Sprintf("to %s and %s", amount(x+s.Down.By, k), amount(x+s.Up.By, k))
	case spec.Kind == objective.Choices && s.Down.By != 0:
		return "to " + amount(x+s.Down.By, k)
	case spec.Kind == objective.Choices && s.Up.By != 0:
		return "to " + amount(x+s.Up.By, k)
	case spec.Kind == objective.Choices:
		return "no other choice"
	case x == 0:
		return "±" + amount(s.Up.By, k)
	}
	return "±1 %"
}
