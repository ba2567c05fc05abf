package job

import (
	"fmt"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/objective"
)

const stageBrief = `family: 3-RRR
dimensions: {base_radius: 400 mm, platform_radius: 100 mm, proximal: [150 mm, 400 mm], distal: 300 mm, angle_min: sized, angle_range: sized%s}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm}, samples: 20}]}
goals: [{maximise: conditioning}]
`

func parse(t *testing.T, text string) (*Study, error) {
	t.Helper()
	b, err := brief.Parse("brief.yaml", []byte(text), *Known())
	if err != nil {
		return nil, err
	}
	return New(b)
}

// One sign of modes is that of every leg, a list has one for each leg, and none is 1.
func TestModesOfEachLeg(t *testing.T) {
	for given, want := range map[string][3]float64{
		"":                     {1, 1, 1},
		", modes: 1":           {1, 1, 1},
		", modes: -1":          {-1, -1, -1},
		", modes: [-1, 1, -1]": {-1, 1, -1},
	} {
		s, err := parse(t, fmt.Sprintf(stageBrief, given))
		if err != nil {
			t.Fatal(err)
		}
		p := s.Plans[0]
		for i, m := range want {
			sp := p.Specs[p.Family.Index(fmt.Sprintf("modes_%d", i+1))]
			if sp.Kind != objective.Fixed || sp.Values[0] != m {
				t.Errorf("%q: leg %d has %+v, want %v", given, i+1, sp, m)
			}
		}
	}
	s, err := parse(t, fmt.Sprintf(stageBrief, ", modes: [{choices: [-1, 1]}, 1, {choices: [-1, 1]}]"))
	if err != nil {
		t.Fatal(err)
	}
	if n := len(s.Plans[0].Free()); n != 3 {
		t.Errorf("%d free dimensions, want proximal and two modes", n)
	}
}

// Choices for all legs at once are refused with the list to write.
func TestChoicesOfAllModesAreRefused(t *testing.T) {
	_, err := parse(t, fmt.Sprintf(stageBrief, ", modes: {choices: [-1, 1]}"))
	if err == nil || !strings.Contains(err.Error(), "one for each leg: [{choices: [-1, 1]}, {choices: [-1, 1]}, {choices: [-1, 1]}]") {
		t.Errorf("refused with %v", err)
	}
}
