package study

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"sort"
	"strings"

	"legwright/opt"
)

// Rank orders the designs by their closeness to the ideal (TOPSIS, Hwang and Yoon 1981) under the
// weights, best first, equals by their goals in the order in which the front lists them. It sets
// rank, score and marks, and the front's weights; a goal without a weight counts 1. Designs without
// an id are numbered by rank; an id once given stays. Weights must have passed CheckWeights.
func Rank(f *Front, weights map[string]float64) {
	f.Weights = map[string]float64{}
	w := make([]float64, len(f.Goals))
	maximise := make([]bool, len(f.Goals))
	for i, g := range f.Goals {
		w[i] = 1
		if v, ok := weights[g.Measure]; ok {
			w[i] = v
		}
		f.Weights[g.Measure] = w[i]
		maximise[i] = g.Sense == Maximise
	}
	values := f.goalValues()
	for i := range f.Designs {
		f.Designs[i].Score = 0
	}
	sort.Stable(&byScore{f, values, maximise}) // so that the order given changes no last digit
	for i, s := range opt.TOPSIS(values, maximise, w) {
		f.Designs[i].Score = Number(s)
	}
	sort.Stable(&byScore{f, values, maximise})
	for i := range f.Designs {
		f.Designs[i].Rank = i + 1
	}
	f.number()
	f.mark(values, maximise)
}

// CheckWeights says what is wrong with weights for the front's goals, or gives nil.
func CheckWeights(f *Front, weights map[string]float64) error {
	var goals []string
	for _, g := range f.Goals {
		goals = append(goals, g.Measure)
	}
	var names []string
	for n := range weights {
		names = append(names, n)
	}
	slices.Sort(names)
	for _, n := range names {
		if !slices.Contains(goals, n) {
			return fmt.Errorf("weight of %.60s: not a goal of this study; weigh %.400s", Clean(n), Clean(strings.Join(goals, ", ")))
		}
		if v := weights[n]; !(v >= 0) || math.IsInf(v, 0) {
			return fmt.Errorf("weight of %.60s: %v is not a weight; write a number that is not negative", Clean(n), v)
		}
	}
	for _, g := range goals {
		if v, ok := weights[g]; !ok || v > 0 {
			return nil
		}
	}
	return fmt.Errorf("every weight is 0, which leaves nothing to order by; give at least one of %.400s a weight above 0", Clean(strings.Join(goals, ", ")))
}

// goalValues has a row for each design and a column for each goal. A value without bound is taken as
// the worst that any design has, NaN if none has one.
func (f *Front) goalValues() [][]float64 {
	rows := make([][]float64, len(f.Designs))
	for i := range rows {
		rows[i] = make([]float64, len(f.Goals))
		for j, g := range f.Goals {
			v, ok := f.Designs[i].Measures[g.Measure]
			rows[i][j] = float64(v)
			if !ok {
				rows[i][j] = math.NaN()
			}
		}
	}
	for j, g := range f.Goals {
		worst := math.NaN()
		for i := range rows {
			v := rows[i][j]
			if !unbounded(v) && (math.IsNaN(worst) || (v < worst) == (g.Sense == Maximise)) {
				worst = v
			}
		}
		if math.IsNaN(worst) {
			worst = 0
		}
		for i := range rows {
			if unbounded(rows[i][j]) {
				rows[i][j] = worst
			}
		}
	}
	return rows
}

// byScore sorts designs with their goal values.
type byScore struct {
	f        *Front
	values   [][]float64
	maximise []bool
}

func (s *byScore) Len() int { return len(s.values) }

func (s *byScore) Swap(i, j int) {
	s.f.Designs[i], s.f.Designs[j] = s.f.Designs[j], s.f.Designs[i]
	s.values[i], s.values[j] = s.values[j], s.values[i]
}

func (s *byScore) Less(i, j int) bool {
	if c := cmp.Compare(s.f.Designs[j].Score, s.f.Designs[i].Score); c != 0 {
		return c < 0
	}
	for g, more := range s.maximise {
		a, b := s.values[i][g], s.values[j][g]
		if a != b {
			return (a > b) == more
		}
	}
	return s.f.Designs[i].ID < s.f.Designs[j].ID
}

// number gives designs without an id the least free numbers, in the order of rank.
func (f *Front) number() {
	used := map[string]bool{}
	for i := range f.Designs {
		used[f.Designs[i].ID] = true
	}
	next := 1
	for i := range f.Designs {
		if f.Designs[i].ID != "" {
			continue
		}
		for used[fmt.Sprintf("%03d", next)] {
			next++
		}
		f.Designs[i].ID = fmt.Sprintf("%03d", next)
		next++
	}
}
