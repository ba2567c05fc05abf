package objective

import (
	"legwright/kin"
	"legwright/kin/linalg"
)

// Joint is one place where a force passes from a leg to a plate.
type Joint struct {
	Plate string // "base" or "platform": what the force acts on
	Leg   int    // 0-based, -1 for all legs together
	Part  string // "joint", "hinge", "crank pivot", "arm pivot", "carriage", "rod a", "rod b", "shaft", …

	Moments bool // it also carries moments, about its own centre
	One     bool // its force has one direction at each pose, along its leg: the largest is then exact
}

// equilibrium finds what joints exert at one posture. Legs and rods are massless and carry forces along
// themselves; a platform of three swinging legs is also held across them, in the direction of their hinges.
type equilibrium struct {
	machine kin.Machine
	frame   *kin.Frame
	mount   []kin.Mounting
	legs    int  // that carry forces: without a shaft
	twin    bool // parallelograms: two rods to a leg
	shaft   bool
	arm     bool
	joints  []Joint
	out     []reaction

	rows [36]float64 // unit wrenches on the platform (or on what the rods hold), moments over Lc
	line [6]kin.Vec  // their directions, of rods and legs
	phi  [6][6]float64
	six  linalg.Six
}

func newEquilibrium(f *kin.Family, m kin.Machine) *equilibrium {
	s := &equilibrium{machine: m, frame: m.Frame(), mount: kin.Mountings(m), arm: !legged(f), shaft: f.Free > 0}
	s.legs = s.frame.Legs() - f.Free
	if s.arm {
		s.joints = []Joint{
			{Plate: "platform", Leg: -1, Part: "tool's axis", Moments: true},
			{Plate: "base", Leg: -1, Part: "shoulder, all members", Moments: true},
			{Plate: "base", Leg: -1, Part: "whole base", Moments: true},
		}
		s.out = make([]reaction, len(s.joints))
		return s
	}
	s.twin = s.mount[0].Side != kin.Vec{}
	part, moments := "joint", false
	switch {
	case s.frame.Tied:
		part, moments = "hinge", true
	case f.Drive == kin.Rotary && s.twin:
		part, moments = "arm pivot", true
	case f.Drive == kin.Rotary:
		part, moments = "crank pivot", true
	case s.frame.Rails != nil:
		part, moments = "carriage", s.twin
	}
	for i := range s.legs {
		s.joints = append(s.joints, Joint{Plate: "base", Leg: i, Part: part, Moments: moments, One: !s.frame.Tied})
	}
	for i := range s.legs {
		if s.twin {
			s.joints = append(s.joints, Joint{Plate: "platform", Leg: i, Part: "rod a", One: true}, Joint{Plate: "platform", Leg: i, Part: "rod b", One: true})
			continue
		}
		s.joints = append(s.joints, Joint{Plate: "platform", Leg: i, Part: "joint", One: !s.frame.Tied})
	}
	if s.shaft {
		s.joints = append(s.joints, Joint{Plate: "base", Leg: s.legs, Part: "shaft", Moments: true, One: true})
	}
	s.joints = append(s.joints, Joint{Plate: "base", Leg: -1, Part: "whole base", Moments: true})
	s.out = make([]reaction, len(s.joints))
	return s
}

// NotDetermined says which joint forces the statics of rigid bodies does not give for the family.
func NotDetermined(f *kin.Family) []string {
	switch {
	case !legged(f):
		return []string{"how links and couplers of the parallelograms share the force: the figures are those of sections through the whole arm"}
	case f.Free > 0:
		return []string{"the sideways forces of a leaning shaft's universal joints: of the shaft only the moment about z is given"}
	case !f.Has(kin.Z) && !f.Has(kin.Roll):
		out := []string{"forces along z and moments about x and y, which joints and guides of the plane share: they are in the row of the whole base alone"}
		if !f.Has(kin.Yaw) {
			out[0] = "forces along z and all moments on the platform, which joints and guides share: they are in the row of the whole base alone"
		}
		return out
	}
	return nil
}

// unitWrench is the force u at the arm r, moments over Lc.
func unitWrench(u, r kin.Vec, inv float64) [6]float64 {
	m := cross(r, u)
	return [6]float64{u.X, u.Y, u.Z, m.X * inv, m.Y * inv, m.Z * inv}
}

