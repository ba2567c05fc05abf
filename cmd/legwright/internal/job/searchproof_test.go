package job

import (
	"bytes"
	"context"
	"os"
	"slices"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
	"legwright/objective/proof"
)

// smallStage is a study of a planar stage that takes a second.
const smallStage = `
family: 3-RPR
dimensions:
  base_radius: [300 mm, 500 mm]
  platform_radius: [80 mm, 160 mm]
  home_heading: [50 deg, 90 deg]
  leg_min: sized
  stroke: sized
actuator: {reserve: 5 mm, stiffness: 20 N/um}
legs: {diameter: 20 mm}
duty:
  zones:
    - {name: work, box: {x: 60 mm, y: 60 mm, yaw: 15 deg}, samples: 30}
goals:
  - maximise: conditioning
  - minimise: footprint
search: {evaluations: 600, seed: 3, front: 30}
`

func frontBytes(t *testing.T, f *study.Front) []byte {
	t.Helper()
	b, err := study.Encode(f)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// Proofs that refute nothing leave the front as it is without them, but for the ranges, which are wide enough for certain; the
// best designs are proved, and their certificates hold for the files that are written.
func TestSearchWithProofs(t *testing.T) {
	s := studyOf(t, smallStage)
	r := Settings(s.Brief)
	plain, err := s.Search(context.Background(), r)
	if err != nil {
		t.Fatal(err)
	}
	r.Prove = 2
	found, err := s.Search(context.Background(), r)
	if err != nil {
		t.Fatal(err)
	}
	if found.Front.Evaluations != plain.Front.Evaluations || len(found.Front.Designs) != len(plain.Front.Designs) || found.Front.Hypervolume != plain.Front.Hypervolume {
		t.Errorf("%d evaluations, %d designs, hypervolume %v; without proofs %d, %d, %v", found.Front.Evaluations, len(found.Front.Designs), found.Front.Hypervolume,
			plain.Front.Evaluations, len(plain.Front.Designs), plain.Front.Hypervolume)
	}
	dir := t.TempDir()
	sources := &study.Sources{Brief: study.File{Name: "brief.yaml", Bytes: []byte(smallStage)}}
	if err := os.WriteFile(dir+"/brief.yaml", sources.Brief.Bytes, 0o666); err != nil {
		t.Fatal(err)
	}
	for i, d := range found.Front.Designs {
		if i >= 2 {
			if d.Proof != nil {
				t.Errorf("design %s is proved unasked", d.ID)
			}
			continue
		}
		if d.Proof == nil || d.Proof.Answer != "proved" || !slices.Contains(d.Marks, "proved") {
			t.Fatalf("design %s: %+v, marks %v", d.ID, d.Proof, d.Marks)
		}
		p := plain.Front.Designs[i]
		if !(d.Dimensions["leg_min"] <= p.Dimensions["leg_min"]) || !(d.Dimensions["stroke"] >= p.Dimensions["stroke"]) {
			t.Errorf("design %s: the range of %v from %v is not wider than %v from %v", d.ID, d.Dimensions["stroke"], d.Dimensions["leg_min"], p.Dimensions["stroke"], p.Dimensions["leg_min"])
		}
		text := EncodeDesign(d, "brief.yaml")
		c, err := found.Certificate(d, text, sources)
		if err != nil || c == nil {
			t.Fatalf("no certificate: %v", err)
		}
		file := dir + "/" + d.ID + ".yaml"
		if err := os.WriteFile(file, text, 0o666); err != nil {
			t.Fatal(err)
		}
		subject, err := NewSubject(file, "")
		if err != nil {
			t.Fatal(err)
		}
		set := proof.Settings{}
		if _, err := subject.Check(context.Background(), c, set); err != nil {
			t.Errorf("design %s: %v", d.ID, err)
		}
	}
	r.Workers = 3
	again, err := s.Search(context.Background(), r)
	if err != nil || !bytes.Equal(frontBytes(t, again.Front), frontBytes(t, found.Front)) {
		t.Errorf("other bytes with three workers (%v)", err)
	}
}

// once refutes the first front that it sees, by a pose far beyond the duty.
type once struct {
	pose objective.Further
	seen int
}

func (o *once) best(context.Context, *study.Front, int) bool { o.seen++; return true }

func (o *once) counters(*study.Front, int) ([]objective.Further, []study.Counterexample) {
	return []objective.Further{o.pose}, []study.Counterexample{{Zone: "work", Property: "reach"}}
}

// A pose that refutes a design joins the duty: the front found with the rest of the budget holds there, and says so.
func TestCounterexampleJoinsTheDuty(t *testing.T) {
	s := studyOf(t, smallStage)
	r := Settings(s.Brief)
	r.Workers = 2
	far := objective.Further{Zone: 0, Coords: kin.Coords{kin.X: 0.12, kin.Y: -0.1}}
	judge := &once{pose: far}
	found, err := s.searchJudged(context.Background(), func() Run { r.Prove = 1; return r }(), judge)
	if err != nil {
		t.Fatal(err)
	}
	f := found.Front
	if judge.seen != 2 || f.Evaluations > 600 || f.Evaluations < 560 || len(f.Counterexamples) != 1 || f.Status != "budget spent" {
		t.Fatalf("%d fronts judged, %d evaluations, %v, %s", judge.seen, f.Evaluations, f.Counterexamples, f.Status)
	}
	if f.Poses != 31 {
		t.Errorf("%d poses", f.Poses)
	}
	for i := range f.Designs {
		d := &f.Designs[i]
		least, most := d.Dimensions["leg_min"], d.Dimensions["leg_min"]+d.Dimensions["stroke"]
		p := objective.NewProbe(s.Tasks[0], s.Plans[0], dimensionsOf(s.Plans[0], d))
		if !p.At(far.Coords, 0) {
			t.Fatalf("design %s does not reach the pose", d.ID)
		}
		q := p.Q()
		for leg := range 3 {
			if q[leg] < float64(least) || q[leg] > float64(most) {
				t.Errorf("design %s: leg %d is %v long there, its range is %v to %v", d.ID, leg+1, q[leg], least, most)
			}
		}
	}
	last := 0
	for _, p := range found.History {
		if p.Evaluations <= last || !(p.Feasible >= 0 && p.Feasible <= 1) {
			t.Errorf("history %+v after %d evaluations", p, last)
		}
		last = p.Evaluations
	}
}
