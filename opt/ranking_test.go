package opt

import (
	"math"
	"slices"
	"testing"
)

// Hwang and Yoon (1981), choice of a fighter aircraft, their matrix and
// weights from memory; the book prints 0.643, 0.268, 0.613, 0.312. The longer
// numbers were computed apart from this program, in Python.
func TestTOPSISAircraft(t *testing.T) {
	values := [][]float64{
		{2.0, 1500, 20000, 5.5, 5, 9},
		{2.5, 2700, 18000, 6.5, 3, 5},
		{1.8, 2000, 21000, 4.5, 7, 7},
		{2.2, 1800, 20000, 5.0, 5, 5},
	}
	maximise := []bool{true, true, true, false, true, true}
	weights := []float64{0.2, 0.1, 0.1, 0.1, 0.2, 0.3}
	want := []float64{0.6432770006, 0.2683835677, 0.61354229, 0.3122910656}
	book := []float64{0.643, 0.268, 0.613, 0.312}
	got := TOPSIS(values, maximise, weights)
	for i, v := range got {
		if math.Abs(v-want[i]) > 1e-9 || math.Abs(v-book[i]) > 6e-4 {
			t.Errorf("alternative %d: %.10f, want %.10f, book %.3f", i, v, want[i], book[i])
		}
	}
	for i := range weights {
		weights[i] *= 7 // only ratios count
	}
	for i, v := range TOPSIS(values, maximise, weights) {
		if math.Abs(v-want[i]) > 1e-9 {
			t.Errorf("weights scaled: alternative %d: %v", i, v)
		}
	}
}

func TestTOPSISCorners(t *testing.T) {
	if got := TOPSIS([][]float64{{1, 0}, {1, 0}}, []bool{true, false}, nil); !slices.Equal(got, []float64{1, 1}) {
		t.Errorf("equal rows: %v", got)
	}
	got := TOPSIS([][]float64{{1, 9}, {2, 3}}, []bool{false, true}, nil)
	if got[0] != 1 || got[1] != 0 {
		t.Errorf("one row best in all: %v", got)
	}
	if TOPSIS(nil, nil, nil) != nil {
		t.Error("no rows")
	}
}

// On a quarter circle below its chord the farthest point is the one in the
// middle, on the unit sphere octant that at equal coordinates.
func TestKneeAndExtremes(t *testing.T) {
	var pts [][]float64
	for i := range 21 {
		a := math.Pi / 2 * float64(i) / 20
		pts = append(pts, []float64{5 * (1 - math.Sin(a)), 300 * (1 - math.Cos(a))})
	}
	if k := Knee(pts); k != 10 {
		t.Errorf("quarter circle: knee %d, want 10", k)
	}
	if e := Extremes(pts); !slices.Equal(e, []int{20, 0}) {
		t.Errorf("extremes %v, want [20 0]", e)
	}
	s := 1 - 1/math.Sqrt(3)
	sphere := [][]float64{{0, 1, 1}, {1, 0, 1}, {1, 1, 0}, {0.3, 0.3, 1}, {s, s, s}, {1, 0.3, 0.3}}
	if k := Knee(sphere); k != 4 {
		t.Errorf("sphere: knee %d, want 4", k)
	}
	if k := Knee([][]float64{{1, 1}}); k != 0 {
		t.Errorf("one point: knee %d", k)
	}
	if Knee(nil) != -1 || Extremes(nil) != nil {
		t.Error("no points")
	}
	if e := Extremes([][]float64{{0, 5}, {0, 3}, {1, 0}}); !slices.Equal(e, []int{1, 2}) {
		t.Errorf("tie: %v, want [1 2]", e)
	}
}
