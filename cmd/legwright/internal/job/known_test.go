package job

import (
	"strings"
	"testing"
)

const pointedBrief = `family: FAMILY
dimensions: {DIMENSIONS, platform_radius: RADIUS, rod: 500 mm}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm, z: 20 mm}, samples: 20}]}
goals: [{maximise: conditioning}]
`

// The rods of a delta may meet in the tool's axis: its platform has no radius then, as all other radii have.
func TestPlatformWithoutRadius(t *testing.T) {
	for family, dimensions := range map[string]string{
		"delta":        "shoulder_radius: 150 mm, arm: [150 mm, 300 mm], home_height: 400 mm, angle_min: sized, angle_range: sized",
		"linear-delta": "rail_radius: 300 mm, rail_slant: [0 deg, 40 deg], home_height: 200 mm, travel_min: sized, travel: sized",
	} {
		text := strings.NewReplacer("FAMILY", family, "DIMENSIONS", dimensions, "RADIUS", "0 mm").Replace(pointedBrief)
		s, err := parse(t, text)
		if err != nil {
			t.Errorf("%s: %v", family, err)
			continue
		}
		p := s.Plans[0]
		if sp := p.Specs[p.Family.Index("platform_radius")]; sp.Values[0] != 0 {
			t.Errorf("%s: %+v", family, sp)
		}
		if _, err := parse(t, strings.Replace(text, "rod: 500 mm", "rod: 0 mm", 1)); err == nil {
			t.Errorf("%s: a rod of no length is taken", family)
		}
	}
}
