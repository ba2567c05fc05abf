package objective

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// statics is an independent statement of one pose, from the joint centres alone: the
// inverse Jacobian with rotations in radians, and the platform's rotation.
type statics struct {
	f    *kin.Frame
	rot  kin.Rot
	jac  *mat.Dense // n×6
	own  *mat.Dense // n×n
	leng []float64
}

func staticsOf(f *kin.Frame, c kin.Coords) *statics {
	p := kin.NewPose(c)
	origin, rot := f.Place(&p)
	n := f.Legs()
	s := &statics{f: f, rot: rot, jac: mat.NewDense(n, 6, nil), own: mat.NewDense(n, n, nil)}
	for i := range n {
		b := rot.Apply(f.Platform[i])
		r := rot.Apply(sub(f.Platform[i], f.Tool))
		d := kin.Vec{X: origin.X + b.X - f.Base[i].X, Y: origin.Y + b.Y - f.Base[i].Y, Z: origin.Z + b.Z - f.Base[i].Z}
		l := norm(d)
		u := kin.Vec{X: d.X / l, Y: d.Y / l, Z: d.Z / l}
		m := crossed(r, u)
		s.jac.SetRow(i, []float64{u.X, u.Y, u.Z, m.X, m.Y, m.Z})
		s.leng = append(s.leng, l)
		for k, q := range f.Freedoms {
			s.own.Set(i, k, s.jac.At(i, int(q)))
		}
	}
	return s
}

func crossed(a, b kin.Vec) kin.Vec {
	return kin.Vec{X: a.Y*b.Z - a.Z*b.Y, Y: a.Z*b.X - a.X*b.Z, Z: a.X*b.Y - a.Y*b.X}
}

// efforts solves Jᵀ τ = w in the family's own freedoms.
func (s *statics) efforts(t testing.TB, w [6]float64) []float64 {
	rhs := mat.NewVecDense(len(s.f.Freedoms), nil)
	for k, q := range s.f.Freedoms {
		rhs.SetVec(k, w[q])
	}
	var x mat.VecDense
	if err := x.SolveVec(s.own.T(), rhs); err != nil {
		t.Fatal(err)
	}
	return x.RawVector().Data
}

// scene is a choice out of every set of one load: accelerations, and departures of force and moment.
type scene struct{ a, alpha, force, moment kin.Vec }

// wrench is what the actuators must exert for the loads, as the contract states it: f = m (a − g),
// m = r × f + R I Rᵀ α, less the forces and moments that the surroundings apply.
func (s *statics) wrench(task *Task, loads []Load, at []scene) (w [6]float64) {
	add := func(f, r, m kin.Vec) {
		c := crossed(r, f)
		for k, v := range [6]float64{f.X, f.Y, f.Z, c.X + m.X, c.Y + m.Y, c.Z + m.Z} {
			w[k] += v
		}
	}
	for i := range loads {
		l, sc := &loads[i], at[i]
		r := s.rot.Apply(sub(l.Centre, s.f.Tool))
		a := sc.a
		if l.AtTool {
			c := crossed(sc.alpha, r)
			a = kin.Vec{X: a.X + c.X, Y: a.Y + c.Y, Z: a.Z + c.Z}
		}
		g := task.Gravity
		t := &l.Inertia
		y := s.rot.Unapply(sc.alpha)
		spin := s.rot.Apply(kin.Vec{
			X: t[0]*y.X + t[3]*y.Y + t[4]*y.Z,
			Y: t[3]*y.X + t[1]*y.Y + t[5]*y.Z,
			Z: t[4]*y.X + t[5]*y.Y + t[2]*y.Z})
		add(kin.Vec{X: l.Mass * (a.X - g.X), Y: l.Mass * (a.Y - g.Y), Z: l.Mass * (a.Z - g.Z)}, r, spin)
		q := kin.Vec{}
		if l.Off {
			q = s.rot.Apply(sub(l.At, s.f.Tool))
		}
		add(kin.Vec{X: -l.Force.X - sc.force.X, Y: -l.Force.Y - sc.force.Y, Z: -l.Force.Z - sc.force.Z}, q,
			kin.Vec{X: -l.Moment.X - sc.moment.X, Y: -l.Moment.Y - sc.moment.Y, Z: -l.Moment.Z - sc.moment.Z})
	}
	return w
}

// draw is a random vector of the set; push the one that goes farthest along e.
func draw(rng *rand.Rand, s *Set) kin.Vec {
	switch s.Kind {
	case AnyWay:
		v := within(rng, 1)
		k := s.Radius * rng.Float64() / norm(v)
		return kin.Vec{X: k * v.X, Y: k * v.Y, Z: k * v.Z}
	case PerAxis:
		return kin.Vec{X: s.Half.X * between(rng, -1, 1), Y: s.Half.Y * between(rng, -1, 1), Z: s.Half.Z * between(rng, -1, 1)}
	}
	return kin.Vec{}
}

