package objective

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"legwright/kin"
)

// readCheck fills out from the entry with that id of a committed list of check
// values (testdata/reference/SOURCES.md tells where each comes from).
func readCheck(t *testing.T, name, id string, out any) {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "testdata", "reference", name))
	if err != nil {
		t.Fatal(err)
	}
	var entries []json.RawMessage
	if err := json.Unmarshal(data, &entries); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	for _, e := range entries {
		var head struct{ ID string }
		if json.Unmarshal(e, &head) == nil && head.ID == id {
			if err := json.Unmarshal(e, out); err != nil {
				t.Fatalf("%s: %s: %v", name, id, err)
			}
			return
		}
	}
	t.Fatalf("%s holds no check %s", name, id)
}

func vecs(ps [][]float64) []kin.Vec {
	out := make([]kin.Vec, len(ps))
	for i, p := range ps {
		out[i] = kin.Vec{X: p[0], Y: p[1], Z: p[2]}
	}
	return out
}

// atHome is a task of the home pose alone, without loads, characteristic length 1 m.
func atHome() *Task {
	return &Task{
		Zones:    []Zone{{Name: "home", Kind: Listed, Poses: []kin.Coords{{}}}},
		Gravity:  kin.Vec{Z: -Gravity},
		Actuator: Actuator{DeadLength: math.NaN(), DeadRatio: 1},
		Rule:     LengthGiven, Length: 1,
		Singular: 1e-6,
		Coverage: 1,
	}
}

// cubic is check C1, the platform whose legs are edges of a cube of 1 m, about the cube's centre.
func cubic(t *testing.T) *kin.Joints {
	var c struct {
		Data struct{ A, B [][]float64 }
	}
	readCheck(t, "C_sixleg_closed_forms.json", "C1", &c)
	return &kin.Joints{Base: vecs(c.Data.A), Platform: vecs(c.Data.B), HomeRot: kin.Identity()}
}

// exampleC5 is the hexagonal platform of the checks C5, W1 and W7: radii 1.5 m and 1 m, joints 10° from their pairs'
// centres, height 1.2 m. In the family's own numbering it is turned by 60° (leg lines are the same).
func exampleC5() (d []float64) { return []float64{1.5, 1, 10 * deg, 10 * deg, 1.2, 0, 0} }
