package study

import (
	"math"

	"legwright/opt"
)

// The marks of designs; "best " and a measure's name is the mark of a goal's extreme.
const (
	MarkRank   = "best rank"
	MarkKnee   = "knee"
	MarkMargin = "most margin"
)

// The senses of goals and limits.
const (
	Maximise = "maximise"
	Minimise = "minimise"
	AtLeast  = "at_least"
	AtMost   = "at_most"
)

// MarkBest is the mark of the extreme of a goal.
func MarkBest(measure string) string { return "best " + measure }

// Marked is the place of the design that has the mark, -1 if none has it.
func (f *Front) Marked(mark string) int {
	for i := range f.Designs {
		for _, m := range f.Designs[i].Marks {
			if m == mark {
				return i
			}
		}
	}
	return -1
}

// mark sets the marks of designs that are in the order of rank, with the values of their goals. Of
// equals the better rank has the mark. Marks that would say nothing are not given: the best of a goal
// that is the same for all, the most margin where all have the same.
func (f *Front) mark(values [][]float64, maximise []bool) {
	for i := range f.Designs {
		f.Designs[i].Marks = []string{}
	}
	give := func(i int, mark string) {
		if i >= 0 {
			f.Designs[i].Marks = append(f.Designs[i].Marks, mark)
		}
	}
	if len(f.Designs) == 0 {
		return
	}
	give(0, MarkRank)
	scaled := unit(values, maximise)
	if len(scaled) >= 3 { // fewer have no knee
		give(opt.Knee(scaled), MarkKnee)
	}
	for j, g := range f.Goals {
		best, differ := 0, false
		for i := range values {
			if (values[i][j] > values[best][j]) == maximise[j] && values[i][j] != values[best][j] {
				best = i
			}
			differ = differ || values[i][j] != values[0][j]
		}
		if differ {
			give(best, MarkBest(g.Measure))
		}
	}
	give(f.roomiest(), MarkMargin)
	for i := range f.Designs {
		if p := f.Designs[i].Proof; p != nil {
			give(i, p.Mark())
		}
		if w := f.Designs[i].WholeStroke; w != nil && w.Singular+w.AloneCross > 0 {
			give(i, MarkCrosses)
		}
	}
}

// roomiest is the design whose tightest limit has the largest margin, -1 if that tells no one apart.
func (f *Front) roomiest() int {
	at, most, least := -1, math.Inf(-1), math.Inf(1)
	for i := range f.Designs {
		l := f.Designs[i].Tightest()
		if l == nil {
			continue
		}
		m := float64(l.Margin)
		if m > most {
			at, most = i, m
		}
		least = math.Min(least, m)
	}
	if most == least {
		return -1
	}
	return at
}
