package objective

import (
	"math"

	"legwright/kin"
	"legwright/kin/linalg"
)

// maxCorners bounds the number of box components whose corners are all tried.
const maxCorners = 12

func deflection() *Measure {
	return &Measure{
		Name: "deflection", Unit: Metre, Sense: Smaller, Need: NeedMatrix,
		Text:   "largest displacement of the tool point under the cases' loads: exact over per-axis sets (up to 12 components, their corners), a bound over sets of given magnitude",
		Source: "linear elastic legs, rigid plates (common practice, no source)",
		Inputs: []string{"actuator.stiffness"}, Lost: inf(),
		Scan: func(v *View, w *Worst) {
			for _, c := range v.active[v.pose.Zone] {
				if d := v.deflect(&v.demands[c]); d > w.Value {
					w.set(v, d, -1, c)
				}
			}
		},
	}
}

// deflect sums the displacement of the nominal wrench, the worst corner of the
// per-axis sets and the sharpest bound of each magnitude set.
func (v *View) deflect(d *demand) float64 {
	if v.sign == 0 {
		return inf()
	}
	// flex is the 3×6 map from a wrench (moments over Lc) to the tool point's displacement.
	var flex [18]float64
	for i := range v.n {
		c := v.compliance(i)
		for k := range 3 {
			for q := range 6 {
				flex[6*k+q] += c * v.x[6*k+i] * v.x[6*q+i]
			}
		}
	}
	move := func(w *[6]float64) (s kin.Vec) {
		var o [3]float64
		for k := range o {
			for q, f := range w {
				o[k] += flex[6*k+q] * f
			}
		}
		return kin.Vec{X: o[0], Y: o[1], Z: o[2]}
	}
	w := d.wrench(v.stand, v.task.Gravity, v.invLc)
	mid := move(&w)
	var corner [maxCorners]kin.Vec
	corners, extra := 0, 0.0
	generators(d, v.stand, v.invLc, func(kind SetKind, radius float64, g [3][6]float64) {
		var s [3]kin.Vec
		for k := range g {
			s[k] = move(&g[k])
		}
		if kind == PerAxis {
			for k := range s {
				switch {
				case s[k] == kin.Vec{}:
				case corners == maxCorners:
					extra += norm(s[k])
				default:
					corner[corners] = s[k]
					corners++
				}
			}
			return
		}
		var a [6]float64 // sᵀ s: its largest eigenvalue is the squared norm of the map
		for k := range s {
			a[0] += s[k].X * s[k].X
			a[1] += s[k].Y * s[k].Y
			a[2] += s[k].Z * s[k].Z
			a[3] += s[k].X * s[k].Y
			a[4] += s[k].X * s[k].Z
			a[5] += s[k].Y * s[k].Z
		}
		extra += radius * math.Sqrt(linalg.Sym3Largest(&a))
	})
	worst := 0.0
	for n := range 1 << corners {
		s := mid
		for k, c := range corner[:corners] {
			if n>>k&1 == 1 {
				c = kin.Vec{X: -c.X, Y: -c.Y, Z: -c.Z}
			}
			s = kin.Vec{X: s.X + c.X, Y: s.Y + c.Y, Z: s.Z + c.Z}
		}
		worst = math.Max(worst, norm(s))
	}
	return worst + extra
}

func norm(v kin.Vec) float64 { return math.Sqrt(v.X*v.X + v.Y*v.Y + v.Z*v.Z) }

// generators calls f with the three wrenches (moments over Lc) that span each
// set of the case at the pose: for PerAxis they are the half ranges themselves,
// for AnyWay they belong to unit vectors and radius is the magnitude.
func generators(d *demand, p *kin.Pose, inv float64, f func(kind SetKind, radius float64, g [3][6]float64)) {
	for first := 0; first < 6; first += 3 {
		var g [3][6]float64
		for k := range g {
			g[k][first+k] = d.dw[first+k]
		}
		f(PerAxis, 1, g)
	}
	at := func(force, r kin.Vec) [6]float64 {
		return [6]float64{force.X, force.Y, force.Z,
			(r.Y*force.Z - r.Z*force.Y) * inv, (r.Z*force.X - r.X*force.Z) * inv, (r.X*force.Y - r.Y*force.X) * inv}
	}
	span := func(s *Set, wrench func(unit kin.Vec) [6]float64) {
		half := s.Half
		if s.Kind == AnyWay {
			half = kin.Vec{X: 1, Y: 1, Z: 1}
		}
		if s.Kind == None {
			return
		}
		f(s.Kind, s.Radius, [3][6]float64{
			wrench(kin.Vec{X: half.X}), wrench(kin.Vec{Y: half.Y}), wrench(kin.Vec{Z: half.Z})})
	}
	for i := range d.point {
		q := &d.point[i]
		span(&Set{Kind: PerAxis, Half: q.l.ForceSpread}, func(u kin.Vec) [6]float64 { return at(u, q.r) })
	}
	for i := range d.body {
		b := &d.body[i]
		m := b.l.Mass
		push := func(a kin.Vec) [6]float64 { return at(kin.Vec{X: m * a.X, Y: m * a.Y, Z: m * a.Z}, b.r) }
		span(&b.l.Linear, push)
		inertia := turned(&p.R, &b.inertia)
		span(&b.angular, func(a kin.Vec) [6]float64 {
			t := &inertia
			w := [6]float64{0, 0, 0,
				(t[0]*a.X + t[3]*a.Y + t[4]*a.Z) * inv,
				(t[3]*a.X + t[1]*a.Y + t[5]*a.Z) * inv,
				(t[4]*a.X + t[5]*a.Y + t[2]*a.Z) * inv}
			if b.l.AtTool { // the mass centre gains α × r
				e := push(kin.Vec{X: a.Y*b.r.Z - a.Z*b.r.Y, Y: a.Z*b.r.X - a.X*b.r.Z, Z: a.X*b.r.Y - a.Y*b.r.X})
				for k := range w {
					w[k] += e[k]
				}
			}
			return w
		})
	}
}
