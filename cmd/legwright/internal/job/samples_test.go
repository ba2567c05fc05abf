package job

import (
	"fmt"
	"strings"
	"testing"
)

// samples counts all poses of a zone; without it each coordinate that moves alone has 25.
func TestSamplesOfAxes(t *testing.T) {
	for _, c := range []struct {
		zone string
		want int
	}{
		{"axes: {x: 20 mm, y: 20 mm}", 50},
		{"axes: {x: 20 mm, y: 20 mm, yaw: 0 deg}", 50},
		{"axes: {x: 20 mm, y: 20 mm}, samples: 4", 4},
		{"axes: {x: 20 mm, y: 20 mm, yaw: [5 deg, 5 deg]}, samples: 300", 300},
		{"axes: {x: [1 mm, 1 mm]}", 1},
		{"box: {x: 20 mm, y: 20 mm}, samples: 77", 77},
		{"ellipsoid: {x: 20 mm, y: 20 mm}, samples: 5", 5},
	} {
		s, err := parse(t, strings.Replace(fmt.Sprintf(stageBrief, ""), "box: {x: 20 mm, y: 20 mm}, samples: 20", c.zone, 1))
		if err != nil {
			t.Fatal(err)
		}
		if n := len(s.Tasks[0].Samples()); n != c.want {
			t.Errorf("%s: %d poses, want %d", c.zone, n, c.want)
		}
	}
}

// Every family of a brief needs evaluations enough for a population of its own.
func TestEvaluationsForEachFamily(t *testing.T) {
	text := `family: [3-RRR, five-bar]
dimensions:
  3-RRR: {base_radius: 400 mm, platform_radius: 100 mm, proximal: [150 mm, 400 mm], distal: 300 mm, angle_min: sized, angle_range: sized}
  five-bar: {spacing: 200 mm, proximal: 300 mm, distal: 300 mm, home_y: 300 mm, angle_min: sized, angle_range: sized}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm}, samples: 20}]}
goals: [{maximise: conditioning}]
search: {evaluations: %d}
`
	if _, err := parse(t, fmt.Sprintf(text, 8)); err != nil {
		t.Error(err)
	}
	if _, err := parse(t, fmt.Sprintf(text, 7)); err == nil || !strings.Contains(err.Error(), "write a whole number from 8 ") {
		t.Errorf("refused with %v", err)
	}
}
