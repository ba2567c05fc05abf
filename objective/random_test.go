package objective

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"
)

// seeded gives the same numbers on every run.
func seeded(seed uint64) *rand.Rand { return rand.New(rand.NewPCG(seed, 20240611)) }

// between is a number in [low, high].
func between(rng *rand.Rand, low, high float64) float64 { return low + (high-low)*rng.Float64() }

// within is a vector with each component in [-r, r].
func within(rng *rand.Rand, r float64) kin.Vec {
	return kin.Vec{X: between(rng, -r, r), Y: between(rng, -r, r), Z: between(rng, -r, r)}
}

// near fails the test if got is farther than tol from want.
func near(t testing.TB, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.17g, want %.17g within %g", what, got, want, tol)
	}
}

// same compares relatively, numbers that may be infinite.
func same(a, b, tol float64) bool {
	return a == b || math.Abs(a-b) <= tol*math.Max(math.Abs(a), math.Abs(b))
}

// randomDesign is a design within the family's usual ranges.
func randomDesign(rng *rand.Rand, f *kin.Family) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = between(rng, dim.Low, dim.High)
	}
	return d
}

// soundDesign is a regular design inside the family's usual ranges, three tenths up each of them, in its usual working mode.
func soundDesign(f *kin.Family) []float64 {
	d := make([]float64, len(f.Dimensions))
	for i, dim := range f.Dimensions {
		d[i] = dim.Low + 0.3*(dim.High-dim.Low)
		if dim.Unit == kin.Sign {
			d[i] = dim.Default
		}
	}
	return d
}

// sizedPlan fixes every dimension but the actuator range, which the duty sizes.
func sizedPlan(t *Task, f *kin.Family, values []float64) *Plan {
	specs := make([]Spec, len(values))
	for i, v := range values {
		specs[i] = Spec{Kind: Fixed, Values: []float64{v}}
	}
	least, span := f.Range()
	if least >= 0 {
		specs[least], specs[span] = Spec{Kind: Sized}, Spec{Kind: Sized}
	}
	return NewPlan(t, f, specs)
}

// appraise judges one design whose actuators the duty sizes.
func appraise(t *Task, f *kin.Family, values []float64) *Appraisal {
	return Appraise(t, sizedPlan(t, f, values), values)
}

// outrightPlan is a machine by its joint centres, its actuators sized.
func outrightPlan(t *Task, f *kin.Family, j *kin.Joints) *Plan {
	p := sizedPlan(t, f, make([]float64, len(f.Dimensions)))
	p.Joints = j
	return p
}

// appraiseJoints judges one machine given by its joint centres.
func appraiseJoints(t *Task, f *kin.Family, j *kin.Joints) *Appraisal {
	p := outrightPlan(t, f, j)
	return Appraise(t, p, p.Single())
}

// value is the reading of a measure; the test ends if there is none.
func value(t testing.TB, a *Appraisal, name string) float64 {
	t.Helper()
	r := a.Reading(name)
	if r == nil {
		t.Fatalf("no reading of %s", name)
	}
	return r.Value
}

// randomCoords are coordinates within part times the family's starter box.
func randomCoords(rng *rand.Rand, f *kin.Family, part float64) kin.Coords {
	var c kin.Coords
	for _, q := range f.Freedoms {
		c[q] = part * between(rng, -f.Starter.Box[q], f.Starter.Box[q])
	}
	return c
}

// ranged is a zone of part times the starter box.
func ranged(f *kin.Family, kind ZoneKind, part float64, samples int) Zone {
	z := Zone{Name: "ranged", Kind: kind, Samples: samples}
	for _, q := range f.Freedoms {
		z.Low[q], z.High[q] = -part*f.Starter.Box[q], part*f.Starter.Box[q]
	}
	return z
}

// listed is a zone of n random poses.
func listed(rng *rand.Rand, f *kin.Family, part float64, n int) Zone {
	z := Zone{Name: "listed", Kind: Listed}
	for range n {
		z.Poses = append(z.Poses, randomCoords(rng, f, part))
	}
	return z
}

