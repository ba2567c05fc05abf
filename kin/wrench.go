package kin

import "math"

// actuated is a machine whose actuators' wrenches have parts in freedoms that the platform
// lacks, which rows of J leave out.
type actuated interface {
	// Actuation writes a unit wrench for each actuator, as Constraints does, and leaves the other rows alone.
	Actuation(s *State, rows *[36]float64) int
}

// Wrenches fills a with the unit wrenches that hold the platform when the drives are
// locked, one row of six each: first the actuators', then the joints' constraints (S. A. Joshi
// and L.-W. Tsai 2002, ASME J. Mech. Des. 124:254, from memory). A force is [u, (r×u)/Lc], a couple
// [0, m]. The matrix is singular where the platform can move though all drives are held.
func Wrenches(m Machine, s *State, a *[36]float64) {
	n := m.Constraints(s, a)
	k := 6 - n
	copy(a[6*k:], a[:6*n])
	if w, ok := m.(actuated); ok {
		w.Actuation(s, a)
		return
	}
	copy(a[:6*k], s.J[:6*k])
	for i := range k {
		row := (*[6]float64)(a[6*i : 6*i+6])
		if f := math.Sqrt(row[0]*row[0] + row[1]*row[1] + row[2]*row[2]); f > 0 {
			for j := range row {
				row[j] /= f
			}
		}
	}
}

// forceRow is the wrench of the unit force u at the distance r from the tool point.
func forceRow(u, r Vec, invLc float64, row []float64) {
	row[0], row[1], row[2] = u.X, u.Y, u.Z
	row[3] = (r.Y*u.Z - r.Z*u.Y) * invLc
	row[4] = (r.Z*u.X - r.X*u.Z) * invLc
	row[5] = (r.X*u.Y - r.Y*u.X) * invLc
}

// unitConstraints are forces along, and couples about, the axes of the freedoms that the platform lacks.
func unitConstraints(freedoms []Freedom, rows *[36]float64) int {
	*rows = [36]float64{}
	n, own := 0, 0
	for q := X; q <= Yaw; q++ {
		if own < len(freedoms) && freedoms[own] == q {
			own++
			continue
		}
		rows[6*n+int(q)] = 1
		n++
	}
	return n
}
