package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// sweeper is a machine whose drives reach beyond the base joints.
type sweeper interface {
	sweep(least, most float64) []Vec
}

// Sweep is what the machine's drives take of the floor beyond the base joints while
// all actuator coordinates stay within [least, most]: points in the base frame,
// the ends of rails, and of a crank's circle its ends and those of its points that
// can lie outermost in plan. It is empty for prismatic legs. A crank that turns in
// the base plane itself gives a point for every 15° of its arc, between which
// less than a hundredth of its length is missed.
func Sweep(m Machine, least, most float64) []Vec {
	if w, ok := m.(sweeper); ok {
		return w.sweep(least, most)
	}
	return nil
}

func (m *rods) sweep(least, most float64) []Vec {
	var out []Vec
	for i := range m.leg[:m.n] {
		d := &m.leg[i].drive
		out = append(out, d.point(least), d.point(most))
		if !d.crank {
			continue
		}
		step := 15 * deg
		if d.e3.Z == 0 { // a vertical plane: seen from above the crank moves on a line, and turns back where it is level
			step = math.Pi
		}
		for k := math.Ceil(least / step); k*step < most && k*step < least+2*math.Pi; k++ {
			out = append(out, d.point(k*step))
		}
	}
	return out
}

// point is the drive's end at the coordinate q.
func (d *drive) point(q float64) Vec {
	if !d.crank {
		return r3.Add(d.at, r3.Scale(q, d.e1))
	}
	sin, cos := math.Sincos(q - d.zero)
	return r3.Add(d.at, r3.Add(r3.Scale(d.length*cos, d.e1), r3.Scale(d.length*sin, d.e2)))
}
