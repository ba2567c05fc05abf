package proof

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"
	"legwright/kin/enclose"
	"legwright/objective"
)

// randomBox is a box of poses of some size about a place in the study's box.
func randomBox(r *rand.Rand, half *kin.Coords, size float64, moving []int) enclose.Box {
	var b enclose.Box
	for _, q := range moving {
		h := half[q] * size * math.Exp(-2*r.Float64())
		c := half[q] * (2*r.Float64() - 1)
		b.Low[q], b.High[q] = c-h, c+h
	}
	return b
}

// inside is a pose of the box, one in three a corner.
func inside(r *rand.Rand, b *enclose.Box) (c kin.Coords) {
	corner := r.IntN(3) == 0
	for q := range c {
		u := r.Float64()
		if corner {
			u = math.Round(u)
		}
		if c[q] = b.Low[q] + u*(b.High[q]-b.Low[q]); u == 1 {
			c[q] = b.High[q]
		}
	}
	return c
}

// soundOn tests bounds over random boxes against poses in them, in plain arithmetic, and gives the median over the boxes
// of how much of the change over the box each bound adds to it.
func soundOn(t *testing.T, r *rand.Rand, task *objective.Task, family string, values []float64, half kin.Coords, boxes, poses int) {
	t.Helper()
	p := planOf(task, family, values)
	s, _ := newSubject(task, p, values)
	b, v := newBench(s), newProber(s)
	var moving []int
	for q := range half {
		if half[q] > 0 {
			moving = append(moving, q)
		}
	}
	region := region{moving: moving, ball: r.IntN(2) == 0, box: enclose.Box{Low: kin.Coords{}, High: half}}
	for q := range half {
		region.box.Low[q] = -half[q]
	}
	b.enter(&region)
	proved := make([]int, len(s.props))
	for range boxes {
		box := randomBox(r, &half, 0.3, moving)
		// what is met
		met := make([]float64, len(s.props))
		for i := range met {
			if met[i] = math.Inf(-1); s.props[i].AtLeast {
				met[i] = math.Inf(1)
			}
		}
		reached, seen := true, false
		for range poses {
			c := [enclose.Coords]float64(inside(r, &box))
			if !region.holds(&c) {
				continue
			}
			seen = true
			v.at(c, 0)
			reached = reached && v.reached
			if !v.reached {
				continue
			}
			for i := range s.props {
				var c Counter
				v.refutes(i, &c)
				if s.props[i].worse(c.Value, met[i]) {
					met[i] = c.Value
				}
			}
		}
		if !seen {
			continue
		}
		// bounds that are no limits show what the tests find; the others must refuse what is met
		for i := range s.props {
			far := math.Inf(1)
			if s.props[i].AtLeast {
				far = math.Inf(-1)
			}
			switch k := s.props[i].kind; k {
			case reach, regular, held:
				far = 0
			case conditioned, wrenches, slowest:
				far = met[i] * (1 + 1e-7)
			case fastest:
				far = met[i] * (1 - 1e-7)
			}
			s.aim(i, far)
		}
		closed, _ := b.prove(&box, 1<<len(s.props)-1)
		for i := range s.props {
			q := &s.props[i]
			if closed>>i&1 == 0 {
				continue
			}
			proved[i]++
			switch q.kind {
			case reach:
				if !reached {
					t.Fatalf("%s: box %v is said to be reached and is not", family, box)
				}
			case regular, held:
				if met[i] < task.Singular {
					t.Fatalf("%s: %s over %v, where %g is met", family, q.Name, box, met[i])
				}
			case conditioned, wrenches, slowest, fastest:
				t.Fatalf("%s: %s %g over %v, where %g is met", family, q.Name, s.target[i], box, met[i])
			default:
				bound := b.worst[i]
				if q.kind == baseSwing || q.kind == otherSwing {
					bound = swing(bound)
				}
				if q.worse(met[i], bound+1e-12*math.Abs(bound)) && q.worse(met[i], bound-1e-12*math.Abs(bound)) {
					t.Fatalf("%s: %s is %.17g at most over %v, where %.17g is met", family, q.Name, bound, box, met[i])
				}
			}
		}
	}
	for i := range s.props {
		switch s.props[i].kind {
		case conditioned, wrenches, slowest, fastest:
		default:
			if proved[i] == 0 {
				t.Errorf("%s: %s was proved for none of %d boxes", family, s.props[i].Name, boxes)
			}
		}
	}
}

