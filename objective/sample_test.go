package objective

import (
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// The first 600 Sobol points in six dimensions by scipy 1.10.1 (unscrambled, Joe-Kuo). Dyadic: compared exactly.
func TestSobolAgainstScipy(t *testing.T) {
	_, want := readTable(t, "../testdata/reference/sobol6.csv")
	if len(want) != 600 {
		t.Fatalf("%d points", len(want))
	}
	s := newSobol()
	u := make([]float64, 6)
	for n, w := range want {
		s.next(u)
		if !slices.Equal(u, w) {
			t.Fatalf("point %d: %v, want %v", n, u, w)
		}
	}
}

// G7: the first 16 points in four dimensions (Sobol 1967, Joe and Kuo 2008). Exact.
func TestFirstSobolPoints(t *testing.T) {
	head, want := readTable(t, "../testdata/reference/G7_sobol_halton.csv")
	s := newSobol()
	u := make([]float64, 4)
	for n, w := range want {
		s.next(u)
		if at := head["sobol1"]; !slices.Equal(u, w[at:at+4]) {
			t.Fatalf("point %d: %v, want %v", n, u, w)
		}
	}
}

// The seventh dimension, which ellipsoids need, has every 2ᵏ-th part of [0, 1) once in each aligned run of 2ᵏ points (the
// definition of a (0, k, 1) net).
func TestSeventhSobolDimension(t *testing.T) {
	s := newSobol()
	u := make([]float64, 7)
	const n = 256
	seen := map[float64]bool{}
	for k := range 4 * n {
		if k%n == 0 {
			clear(seen)
		}
		s.next(u)
		part := math.Floor(u[6] * n)
		if seen[part] {
			t.Fatalf("point %d falls into part %g again", k, part)
		}
		seen[part] = true
	}
}

// Coordinates of the sampled poses in the order in which they were made.
func made(z *Zone) []kin.Coords {
	var out []kin.Coords
	for i, s := range sampleZone(z, 3) {
		if s.Row != i || s.Zone != 3 || s.Pose != kin.NewPose(s.Coords) {
			panic("a sample that does not know where it belongs")
		}
		out = append(out, s.Coords)
	}
	return out
}

// A box: corners with the first coordinate slowest and the low end first, the centre, then points inside; a fixed coordinate stays. Exact.
func TestBox(t *testing.T) {
	z := &Zone{Kind: Box, Low: kin.Coords{-0.1, 0.02, 0, 0, 0, -0.5}, High: kin.Coords{0.3, 0.02, 0, 0, 0, 0.25}, Samples: 20}
	got := made(z)
	want := []kin.Coords{{-0.1, 0.02, 0, 0, 0, -0.5}, {-0.1, 0.02, 0, 0, 0, 0.25}, {0.3, 0.02, 0, 0, 0, -0.5}, {0.3, 0.02, 0, 0, 0, 0.25},
		{0.1, 0.02, 0, 0, 0, -0.125}, {0.1 + 0.5*0.2, 0.02, 0, 0, 0, -0.125 - 0.5*0.375}}
	for i, w := range want {
		for q := range w {
			near(t, "coordinate", got[i][q], w[q], 1e-16)
		}
	}
	if len(got) != 20 || z.MinSamples() != 5 {
		t.Errorf("%d poses, at least %d", len(got), z.MinSamples())
	}
	for i, s := range sampleZone(z, 0) {
		if s.Volume != (i > 4) {
			t.Errorf("pose %d counts for averages: %v", i, s.Volume)
		}
		for q, v := range s.Coords {
			if v < z.Low[q] || v > z.High[q] {
				t.Errorf("pose %d lies outside: %v", i, s.Coords)
			}
		}
	}
}

// An ellipsoid: its centre, the ends of its axes, then as many poses on its surface (1e-12) as inside, both all
// around: in every coordinate about as many to either side, and the inside as dense as the volume grows.
func TestEllipsoid(t *testing.T) {
	for _, moving := range []int{1, 2, 3, 6} {
		z := &Zone{Kind: Ellipsoid, Low: kin.Coords{-0.1, -0.3, 0.1, -0.2, -0.4, 0}, High: kin.Coords{0.3, 0.3, 0.2, 0.2, 0.1, 0.6}}
		for q := moving; q < 6; q++ {
			z.High[q] = z.Low[q]
		}
		const each = 512
		z.Samples = 1 + 2*moving + 2*each
		if z.MinSamples() != 1+2*moving {
			t.Errorf("at least %d samples", z.MinSamples())
		}
		centre := z.centre()
		var side [2][6]int
		var count, near2 [2]int
		for i, s := range sampleZone(z, 0) {
			r2 := 0.0
			for q := range moving {
				e := (s.Coords[q] - centre[q]) / (z.High[q] - z.Low[q]) * 2
				r2 += e * e
			}
			for q := moving; q < 6; q++ {
				if s.Coords[q] != z.Low[q] {
					t.Errorf("fixed coordinate %d moved to %g", q, s.Coords[q])
				}
			}
			switch {
			case i == 0:
				near(t, "radius of the centre", r2, 0, 0)
				continue
			case i <= 2*moving:
				near(t, "radius at an end", r2, 1, 1e-15)
				q := (i - 1) / 2
				if end := [2]float64{z.Low[q], z.High[q]}[(i-1)%2]; s.Coords[q] != end || s.Volume {
					t.Errorf("pose %d: %v is no end of axis %d", i, s, q)
				}
				continue
			}
			inside := 0
			if s.Volume {
				inside = 1
				if r2 > 1+1e-12 {
					t.Errorf("%v lies outside", s.Coords)
				}
				if r2 < math.Pow(0.5, 2/float64(moving)) {
					near2[1]++ // within the part of half the volume
				}
			} else {
				near(t, "radius on the surface", r2, 1, 1e-12)
			}
			count[inside]++
			for q := range moving {
				if s.Coords[q] > centre[q] {
					side[inside][q]++
				}
			}
		}
		if count != [2]int{each, each} {
			t.Errorf("%d on the surface, %d inside", count[0], count[1])
		}
		if math.Abs(float64(near2[1])/each-0.5) > 0.05 {
			t.Errorf("%d coordinates: %d of %d poses in the inner half of the volume", moving, near2[1], each)
		}
		for i, where := range [2]string{"on the surface", "inside"} {
			for q := range moving {
				if n := float64(side[i][q]) / each; math.Abs(n-0.5) > 0.05 {
					t.Errorf("%d coordinates, %s: %.0f %% are above the centre in coordinate %d", moving, where, 100*n, q)
				}
			}
		}
	}
}

// Axes: each coordinate alone, evenly from end to end, the others at home; a fixed coordinate stays where it is fixed. Exact.
func TestAxes(t *testing.T) {
	z := &Zone{Kind: Axes, Low: kin.Coords{0, 0, -0.2, 0.1, 0, -0.5}, High: kin.Coords{0, 0, 0.2, 0.1, 0, 0}, Samples: 5}
	want := []kin.Coords{{2: -0.2, 3: 0.1}, {2: -0.1, 3: 0.1}, {3: 0.1}, {2: 0.1, 3: 0.1}, {2: 0.2, 3: 0.1},
		{3: 0.1, 5: -0.5}, {3: 0.1, 5: -0.375}, {3: 0.1, 5: -0.25}, {3: 0.1, 5: -0.125}, {3: 0.1}}
	got := made(z)
	if len(got) != len(want) {
		t.Fatalf("%d poses, want %d: %v", len(got), len(want), got)
	}
	for i := range want {
		for q := range want[i] {
			near(t, "coordinate", got[i][q], want[i][q], 1e-16)
		}
	}
	if z.MinSamples() != 2 {
		t.Errorf("at least %d samples", z.MinSamples())
	}
}

// A zone in which nothing moves is one pose, whatever its shape.
func TestZoneOfOnePose(t *testing.T) {
	c := kin.Coords{0.1, 0, -0.2, 0.3, 0, 0}
	for kind, name := range map[ZoneKind]string{Box: "box", Axes: "axes", Ellipsoid: "ellipsoid"} {
		z := &Zone{Kind: kind, Low: c, High: c, Samples: 500}
		if got := made(z); len(got) != 1 || got[0] != c {
			t.Errorf("%s: %d poses, the first is %v", name, len(got), got)
		}
		if z.MinSamples() != 1 {
			t.Errorf("%s: at least %d samples", name, z.MinSamples())
		}
		task := richTask(seeded(111), kin.FamilyNamed("6-UPS"))
		task.Zones, task.Cases = []Zone{*z}, nil
		task.Prepare()
		a := appraise(task, kin.FamilyNamed("6-UPS"), soundDesign(kin.FamilyNamed("6-UPS")))
		if x, y := value(t, a, "conditioning"), value(t, a, "mean_conditioning"); x != y {
			t.Errorf("%s: conditioning %g, mean %g of one pose", name, x, y)
		}
	}
}

// The scouts of a pose file that holds a box's corners are these corners, wherever they stand in the file.
func TestScoutsOfAFile(t *testing.T) {
	_, rows := readTable(t, "../testdata/study-a/poses.csv")
	rng := seeded(112)
	z := Zone{Kind: Listed}
	corner := map[kin.Coords]bool{}
	for i, r := range rows {
		c := kin.Coords(r)
		z.Poses = append(z.Poses, c)
		if i < 64 {
			corner[c] = true
		}
	}
	rng.Shuffle(len(z.Poses), func(i, j int) { z.Poses[i], z.Poses[j] = z.Poses[j], z.Poses[i] })
	task := &Task{Zones: []Zone{z}}
	task.Prepare()
	if task.scouts != 64 {
		t.Errorf("%d scouts, want 64", task.scouts)
	}
	for _, s := range task.samples[:task.scouts] {
		if !corner[s.Coords] {
			t.Errorf("scout %v is no corner", s.Coords)
		}
	}
	if len(task.Samples()) != len(rows) {
		t.Errorf("%d samples of %d rows", len(task.Samples()), len(rows))
	}
}