// pinned is the task with the sampled poses of every zone listed outright: nothing is then refined.
func pinned(t *Task) *Task {
	p := *t
	p.Zones = append([]Zone(nil), t.Zones...)
	for i := range p.Zones {
		z := Zone{Name: p.Zones[i].Name, Kind: Listed}
		for _, s := range sampleZone(&p.Zones[i], i) {
			z.Poses = append(z.Poses, s.Coords)
		}
		p.Zones[i] = z
	}
	p.Prepare()
	return &p
}

// anyWay and perAxis are sets of about the size r.
func anyWay(rng *rand.Rand, r float64) Set { return Set{Kind: AnyWay, Radius: between(rng, r/2, r)} }

func perAxis(rng *rand.Rand, r float64) Set {
	return Set{Kind: PerAxis, Half: kin.Vec{X: between(rng, 0, r), Y: between(rng, 0, r), Z: between(rng, 0, r)}}
}

// randomLoads are four loads that act together: two masses, a force at the tool
// and a force elsewhere. set makes their sets.
func randomLoads(rng *rand.Rand, set func(*rand.Rand, float64) Set) []Load {
	return []Load{
		{Name: "mass", Mass: between(rng, 50, 300), Centre: within(rng, 0.3),
			Inertia: [6]float64{between(rng, 10, 20), between(rng, 10, 20), between(rng, 10, 20),
				between(rng, -4, 4), between(rng, -4, 4), between(rng, -4, 4)},
			Linear: set(rng, 5), Angular: set(rng, 4)},
		{Name: "by the tool", Mass: between(rng, 10, 50), Centre: within(rng, 0.3),
			Inertia: [6]float64{2, 3, 4, 0.5, -0.5, 0.3}, Linear: set(rng, 5), Angular: set(rng, 4), AtTool: true},
		{Name: "force", Force: within(rng, 500), ForceSpread: positiveVec(rng, 200),
			Moment: within(rng, 50), MomentSpread: positiveVec(rng, 20)},
		{Name: "force elsewhere", Force: within(rng, 500), ForceSpread: positiveVec(rng, 200),
			Moment: within(rng, 50), MomentSpread: positiveVec(rng, 20), At: within(rng, 0.2), Off: true},
	}
}

func positiveVec(rng *rand.Rand, r float64) kin.Vec {
	return kin.Vec{X: between(rng, 0, r), Y: between(rng, 0, r), Z: between(rng, 0, r)}
}

// richTask has every kind of zone, load and input; Prepare is still to be called.
func richTask(rng *rand.Rand, f *kin.Family) *Task {
	return &Task{
		Zones: []Zone{ranged(f, Box, 0.8, 100), ranged(f, Axes, 1, 5), ranged(f, Ellipsoid, 1, 40), listed(rng, f, 1, 20)},
		Cases: []Case{
			{Name: "axes", Loads: randomLoads(rng, perAxis)[:1], Linear: perAxis(rng, 0.4), Angular: perAxis(rng, 0.5)},
			{Name: "ways", Loads: randomLoads(rng, anyWay)[1:], Linear: anyWay(rng, 0.4), Angular: anyWay(rng, 0.5), Zones: []int{1, 3}},
			{Name: "rest", Loads: []Load{{Name: "plate", Mass: 40}}, Zones: []int{2}},
		},
		Tool:     kin.Vec{X: 0.02, Y: -0.03, Z: 0.1},
		Gravity:  kin.Vec{Z: -Gravity},
		Actuator: Actuator{DeadLength: math.NaN(), DeadRatio: 1, Reserve: 0.01, Stiffness: 3e7, Error: 1e-5},
		Joints:   Joints{Stiffness: 2e8},
		Legs:     Legs{Diameter: 0.05, RodDiameter: 0.03, Modulus: 2.1e11, EndFixity: 1},
		Rule:     LengthGiven, Length: 0.3,
		Singular: 1e-6,
		Coverage: 1,
	}
}

// eachFamily runs check on the families with prismatic legs between two joints, for which the
// tests have an independent statement of lengths and rows (see statics).
func eachFamily(t *testing.T, check func(t *testing.T, f *kin.Family)) {
	for _, name := range prismatic {
		t.Run(name, func(t *testing.T) { check(t, kin.FamilyNamed(name)) })
	}
}

var prismatic = []string{"6-UPS", "3-RPR"}

// everyFamily runs check on all families.
func everyFamily(t *testing.T, check func(t *testing.T, f *kin.Family)) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) { check(t, f) })
	}
}
