package job

import (
	"slices"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/brief"
)

const worded = `title: Two ways to shake a crate
family: [6-UPS, 6-RUS]
mount: ceiling
dimensions:
  6-UPS: {base_radius: {from: 400 mm, to: 1200 mm, step: 5 mm}, platform_radius: [200 mm, 800 mm], base_half_angle: 12.5 deg,
    platform_half_angle: {choices: [4 deg, 8 deg]}, home_height: 1 m, leg_min: sized, stroke: sized}
  6-RUS: {base_radius: [40 cm, 90 cm], platform_radius: 300 mm, base_half_angle: 10 deg, platform_half_angle: 15 deg, home_height: 1 m,
    crank_length: 200 mm, crank_azimuth: [-90 deg, 30 deg], rod_length: 900 mm, angle_min: sized, angle_range: 90 deg}
actuator: {dead_length: 180 mm, dead_ratio: 0.9, reserve: [10 mm, 2 deg], power: 1.5 kW}
joints: {base_swing: 45 deg}
duty:
  zones:
    - {name: work, box: {x: 150 mm, y: [-20 mm, 150 mm], yaw: 0 deg}, samples: 500}
    - {name: service, axes: {z: [-200 mm, 0 mm], roll: 30 deg}, samples: 40}
    - {name: stir, ellipsoid: {x: 100 mm, pitch: 8 deg}, samples: 20}
  cases:
    - name: running
      loads:
        - {name: cell, mass: 300 kg, centre: [0 mm, 5 mm, 250 mm], acceleration: {linear: 4 m/s2, angular: [1 rad/s2, 0 rad/s2, 3 rad/s2], at: tool}}
        - {name: push, force: [500 N, 0 N, 0 N], force_spread: [0 N, 200 N, 200 N], at: [0 mm, 0 mm, 300 mm], moment: [0 N m, 1 N m, 0 N m]}
      speeds: {linear: 0.4 m/s}
      zones: [work, stir]
    - {name: rest}
goals: [{maximise: conditioning}, {minimise: footprint}]
limits: [{measure: coverage, at_least: 95 %}, {measure: footprint, at_most: 2.4 m}]
`

// The brief in words has every number of the file, in the units of screens.
func TestBriefInWords(t *testing.T) {
	b, err := brief.Parse("brief.yaml", []byte(worded), *Known())
	if err != nil {
		t.Fatal(err)
	}
	s, err := New(b)
	if err != nil {
		t.Fatal(err)
	}
	w := s.inWords("brief.yaml")
	for _, c := range []struct {
		name      string
		got, want []string
	}{
		{"zones", w.Zones, []string{
			"work: x ±150 mm, y -20 to 150 mm, yaw 0 deg; all at once, 500 poses",
			"service: z -200 to 0 mm, roll ±30 deg; each alone, 40 poses",
			"stir: x ±100 mm, pitch ±8 deg; all at once, within the ellipsoid, 20 poses",
		}},
		{"cases", w.Cases, []string{
			"running (in work, stir): cell 300 kg at (0, 5, 250) mm, accelerated at up to 4 m/s2 any way and ±(1, 0, 3) rad/s2 of the tool point, " +
				"push force (500, 0, 0) N ± (0, 200, 200) N at (0, 0, 300) mm, moment (0, 1, 0) N m, speeds up to 400 mm/s any way",
			"rest: nothing",
		}},
		{"limits", w.Limits, []string{
			"coverage at least 95 %", "footprint at most 2400 mm", "base_swing at most 45 deg", "leg_power at most 1500 W",
			"shortest leg at least 0.9 times the stroke and 180 mm", "10 mm kept free at each end of the stroke", "2 deg kept free at each end of the crank's range",
		}},
		{"open dimensions", w.Open, []string{
			"6-UPS: base_radius 400 to 1200 mm in steps of 5 mm", "platform_radius 200 to 800 mm", "platform_half_angle 4 deg or 8 deg", "leg_min as the duty needs", "stroke as the duty needs",
			"6-RUS: base_radius 400 to 900 mm", "crank_azimuth -90 to 30 deg", "angle_min as the duty needs",
		}},
	} {
		if !slices.Equal(c.got, c.want) {
			t.Errorf("%s:\n%s\nwant\n%s", c.name, strings.Join(c.got, "\n"), strings.Join(c.want, "\n"))
		}
	}
	for _, part := range append(append(slices.Clone(w.Zones), w.Cases...), "6-UPS, 6-RUS machines that maximise conditioning, minimise footprint. They hang.") {
		if !strings.Contains(w.Paragraph, part) {
			t.Errorf("the paragraph lacks %q", part)
		}
	}
}
