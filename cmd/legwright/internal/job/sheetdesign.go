package job

import (
	"fmt"
	"math"
	"slices"

	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
)

// limitKinds lists the limits that designs of the front have.
func limitKinds(d *sheet.Data, f *study.Front) {
	d.Limits = []sheet.LimitKind{}
	for i := range f.Designs {
		for k := range f.Designs[i].Limits {
			if v := kindOf(&f.Designs[i].Limits[k]); !slices.Contains(d.Limits, v) {
				d.Limits = append(d.Limits, v)
			}
		}
	}
}

func kindOf(l *study.Limit) sheet.LimitKind {
	k := sheet.LimitKind{Measure: l.Measure, Origin: l.Origin, Unit: study.KindOf(l.Unit).SI(), AtLeast: l.Sense == study.AtLeast}
	if l.Measure == "coverage" {
		k.Unit = "%"
	}
	return k
}

// design fills design i.
func (b *sheetBuilder) design(d *sheet.Data, i int) error {
	r := &b.front.Designs[i]
	plan := b.study.planOf(r.Family)
	p := b.study.Plans[plan]
	a, outline := b.machine(plan, r)
	err := sameJoints(a.Machine.Frame(), r)
	if err != nil {
		return err
	}
	v := &d.Designs[i]
	*v = sheet.Design{
		ID: r.ID, Rank: r.Rank, Score: sheet.Exact(r.Score), Family: plan, Feasible: r.Feasible, Marks: append([]string{}, r.Marks...),
		Sheets: b.full[i], Notes: r.Notes, Tightest: -1,
	}
	if r.Proof != nil {
		v.Proof, v.Proved = r.Proof.Answer, report.ProofSentence(r.Proof)
	}
	if r.WholeStroke != nil {
		v.Stroke = report.StrokeSentence(r.WholeStroke)
	}
	for k := range p.Family.Dimensions {
		v.Dimensions = append(v.Dimensions, sheet.Exact(a.Values[k]))
	}
	b.measures(d, v, r)
	tightest := r.Tightest()
	for k := range r.Limits {
		l := &r.Limits[k]
		if l == tightest {
			v.Tightest = k
		}
		holds := sheet.Num(0)
		if l.Holds {
			holds = 1
		}
		v.Limits = append(v.Limits, [5]sheet.Num{sheet.Num(slices.Index(d.Limits, kindOf(l))), sheet.Num(l.Bound), sheet.Num(l.Value), sheet.Num(l.Margin), holds})
	}
	low, high := actuatorRange(p, a.Values)
	v.Range = [2]sheet.Num{sheet.Num(low), sheet.Num(high)}
	for k := range r.Legs {
		l := &r.Legs[k]
		v.Legs = append(v.Legs, [8]sheet.Num{sheet.Num(l.Shortest), sheet.Num(l.Home), sheet.Num(l.Longest),
			few(l.Push), few(l.Pull), few(l.Speed), few(l.BaseSwing), few(l.PlatformSwing)})
	}
	v.Fixed, v.Platform = points(outline.Fixed), points(outline.Platform)
	b.poses(d, v, r, a, outline)
	if b.full[i] {
		b.detail(d, v, plan, a, outline)
		if v.Detail.Handover, err = b.handover(r); err != nil {
			return err
		}
	}
	return nil
}

// few is a figure to five digits.
func few(v study.Number) sheet.Num { return sheet.Num(sheet.Rounded(float64(v), 5)) }

// sameJoints tells whether a record's joints are where its dimensions put them.
func sameJoints(f *kin.Frame, r *study.Design) error {
	same := func(a []kin.Vec, b [][3]float64) bool {
		if len(a) != len(b) {
			return false
		}
		for i, v := range a {
			for k, x := range [3]float64{v.X, v.Y, v.Z} {
				if !(math.Abs(x-b[i][k]) <= 1e-9) {
					return false
				}
			}
		}
		return true
	}
	if !same(f.Base, r.Joints.Base) || !same(f.Platform, r.Joints.Platform) {
		return fmt.Errorf("design %s: its joints in front.json are not where its dimensions put them; take front.json from a backup, or search again", r.ID)
	}
	return nil
}

// measures fills the values of all measures; those of goals keep every digit, since the ranking depends on them.
func (b *sheetBuilder) measures(d *sheet.Data, v *sheet.Design, r *study.Design) {
	for k := range d.Measures {
		x, ok := r.Measures[d.Measures[k].Name]
		if !ok {
			x = study.Number(math.NaN())
		} else if math.IsInf(float64(x), 0) || math.IsNaN(float64(x)) {
			v.Unbounded = append(v.Unbounded, k)
		}
		if !slices.ContainsFunc(d.Goals, func(g sheet.Goal) bool { return g.Measure == k }) {
			x = study.Number(sheet.Rounded(float64(x), 7))
		}
		v.Measures = append(v.Measures, sheet.Exact(x))
	}
}

// poses fills home and the deciding poses, each once, and which measure each decides.
func (b *sheetBuilder) poses(d *sheet.Data, v *sheet.Design, r *study.Design, a *objective.Appraisal, o *kin.Outline) {
	at := map[study.Pose]int{}
	number := func(p study.Pose) int {
		n, ok := at[p]
		if !ok {
			n = len(v.Poses)
			at[p] = n
			v.Poses = append(v.Poses, posture(p, a, o))
		}
		return n
	}
	number(study.Pose{})
	v.Deciding = [][6]int{}
	for k := range d.Measures {
		w, ok := r.Worst[d.Measures[k].Name]
		if !ok || w.Pose == nil {
			continue
		}
		zone := slices.IndexFunc(d.Zones, func(z sheet.Zone) bool { return w.Zone != "" && z.Name == w.Zone })
		load := -1
		if w.Case != "" {
			load = slices.Index(d.Cases, w.Case)
		}
		v.Deciding = append(v.Deciding, [6]int{k, number(*w.Pose), w.Leg, w.Mate, zone, load})
	}
}

// posture is how the machine stands at a pose about home.
func posture(at study.Pose, a *objective.Appraisal, o *kin.Outline) sheet.Pose {
	c := kin.Coords{at.X, at.Y, at.Z, at.Roll, at.Pitch, at.Yaw}
	p := kin.NewPose(c)
	out := sheet.Pose{Place: place(o, &p), Q: []sheet.Num{}}
	for k, x := range c {
		out.At[k] = sheet.Num(x)
	}
	var s kin.State
	if a.Machine.Move(&p, &s); s.Fail == kin.Reached {
		out.Moving = points(o.Move(&p, &s))
		for _, q := range s.Q[:a.Machine.Frame().Legs()] {
			out.Q = append(out.Q, sheet.Num(q))
		}
	}
	return out
}

func place(o *kin.Outline, p *kin.Pose) [6]sheet.Fine {
	origin, rot := o.Place(p)
	roll, pitch, yaw := rot.RPY()
	return [6]sheet.Fine{sheet.Fine(origin.X), sheet.Fine(origin.Y), sheet.Fine(origin.Z), sheet.Fine(roll), sheet.Fine(pitch), sheet.Fine(yaw)}
}

func points(vs []kin.Vec) []sheet.Fine {
	out := make([]sheet.Fine, 0, 3*len(vs))
	for _, v := range vs {
		out = append(out, sheet.Fine(v.X), sheet.Fine(v.Y), sheet.Fine(v.Z))
	}
	return out
}
