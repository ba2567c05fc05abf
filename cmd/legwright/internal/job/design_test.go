package job

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// judged appraises a design file under a brief, both given as text.
func judged(t *testing.T, briefText, designText string) (*objective.Plan, study.Design, error) {
	t.Helper()
	dir := t.TempDir()
	b, d := filepath.Join(dir, "brief.yaml"), filepath.Join(dir, "design.yaml")
	for file, text := range map[string]string{b: briefText, d: designText} {
		if err := os.WriteFile(file, []byte(text), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	_, task, p, err := Design(d, b)
	if err != nil {
		return nil, study.Design{}, err
	}
	return p, study.FromAppraisal(task, objective.Appraise(task, p, p.Single())), nil
}

const slideBrief = `family: 3-RPR
dimensions: {base_radius: 400 mm, platform_radius: 100 mm, home_heading: 60 deg, leg_min: LEG, stroke: STROKE}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm}, samples: 20}]}
goals: [{maximise: conditioning}]
`

// A record of joints given outright holds no dimension that would have placed them.
func TestJointsOutrightHaveNoPlacingDimensions(t *testing.T) {
	text := strings.NewReplacer("LEG", "sized", "STROKE", "sized").Replace(slideBrief)
	_, r, err := judged(t, text, `family: 3-RPR
joints:
  base: [[400 mm, 0 mm, 0 mm], [-200 mm, 346 mm, 0 mm], [-200 mm, -346 mm, 0 mm]]
  platform: [[100 mm, 0 mm, 0 mm], [-50 mm, 86 mm, 0 mm], [-50 mm, -86 mm, 0 mm]]
home: [0 mm, 0 mm, 0 mm, 0 deg, 0 deg, 60 deg]
`)
	if err != nil {
		t.Fatal(err)
	}
	if len(r.Dimensions) != 2 || r.Dimensions["leg_min"] <= 0 || r.Dimensions["stroke"] <= 0 {
		t.Errorf("dimensions %v, want leg_min and stroke alone", r.Dimensions)
	}
	if c := r.Measures["conditioning"]; !(c > 0) {
		t.Errorf("conditioning %v", c)
	}
}

// A range that a design leaves out is derived within what the brief allows, not beyond. A leg needs
// lengths from about 340 to 380 mm here: the lines from (400, 0) to 100 mm at 60 deg, ±20 mm.
func TestRangeLeftOutStaysWithinTheBrief(t *testing.T) {
	const design = "family: 3-RPR\ndimensions: {base_radius: 400 mm, platform_radius: 100 mm, home_heading: 60 deg}\n"
	for _, c := range []struct {
		leg, stroke      string
		least, low, high float64 // leg_min, bounds of stroke
	}{
		{"[300 mm, 320 mm]", "[10 mm, 30 mm]", 0.320, 0.030, 0.030},
		{"{from: 200 mm, to: 300 mm, step: 50 mm}", "[10 mm, 500 mm]", 0.300, 0.060, 0.120},
		{"310 mm", "[10 mm, 500 mm]", 0.310, 0.050, 0.110},
	} {
		text := strings.NewReplacer("LEG", c.leg, "STROKE", c.stroke).Replace(slideBrief)
		_, r, err := judged(t, text, design)
		if err != nil {
			t.Fatal(err)
		}
		least, stroke := float64(r.Dimensions["leg_min"]), float64(r.Dimensions["stroke"])
		if least-c.least > 1e-12 || c.least-least > 1e-12 || stroke < c.low || stroke > c.high {
			t.Errorf("leg_min %s, stroke %s: %v and %v", c.leg, c.stroke, least, stroke)
		}
	}
	text := strings.NewReplacer("LEG", "{choices: [300 mm, 320 mm]}", "STROKE", "sized").Replace(slideBrief)
	if _, _, err := judged(t, text, design); err == nil || !strings.Contains(err.Error(), "leg_min is missing") {
		t.Errorf("choices: %v", err)
	}
}

// A design of a family without platform_radius cannot be judged by that length.
func TestLengthOfAMissingPlatform(t *testing.T) {
	text := strings.NewReplacer("LEG", "sized", "STROKE", "sized").Replace(slideBrief) + "characteristic_length: platform_radius\n"
	_, _, err := judged(t, text, "family: five-bar\ndimensions: {spacing: 200 mm, proximal: 300 mm, distal: 300 mm, home_y: 300 mm, angle_min: 0 deg, angle_range: 180 deg}\n")
	if err == nil || !strings.Contains(err.Error(), "five-bar, the design's family, has no platform_radius; write a length or duty") {
		t.Errorf("refused with %v", err)
	}
}
