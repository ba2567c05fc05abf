package job

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"math"
	"slices"

	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
	"legwright/objective/proof"
)

// proofBoxes is how many boxes of poses a search spends on the proof of one design, at most. Unlike a time it ends at the
// same place on every machine.
const proofBoxes = 200_000

// proofs remembers what was proved, by design, so that a design of two fronts is proved once.
type proofs struct {
	s       *Study
	workers int
	tell    func(done, of int, p proof.Progress) // may be nil
	known   map[string]*proven
}

// proven is a design that was widened, if its range is the duty's affair, and what was proved of it.
type proven struct {
	record study.Design
	result *proof.Result
}

// dimensionsOf are a record's dimensions in the order of the plan's family, NaN where it gives none.
func dimensionsOf(p *objective.Plan, r *study.Design) []float64 {
	out := make([]float64, len(p.Family.Dimensions))
	for i := range out {
		v, ok := r.Dimensions[p.Family.Dimensions[i].Name]
		if out[i] = float64(v); !ok {
			out[i] = math.NaN()
		}
	}
	return out
}

// fixed is a plan in which nothing is left open.
func fixed(t *objective.Task, p *objective.Plan, values []float64) *objective.Plan {
	specs := make([]objective.Spec, len(values))
	for i := range values {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: values[i : i+1]}
	}
	return objective.NewPlan(t, p.Family, specs)
}

// best proves the n designs of the front that have the best ranks, and puts what was proved, and the widened ranges, into
// the front. It reports false where the context ended before all were done.
func (b *proofs) best(ctx context.Context, f *study.Front, n int) bool {
	n = min(n, len(f.Designs))
	for i := range f.Designs[:n] {
		d := &f.Designs[i]
		key := designKey(d)
		p := b.known[key]
		if p == nil {
			if p = b.prove(ctx, d, i, n); p == nil || ctx.Err() != nil {
				return false
			}
			b.known[key], b.known[designKey(&p.record)] = p, p
		}
		r := p.record
		r.ID, r.Rank, r.Score, r.Marks = d.ID, d.Rank, d.Score, d.Marks
		*d = r
	}
	study.Rank(f, f.Weights) // for the marks, and since a goal may speak of the stroke
	return true
}

// prove widens the design and proves it; nil for a family that the study lacks.
func (b *proofs) prove(ctx context.Context, d *study.Design, i, of int) *proven {
	k := b.s.planOf(d.Family)
	if k < 0 {
		return nil
	}
	t, plan := b.s.Tasks[k], b.s.Plans[k]
	set := proof.Settings{Boxes: proofBoxes, Workers: b.workers}
	if b.tell != nil {
		set.Progress = func(p proof.Progress) { b.tell(i, of, p) }
	}
	out := &proven{record: *d}
	values := dimensionsOf(plan, d)
	if wide := b.widen(ctx, t, plan, values, set); wide != nil {
		a := objective.Appraise(t, fixed(t, plan, wide), wide)
		if a.Feasible {
			notes := out.record.Notes
			out.record, values = study.FromAppraisal(t, a), wide
			out.record.Notes = notes
		}
	}
	out.result = proof.Prove(ctx, t, fixed(t, plan, values), values, set)
	p := study.FromProof(t, d.Family, out.result)
	p.Own = study.OwnLimits(objective.Appraise(t, fixed(t, plan, values), values))
	out.record.Proof = &p
	return out
}

// widen gives the dimensions with the actuator range widened to the proved enclosure of what the duty needs; nil where the
// range is not the duty's affair, or the enclosure is not found.
func (b *proofs) widen(ctx context.Context, t *objective.Task, plan *objective.Plan, values []float64, set proof.Settings) []float64 {
	least, span := plan.RangeOf()
	if least < 0 || !plan.Derived(least) && !plan.Derived(span) {
		return nil
	}
	r, err := proof.Ranges(ctx, t, fixed(t, plan, values), values, set)
	if err != nil || r.Interrupted || r.Unreachable || !r.Known() {
		return nil
	}
	wide := slices.Clone(values)
	plan.Resize(&t.Actuator, r.Least, r.Most, wide)
	if stock := t.Actuator.Strokes; len(stock) > 0 && wide[span] > stock[len(stock)-1]*(1+objective.Tolerance) {
		return nil // nothing that can be bought: the limit is then proved to the gap
	}
	return wide
}

// counters are the poses that refute designs among the best n of the front, each once.
func (b *proofs) counters(f *study.Front, n int) (out []objective.Further, names []study.Counterexample) {
	for i := range f.Designs[:min(n, len(f.Designs))] {
		d := &f.Designs[i]
		p := b.known[designKey(d)]
		if p == nil || p.result.Answer != proof.Refuted {
			continue
		}
		for k := range p.result.Outcomes {
			o := &p.result.Outcomes[k]
			if o.Answer != proof.Refuted || o.At == nil || o.At.Zone < 0 {
				continue
			}
			x := objective.Further{Zone: o.At.Zone, Coords: o.At.Pose}
			if slices.Contains(out, x) {
				continue
			}
			out = append(out, x)
			names = append(names, study.NewCounterexample(b.s.Tasks[0], x, o.Name))
		}
	}
	return out, names
}

// Certificate is that of a design of the front, whose file holds text; nil where nothing of it was proved.
func (f *Found) Certificate(d study.Design, text []byte, sources *study.Sources) (*study.Certificate, error) {
	if f.book == nil || d.Proof == nil || d.Proof.Answer == proof.Refuted.String() {
		return nil, nil
	}
	p := f.book.known[designKey(&d)]
	if p == nil {
		return nil, nil
	}
	sum := sha256.Sum256(text)
	return certificate(f.book.s.Tasks[f.book.s.planOf(d.Family)], d.Family, hex.EncodeToString(sum[:]), SourcesHash(sources), p.result)
}

// designKey tells designs apart by family and dimensions.
func designKey(d *study.Design) string { return fmt.Sprint(d.Family, d.Dimensions) }
