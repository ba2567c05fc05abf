package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// Poses whose singularity is known by construction are called by its kind.
func TestKindsOfSingularity(t *testing.T) {
	delta := func(height float64) []float64 {
		f := kin.FamilyNamed("delta")
		d := make([]float64, len(f.Dimensions))
		for i := range f.Dimensions {
			d[i] = f.Dimensions[i].Default
		}
		for name, v := range map[string]float64{"shoulder_radius": 0.2, "platform_radius": 0.1, "arm": 0.2, "rod": 0.4,
			"home_height": height, "angle_min": -1, "angle_range": 2} {
			d[f.Index(name)] = v
		}
		return d
	}
	for _, c := range []struct {
		why    string
		family string
		values []float64
		pose   kin.Coords
		want   string
	}{
		// E. F. Fichter 1986 (check C5): a hexagonal six-leg platform is singular turned by 90° about z.
		{"turned by almost 90°", "6-UPS", []float64{0.65, 0.4, 18 * deg, 12 * deg, 0.8, 0.5, 1}, kin.Coords{kin.Yaw: 89.9 * deg}, "actuator"},
		// J. Sefrioui and C. Gosselin 1995 (check H6): three leg lines meet on a circle about the centre.
		{"almost on the circle", "3-RPR", rprAt(60 * deg), kin.Coords{kin.X: circleOf(60*deg) - 1e-4}, "actuator"},
		// Arm and rod in line: 0.1 m in the plan, so the height is sqrt(0.6² - 0.1²) where fully stretched.
		{"arms almost stretched", "delta", delta(math.Sqrt(0.36-0.01) - 1e-5), kin.Coords{}, "serial"},
	} {
		task := studyA(t)
		task.Goals, task.Limits = nil, nil
		f := kin.FamilyNamed(c.family)
		setup := task.setup()
		v := newView(task)
		v.begin(f.Build(c.values, &setup))
		s := Sample{Coords: c.pose, Pose: kin.NewPose(c.pose), Zone: len(task.Zones)}
		if got := v.kindAt(&s); got != c.want {
			t.Errorf("%s: %q, want %q (1/kappa %g)", c.why, got, c.want, math.Sqrt(v.ratio2))
		}
	}
}

// rprAt are the dimensions of a planar stage with equilateral triangles at a heading.
func rprAt(heading float64) []float64 {
	f := kin.FamilyNamed("3-RPR")
	d := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		d[i] = f.Dimensions[i].Default
	}
	d[f.Index("base_radius")], d[f.Index("platform_radius")], d[f.Index("home_heading")] = 0.5, 0.2, heading
	return d
}

// circleOf is the radius of its singular circle.
func circleOf(heading float64) float64 {
	return math.Sqrt(0.25 + 0.04 - 2*0.5*0.2*math.Cos(heading))
}
