package kin

import (
	"math"

	"legwright/kin/enclose"
)

// Enclose encloses the column, the links and the tool's motor over the box.
//
// The elbow's angle, from acos of its cosine, and those at shoulder and wrist depend on the distance from shoulder
// to wrist alone; the links' directions are that to the wrist, turned by them.
func (m *arm) Enclose(b *enclose.Box, e *Enclosure) {
	var (
		c                                       [6]enclose.Form
		tool                                    enclose.Vec
		plan, reach                             enclose.Vec // from the column's axis to the platform origin; from shoulder to wrist
		r, invR2, d2, along, room, elbow, slant enclose.Form
		bend                                    enclose.Form
	)
	f := &m.frame
	f.coordinates(b, &c)
	e.start()
	e.P = enclose.Vec(c[:3])
	e.heading(&c[Yaw])
	tool.Turn(&e.R, m.tool)
	plan.AddConst(plan.Sub(&e.P, &tool), m.home)
	plan[2].Const(m.wrong)
	r.Norm(&plan)
	invR2.Dot(&plan, &plan)
	invR2.Inv(&invR2)
	reach[0].AddConst(&r, -m.inner)
	reach[1].AddConst(&c[Z], m.home.Z-m.tool.Z-m.height)
	d2.Dot(&reach, &reach)

	// How far the third side is from its least and its greatest.
	sum, diff := m.upper+m.fore, m.upper-m.fore
	edge := rounding * sum * sum
	room.AddConst(room.Neg(&d2), sum*sum)
	e.decide(0, &r, 0)
	e.decide(1, &room, edge)
	room.AddConst(&d2, -diff*diff)
	e.decide(1, &room, edge)

	fold := 1 / (2 * m.upper * m.fore)
	along.AddConst(&d2, -(m.upper*m.upper + m.fore*m.fore))
	elbow.Acos(elbow.Scale(&along, fold))
	slant.Atan2(&reach[1], &reach[0])
	var sin, cos enclose.Form
	sin.Scale(sin.Sin(&elbow), m.fore)
	cos.AddConst(cos.Scale(&along, fold*m.fore), m.upper)
	bend.Atan2(&sin, &cos) // at the shoulder, between the upper arm and the line to the wrist
	wrap(&slant, 0)
	e.Q[0].Atan2(&plan[1], &plan[0])
	e.Q[1].AddScaled(&slant, m.mode, &bend)
	bend.Sub(&elbow, &bend) // at the wrist
	e.Q[2].AddScaled(&slant, -m.mode, &bend)
	e.Q[3].Sub(&c[Yaw], &e.Q[0])
	wrap(&e.Q[3], 0)

	e.BaseChord, e.PlatformChord = [6]enclose.Form{}, [6]enclose.Form{}
	m.rates(e, &plan, &tool, &r, &invR2, &elbow)
	e.held(f)
	e.stopAt(1, &m.upperStop, &e.Q[1], "upper arm")
	e.stopAt(2, &m.foreStop, &e.Q[2], "forearm")
	e.stopAt(1, &m.elbowStop, &elbow, "parallelogram")
}

// rates fills the rows of J, and the rows of e.Wrenches that are their unit wrenches. The links' rows have the parts
// of a force along the other link, at the platform origin.
func (m *arm) rates(e *Enclosure, plan, tool *enclose.Vec, r, invR2, elbow *enclose.Form) {
	var (
		lead, side, inv enclose.Form
		out, cross      enclose.Vec // outward and leftward
	)
	out.Unit(plan)
	cross[0].Neg(&out[1])
	cross[1] = out[0]
	flat := enclose.Vec{tool[0], tool[1]}
	lead.Scale(lead.Dot(&flat, &out), -m.invLc)
	side.Scale(side.Dot(&flat, &cross), m.invLc)

	column := e.J[0:6]
	column[0].Neg(column[0].Mul(&plan[1], invR2))
	column[1].Mul(&plan[0], invR2)
	flat2 := enclose.Vec{plan[0], plan[1]}
	column[5].Dot(&flat, &flat2)
	column[5].Scale(column[5].Mul(&column[5], invR2), -m.invLc)
	turn := e.J[18:24]
	turn[0].Neg(&column[0])
	turn[1].Neg(&column[1])
	turn[5].AddConst(turn[5].Neg(&column[5]), m.invLc)

	clear(e.Wrenches[:24])
	copy(e.Wrenches[0:], cross[:2])
	e.Wrenches[5] = lead
	e.Wrenches[18].Neg(&cross[0])
	e.Wrenches[19].Neg(&cross[1])
	e.Wrenches[23].Sub(e.Wrenches[23].Scale(r, m.invLc), &lead)

	inv.Sin(elbow)
	inv.Scale(inv.Inv(&inv), m.mode)
	bar := func(leg int, q *enclose.Form, s, length float64) {
		var c, sn, k enclose.Form
		c.Scale(c.Cos(q), s)
		sn.Scale(sn.Sin(q), s)
		unit := e.Wrenches[6*leg : 6*leg+6]
		unit[0].Mul(&c, &out[0])
		unit[1].Mul(&c, &out[1])
		unit[2] = sn
		unit[5].Mul(&c, &side)
		k.Scale(&inv, 1/length)
		row := e.J[6*leg : 6*leg+6]
		for j := range row {
			row[j].Mul(&unit[j], &k)
			unit[j].Scale(&unit[j], m.mode)
		}
	}
	bar(1, &e.Q[2], -1, m.upper)
	bar(2, &e.Q[1], 1, m.fore)
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