func push(s *Set, e kin.Vec) kin.Vec {
	switch s.Kind {
	case AnyWay:
		if n := norm(e); n > 0 {
			return kin.Vec{X: s.Radius * e.X / n, Y: s.Radius * e.Y / n, Z: s.Radius * e.Z / n}
		}
	case PerAxis:
		return kin.Vec{X: math.Copysign(s.Half.X, e.X), Y: math.Copysign(s.Half.Y, e.Y), Z: math.Copysign(s.Half.Z, e.Z)}
	}
	return kin.Vec{}
}

// able leaves of an acceleration what the family can do: a planar stage turns about z alone.
func able(f *kin.Frame, alpha kin.Vec) kin.Vec {
	if len(f.Freedoms) == 3 {
		return kin.Vec{Z: alpha.Z}
	}
	return alpha
}

// setsOf are the four sets of a load, in the order of a scene.
func setsOf(l *Load) [4]*Set {
	return [4]*Set{&l.Linear, &l.Angular, {Kind: PerAxis, Half: l.ForceSpread}, {Kind: PerAxis, Half: l.MomentSpread}}
}

func (s *scene) parts() [4]*kin.Vec { return [4]*kin.Vec{&s.a, &s.alpha, &s.force, &s.moment} }

// bounds are the efforts by the package at one pose.
func bounds(task *Task, m kin.Machine, c kin.Coords, cs int) (lo, hi [6]float64) {
	v := newView(task)
	v.begin(m)
	v.keep = math.Inf(1)
	v.at(&Sample{Coords: c, Pose: kin.NewPose(c)}, 0, NeedEfforts|NeedRates)
	return v.lo[cs], v.hi[cs]
}

// The efforts are exact over every set: random vectors of the sets never pass them, and the
// vectors farthest along the gradient of each leg's effort attain them. Efforts by gonum's LU from the
// joint centres; 1e-11 of the largest effort (the LU's rounding times the condition number).
func TestEffortsAreExactOverSets(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(61)
		for round := range 24 {
			set := []func(*rand.Rand, float64) Set{anyWay, perAxis}[round%2]
			task := richTask(rng, f)
			task.Zones = []Zone{{Kind: Listed}}
			task.Cases = []Case{{Loads: randomLoads(rng, set)}}
			loads := task.Cases[0].Loads
			task.Gravity = kin.Vec{X: 1, Y: -2, Z: -9}
			m := sizedPlan(task, f, soundDesign(f)).build(task, randomDesign(rng, f))
			c := randomCoords(rng, f, 1)
			lo, hi := bounds(task, m, c, 0)
			s := staticsOf(m.Frame(), c)
			tau := func(at []scene) []float64 {
				for i := range at {
					at[i].alpha = able(s.f, at[i].alpha)
				}
				return s.efforts(t, s.wrench(task, loads, at))
			}
			at := make([]scene, len(loads))
			mid := tau(at)
			scale := 0.0
			for i := range f.Legs {
				scale = math.Max(scale, largest(lo[i], hi[i]))
			}
			// the gradient of each leg's effort, part by part: the effort is affine in them
			grad := make([][4][3][]float64, len(loads))
			for l := range loads {
				for p := range 4 {
					for k := range 3 {
						one := make([]scene, len(loads))
						component(one[l].parts()[p], k)
						e := tau(one)
						for i := range e {
							e[i] -= mid[i]
						}
						grad[l][p][k] = e
					}
				}
			}
			for i := range f.Legs {
				for _, sign := range [2]float64{1, -1} {
					best := make([]scene, len(loads))
					for l := range loads {
						for p, set := range setsOf(&loads[l]) {
							g := &grad[l][p]
							*best[l].parts()[p] = push(set, kin.Vec{X: sign * g[0][i], Y: sign * g[1][i], Z: sign * g[2][i]})
						}
					}
					want := hi[i]
					if sign < 0 {
						want = lo[i]
					}
					near(t, "effort at the farthest vectors", tau(best)[i], want, 1e-11*scale)
				}
			}
			for range 50 {
				for l := range loads {
					for p, set := range setsOf(&loads[l]) {
						*at[l].parts()[p] = draw(rng, set)
					}
				}
				for i, e := range tau(at) {
					if e > hi[i]+1e-11*scale || e < lo[i]-1e-11*scale {
						t.Fatalf("round %d, leg %d: effort %g is outside [%g, %g]", round, i+1, e, lo[i], hi[i])
					}
				}
			}
			if t.Failed() {
				return
			}
		}
	})
}

// component sets one component of a vector to 1.
func component(v *kin.Vec, k int) {
	switch k {
	case 0:
		v.X = 1
	case 1:
		v.Y = 1
	case 2:
		v.Z = 1
	}
}
