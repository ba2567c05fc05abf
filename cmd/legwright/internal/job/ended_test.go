package job

import (
	"encoding/json"
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// A panic or a NaN in the judging of single designs leaves them on record with their dimensions, for any
// number of workers alike, and the study goes on to a front.
func TestFailedDesignsAreRecorded(t *testing.T) {
	faulty := func() *Study {
		s := studyOf(t, journalBrief)
		footprint := *s.Tasks[0].Goals[0].Measure
		judge := footprint.Design
		footprint.Design = func(d *objective.Design) float64 {
			v := judge(d)
			switch {
			case v > 0.95:
				panic("too wide: " + strings.Repeat("wide ", 100))
			case v > 0.9:
				return math.NaN()
			}
			return v
		}
		s.Tasks[0].Goals[0].Measure = &footprint
		return s
	}
	found, err := faulty().Search(t.Context(), Run{Evaluations: 800, Seed: 1, Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	f := found.Front
	if f.Evaluations != 800 || len(f.Designs) == 0 {
		t.Fatalf("%d designs after %d evaluations", len(f.Designs), f.Evaluations)
	}
	if f.Failures == 0 || len(f.Failed) == 0 || len(f.Failed) > 20 || f.Failures < len(f.Failed) {
		t.Fatalf("%d failures, %d on record", f.Failures, len(f.Failed))
	}
	seen := map[string]int{}
	for _, d := range f.Failed {
		switch r, ok := d.Dimensions["base_radius"]; {
		case d.Family != "3-RPR" || !ok || r < 0.2 || r > 0.5 || len(d.Why) > maxFault:
			t.Errorf("failed: %+v", d)
		case strings.HasPrefix(d.Why, "panic: too wide"):
			seen["panic"]++
		case strings.Contains(d.Why, "NaN"):
			seen["NaN"]++
		default:
			t.Errorf("why: %q", d.Why)
		}
		for name, v := range d.Dimensions {
			if math.IsNaN(float64(v)) {
				t.Errorf("%s is NaN", name)
			}
		}
	}
	if seen["panic"] == 0 || seen["NaN"] == 0 {
		t.Errorf("of each kind: %v", seen)
	}
	for _, d := range f.Designs {
		if d.Measures["footprint"] > 0.9 { // the diameter, m
			t.Error("a design that failed is on the front")
		}
	}
	again, err := faulty().Search(t.Context(), Run{Evaluations: 800, Seed: 1, Workers: 3})
	if err != nil || !reflect.DeepEqual(again.Front, f) {
		t.Errorf("depends on the workers: %v", err)
	}
	b, err := study.Encode(f)
	if err != nil {
		t.Fatal(err)
	}
	var back struct{ Failed []study.Failed }
	if err := json.Unmarshal(b, &back); err != nil || !reflect.DeepEqual(back.Failed, f.Failed) {
		t.Errorf("front.json has other failures: %v", err)
	}
}

// Parts are told apart by their streams, and their shares add up to the whole.
func TestParts(t *testing.T) {
	streams := map[uint64]string{}
	for seed := range int64(3) {
		for of := 1; of <= 17; of++ {
			sum, least, most := 0, math.MaxInt, 0
			for n := 1; n <= of; n++ {
				p := Part{n, of}
				if other, ok := streams[p.stream(seed)]; ok {
					t.Errorf("%v of seed %d has the stream of %s", p, seed, other)
				}
				streams[p.stream(seed)] = fmt.Sprint(p, seed)
				share := p.Share(1003)
				sum, least, most = sum+share, min(least, share), max(most, share)
				if q, err := ParsePart(p.String()); err != nil || q != p {
					t.Errorf("%v reads as %v, %v", p, q, err)
				}
			}
			if sum != 1003 || most-least > 1 {
				t.Errorf("%d parts have %d evaluations, from %d to %d", of, sum, least, most)
			}
		}
	}
	for _, bad := range []string{"3", "/", "0/4", "5/4", "-1/4", "1/0", "1/4/2", "1/4 ", " 1/4", "01/4", "1.0/4", "1/100001", "a/b", "1/99999999999999999999"} {
		if p, err := ParsePart(bad); err == nil {
			t.Errorf("%q reads as %v", bad, p)
		}
	}
}
