package objective

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// tripod is a task of poses of a 3-RPS, their loads without sets, and a random machine.
func tripod(rng *rand.Rand) (*Task, *kin.Family, kin.Machine) {
	f := kin.FamilyNamed("3-RPS")
	task := richTask(rng, f)
	task.Zones = []Zone{listed(rng, f, 1.5, 8)}
	loads := randomLoads(rng, func(*rand.Rand, float64) Set { return Set{} })
	for i := range loads {
		loads[i].ForceSpread, loads[i].MomentSpread = kin.Vec{}, kin.Vec{}
	}
	task.Cases = []Case{{Loads: loads}}
	task.Prepare()
	d := randomDesign(rng, f)
	for i := range 3 { // legs anywhere around
		d[f.Index("leg_azimuths_1")+i] += between(rng, -30, 30) * deg
	}
	return task, f, sizedPlan(task, f, d).build(task, d)
}

// settledCoords are the coordinates that the platform takes.
func settledCoords(m kin.Machine, c kin.Coords) kin.Coords {
	p := kin.NewPose(c)
	return kin.Settle(m, &p).Coords()
}

// Efforts of a platform whose x, y and yaw follow from its tilt are the actuator part of the equilibrium of
// all six forces at the spherical joints, three along the legs and three along the
// revolute axes, by gonum's LU from the joint centres. Poses are told without x, y and yaw. 1e-10 of the largest.
// Regularity is σmin/σmax of these six (Joshi and Tsai 2002), by gonum's SVD. 1e-10 relative.
func TestEffortsOfATiedPlatform(t *testing.T) {
	rng := seeded(201)
	for range 20 {
		task, f, m := tripod(rng)
		for _, c := range task.Zones[0].Poses {
			s := staticsOf(m.Frame(), settledCoords(m, c))
			six := mat.NewDense(6, 6, nil)
			for i := range 3 {
				a := m.Frame().Base[i]
				r := norm(a)
				along := kin.Vec{X: -a.Y / r, Y: a.X / r}
				mo := crossed(s.rot.Apply(sub(m.Frame().Platform[i], m.Frame().Tool)), along)
				six.SetRow(i, s.jac.RawRowView(i))
				six.SetRow(3+i, []float64{along.X, along.Y, 0, mo.X, mo.Y, mo.Z})
			}
			loads := task.Cases[0].Loads
			w := s.wrench(task, loads, make([]scene, len(loads)))
			var want mat.VecDense
			if err := want.SolveVec(six.T(), mat.NewVecDense(6, w[:])); err != nil {
				t.Fatal(err)
			}
			for i := range 6 {
				for k := 3; k < 6; k++ {
					six.Set(i, k, six.At(i, k)/task.Length)
				}
			}
			v := newView(task)
			v.begin(m)
			v.at(&Sample{Coords: c, Pose: kin.NewPose(c)}, 0, NeedMatrix)
			if got, want := v.whole(), inverseKappa(t, six); !same(got, want, 1e-10) {
				t.Errorf("regularity %.15g, want %.15g", got, want)
			}
			lo, hi := bounds(task, m, c, 0)
			scale := mat.Norm(&want, math.Inf(1))
			for i := range f.Legs {
				near(t, "effort", hi[i], want.AtVec(i), 1e-10*scale)
				near(t, "effort", lo[i], want.AtVec(i), 1e-10*scale)
			}
		}
	}
}

// Power balance with the tied motion: Σ effort · rate is the wrench on the motion of the tool point that Place
// shows for small steps in the platform's own freedoms (differences of fourth order). 1e-8 of the parts' sum.
func TestPowerBalanceOfATiedPlatform(t *testing.T) {
	rng := seeded(202)
	for range 20 {
		task, f, m := tripod(rng)
		fr := m.Frame()
		for _, c := range task.Zones[0].Poses {
			p := kin.NewPose(settledCoords(m, c))
			own := kin.Vec{X: between(rng, -1, 1), Y: between(rng, -1, 1), Z: between(rng, -0.3, 0.3)} // ωx, ωy, vz
			at := func(h float64) (tool kin.Vec, rot kin.Rot) {
				e := kin.Exp(kin.Vec{X: h * own.X, Y: h * own.Y})
				q := kin.Pose{P: kin.Vec{X: p.P.X, Y: p.P.Y, Z: p.P.Z + h*own.Z}, R: e.Mul(&p.R)}
				origin, rot := m.Place(&q)
				r := rot.Apply(fr.Tool)
				return kin.Vec{X: origin.X + r.X, Y: origin.Y + r.Y, Z: origin.Z + r.Z}, rot
			}
			_, here := at(0)
			var twist [6]float64
			const h = 1e-4
			for _, x := range []struct{ loc, coeff float64 }{{-2, 1. / 12}, {-1, -8. / 12}, {1, 8. / 12}, {2, -1. / 12}} {
				tool, rot := at(x.loc * h)
				back := kin.Rot{here[0], here[3], here[6], here[1], here[4], here[7], here[2], here[5], here[8]}
				e := rot.Mul(&back)
				for k, v := range [6]float64{tool.X, tool.Y, tool.Z, (e[7] - e[5]) / 2, (e[2] - e[6]) / 2, (e[3] - e[1]) / 2} {
					twist[k] += x.coeff * v / h
				}
			}
			loads := task.Cases[0].Loads
			w := staticsOf(fr, p.Coords()).wrench(task, loads, make([]scene, len(loads)))
			_, effort := bounds(task, m, c, 0)
			var s kin.State
			m.Move(&p, &s)
			power, want, size := 0.0, 0.0, 0.0
			for i := range f.Legs {
				rate := s.J[6*i+2]*own.Z + fr.Length*(s.J[6*i+3]*own.X+s.J[6*i+4]*own.Y)
				power += effort[i] * rate
				size += math.Abs(effort[i] * rate)
			}
			for k := range w {
				want += w[k] * twist[k]
				size += math.Abs(w[k] * twist[k])
			}
			near(t, "power", power, want, 1e-8*size)
		}
	}
}

