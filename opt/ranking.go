package opt

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// Extremes returns, for each goal, the index of the point that is best in it;
// of equals the one with the least sum of the other goals, each scaled by its
// range. It returns nil for no points.
func Extremes(pts [][]float64) []int {
	if len(pts) == 0 {
		return nil
	}
	low, span := ranges(pts)
	out := make([]int, len(low))
	for k := range out {
		rest := func(p []float64) float64 {
			s := 0.0
			for j, v := range p {
				if j != k && span[j] > 0 {
					s += (v - low[j]) / span[j]
				}
			}
			return s
		}
		for i, p := range pts {
			if b := pts[out[k]]; p[k] < b[k] || p[k] == b[k] && rest(p) < rest(b) {
				out[k] = i
			}
		}
	}
	return out
}

// ranges returns the least value and the range of each coordinate.
func ranges(pts [][]float64) (low, span []float64) {
	low, span = make([]float64, len(pts[0])), make([]float64, len(pts[0]))
	for k := range low {
		lo, hi := pts[0][k], pts[0][k]
		for _, p := range pts {
			lo, hi = min(lo, p[k]), max(hi, p[k])
		}
		low[k], span[k] = lo, hi-lo
	}
	return low, span
}

// Knee returns the index of the point that lies farthest below the plane
// through the extremes, in goals scaled to [0, 1] (Das 1999, "On characterizing
// the knee of the Pareto curve"). Where the extremes span no plane that cuts
// all axes, the plane of equal sums is taken. It returns -1 for no points.
func Knee(pts [][]float64) int {
	if len(pts) == 0 {
		return -1
	}
	low, span := ranges(pts)
	m := len(low)
	at := func(i, k int) float64 {
		if span[k] > 0 {
			return (pts[i][k] - low[k]) / span[k]
		}
		return 0
	}
	normal := make([]float64, m)
	for k := range normal {
		normal[k] = 1
	}
	anchors := mat.NewDense(m, m, nil)
	for r, i := range Extremes(pts) {
		for k := range m {
			anchors.Set(r, k, at(i, k))
		}
	}
	var n mat.VecDense
	if n.SolveVec(anchors, mat.NewVecDense(m, append([]float64(nil), normal...))) == nil {
		ok := true
		for k := range m {
			v := n.AtVec(k)
			ok = ok && v > 0 && !math.IsInf(v, 0)
		}
		if ok {
			copy(normal, n.RawVector().Data)
		}
	}
	best, least := 0, math.Inf(1)
	for i := range pts {
		s := 0.0
		for k, v := range normal {
			s += float64(v * at(i, k))
		}
		if s < least {
			best, least = i, s
		}
	}
	return best
}

// TOPSIS returns the relative closeness of each row of values to the ideal
// alternative, 1 best and 0 worst (Hwang and Yoon 1981): columns are scaled to
// unit Euclidean length and weighted, weights being scaled to sum 1; the ideal
// takes the best of each column, the anti-ideal the worst. maximise says which
// columns are better when larger. nil weights are equal. All values have to be
// finite. Where all rows are equal every score is 1.
func TOPSIS(values [][]float64, maximise []bool, weights []float64) []float64 {
	if len(values) == 0 {
		return nil
	}
	m := len(maximise)
	if weights != nil && len(weights) != m {
		panic("opt: weights and columns differ in number")
	}
	total := 0.0
	for k := range m {
		total += weight(weights, k)
	}
	if !(total > 0) {
		panic("opt: weights have no positive sum")
	}
	plus, minus := make([]float64, len(values)), make([]float64, len(values))
	for k := range m {
		// Scaled by the largest value first, lest squares overflow.
		big := 0.0
		for _, row := range values {
			if len(row) != m {
				panic("opt: rows differ in length")
			}
			big = max(big, math.Abs(row[k]))
		}
		if big == 0 {
			continue
		}
		norm := 0.0
		best, worst := math.Inf(-1), math.Inf(1)
		for _, row := range values {
			v := row[k] / big
			norm += float64(v * v)
			best, worst = max(best, v), min(worst, v)
		}
		if !maximise[k] {
			best, worst = worst, best
		}
		w := weight(weights, k) / total / math.Sqrt(norm)
		for i, row := range values {
			v := row[k] / big
			plus[i] += float64((w * (v - best)) * (w * (v - best)))
			minus[i] += float64((w * (v - worst)) * (w * (v - worst)))
		}
	}
	score := make([]float64, len(values))
	for i := range score {
		p, q := math.Sqrt(plus[i]), math.Sqrt(minus[i])
		if score[i] = 1; p+q > 0 {
			score[i] = q / (p + q)
		}
	}
	return score
}

func weight(weights []float64, k int) float64 {
	if weights == nil {
		return 1
	}
	return weights[k]
}
