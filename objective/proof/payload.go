package proof

import (
	"legwright/kin"
	"legwright/objective"
)

// payload is one case over a box: what objective.Demand asks of a leg, given the leg's column of the inverse of the
// Jacobian, as in package objective: u = m(x_f + x_m×r) per unit of the mass centre's acceleration, R I Rᵀ x_m per
// unit of angular acceleration.
type payload struct {
	d      objective.Demand
	invLc  float64
	weight []kin.Vec // of each body, as a force that the actuators must exert
	body   []posed
	point  []vector // from the tool point to each point's place
}

// posed is a body over the box.
type posed struct {
	r       vector // from the tool point to the mass centre
	inertia tensor // base axes
}

func newPayload(c *objective.Case, f *kin.Frame, gravity kin.Vec) *payload {
	z := &payload{d: objective.DemandOf(c, f), invLc: 1 / f.Length}
	for i := range z.d.Bodies {
		m := -z.d.Bodies[i].Mass
		z.weight = append(z.weight, kin.Vec{X: m * gravity.X, Y: m * gravity.Y, Z: m * gravity.Z})
	}
	z.body = make([]posed, len(z.d.Bodies))
	z.point = make([]vector, len(z.d.Points))
	return z
}

// move brings bodies and points to the box. Platforms that do not turn leave moments to their joints.
func (z *payload) move(rot *[9]line) {
	if !z.d.Turns {
		return
	}
	for i := range z.body {
		b, p := &z.d.Bodies[i], &z.body[i]
		p.r.turn(rot, b.Centre)
		if b.Angular.Kind != objective.None {
			p.inertia.turn(rot, &b.Inertia)
		}
	}
	for i := range z.point {
		z.point[i].turn(rot, z.d.Points[i].At)
	}
}

// effort sets s to the effort of the leg whose column of the inverse, over (v, Lc·ω), is x.
func (z *payload) effort(x *[6]line, s *support) {
	s.reset()
	f := (*vector)(x[:3])
	parts := 3
	if z.d.Turns {
		parts = 6
	}
	for k := range parts {
		s.mid.add(z.d.Wrench[k], &x[k])
		s.along(z.d.Spread[k], &x[k])
	}
	var m vector // per unit of moment
	if z.d.Turns {
		for c := range m {
			m[c].add(z.invLc, &x[3+c])
			m[c].spread()
		}
	}
	for i := range z.d.Bodies {
		z.carry(i, f, &m, s)
	}
	for i := range z.d.Points {
		p := &z.d.Points[i]
		u := *f
		if z.d.Turns {
			// the moment of the force was left out of Wrench
			var q vector
			q.cross(&m, &z.point[i])
			s.mid.add(-p.Force.X, &q[0])
			s.mid.add(-p.Force.Y, &q[1])
			s.mid.add(-p.Force.Z, &q[2])
			for c := range u {
				u[c].add(1, &q[c])
				u[c].spread()
			}
		}
		s.along(p.Spread.X, &u[0])
		s.along(p.Spread.Y, &u[1])
		s.along(p.Spread.Z, &u[2])
	}
	s.mid.spread()
}

// carry adds body i to the effort of a leg: f per unit of force, m per unit of moment.
func (z *payload) carry(i int, f, m *vector, s *support) {
	b, p := &z.d.Bodies[i], &z.body[i]
	u := *f
	if z.d.Turns && b.Centre != (kin.Vec{}) {
		var q vector
		q.cross(m, &p.r)
		for c := range u {
			u[c].add(1, &q[c])
			u[c].spread()
		}
	}
	g := z.weight[i]
	s.mid.add(g.X, &u[0])
	s.mid.add(g.Y, &u[1])
	s.mid.add(g.Z, &u[2])
	s.over(&b.Linear, b.Mass, &u)
	if !z.d.Turns || b.Angular.Kind == objective.None {
		return
	}
	var v vector
	p.inertia.apply(m, &v)
	if b.AtTool {
		var q vector
		q.cross(&p.r, &u)
		for c := range v {
			v[c].add(b.Mass, &q[c])
			v[c].spread()
		}
	}
	s.over(&b.Angular, 1, &v)
}

// rate sets s to the rate of the leg with the row j of the inverse Jacobian, over (v, Lc·ω).
func (z *payload) rate(j *[6]line, s *support) {
	s.reset()
	s.over(&z.d.Linear, 1, (*vector)(j[:3]))
	if z.d.Turns {
		s.over(&z.d.Spin, 1, (*vector)(j[3:]))
	}
}

// cases makes the cases of a task ready that occur in the zone.
func cases(t *objective.Task, f *kin.Frame, zone int) (out []*payload) {
	for c := range t.Cases {
		if t.Cases[c].In(zone) {
			out = append(out, newPayload(&t.Cases[c], f, t.Gravity))
		}
	}
	return out
}