// E3 (Bonev 2002) and the family's definition, for legs 120° apart: a tilt by θ moves the origin by
// (r/2)(1-cos θ) and turns it by |atan(sin pitch sin roll/(cos pitch + cos roll))|. The worst over
// lists of poses, and the poses that have it. 1e-14.
func TestParasiticMeasures(t *testing.T) {
	f := kin.FamilyNamed("3-RPS")
	rng := seeded(203)
	for range 20 {
		task := richTask(rng, f)
		task.Zones = []Zone{listed(rng, f, 2, 40)}
		task.Cases = nil
		task.Prepare()
		d := randomDesign(rng, f)
		a := appraise(task, f, d)
		motion, turn := 0.0, 0.0
		var moved, turned kin.Coords
		for _, c := range task.Zones[0].Poses {
			cos := math.Cos(c[kin.Roll]) * math.Cos(c[kin.Pitch]) // of the tilt
			if k := d[f.Index("platform_radius")] / 2 * (1 - cos); k > motion {
				motion, moved = k, c
			}
			yaw := math.Abs(math.Atan(math.Sin(c[kin.Pitch]) * math.Sin(c[kin.Roll]) / (math.Cos(c[kin.Pitch]) + math.Cos(c[kin.Roll]))))
			if yaw > turn {
				turn, turned = yaw, c
			}
		}
		near(t, "parasitic_motion", value(t, a, "parasitic_motion"), motion, 1e-14)
		near(t, "parasitic_turn", value(t, a, "parasitic_turn"), turn, 1e-14)
		if a.Reading("parasitic_motion").Pose.Coords != moved || a.Reading("parasitic_turn").Pose.Coords != turned {
			t.Error("the worst poses are others")
		}
	}
	for _, g := range kin.Families() {
		if has := measured(t, "parasitic_motion").Has(g); has != (g.Name == "3-RPS") {
			t.Errorf("%s has parasitic motion: %v", g.Name, has)
		}
	}
}

// position_error and angle_error hold for the whole motion of the tool, parasitic parts included: against exact
// forward kinematics over all signs, to first order as in TestErrorsByForwardKinematics.
func TestErrorsOfATiedPlatform(t *testing.T) {
	rng := seeded(204)
	for range 8 {
		task, _, m := tripod(rng)
		c := task.Zones[0].Poses[0]
		p := kin.NewPose(settledCoords(m, c))
		v := newView(task)
		v.begin(m)
		v.at(&Sample{Coords: c, Pose: kin.NewPose(c)}, 0, NeedMatrix)
		off := [2][2]float64{}
		for k, e := range [2]float64{1e-4, 1e-5} {
			task.Actuator.Error = e
			shift, turn := tiedErrors(t, m, p, e)
			off[k] = [2]float64{v.worstShift(0, 1)/shift - 1, v.worstShift(3, v.invLc)/turn - 1}
		}
		for i, name := range [2]string{"position_error", "angle_error"} {
			if math.Abs(off[1][i]) > 1e-3 || math.Abs(off[1][i]) > 0.15*math.Abs(off[0][i])+1e-7 {
				t.Errorf("%s differs from the exact one by %.2g at 0.1 mm, %.2g at 0.01 mm", name, off[0][i], off[1][i])
			}
		}
	}
}

// The deflection is how far the tool moves where each leg gives way to its effort: by exact forward
// kinematics, first order in some 10 µm: 1e-3.
func TestDeflectionOfATiedPlatform(t *testing.T) {
	rng := seeded(205)
	for range 20 {
		task, f, m := tripod(rng)
		task.Legs.RodDiameter = 0
		c := task.Zones[0].Poses[0]
		p := kin.NewPose(settledCoords(m, c))
		v := newView(task)
		v.begin(m)
		v.at(&Sample{Coords: c, Pose: kin.NewPose(c)}, 0, NeedMatrix|NeedEfforts)
		q := make([]float64, f.Legs)
		for i := range q {
			q[i] = v.S.Q[i] - v.hi[0][i]*(1/task.Actuator.Stiffness+1/task.Joints.Stiffness)
		}
		got, ok := kin.Locate(m, q, p)
		if !ok {
			t.Fatal("not located")
		}
		if d, want := v.deflect(&v.demands[0]), norm(sub(got.Pose.P, p.P)); !same(d, want, 1e-3) {
			t.Errorf("deflection %g, want %g", d, want)
		}
	}
}

// tiedErrors solves the forward kinematics for every pattern of signs.
func tiedErrors(t *testing.T, m kin.Machine, from kin.Pose, e float64) (shift, turn float64) {
	var s kin.State
	m.Move(&from, &s)
	back := kin.Rot{from.R[0], from.R[3], from.R[6], from.R[1], from.R[4], from.R[7], from.R[2], from.R[5], from.R[8]}
	for pattern := range 8 {
		q := []float64{s.Q[0] - e, s.Q[1] - e, s.Q[2] - e}
		for i := range q {
			q[i] += 2 * e * float64(pattern>>i&1)
		}
		p, ok := kin.Locate(m, q, from)
		if !ok {
			t.Fatalf("no pose for errors %d", pattern)
		}
		r := p.Pose.R.Mul(&back)
		shift = math.Max(shift, norm(sub(p.Pose.P, from.P)))
		turn = math.Max(turn, norm(kin.Vec{X: r[7] - r[5], Y: r[2] - r[6], Z: r[3] - r[1]})/2)
	}
	return shift, turn
}
