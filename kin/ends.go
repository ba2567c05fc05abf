package kin

// ender is a machine with rods, or with legs that are rods themselves.
type ender interface {
	ends(q []float64) []Vec
}

// Ends is where the legs' rods start when the actuator coordinates are q, base
// frame: the ends of cranks, the carriages, or the base joints of prismatic legs.
// It is nil for machines without rods.
func Ends(m Machine, q []float64) []Vec {
	if e, ok := m.(ender); ok {
		return e.ends(q)
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
