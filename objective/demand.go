package objective

import (
	"math"

	"legwright/kin"
)

// demand is one case made ready for one machine: the wrenches that the actuators
// must exert and the twists that they must follow, with moments divided and
// angular speeds multiplied by the characteristic length, as the rows of
// kin.State.J want them.
type demand struct {
	c      *Case
	w0     [6]float64 // wrench that is the same at every pose
	dw     [6]float64 // ± on it, per base axis
	spread bool       // dw is not zero
	turns  bool       // the platform has a rotational freedom
	body   []body
	point  []point
	linear Set // speeds
	spin   Set // angular speeds times Lc
}

// body is a mass; its vectors are turned by R_home.
type body struct {
	l       *Load
	centre  kin.Vec    // from the tool point
	inertia [6]float64 // xx, yy, zz, xy, xz, yz
	angular Set        // angular accelerations that the platform can follow
	r       kin.Vec    // at the pose in work: from the tool point to the mass centre, base axes
}

// point is a force away from the tool point.
type point struct {
	l  *Load
	at kin.Vec
	r  kin.Vec
}

// prepare fills d for a machine; it keeps the slices it has.
func (d *demand) prepare(c *Case, f *kin.Frame) {
	inv := 1 / f.Length
	*d = demand{c: c, body: d.body[:0], point: d.point[:0], linear: c.Linear, spin: scaled(c.Angular, f.Length)}
	for i := range c.Loads {
		l := &c.Loads[i]
		if l.Mass != 0 || l.Inertia != [6]float64{} {
			d.body = append(d.body, body{
				l:       l,
				centre:  f.HomeRot.Apply(sub(l.Centre, f.Tool)),
				inertia: turned(&f.HomeRot, &l.Inertia),
				angular: followed(l.Angular, f.Freedoms),
			})
		}
		d.w0[3] -= l.Moment.X * inv
		d.w0[4] -= l.Moment.Y * inv
		d.w0[5] -= l.Moment.Z * inv
		d.dw[3] += l.MomentSpread.X * inv
		d.dw[4] += l.MomentSpread.Y * inv
		d.dw[5] += l.MomentSpread.Z * inv
		d.w0[0] -= l.Force.X
		d.w0[1] -= l.Force.Y
		d.w0[2] -= l.Force.Z
		if l.Off {
			d.point = append(d.point, point{l: l, at: f.HomeRot.Apply(sub(l.At, f.Tool))})
			continue
		}
		d.dw[0] += l.ForceSpread.X
		d.dw[1] += l.ForceSpread.Y
		d.dw[2] += l.ForceSpread.Z
	}
	d.spread = d.dw != [6]float64{}
	for _, q := range f.Freedoms {
		d.turns = d.turns || q.Angular()
	}
}

// wrench moves bodies and points to the pose and gives the nominal wrench there.
func (d *demand) wrench(p *kin.Pose, g kin.Vec, inv float64) [6]float64 {
	w := d.w0
	for i := range d.body {
		b := &d.body[i]
		b.r = p.R.Apply(b.centre)
		fx, fy, fz := -b.l.Mass*g.X, -b.l.Mass*g.Y, -b.l.Mass*g.Z
		w[0] += fx
		w[1] += fy
		w[2] += fz
		w[3] += (b.r.Y*fz - b.r.Z*fy) * inv
		w[4] += (b.r.Z*fx - b.r.X*fz) * inv
		w[5] += (b.r.X*fy - b.r.Y*fx) * inv
	}
	for i := range d.point {
		q := &d.point[i]
		q.r = p.R.Apply(q.at)
		f := &q.l.Force
		w[3] -= (q.r.Y*f.Z - q.r.Z*f.Y) * inv
		w[4] -= (q.r.Z*f.X - q.r.X*f.Z) * inv
		w[5] -= (q.r.X*f.Y - q.r.Y*f.X) * inv
	}
	return w
}

// efforts fills the least and the greatest effort of each leg over the case's
// sets: column i of x is the effort of leg i per unit of wrench. Exact for each
// load's sets taken independently.
func (d *demand) efforts(p *kin.Pose, g kin.Vec, inv float64, x *[36]float64, n int, lo, hi *[6]float64) {
	w := d.wrench(p, g, inv)
	if !d.turns {
		d.pushes(&w, x, n, lo, hi)
		return
	}
	for i := range n {
		if i > 5 {
			break
		}
		a, b, c, e, f, h := x[i], x[6+i], x[12+i], x[18+i], x[24+i], x[30+i]
		mid := (a*w[0] + b*w[1] + c*w[2]) + (e*w[3] + f*w[4] + h*w[5])
		half := 0.0
		if d.spread {
			dw := &d.dw
			half = (abs(a)*dw[0] + abs(b)*dw[1] + abs(c)*dw[2]) + (abs(e)*dw[3] + abs(f)*dw[4] + abs(h)*dw[5])
		}
		e, f, h = e*inv, f*inv, h*inv
		for k := range d.body {
			half += d.body[k].reach(p, a, b, c, e, f, h)
		}
		for k := range d.point {
			q := &d.point[k]
			s := &q.l.ForceSpread
			half += abs(a+f*q.r.Z-h*q.r.Y)*s.X + abs(b+h*q.r.X-e*q.r.Z)*s.Y + abs(c+e*q.r.Y-f*q.r.X)*s.Z
		}
		lo[i], hi[i] = mid-half, mid+half
	}
}

