package study

import (
	"slices"
	"testing"
)

// Goals from 0 to 100: designs nearer than 2 in both goals to the first of a group are in it, and groups do not mix families.
func TestTwinsAreNearInEveryGoal(t *testing.T) {
	f := &Front{Goals: []Goal{{Measure: "a", Sense: Maximise}, {Measure: "b", Sense: Minimise}}}
	for i, v := range [][2]float64{{100, 100}, {98.5, 99}, {97, 98}, {0, 0}, {1, 1}, {1.5, 0}, {50, 1}} {
		family := "x"
		if i == 5 {
			family = "y"
		}
		f.Designs = append(f.Designs, Design{Family: family, Measures: map[string]Number{"a": Number(v[0]), "b": Number(v[1])}})
	}
	if got := Twins(f); !slices.Equal(got, []int{0, 0, 2, 3, 3, 5, 6}) {
		t.Errorf("groups %v", got)
	}
	if got := Twins(&Front{Goals: f.Goals}); len(got) != 0 {
		t.Errorf("groups of nothing: %v", got)
	}
}
