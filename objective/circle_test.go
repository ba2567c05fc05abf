package objective

import (
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// Triangles whose smallest circle is known from school geometry: the circumcircle of an acute one (abc/4A), the longest side of a
// right or obtuse one. 1e-14.
func TestCircleOfTriangles(t *testing.T) {
	for _, c := range []struct {
		what string
		p    []kin.Vec
		want float64
	}{
		{"equilateral, side 1", []kin.Vec{{}, {X: 1}, {X: 0.5, Y: math.Sqrt(3) / 2}}, 2 / math.Sqrt(3)},
		{"13-14-15", []kin.Vec{{}, {X: 14}, {X: 5, Y: 12}}, 16.25},
		{"right 3-4-5", []kin.Vec{{}, {X: 3}, {Y: 4}}, 5},
		{"obtuse", []kin.Vec{{}, {X: 10}, {X: 4, Y: 1}}, 10},
		{"on a line", []kin.Vec{{X: 1, Y: 1}, {X: 3, Y: 3}, {X: 2, Y: 2}}, math.Sqrt(8)},
		{"a square", []kin.Vec{{}, {X: 1}, {X: 1, Y: 1}, {Y: 1}}, math.Sqrt2},
		{"two", []kin.Vec{{X: 5}, {X: 8, Y: 4}}, 5},
		{"one", []kin.Vec{{X: 5}}, 0},
		{"the same twice", []kin.Vec{{X: 5}, {X: 5}}, 0},
		{"heights do not count", []kin.Vec{{X: -1, Z: 9}, {X: 1, Z: -9}, {Y: 0.5}}, 2},
	} {
		near(t, c.what, enclosing(c.p), c.want, 1e-14*math.Max(c.want, 1))
	}
}

// lowest is the least value of a convex function on [-1, 1], by thirds.
func lowest(f func(float64) float64) float64 {
	a, b := -1.0, 1.0
	for range 60 {
		x, y := a+(b-a)/3, b-(b-a)/3
		if f(x) < f(y) {
			b = y
		} else {
			a = x
		}
	}
	return f((a + b) / 2)
}

// Random points: the circle about the best centre, found by search (the largest distance is convex in the
// centre), is no smaller and by no more than 1e-9 larger.
func TestCircleBySearch(t *testing.T) {
	rng := seeded(161)
	for range 20 {
		p := make([]kin.Vec, 2+rng.IntN(7))
		for i := range p {
			p[i] = within(rng, 1)
		}
		far := func(x, y float64) float64 {
			r := 0.0
			for _, q := range p {
				r = math.Max(r, math.Hypot(q.X-x, q.Y-y))
			}
			return r
		}
		best := lowest(func(x float64) float64 { return lowest(func(y float64) float64 { return far(x, y) }) })
		got := enclosing(p) / 2
		if best < got*(1-1e-12) || best > got*(1+1e-9) {
			t.Errorf("radius %.12g, by search %.12g, of %v", got, best, p)
		}
	}
}

// The built families' footprint is twice the base radius: joints all around the circle. Off-centre machines keep theirs. 1e-14.
func TestFootprint(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(162)
		task := atHome()
		task.Prepare()
		for range 10 {
			d := randomDesign(rng, f)
			near(t, "footprint", value(t, appraise(task, f, d), "footprint"), 2*d[f.Index("base_radius")], 1e-14)
			j := jointsOf(task, f, d)
			for i := range j.Base {
				j.Base[i].X += 3
				j.Base[i].Y -= 2
			}
			near(t, "footprint off the centre", value(t, appraiseJoints(task, f, j), "footprint"), 2*d[f.Index("base_radius")], 1e-14)
		}
	})
}

// joint_spacing of hexagons in closed form: the least chord between neighbours of either plate, 2 R sin of half the angle between them; joints that
// coincide, or differ by the rounding of their azimuths, count as one. 1e-14.
func TestJointSpacing(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := atHome()
	task.Prepare()
	spacing := func(ra, rb, alpha, beta float64) float64 {
		d := soundDesign(f)
		d[0], d[1], d[2], d[3] = ra, rb, alpha, beta
		return value(t, appraise(task, f, d), "joint_spacing")
	}
	rng := seeded(163)
	for range 30 {
		ra, rb, a, b := between(rng, 0.4, 1), between(rng, 0.2, 0.8), between(rng, 4*deg, 56*deg), between(rng, 4*deg, 56*deg)
		chords := []float64{2 * ra * math.Sin(a), 2 * ra * math.Sin(60*deg-a), 2 * rb * math.Sin(b), 2 * rb * math.Sin(60*deg-b)}
		near(t, "joint_spacing", spacing(ra, rb, a, b), slices.Min(chords), 1e-14)
	}
	for _, triangle := range []float64{0, 60 * deg} {
		near(t, "spacing of a triangle", spacing(0.2, 0.5, triangle, 20*deg), math.Min(0.2*math.Sqrt(3), 2*0.5*math.Sin(20*deg)), 1e-14)
		near(t, "spacing of a triangle", spacing(1, 0.2, 20*deg, triangle), 0.2*math.Sqrt(3), 1e-14)
	}
}