// limited gives a task limits on measures.
func limited(t *objective.Task, f *kin.Family, names ...string) {
	t.Limits = nil
	for _, n := range names {
		m := objective.MeasureNamed(n)
		if m.Has == nil || m.Has(f) {
			t.Limits = append(t.Limits, objective.Limit{Measure: m, AtLeast: m.Sense == objective.Larger, Bound: 1, Origin: "limits"})
		}
	}
	t.Prepare()
}

// Loads of every kind, against the appraisal's own arithmetic.
func loads() []objective.Case {
	any := func(x float64) objective.Set { return objective.Set{Kind: objective.AnyWay, Radius: x} }
	each := func(x, y, z float64) objective.Set {
		return objective.Set{Kind: objective.PerAxis, Half: kin.Vec{X: x, Y: y, Z: z}}
	}
	return []objective.Case{
		{Name: "ways", Linear: any(0.3), Angular: any(0.5), Loads: []objective.Load{
			{Mass: 120, Centre: kin.Vec{X: 0.05, Y: -0.1, Z: 0.2}, Inertia: [6]float64{4, 9, 6, 0.5, -0.3, 0.8}, Linear: any(4), Angular: any(5)},
			{Force: kin.Vec{X: 300, Y: -100, Z: 50}, ForceSpread: kin.Vec{X: 20, Y: 90}, Moment: kin.Vec{Z: 30}, MomentSpread: kin.Vec{X: 10, Y: 20}},
		}},
		{Name: "axes", Linear: each(0.3, 0.2, 0.1), Angular: each(0.5, 0.1, 0.7), Loads: []objective.Load{
			{Mass: 80, Centre: kin.Vec{X: -0.1, Z: 0.3}, Inertia: [6]float64{3, 5, 8, 0.1, 0.2, 0.3}, Linear: each(1, 5, 2), Angular: each(2, 4, 1), AtTool: true},
			{Force: kin.Vec{X: 200, Y: 100}, ForceSpread: kin.Vec{X: 50, Y: 20, Z: 30}, At: kin.Vec{X: 0.1, Y: 0.1, Z: 0.1}, Off: true},
		}},
	}
}

func TestBoundsHold(t *testing.T) {
	boxes, poses := 60, 60
	if !testing.Short() {
		boxes, poses = 1000, 200
	}
	r := rand.New(rand.NewPCG(11, 4))
	for range 4 {
		task := studyA(1)
		task.Tool = kin.Vec{X: 0.02, Y: -0.03, Z: 0.1}
		task.Cases = loads()
		limited(task, kin.FamilyNamed("6-UPS"), "base_swing", "platform_swing", "leg_clearance", "conditioning", "regularity", "leg_force", "push_force",
			"pull_force", "leg_speed", "leg_power")
		v := []float64{0.5 + 0.4*r.Float64(), 0.25 + 0.25*r.Float64(), (8 + 20*r.Float64()) * deg, (8 + 20*r.Float64()) * deg, 0.7 + 0.5*r.Float64(), 0.5, 0.9}
		soundOn(t, r, task, "6-UPS", v, kin.Coords{0.15, 0.15, 0.1, 12 * deg, 12 * deg, 15 * deg}, boxes, poses)
	}
}

// Every family, at designs from its usual ranges.
func TestBoundsHoldOfFamilies(t *testing.T) {
	boxes, poses := 25, 30
	if !testing.Short() {
		boxes, poses = 300, 100
	}
	r := rand.New(rand.NewPCG(5, 9))
	for _, f := range kin.Families() {
		for range 2 {
			task, values := some(t, r, f, allMeasures...)
			soundOn(t, r, task, f.Name, values, f.Starter.Box, boxes, poses)
		}
	}
}

func mustSubject(t *objective.Task, family string, values []float64) *subject {
	s, _ := newSubject(t, planOf(t, family, values), values)
	return s
}

func TestBoxesAllocateNothing(t *testing.T) {
	task := studyA(1)
	task.Cases = loads()
	limited(task, kin.FamilyNamed("6-UPS"), "base_swing", "leg_clearance", "conditioning", "leg_force", "leg_speed", "leg_power")
	values := front(t, 20)
	s := mustSubject(task, "6-UPS", values)
	b := newBench(s)
	g := regions(task.Zones)
	b.enter(&g[0])
	for i := range s.props {
		s.aim(i, s.props[i].Limit)
		if s.props[i].kind == conditioned {
			s.aim(i, 0.1)
		}
	}
	box := g[0].box
	for q := range box.Low {
		box.Low[q], box.High[q] = 0.2*box.Low[q], 0.2*box.High[q]
	}
	if n := testing.AllocsPerRun(20, func() { b.prove(&box, 1<<len(s.props)-1) }); n != 0 {
		t.Errorf("a box allocates %g times", n)
	}
}