// pushes is efforts for a platform that does not turn: moments are the joints' affair.
func (d *demand) pushes(w *[6]float64, x *[36]float64, n int, lo, hi *[6]float64) {
	for i := range n {
		if i > 5 {
			break
		}
		a, b, c := x[i], x[6+i], x[12+i]
		mid := a*w[0] + b*w[1] + c*w[2]
		half := abs(a)*d.dw[0] + abs(b)*d.dw[1] + abs(c)*d.dw[2]
		for k := range d.body {
			l := d.body[k].l
			half += l.Linear.reach(l.Mass*a, l.Mass*b, l.Mass*c)
		}
		for k := range d.point {
			s := &d.point[k].l.ForceSpread
			half += abs(a)*s.X + abs(b)*s.Y + abs(c)*s.Z
		}
		lo[i], hi[i] = mid-half, mid+half
	}
}

// reach is the largest effort of a leg that the accelerations of the body can
// ask for on top of its weight: (a, b, c) per unit of force, (e, f, h) per unit of
// moment. With the coefficient of the force on the mass centre u = m (x_f + x_m × r),
// the linear part is the reach of u over the linear set and the angular part that
// of R I Rᵀ x_m, or of R I Rᵀ x_m + r × u if the acceleration is the tool point's.
func (b *body) reach(p *kin.Pose, a, bb, c, e, f, h float64) float64 {
	m := b.l.Mass
	ux := m * (a + f*b.r.Z - h*b.r.Y)
	uy := m * (bb + h*b.r.X - e*b.r.Z)
	uz := m * (c + e*b.r.Y - f*b.r.X)
	half := b.l.Linear.reach(ux, uy, uz)
	if b.angular.Kind == None {
		return half
	}
	y := p.R.Unapply(kin.Vec{X: e, Y: f, Z: h})
	t := &b.inertia
	v := kin.Vec{
		X: t[0]*y.X + t[3]*y.Y + t[4]*y.Z,
		Y: t[3]*y.X + t[1]*y.Y + t[5]*y.Z,
		Z: t[4]*y.X + t[5]*y.Y + t[2]*y.Z,
	}
	if b.angular.Kind == PerAxis || b.l.AtTool {
		v = p.R.Apply(v)
	}
	if b.l.AtTool {
		v.X += b.r.Y*uz - b.r.Z*uy
		v.Y += b.r.Z*ux - b.r.X*uz
		v.Z += b.r.X*uy - b.r.Y*ux
	}
	return half + b.angular.reach(v.X, v.Y, v.Z)
}

// rates fills the largest rate of each leg over the case's speeds.
func (d *demand) rates(j *[36]float64, n int, out *[6]float64) {
	if !d.turns {
		for i := range n {
			if i > 5 {
				break
			}
			out[i] = d.linear.reach(j[6*i], j[6*i+1], j[6*i+2])
		}
		return
	}
	for i := range n {
		if i > 5 {
			break
		}
		r := (*[6]float64)(j[6*i : 6*i+6])
		out[i] = d.linear.reach(r[0], r[1], r[2]) + d.spin.reach(r[3], r[4], r[5])
	}
}

// followed is what of a set of angular accelerations a platform with the freedoms
// can follow: one that turns about z alone, only that component; one that cannot turn, nothing.
func followed(s Set, freedoms []kin.Freedom) Set {
	angular := 0
	for _, q := range freedoms {
		if q.Angular() {
			angular++
		}
	}
	switch {
	case s.Kind == None || angular == 0:
		return Set{}
	case angular == 1: // yaw
		return Set{Kind: PerAxis, Half: kin.Vec{Z: s.reach(0, 0, 1)}}
	}
	return s
}

// abs is the absolute value.
func abs(x float64) float64 { return math.Abs(x) }

func sub(a, b kin.Vec) kin.Vec { return kin.Vec{X: a.X - b.X, Y: a.Y - b.Y, Z: a.Z - b.Z} }

func scaled(s Set, k float64) Set {
	s.Radius *= k
	s.Half = kin.Vec{X: k * s.Half.X, Y: k * s.Half.Y, Z: k * s.Half.Z}
	return s
}

// turned is R I Rᵀ of a symmetric matrix (xx, yy, zz, xy, xz, yz).
func turned(r *kin.Rot, t *[6]float64) [6]float64 {
	m := kin.Rot{t[0], t[3], t[4], t[3], t[1], t[5], t[4], t[5], t[2]}
	a := r.Mul(&m)
	rt := kin.Rot{r[0], r[3], r[6], r[1], r[4], r[7], r[2], r[5], r[8]}
	b := a.Mul(&rt)
	return [6]float64{b[0], b[4], b[8], b[1], b[2], b[5]}
}
