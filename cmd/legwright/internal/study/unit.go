package study

import "math"

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
