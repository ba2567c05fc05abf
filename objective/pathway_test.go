package objective

import (
	"math"
	"slices"
	"testing"

	"legwright/kin"
)

// A path keeps to its length, begins and ends at home, stops at required poses alone, and the poses
// between two stops lie on the line between them.
func TestPathwayThroughTheDuty(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task := richTask(seeded(5), f)
		task.Prepare()
		required := map[kin.Coords]bool{{}: true}
		for i := range task.samples {
			required[task.samples[i].Coords] = true
		}
		w := Pathway(task, 200)
		if n := len(w.Coords); n < 100 || n > 200 {
			t.Fatalf("%d poses", n)
		}
		if w.Coords[0] != (kin.Coords{}) || w.Coords[len(w.Coords)-1] != (kin.Coords{}) {
			t.Error("does not begin and end at home")
		}
		for k, i := range w.Required {
			if !required[w.Coords[i]] && w.Coords[i] != task.Zones[1].fixed() {
				t.Errorf("pose %d, %v, is not required", i, w.Coords[i])
			}
			if k == 0 {
				continue
			}
			from := w.Required[k-1]
			for j := from + 1; j < i; j++ {
				part := float64(j-from) / float64(i-from)
				for q := range 6 {
					a, b := w.Coords[from][q], w.Coords[i][q]
					near(t, "coordinate on the line", w.Coords[j][q], a+part*(b-a), 1e-12)
				}
			}
		}
		again := Pathway(task, 200)
		if !slices.Equal(again.Coords, w.Coords) || !slices.Equal(again.Required, w.Required) {
			t.Error("is not the same again")
		}
	})
}

// The tour of the corners of a square from its middle is known: along three sides, and twice half a diagonal.
func TestTourOfASquare(t *testing.T) {
	task := &Task{Zones: []Zone{{Kind: Box, Low: kin.Coords{-0.1, -0.2}, High: kin.Coords{0.1, 0.2}, Samples: 5}}, Rule: LengthGiven, Length: 1}
	task.Prepare()
	w := Pathway(task, 60)
	span := kin.Coords{0.2, 0.4, 1, 1, 1, 1}
	long := 0.0
	for i := 1; i < len(w.Coords); i++ {
		long += distance(&w.Coords[i-1], &w.Coords[i], &span)
	}
	near(t, "length", long, 3+math.Sqrt2, 1e-12)
}

// Recorded poses are followed in their own order.
func TestPathwayOfARecording(t *testing.T) {
	z := Zone{Kind: Listed}
	for i := range 500 {
		a := float64(i) / 20
		z.Poses = append(z.Poses, kin.Coords{0.1 * math.Cos(a), 0.1 * math.Sin(a), 0.001 * float64(i)})
	}
	task := &Task{Zones: []Zone{z}, Rule: LengthGiven, Length: 1}
	task.Prepare()
	w := Pathway(task, 200)
	if len(w.Coords) > 200 || len(w.Required) < 150 {
		t.Fatalf("%d poses, %d of them required", len(w.Coords), len(w.Required))
	}
	last := -1.0
	for _, i := range w.Required[:len(w.Required)-1] {
		if c := w.Coords[i]; c[2] < last {
			t.Fatal("goes back")
		} else {
			last = c[2]
		}
	}
	if last != 0.499 {
		t.Errorf("the last row is left out: %v", last)
	}
}