// at finds the reactions at the posture in v. It reports false where the legs cannot hold the platform.
func (s *equilibrium) at(v *View) bool {
	lc := s.frame.Length
	origin, rot := s.machine.Place(v.stand)
	tool := add(origin, rot.Apply(s.frame.Tool))
	for i := range s.out {
		s.out[i] = reaction{}
	}
	// the wrench as it is, of the base as a whole
	s.section(len(s.out)-1, -1, tool, lc)
	if s.arm {
		cos, sin := direction(s.frame.Base[1], v.S.Q[0])
		s.section(0, 1, sub(tool, origin), lc)
		s.section(1, -1, sub(tool, kin.Vec{X: cos, Y: sin, Z: s.frame.Base[1].Z}), lc)
		return true
	}
	about := tool
	if s.shaft { // the platform does not turn with the tool
		about = origin
	}
	start, end := s.bars(&v.S, about, 1/lc)
	if v.sign == 0 || s.six.Factor(&s.rows) == 0 {
		return false
	}
	// φ = X·w: to the wrench about the tool point, whose moment about z a shaft takes
	move := sub(tool, about)
	for k := range s.phi {
		for q := range 6 {
			s.phi[k][q] = s.six.X[6*q+k]
		}
		p := &s.phi[k]
		if s.shaft {
			p[5] = 0
		}
		c := cross(kin.Vec{X: p[3], Y: p[4], Z: p[5]}, move) // m·(move × f) = f·(m × move)
		p[0] += c.X / lc
		p[1] += c.Y / lc
		p[2] += c.Z / lc
	}
	s.share(&start, &end)
	if s.shaft {
		r := &s.out[len(s.out)-2]
		r[5] = [6]float64{move.Y, -move.X, 0, 0, 0, -lc} // -(move × f + m)z
	}
	return true
}

// direction is the vector of the size of v's reach from the z axis, at the angle.
func direction(v kin.Vec, angle float64) (x, y float64) {
	r := kin.RPY(0, 0, angle)
	w := r.Apply(v)
	return w.X, w.Y
}

// section is the whole wrench, or its opposite, moments about the point from which arm leads to the tool point.
func (s *equilibrium) section(joint int, sign float64, arm kin.Vec, lc float64) {
	r := &s.out[joint]
	for k, u := range [3]kin.Vec{{X: sign}, {Y: sign}, {Z: sign}} {
		m := cross(arm, u)
		r[k][k] = sign
		r[3][k], r[4][k], r[5][k] = m.X, m.Y, m.Z
		r[3+k][3+k] = sign * lc
	}
}

// bars fills the unit wrenches and tells where legs or rods start and end.
func (s *equilibrium) bars(p *kin.State, about kin.Vec, inv float64) (start, end [6]kin.Vec) {
	put := func(k int, row [6]float64) { copy(s.rows[6*k:6*k+6], row[:]) }
	if !s.twin {
		rows := new([36]float64)
		n := s.machine.Constraints(p, rows)
		copy(s.rows[6*(6-n):], rows[:6*n])
	}
	for i := range s.legs {
		u, from, length := p.Rod[i], s.frame.Base[i], p.Q[i]
		if s.frame.Rods != nil {
			from, length = p.End[i], s.frame.Rods[i]
		} else if !s.frame.Tied {
			u = kin.Vec{X: p.J[6*i], Y: p.J[6*i+1], Z: p.J[6*i+2]}
		}
		s.line[i], start[i], end[i] = u, from, add(from, times(length, u))
		r := sub(end[i], about)
		if s.twin {
			side := s.mount[i].Side
			put(2*i, unitWrench(u, add(r, side), inv))
			put(2*i+1, unitWrench(u, sub(r, side), inv))
			continue
		}
		put(i, unitWrench(u, r, inv))
	}
	return start, end
}

// share gives each joint its part of the bars' forces.
func (s *equilibrium) share(start, end *[6]kin.Vec) {
	for i := range s.legs {
		base, u := &s.out[i], s.line[i]
		arm := kin.Vec{}
		if s.frame.Rods != nil && s.frame.Rails == nil {
			arm = sub(start[i], s.frame.Base[i])
		}
		switch {
		case s.twin:
			side := s.mount[i].Side
			a, b := &s.phi[2*i], &s.phi[2*i+1]
			s.out[s.legs+2*i].bar(a, u, kin.Vec{})
			s.out[s.legs+2*i+1].bar(b, u, kin.Vec{})
			base.bar(a, times(-1, u), add(arm, side))
			base.bar(b, times(-1, u), sub(arm, side))
		case s.frame.Tied:
			h := s.mount[i].Hinge
			s.out[s.legs+i].bar(&s.phi[i], u, kin.Vec{})
			s.out[s.legs+i].bar(&s.phi[s.legs+i], h, kin.Vec{})
			base.bar(&s.phi[i], times(-1, u), kin.Vec{})
			base.bar(&s.phi[s.legs+i], times(-1, h), sub(end[i], start[i]))
		default:
			s.out[s.legs+i].bar(&s.phi[i], u, kin.Vec{})
			base.bar(&s.phi[i], times(-1, u), arm)
		}
	}
}
