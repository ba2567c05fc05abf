package job

import (
	"math"

	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
)

// families fills what the designs of each family of the brief have in common.
func (b *sheetBuilder) families(d *sheet.Data) {
	s := b.study
	for i, p := range s.Plans {
		f := p.Family
		coordinate, effort, rate := study.DriveKinds(f.Name)
		v := sheet.Family{
			Name: f.Name, Text: f.Text, Rotary: f.Drive == kin.Rotary, Bounded: f.Legs - f.Free,
			Coordinate: coordinate.SI(), Effort: effort.SI(), Rate: rate.SI(),
			Reserve: sheet.Num(s.Tasks[i].Actuator.Reserve),
		}
		if least, _ := f.Range(); least < 0 {
			v.Bounded = 0
		}
		for _, q := range f.Freedoms {
			v.Freedoms = append(v.Freedoms, q.String())
		}
		for k := range f.Dimensions {
			v.Dimensions = append(v.Dimensions, dimensionColumn(p, k))
		}
		t := s.Tasks[i]
		force, speed := "leg_force", "leg_speed"
		if v.Rotary {
			force, speed = "motor_torque", "motor_speed"
		}
		v.Push = least(most(t, force), most(t, "push_force"))
		v.Pull = least(most(t, force), most(t, "pull_force"))
		v.Speed = most(t, speed)
		v.BaseSwing, v.PlatformSwing = most(t, "base_swing"), most(t, "platform_swing")
		for k := range b.front.Families {
			if l := &b.front.Families[k]; l.Name == f.Name {
				v.Summary = l.Why
			}
		}
		d.Families = append(d.Families, v)
	}
	for i := range b.front.Designs { // the lines are the same for all designs of a family
		r := &b.front.Designs[i]
		at := b.study.planOf(r.Family)
		if sk := &d.Families[at].Skeleton; sk.Lines == nil {
			_, outline := b.machine(at, r)
			*sk = skeleton(outline)
		}
	}
}

// most is the least upper bound that the task sets on a measure, nil for none.
func most(t *objective.Task, measure string) *sheet.Num {
	var out *sheet.Num
	for i := range t.Limits {
		if l := &t.Limits[i]; l.Measure.Name == measure && !l.AtLeast {
			out = least(out, sheet.Pointer(l.Bound))
		}
	}
	return out
}

// least is the smaller of two bounds, of which nil is none.
func least(a, b *sheet.Num) *sheet.Num {
	if a == nil || b != nil && *b < *a {
		return b
	}
	return a
}

// dimensionColumn is the column of a family's dimension.
func dimensionColumn(p *objective.Plan, k int) sheet.Column {
	dim, spec := &p.Family.Dimensions[k], &p.Specs[k]
	c := sheet.Column{Name: dim.Name, Text: dim.Text, Unit: study.DimensionUnit(dim.Unit).SI()}
	switch spec.Kind {
	case objective.Fixed:
		c.Form = "fixed"
	case objective.Range:
		c.Form = "range"
	case objective.Steps:
		c.Form, c.Step = "steps", spec.Step
	case objective.Choices:
		c.Form = "choices"
	case objective.Sized:
		c.Form = "sized"
		return c
	}
	if p.Derived(k) {
		c.Form = "derived"
	}
	low, high := bounds(spec)
	c.Low, c.High = sheet.Pointer(low), sheet.Pointer(high)
	return c
}

// machine builds the machine of a record, and its lines, with rails over the range that its dimensions allow.
func (b *sheetBuilder) machine(plan int, r *study.Design) (*objective.Appraisal, *kin.Outline) {
	p := b.study.Plans[plan]
	values := dimensionsOf(p, r)
	a := objective.Unjudged(b.study.Tasks[plan], p, values)
	low, high := actuatorRange(p, values)
	return a, kin.NewOutline(a.Machine, low, high)
}

// actuatorRange is what the dimensions allow, NaN where the family has no such dimensions.
func actuatorRange(p *objective.Plan, values []float64) (low, high float64) {
	least, span := p.Family.Range()
	if least < 0 {
		return math.NaN(), math.NaN()
	}
	return values[least], values[least] + values[span]
}

func skeleton(o *kin.Outline) sheet.Skeleton {
	out := sheet.Skeleton{
		Fixed: len(o.Fixed), Platform: len(o.Platform), Moving: o.Moving, Kinds: []string{}, Lines: [][4]int{},
		Base: o.Base, Joints: o.Joints, Origin: o.Origin, Tool: o.Tool,
	}
	at := map[kin.LineKind]int{}
	for _, l := range o.Lines {
		k, ok := at[l.Kind]
		if !ok {
			k = len(out.Kinds)
			at[l.Kind] = k
			out.Kinds = append(out.Kinds, l.Kind.String())
		}
		out.Lines = append(out.Lines, [4]int{k, l.Leg + 1, l.A, l.B})
	}
	return out
}
