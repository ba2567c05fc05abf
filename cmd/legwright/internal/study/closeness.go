package study

import "math"

// closeness is the TOPSIS score of each row of values: with columns divided by their norms and
// weighted, the distance from the worst point over the sum of the distances from the worst and from
// the best (Hwang and Yoon 1981). It is 1 where all rows are alike.
func closeness(values [][]float64, maximise []bool, weights []float64) []float64 {
	n := len(maximise)
	scale := make([]float64, n)
	for j := range scale {
		norm := 0.0
		for _, row := range values {
			norm = math.Hypot(norm, row[j])
		}
		if norm > 0 {
			scale[j] = weights[j] / norm
		}
		if !maximise[j] {
			scale[j] = -scale[j]
		}
	}
	best, worst := make([]float64, n), make([]float64, n)
	for j := range best {
		best[j], worst[j] = math.Inf(-1), math.Inf(1)
		for _, row := range values {
			best[j], worst[j] = math.Max(best[j], float64(row[j]*scale[j])), math.Min(worst[j], float64(row[j]*scale[j]))
		}
	}
	out := make([]float64, len(values))
	for i, row := range values {
		up, down := 0.0, 0.0
		for j, v := range row {
			up = math.Hypot(up, best[j]-float64(v*scale[j]))
			down = math.Hypot(down, float64(v*scale[j])-worst[j])
		}
		out[i] = 1
		if up+down > 0 {
			out[i] = down / (up + down)
		}
	}
	return out
}

// unit gives the rows of values scaled to [0, 1] in each column, 0 being the best. A column of equal
// values is 0.
func unit(values [][]float64, maximise []bool) [][]float64 {
	out := make([][]float64, len(values))
	for i := range out {
		out[i] = make([]float64, len(maximise))
	}
	for j, more := range maximise {
		low, high := math.Inf(1), math.Inf(-1)
		for _, row := range values {
			low, high = math.Min(low, row[j]), math.Max(high, row[j])
		}
		if high == low {
			continue
		}
		for i, row := range values {
			out[i][j] = (row[j] - low) / (high - low)
			if more {
				out[i][j] = (high - row[j]) / (high - low)
			}
		}
	}
	return out
}

// knee is the row whose scaled goals have the least sum: of a front that bulges towards the best it
// is the one farthest from the plane through the extremes (Das 1999, from memory). Of equals it is
// the first, -1 if there are fewer than three rows.
func knee(scaled [][]float64) int {
	if len(scaled) < 3 {
		return -1
	}
	at, least := -1, math.Inf(1)
	for i, row := range scaled {
		sum := 0.0
		for _, v := range row {
			sum += v
		}
		if sum < least {
			at, least = i, sum
		}
	}
	return at
}
