package kin

// ender is a machine whose drives carry the rods' ends.
type ender interface {
	ends(q []float64) []Vec
}

// Ends is where the legs' rods start when the actuator coordinates are q, base
// frame: the ends of cranks, the carriages, or the base joints of prismatic legs.
// It is nil for machines without rods.
func Ends(m Machine, q []float64) []Vec {
	switch e := m.(type) {
	case ender:
		return e.ends(q)
	case *struts:
		return e.frame.Base
	}
	return nil
}

func (m *rods) ends(q []float64) []Vec {
	out := make([]Vec, m.n)
	for i := range out {
		out[i] = m.leg[i].point(q[i])
	}
	return out
}
