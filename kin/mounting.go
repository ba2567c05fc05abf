package kin

// Mounting is how the joints of one leg sit in the machine when it is at home. Vectors that a leg
// does not have are zero.
type Mounting struct {
	// Hinge is the axis at the base about which the leg as a whole turns, base axes, unit: of a crank's
	// pivot, of the revolute joint of a leg that swings in a plane. A crank's angle grows counter-clockwise about it.
	Hinge Vec

	// Base and Platform are the unit vectors from which swing is measured: that of the joint at the base
	// (with a drive and a rod: of the joint between the two) in base axes, that of the platform joint in platform axes.
	Base, Platform Vec

	// Side runs from the middle of the leg's parallelogram to one of its two rods, base axes (m); the other rod
	// is at -Side. The swing of such rods is measured from the plane square to it, and there are no mounting axes.
	Side Vec
}

// mounted is a machine that tells how its joints sit.
type mounted interface{ mountings() []Mounting }

// Mountings tells how the joints of each leg sit at home; nil for a machine that does not tell. Where a
// leg does not reach home its axes along the leg are zero.
func Mountings(m Machine) []Mounting {
	if w, ok := m.(mounted); ok {
		return w.mountings()
	}
	return nil
}

// planar tells whether the platform moves in the plane z = 0 alone.
func (f *Frame) planar() bool {
	for _, q := range f.Freedoms {
		if q != X && q != Y && q != Yaw {
			return false
		}
	}
	return true
}

func (m *struts) mountings() []Mounting {
	out := make([]Mounting, m.n)
	for i := range out {
		l := &m.leg[i]
		out[i] = Mounting{Base: l.ua, Platform: m.frame.HomeRot.Unapply(l.ub)}
		if m.frame.planar() {
			out[i].Hinge = Vec{Z: 1}
		}
	}
	return out
}

func (m *tripod) mountings() []Mounting {
	out := m.struts.mountings()
	for i := range out {
		out[i].Hinge = Vec{X: -m.sin[i], Y: m.cos[i]}
	}
	return out
}

func (m *rods) mountings() []Mounting {
	out := make([]Mounting, m.n)
	for i := range out {
		l := &m.leg[i]
		out[i] = Mounting{Base: l.ua, Platform: m.frame.HomeRot.Unapply(l.ub)}
		if l.crank {
			a := l.ua
			out[i].Base = Vec{
				X: a.X*l.e1.X + a.Y*l.e2.X + a.Z*l.e3.X,
				Y: a.X*l.e1.Y + a.Y*l.e2.Y + a.Z*l.e3.Y,
				Z: a.X*l.e1.Z + a.Y*l.e2.Z + a.Z*l.e3.Z,
			}
			out[i].Hinge = l.e3
		}
	}
	return out
}

func (m *shiftingRods) mountings() []Mounting {
	out := m.rods.mountings()
	if m.parallel {
		for i := range out {
			out[i] = Mounting{Hinge: out[i].Hinge, Side: m.links.side[i]}
		}
	}
	return out
}

// mountings of the shaft are upright: its swing is measured from there.
func (m *toolDelta) mountings() []Mounting {
	return append(m.shiftingRods.mountings(), Mounting{Base: Vec{Z: 1}, Platform: Vec{Z: 1}})
}

// mountings are the motors' axes: column and tool upright, those of the two links level, so that angles
// upward are positive.
func (m *arm) mountings() []Mounting {
	return []Mounting{{Hinge: Vec{Z: 1}}, {Hinge: Vec{Y: -1}}, {Hinge: Vec{Y: -1}}, {Hinge: Vec{Z: 1}}}
}
