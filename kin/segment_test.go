package kin

import (
	"encoding/csv"
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"strconv"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// segmentGap is the distance between the segments p1 q1 and p2 q2.
func segmentGap(p1, q1, p2, q2 Vec) float64 {
	d, u, v := r3.Sub(p1, p2), r3.Sub(q1, p1), r3.Sub(q2, p2)
	lu, lv := r3.Norm(u), r3.Norm(v)
	u, v = r3.Scale(1/lu, u), r3.Scale(1/lv, v)
	return math.Sqrt(segmentGap2(&d, &u, &v, lu, lv))
}

// The table W5: parallel, crossing, collinear and touching segments, distances
// rounded to 12 decimals there and checked on a 2001×2001 parameter grid.
func TestSegmentDistancesOfTheTable(t *testing.T) {
	f, err := os.Open("../testdata/reference/W5_segment_distances.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	for line, rec := range records[1:] {
		var p [4]Vec
		for k := range p {
			var x [3]float64
			if err := json.Unmarshal([]byte(rec[k]), &x); err != nil {
				t.Fatal(err)
			}
			p[k] = Vec{X: x[0], Y: x[1], Z: x[2]}
		}
		want, err := strconv.ParseFloat(rec[4], 64)
		if err != nil {
			t.Fatal(err)
		}
		for name, got := range map[string]float64{
			"as given":         segmentGap(p[0], p[1], p[2], p[3]),
			"exchanged":        segmentGap(p[2], p[3], p[0], p[1]),
			"first reversed":   segmentGap(p[1], p[0], p[2], p[3]),
			"second reversed":  segmentGap(p[0], p[1], p[3], p[2]),
			"both ends turned": segmentGap(p[1], p[0], p[3], p[2]),
		} {
			if math.Abs(got-want) > 1e-12 {
				t.Errorf("row %d %s: %.13g, want %.13g", line+1, name, got, want)
			}
		}
	}
}

// Segments that cross in their middles touch, however small the angle; below
// 3e-8 rad the ends stand for the crossing, at most that angle times their half length off.
func TestNearlyParallelSegmentsThatCross(t *testing.T) {
	for a, tol := range map[float64]float64{0.1: 1e-15, 1e-3: 1e-12, 1e-5: 1e-10, 5e-7: 1e-8, 1e-7: 1e-8, 1e-8: 1e-8} {
		sin, cos := math.Sincos(a)
		got := segmentGap(Vec{X: -0.5}, Vec{X: 0.5}, Vec{X: -0.3 * cos, Y: -0.3 * sin}, Vec{X: 0.7 * cos, Y: 0.7 * sin})
		if got > tol {
			t.Errorf("angle %g: %g apart", a, got)
		}
	}
}

// gridGap is the least distance on a grid of the two parameters and the
// greatest distance from a grid point to any point of its cell.
func gridGap(p1, q1, p2, q2 Vec, n int) (least, cell float64) {
	least = math.Inf(1)
	u, v := r3.Sub(q1, p1), r3.Sub(q2, p2)
	for i := range n + 1 {
		x := r3.Add(p1, r3.Scale(float64(i)/float64(n), u))
		for k := range n + 1 {
			y := r3.Add(p2, r3.Scale(float64(k)/float64(n), v))
			least = math.Min(least, r3.Norm(r3.Sub(x, y)))
		}
	}
	return least, (r3.Norm(u) + r3.Norm(v)) / float64(2*n)
}

// Random segments against a dense grid, which cannot be less and cannot be more
// than half a cell greater.
func TestSegmentDistancesAgainstAGrid(t *testing.T) {
	rng := rand.New(rand.NewPCG(2, 2))
	at := func() Vec {
		return Vec{X: 2*rng.Float64() - 1, Y: 2*rng.Float64() - 1, Z: 2*rng.Float64() - 1}
	}
	for range 200 {
		p1, q1, p2, q2 := at(), at(), at(), at()
		switch rng.IntN(4) {
		case 0: // parallel
			q2 = r3.Add(p2, r3.Scale(2*rng.Float64()-1, r3.Sub(q1, p1)))
		case 1: // flat: crossing or end to end
			p1.Z, q1.Z, p2.Z, q2.Z = 0, 0, 0, 0
		}
		got := segmentGap(p1, q1, p2, q2)
		grid, cell := gridGap(p1, q1, p2, q2, 60)
		if got > grid+1e-12 || got < grid-cell {
			t.Errorf("%v %v | %v %v: %g, grid %g less at most %g", p1, q1, p2, q2, got, grid, cell)
		}
	}
}

// Legs that are nearly but not quite parallel. Two segments of length 1 in a
// plane that start 0.1 apart and close in by the angle a are 0.1 cos a - sin a
// apart at the far end, at any angle; 1e-12.
func TestNearlyParallelSegments(t *testing.T) {
	for _, a := range []float64{1e-2, 1e-4, 1e-5, 1e-6, 5e-7, 1e-7, 2e-8, 1e-9, 1e-12, 0} {
		sin, cos := math.Sincos(a)
		got := segmentGap(Vec{}, Vec{X: 1}, Vec{Y: 0.1}, Vec{X: cos, Y: 0.1 - sin})
		// The nearest points are the second's far end and its foot on the first.
		want := 0.1 - sin
		if math.Abs(got-want) > 1e-12 {
			t.Errorf("angle %g: %.15g, want %.15g (difference %g)", a, got, want, got-want)
		}
	}
}
