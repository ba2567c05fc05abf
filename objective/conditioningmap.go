package objective

import (
	"math"

	"legwright/kin"
)

// Map is the conditioning over two coordinates, the others staying where they are.
type Map struct {
	X, Y      kin.Freedom
	Low, High kin.Coords // of X and Y; the others are At
	At        kin.Coords
	N         int        // points along each, ends included
	Standings []Standing // N·N, a row for each Y from low to high
}

// mapPairs are pairs of coordinates, the most telling first.
var mapPairs = [15][2]kin.Freedom{
	{kin.X, kin.Y}, {kin.Roll, kin.Pitch}, {kin.X, kin.Z}, {kin.Z, kin.Yaw}, {kin.Y, kin.Z},
	{kin.X, kin.Yaw}, {kin.Y, kin.Yaw}, {kin.X, kin.Pitch}, {kin.Y, kin.Roll}, {kin.Z, kin.Roll},
	{kin.Z, kin.Pitch}, {kin.X, kin.Roll}, {kin.Y, kin.Pitch}, {kin.Roll, kin.Yaw}, {kin.Pitch, kin.Yaw},
}

// MapAxes lists the pairs of coordinates that the duty moves, the most telling first.
func MapAxes(t *Task) [][2]kin.Freedom {
	low, high := t.Extent()
	var out [][2]kin.Freedom
	for _, p := range mapPairs {
		if low[p[0]] != high[p[0]] && low[p[1]] != high[p[1]] {
			out = append(out, p)
		}
	}
	return out
}

// ConditioningMap looks at n times n poses over the ranges of two coordinates in the duty. The other
// coordinates are at home, or where the duty comes nearest to it.
func ConditioningMap(t *Task, a *Appraisal, x, y kin.Freedom, n int) *Map {
	if n < 2 || x == y {
		panic("objective: a map of nothing")
	}
	m := &Map{X: x, Y: y, N: n}
	m.Low, m.High = t.Extent()
	for k := range m.At {
		m.At[k] = math.Max(m.Low[k], math.Min(m.High[k], 0))
	}
	l := limitsOf(t, a)
	for j := range n {
		for i := range n {
			c := m.At
			c[x], c[y] = m.along(x, i), m.along(y, j)
			m.Standings = append(m.Standings, l.stand(t, c))
		}
	}
	return m
}

// along is point i of the coordinate q; the ends are exact.
func (m *Map) along(q kin.Freedom, i int) float64 {
	if i == m.N-1 {
		return m.High[q]
	}
	return m.Low[q] + (m.High[q]-m.Low[q])*float64(i)/float64(m.N-1)
}
