package study

import (
	"math"
	"slices"
)

// Choice is a design that was chosen to be shown.
type Choice struct {
	Index int      // into Front.Designs
	Near  []string // marks of designs left out because they differ too little from this one
}

// twin is the difference in every goal, as a share of its range over the front, below which two
// designs are not worth showing side by side.
const twin = 0.02

// Choose picks at most most designs of a ranked front that are worth a first look: the extreme of
// each goal, the knee, the best rank and the most margin, then those farthest from what is chosen
// (Gonzalez 1985), in goals scaled by their ranges. Of near-twins only one is chosen. They come in
// the order of rank.
func Choose(f *Front, most int) []Choice {
	maximise := make([]bool, len(f.Goals))
	for i, g := range f.Goals {
		maximise[i] = g.Sense == Maximise
	}
	p := chooser{scaled: unit(f.goalValues(), maximise), most: most}
	for _, g := range f.Goals {
		p.marked(f, MarkBest(g.Measure))
	}
	p.marked(f, MarkKnee)
	p.marked(f, MarkRank)
	p.marked(f, MarkMargin)
	for p.spread() {
	}
	slices.SortFunc(p.out, func(a, b Choice) int { return a.Index - b.Index })
	return p.out
}

type chooser struct {
	scaled [][]float64
	most   int
	out    []Choice
}

// marked takes the design with the mark, or notes the mark with the twin that is chosen already.
func (p *chooser) marked(f *Front, mark string) {
	i := f.Marked(mark)
	if i < 0 {
		return
	}
	for k := range p.out {
		c := &p.out[k]
		if c.Index == i {
			return
		}
		if _, largest := apart(p.scaled[c.Index], p.scaled[i]); largest < twin {
			c.Near = append(c.Near, mark)
			return
		}
	}
	if len(p.out) < p.most {
		p.out = append(p.out, Choice{Index: i})
	}
}

// spread takes the design that is farthest from all that are chosen; false if there is none or no room.
func (p *chooser) spread() bool {
	if len(p.out) >= p.most {
		return false
	}
	at, far := -1, 0.0
	for i, row := range p.scaled {
		near, differs := math.Inf(1), true
		for _, c := range p.out {
			d, largest := apart(p.scaled[c.Index], row)
			near = math.Min(near, d)
			differs = differs && largest >= twin
		}
		if differs && near > far {
			at, far = i, near
		}
	}
	if at < 0 {
		return false
	}
	p.out = append(p.out, Choice{Index: at})
	return true
}

// apart is the distance of two rows, and their largest difference in one column.
func apart(a, b []float64) (distance, largest float64) {
	for j := range a {
		d := math.Abs(a[j] - b[j])
		distance = math.Hypot(distance, d)
		largest = math.Max(largest, d)
	}
	return distance, largest
}
