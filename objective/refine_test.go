package objective

import (
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// refinedTask is a duty of one zone, as large as the family's starter duty, with loads of both kinds of sets.
func refinedTask(f *kin.Family, kind ZoneKind, part float64, samples int, seed uint64) *Task {
	rng := seeded(seed)
	t := richTask(rng, f)
	t.Zones = []Zone{ranged(f, kind, part, samples)}
	t.Cases = []Case{
		{Name: "axes", Loads: randomLoads(rng, perAxis)[2:], Linear: perAxis(rng, 0.4), Angular: perAxis(rng, 0.5)},
		{Name: "ways", Loads: randomLoads(rng, anyWay)[:1], Linear: anyWay(rng, 0.4), Angular: anyWay(rng, 0.5)},
	}
	t.Prepare()
	return t
}

// variedDesign is a sound design with every dimension moved by up to a fifth of its usual range either way.
func variedDesign(f *kin.Family, random func() float64) []float64 {
	d := soundDesign(f)
	for i, dim := range f.Dimensions {
		if dim.Role == kin.Shape && dim.Unit != kin.Sign && dim.Low < dim.High {
			d[i] += 0.4 * (random() - 0.5) * (dim.High - dim.Low)
		}
	}
	return d
}

// pattern is a search for the worst that shares nothing with the Refiner's but the values at poses: steps along
// coordinates and in random directions, halved when none helps (after R. Hooke and T. A. Jeeves 1961).
func pattern(f func(*[6]float64) float64, g *region, u [6]float64, random func() float64) float64 {
	best := f(&u)
	for step := 0.5; step > 1e-6; {
		better := false
		try := func(t [6]float64) {
			g.project(&t)
			if v := f(&t); v > best+1e-13*math.Abs(best) {
				u, best, better = t, v, true
			}
		}
		for k := range g.n {
			for _, s := range [2]float64{-step, step} {
				t := u
				t[k] += s
				try(t)
			}
		}
		for range 2 * g.n {
			t := u
			for k := range g.n {
				t[k] += step * (2*random() - 1)
			}
			try(t)
		}
		if !better {
			step /= 2
		}
	}
	return best
}

// allProperties are the measures of poses (but deflection, which is dear) and the ends of every leg.
func allProperties(t *Task, f *kin.Family, legs int) (out []Property) {
	for _, m := range every(t, f) {
		if m.perPose() && m.Name != "deflection" {
			out = append(out, Property{Measure: m})
		}
	}
	for i := range legs {
		out = append(out, Property{Leg: i}, Property{Leg: i, Most: true})
	}
	return out
}

// badness of an extreme, larger is worse, in the measure's own units.
func (p *Property) badness(v float64) float64 {
	if p.Measure != nil && p.Measure.Sense == Larger || p.Measure == nil && !p.Most {
		return -v
	}
	return v
}

// ranked gives the samples by how bad the property is at them, worst first.
func (r *Refiner) ranked(p Property) (out []start) {
	r.aim(p)
	for k := range r.v.task.samples {
		r.here = r.v.task.samples[k]
		if r.look(k, r.need) {
			if b, ok := r.read(); ok {
				out = append(out, start{b, k})
			}
		}
	}
	slices.SortStableFunc(out, func(a, b start) int {
		switch {
		case a.bad > b.bad:
			return -1
		case a.bad < b.bad:
			return 1
		}
		return 0
	})
	return out
}

// finished turns a raw bad value into one of the measure, larger worse still.
func finished(p Property, bad float64) float64 {
	if p.Measure == nil {
		return bad
	}
	w := Worst{Value: p.Measure.bad(bad)}
	return p.badness(p.Measure.value(&w))
}

// excesses compares, for random designs, what the Refiner adds to the worst sample with what a pattern search from the 12 worst
// of ten times as many samples adds, and counts the properties for which it is less than 99.9 % of that.
func excesses(t *testing.T, f *kin.Family, kind ZoneKind, designs int) (beyond, short int) {
	rng := seeded(7)
	few := map[ZoneKind]int{Box: 200, Ellipsoid: 200, Axes: 21}[kind]
	for seed := range uint64(designs) {
		task, dense := refinedTask(f, kind, 1, few, seed), refinedTask(f, kind, 1, 10*few, seed)
		p := sizedPlan(task, f, variedDesign(f, rng.Float64))
		m := p.build(task, p.Single())
		r, ref := NewRefiner(task, f), NewRefiner(dense, f)
		if !r.Begin(m) || !ref.Begin(m) {
			continue
		}
		for _, p := range allProperties(task, f, m.Frame().Legs()) {
			samples := r.ranked(p)
			e, ok := r.Worst(0, p)
			if !ok || e.Lost || e.Singular || len(samples) < len(task.samples) {
				continue
			}
			sampled, got := finished(p, samples[0].bad), p.badness(e.Value)
			if got < sampled-1e-12*math.Abs(sampled) {
				t.Errorf("%s: refined to %.12g from a worse sample, %.12g", name(p), got, sampled)
			}
			top := math.Inf(-1)
			starts := ref.ranked(p)
			for _, s := range starts[:min(12, len(starts))] {
				o := &dense.samples[s.sample]
				ref.reg, ref.here = regionOf(&dense.Zones[0], o), Sample{Row: -1}
				top = math.Max(top, pattern(ref.bad, &ref.reg, ref.reg.from(&o.Coords), rng.Float64))
			}
			truth := finished(p, top)
			if excess := truth - sampled; excess > 1e-7*math.Abs(truth) && !math.IsInf(truth, 1) {
				beyond++
				if got-sampled < 0.999*excess {
					short++
					t.Logf("%s, zone kind %d, %s: sampled %.9g, refined %.9g, found %.9g", f.Name, kind, name(p), sampled, got, truth)
				}
			}
		}
	}
	return beyond, short
}

func name(p Property) string {
	if p.Measure == nil {
		return "leg"
	}
	return p.Measure.Name
}

// Worst values that lie between the samples are found: at least 99.9 % of what a tenfold denser sample and a search of
// another kind find, in all but one of 200.
func TestRefinementFindsTheExcess(t *testing.T) {
	families, designs := []string{"6-UPS", "3-RPR", "delta", "6-RUS", "3-RPS", "five-bar", "level-arm", "6-PUS"}, 2
	if testing.Short() {
		families, designs = []string{"3-RPR", "five-bar"}, 1
	}
	beyond, short := 0, 0
	for _, name := range families {
		for _, kind := range []ZoneKind{Box, Ellipsoid, Axes} {
			b, s := excesses(t, kin.FamilyNamed(name), kind, designs)
			beyond, short = beyond+b, short+s
		}
	}
	t.Logf("%d worst values lie beyond the samples, %d of them were not found", beyond, short)
	if beyond < 10 || 200*short > beyond+199 {
		t.Errorf("%d of %d worst values were not found", short, beyond)
	}
}

// Leg lengths over translations alone: the farthest point of a box from a base joint is a corner, the nearest the joint's
// projection on the box (the length is the distance of base joint and platform joint, which moves with the box). 1e-9 m.
func TestLegsOverATranslationBox(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	rng := seeded(301)
	for round := range 20 {
		task := refinedTask(f, Box, 1, 100, uint64(round))
		z := &task.Zones[0]
		for q := range 3 {
			a, b := between(rng, -1.5, 1.5), between(rng, -1.5, 1.5)
			z.Low[q], z.High[q] = math.Min(a, b), math.Max(a, b)
			z.Low[3+q], z.High[3+q] = 0, 0
		}
		z.Low[2], z.High[2] = -0.2, between(rng, 0, 0.5)
		task.Prepare()
		a := appraise(task, f, soundDesign(f))
		frame := a.Machine.Frame()
		for i, l := range a.Legs {
			near, far := 0.0, 0.0
			home := kin.Vec{
				X: frame.Home.X + frame.Platform[i].X - frame.Base[i].X,
				Y: frame.Home.Y + frame.Platform[i].Y - frame.Base[i].Y,
				Z: frame.Home.Z + frame.Platform[i].Z - frame.Base[i].Z,
			}
			for q, h := range [3]float64{home.X, home.Y, home.Z} {
				low, high := h+z.Low[q], h+z.High[q]
				n := math.Max(0, math.Max(low, -high))
				m := math.Max(math.Abs(low), math.Abs(high))
				near, far = near+n*n, far+m*m
			}
			near, far = math.Min(math.Sqrt(near), l.Home), math.Max(math.Sqrt(far), l.Home)
			if len(a.Verdicts) > 0 && a.Reading("conditioning").Value == 0 {
				continue
			}
			if v := a.Verdicts[len(a.Verdicts)-1]; v.Name == "singular poses" {
				continue // then nothing is refined
			}
			if math.Abs(l.Least-near) > 1e-9 || math.Abs(l.Most-far) > 1e-9 {
				t.Errorf("round %d, leg %d: %.12g to %.12g, want %.12g to %.12g", round, i+1, l.Least, l.Most, near, far)
			}
		}
	}
}
