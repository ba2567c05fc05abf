package job

import (
	"context"
	"math"
	"slices"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
)

const (
	briefs = "../../../../testdata/briefs/"
	studyA = "../../../../testdata/study-a/"
)

func load(t *testing.T, file string) *Study {
	t.Helper()
	b, err := brief.Load(file, *Known())
	if err != nil {
		t.Fatal(err)
	}
	s, err := New(b)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// The search finds, from a brief alone, the best condition number of the symmetric
// six-leg family in one pose, sqrt 2 (K. H. Pittens and R. P. Podhorodeski 1993, J. Robotic
// Systems 10:463; check C3 of testdata/reference, tolerance 1e-6).
func TestSearchFindsTheBestConditionNumber(t *testing.T) {
	s := load(t, briefs+"isotropic.yaml")
	found, err := s.Search(context.Background(), Settings(s.Brief))
	if err != nil {
		t.Fatal(err)
	}
	best := 0.0
	for _, d := range found.Front.Designs {
		best = math.Max(best, float64(d.Measures["conditioning"]))
	}
	if kappa := 1 / best; math.Abs(kappa-math.Sqrt2) > 1e-6 {
		t.Errorf("condition number %.9f, want sqrt 2", kappa)
	}
}

// A box and the file of its poses are the same duty, but for what lies between the poses of the box: there
// values may be worse, never better.
func TestBoxAndPoseFileAgree(t *testing.T) {
	box, file := load(t, studyA+"box.yaml"), load(t, studyA+"ranges.yaml")
	values := []float64{0.65, 0.40, 18 * math.Pi / 180, 12 * math.Pi / 180, 0.85, 0.62, 0.40}
	a, b := objective.Appraise(box.Tasks[0], box.Plans[0], values), objective.Appraise(file.Tasks[0], file.Plans[0], values)
	for _, r := range a.Readings {
		o := b.Reading(r.Measure.Name)
		if r.Measure.Mean { // a file's corners count in averages, a box's do not
			continue
		}
		if o == nil {
			t.Errorf("%s: box %v, file none", r.Measure.Name, r.Value)
			continue
		}
		worse := r.Value - o.Value
		if r.Measure.Sense == objective.Larger {
			worse = -worse
		}
		if r.Measure.Sense == objective.Either { // leg_min falls, the stroke grows
			worse = math.Abs(worse)
		}
		if worse < -1e-12*math.Abs(r.Value) || worse > 0.05*math.Abs(o.Value) {
			t.Errorf("%s: box %v, file %v", r.Measure.Name, r.Value, o.Value)
		}
	}
}

// Ranges of the leg that nothing speaks of are derived, and the program says so.
func TestRangesOfTheLegAreDerived(t *testing.T) {
	s := load(t, studyA+"ranges.yaml")
	if !s.Plans[0].Derive || len(s.Plans[0].Free()) != 5 {
		t.Errorf("derive %v, %d free dimensions", s.Plans[0].Derive, len(s.Plans[0].Free()))
	}
	if !slices.ContainsFunc(s.Hints(), func(h string) bool { return len(h) > 0 && h[:7] == "no goal" }) {
		t.Errorf("hints %q", s.Hints())
	}
}

// Where a single limit stands in the way, the smallest change of it that admits a design seen is a
// change that admits that design.
func TestRelaxationAdmitsItsDesign(t *testing.T) {
	b, err := brief.Load(briefs+"gauge-stage.yaml", *Known())
	if err != nil {
		t.Fatal(err)
	}
	for i := range b.Limits {
		if b.Limits[i].Measure == "conditioning" {
			b.Limits[i].Bound = 0.97
		}
	}
	s, err := New(b)
	if err != nil {
		t.Fatal(err)
	}
	run := Settings(b)
	run.Evaluations = 1000
	found, err := s.Search(context.Background(), run)
	if err != nil {
		t.Fatal(err)
	}
	help := found.Front.Help
	if help == nil || len(help.Nearest) == 0 {
		t.Fatalf("no help: %d designs", len(found.Front.Designs))
	}
	at := slices.IndexFunc(help.Relaxations, func(r study.Relaxation) bool { return r.Constraint == "conditioning" })
	if at < 0 {
		t.Fatalf("relaxations %+v", help.Relaxations)
	}
	r := help.Relaxations[at]
	for i := range b.Limits {
		if b.Limits[i].Measure == "conditioning" {
			b.Limits[i].Bound = float64(r.Needed)
		}
	}
	if s, err = New(b); err != nil {
		t.Fatal(err)
	}
	f := kin.FamilyNamed("3-RPR")
	values := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		values[i] = float64(help.Nearest[r.Design].Dimensions[f.Dimensions[i].Name])
	}
	if a := objective.Appraise(s.Tasks[0], s.Plans[0], values); !a.Feasible {
		t.Errorf("with conditioning at least %v the design still fails: %+v", r.Needed, a.Verdicts)
	}
}

// Every dimension of a record's design file reads back to the same bits.
func TestDesignFilesReadBack(t *testing.T) {
	for _, f := range kin.Families() {
		d := study.Design{ID: "007", Family: f.Name, Dimensions: map[string]study.Number{}}
		for i := range f.Dimensions {
			dim := &f.Dimensions[i]
			v := dim.Low + (dim.High-dim.Low)/3
			if dim.Unit == kin.Sign {
				v = 1
			}
			if dim.Optional && dim.Low == dim.High {
				v = dim.Default
			}
			d.Dimensions[dim.Name] = study.Number(v)
		}
		back, err := brief.ParseDesign("007.yaml", EncodeDesign(d, "../brief.yaml"), *Known())
		if err != nil {
			t.Errorf("%s: %v", f.Name, err)
			continue
		}
		for name, v := range back.Values() {
			if study.Number(v) != d.Dimensions[name] {
				t.Errorf("%s: %s is %v, was %v", f.Name, name, v, d.Dimensions[name])
			}
		}
		if len(back.Values()) != len(d.Dimensions) {
			t.Errorf("%s: %d of %d dimensions", f.Name, len(back.Values()), len(d.Dimensions))
		}
	}
}
