package kin

import "legwright/kin/enclose"

// coordinates sets c to the pose coordinates of the box. Those of freedoms that the family lacks stay at home.
func (f *Frame) coordinates(b *enclose.Box, c *[6]enclose.Form) {
	*c = [6]enclose.Form{}
	for _, q := range f.Freedoms {
		c[q].Coordinate(b, int(q))
	}
}

// formsOf sets forms to numbers.
func formsOf(forms []enclose.Form, v []float64) {
	for i := range forms {
		forms[i].Const(v[i])
	}
}

// turned sets e.R to the rotation with the coordinates c.
func (e *Enclosure) turned(f *Frame, c *[6]enclose.Form) {
	angular := 0
	for _, q := range f.Freedoms {
		if q.Angular() {
			angular++
		}
	}
	switch {
	case angular == 0:
		e.heading(nil)
	case angular == 1 && f.Freedoms[len(f.Freedoms)-1] == Yaw:
		e.heading(&c[Yaw])
	default:
		enclose.Turned(&c[Roll], &c[Pitch], &c[Yaw], &e.R)
	}
}

// heading sets e.R to the rotation by yaw about z, or by nothing.
func (e *Enclosure) heading(yaw *enclose.Form) {
	id := Identity()
	formsOf(e.R[:], id[:])
	if yaw == nil {
		return
	}
	e.R[0].Cos(yaw)
	e.R[3].Sin(yaw)
	e.R[1].Neg(&e.R[3])
	e.R[4] = e.R[0]
}

// held sets the last rows of e.Wrenches to the constraints of joints that take what the family's freedoms leave.
func (e *Enclosure) held(f *Frame) {
	var rows [36]float64
	n := unitConstraints(f.Freedoms, &rows)
	formsOf(e.Wrenches[6*(6-n):], rows[:6*n])
}

// force sets a row of e.Wrenches to the unit force u at r from the tool point.
func force(row []enclose.Form, u, r *enclose.QuadVec, invLc float64) {
	var moment enclose.QuadVec
	moment.Scale(moment.Cross(r, u), invLc)
	quads(row[:3], u)
	quads(row[3:], &moment)
}

// quads sets forms to the components of v.
func quads(forms []enclose.Form, v *enclose.QuadVec) {
	for c := range v {
		forms[c].Quad(&v[c])
	}
}

// turns tells which of roll, pitch and yaw the family has.
func (f *Frame) turns() (own [3]bool) {
	for _, q := range f.Freedoms {
		if q.Angular() {
			own[q-Roll] = true
		}
	}
	return own
}

// crossed sets z to r×u.
func crossed(z *enclose.QuadVec, r Vec, u *enclose.QuadVec) {
	v := *u
	z[0].Along(&v, Vec{Y: -r.Z, Z: r.Y})
	z[1].Along(&v, Vec{X: r.Z, Z: -r.X})
	z[2].Along(&v, Vec{X: -r.Y, Y: r.X})
}

// chord sets z to 2-2cos of the angle between a unit vector and a mounting axis whose dot product is dot. The
// axis is a unit vector, or zero where there is none, and on is its squared length.
func chord(z, dot *enclose.Form, on float64) {
	z.AddConst(z.Scale(dot, -2), 1+on)
}

// decide takes in what the form `room` of one leg, positive where the leg reaches, says of the whole box. The
// sign of a room below `edge` is a matter of rounding.
func (e *Enclosure) decide(leg int, room *enclose.Form, edge float64) {
	switch {
	case e.Reach == NoReach:
	case room.Upper() < -edge:
		e.Reach, e.Leg = NoReach, leg
	case !(room.Lower() > edge) && e.Reach == AllReach:
		e.Reach, e.Leg = Unsure, leg
	}
}
