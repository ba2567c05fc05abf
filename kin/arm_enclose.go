package kin

import (
	"math"

	"legwright/kin/enclose"
)

// Enclose encloses the column, the links and the tool's motor over the box.
//
// The angles at elbow, shoulder and wrist depend on the distance from shoulder to wrist alone; the links' directions
// are that to the wrist, turned by the latter two.
func (m *arm) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c                      [6]enclose.Form
		reached, elbow         enclose.Form
		p, tool, plan          enclose.QuadVec // plan is from the column's axis to the platform origin
		turn                   enclose.Turn
		out, up                enclose.Quad // from shoulder to wrist
		r, invR, d2, along     enclose.Quad
		short, room, s, k, x   enclose.Quad
		across, slant, upper   enclose.Quad
		column, fore, sin, yaw enclose.Quad
	)
	f := &m.frame
	f.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.heading(&c[Yaw])
	turn.Set(b, f.turns())
	tool.Arm(&turn, Vec{X: m.tool.X, Y: m.tool.Y})
	p.Set(&e.P)
	plan.AddConst(plan.Sub(&p, &tool), m.home)
	r.Sum2(&plan[0], &plan[0], &plan[1], &plan[1])
	r.AddConst(&r, m.wrong)
	invR.InvSqrt(&r)
	e.decide(0, reached.Quad(&r), rounding*(r.C+m.inner*m.inner))
	r.Sqrt(&r)
	out.AddConst(&r, -m.inner)
	up.AddConst(&p[2], m.home.Z-m.tool.Z-m.height)
	d2.Sum2(&out, &out, &up, &up)

	// How far the third side is from its greatest and its least.
	sum, diff := m.upper+m.fore, m.upper-m.fore
	edge := rounding * sum * sum
	short.AddConst(short.Neg(&d2), sum*sum)
	e.decide(1, reached.Quad(&short), edge)
	x.AddConst(&d2, -diff*diff)
	e.decide(1, reached.Quad(&x), edge)
	fold := 1 / (2 * m.upper * m.fore)
	room.Scale(room.Mul(&short, &x), fold*fold)
	sin.Sqrt(&room)
	along.Scale(along.AddConst(&d2, -(m.upper*m.upper+m.fore*m.fore)), fold)

	// across is a link's length times the elbow's sine
	elbow.Quad(x.Atan2(&sin, &along))
	slant.Atan2(&up, &out)
	bend := func(z *enclose.Quad, near, far, sign float64) {
		across.Scale(&sin, far)
		x.AddConst(x.Scale(&along, far), near)
		z.AddScaled(&slant, sign*m.mode, x.Atan2(&across, &x))
	}
	bend(&upper, m.upper, m.fore, 1)
	bend(&fore, m.fore, m.upper, -1)
	column.Atan2(&plan[1], &plan[0])
	e.Q[0].Quad(&column)
	e.Q[1].Quad(&upper)
	e.Q[2].Quad(&fore)
	e.Q[3].Quad(x.Sub(yaw.Set(&c[Yaw]), &column))
	wrap(&e.Q[3], 0)

	e.BaseChord, e.PlatformChord = [6]enclose.Form{}, [6]enclose.Form{}
	k.Scale(s.InvSqrt(&room), m.mode)
	m.columnRates(e, &plan, &tool, &r, &invR)
	m.barRates(1, e, &plan, &tool, &invR, &fore, -1, k.Scale(&k, 1/m.upper))
	m.barRates(2, e, &plan, &tool, &invR, &upper, 1, k.Scale(&k, m.upper/m.fore))
	e.held(f)
	e.stopAt(1, &m.upperStop, &e.Q[1], "upper arm")
	e.stopAt(2, &m.foreStop, &e.Q[2], "forearm")
	e.stopAt(1, &m.elbowStop, &elbow, "parallelogram")
}

// columnRates fills the rows of the column and of the tool's motor, in J and as unit wrenches. lead and side are, in the plane
// of the arm and across it, how the platform origin moves as the platform turns.
func (m *arm) columnRates(e *Enclosure, plan, tool *enclose.QuadVec, r, invR *enclose.Quad) {
	var x, y, lead, turn enclose.Quad
	x.Mul(&plan[0], invR)
	y.Mul(&plan[1], invR)
	lead.Scale(lead.Sum2(&tool[0], &x, &tool[1], &y), -m.invLc)
	clear(e.Wrenches[:24])
	e.Wrenches[1].Quad(&x)
	e.Wrenches[0].Quad(turn.Neg(&y))
	e.Wrenches[5].Quad(&lead)
	e.Wrenches[18].Neg(&e.Wrenches[0])
	e.Wrenches[19].Neg(&e.Wrenches[1])
	e.Wrenches[23].Quad(turn.Sub(turn.Scale(r, m.invLc), &lead))

	column, motor := e.J[:6], e.J[18:24]
	column[1].Quad(x.Mul(&x, invR))
	column[0].Quad(y.Neg(y.Mul(&y, invR)))
	lead.Mul(&lead, invR)
	column[5].Quad(&lead)
	motor[0].Neg(&column[0])
	motor[1].Neg(&column[1])
	motor[5].Quad(lead.AddConst(lead.Neg(&lead), m.invLc))
}

// barRates fills the rows of one link: s times the other link's direction, whose angle is q, of which k is the rate.
func (m *arm) barRates(leg int, e *Enclosure, plan, tool *enclose.QuadVec, invR, q *enclose.Quad, s float64, k *enclose.Quad) {
	var cos, sin, side, z enclose.Quad
	cos.Scale(cos.Cos(q), s)
	sin.Scale(sin.Sin(q), s)
	cos.Mul(&cos, invR)
	side.Sum2(&tool[1], &plan[0], z.Neg(&tool[0]), &plan[1])
	side.Scale(&side, m.invLc)
	row, unit := e.J[6*leg:6*leg+6], e.Wrenches[6*leg:6*leg+6]
	set := func(i int, part *enclose.Quad) {
		unit[i].Quad(part)
		unit[i].Scale(&unit[i], m.mode)
		row[i].Quad(part.Mul(part, k))
	}
	set(0, z.Mul(&cos, &plan[0]))
	set(1, z.Mul(&cos, &plan[1]))
	set(2, &sin)
	set(5, z.Mul(&cos, &side))
}

// stopAt puts the angle a on the turn that starts at the stop and decides whether it is within the range.
func (e *Enclosure) stopAt(leg int, s *stop, a *enclose.Form, what string) {
	wrap(a, 0)
	mid, _ := s.on(a.C)
	wrap(a, mid)
	was := e.Reach
	over, under := a.Upper()-(s.least+s.span+stopSlack), s.least-stopSlack-a.Lower()
	switch {
	case e.Reach == NoReach:
	case a.Lower() > s.least+s.span+stopSlack && a.Upper() < s.least-stopSlack+2*math.Pi:
		e.Reach, e.Leg = NoReach, leg
	case !(over <= 0 && under <= 0) || s.least > math.Pi || s.least < -3*math.Pi: // on moves an angle by one turn at most
		if e.Reach == AllReach {
			e.Reach, e.Leg = Unsure, leg
		}
	}
	if e.Reach != was {
		e.What = what
	}
}
