package proof

import (
	"math/rand/v2"
	"testing"

	"legwright/kin"
	"legwright/kin/enclose"
	"legwright/objective"
)

// some gives a design of the family that reaches the starter's box well, with its task.
func some(t testing.TB, r *rand.Rand, f *kin.Family, measures ...string) (*objective.Task, []float64) {
	t.Helper()
	low := kin.Coords{}
	for q := range low {
		low[q] = -f.Starter.Box[q]
	}
	for range 5000 {
		values := make([]float64, len(f.Dimensions))
		for i := range f.Dimensions {
			d := &f.Dimensions[i]
			switch {
			case d.Optional:
				values[i] = d.Default
			case d.Unit == kin.Sign:
				values[i] = 1
			default:
				values[i] = d.Low + (0.2+0.6*r.Float64())*(d.High-d.Low)
			}
		}
		task := boxTask(objective.Box, low, f.Starter.Box)
		task.Cases, task.Gravity = loads(), kin.Vec{Z: -objective.Gravity}
		task.Legs = objective.Legs{Diameter: 0.5 * f.Starter.Diameter, RodDiameter: 0.02, Modulus: 210e9, EndFixity: 1}
		limited(task, f, measures...)
		v := newProber(mustSubject(task, f.Name, values))
		good := v.home != 0
		for range 100 {
			if !good {
				break
			}
			v.at(inside(r, &enclose.Box{Low: low, High: f.Starter.Box}), 0)
			if good = v.reached; good {
				ratio, sign := v.Singular()
				good = sign == v.home && ratio > 0.05 && v.Read(v.whole).Value > 0.02
			}
		}
		if good {
			return task, values
		}
	}
	t.Fatalf("%s: no design was found", f.Name)
	return nil, nil
}

var allMeasures = []string{"base_swing", "platform_swing", "leg_clearance", "conditioning", "regularity", "gain_least", "gain_most",
	"leg_force", "motor_torque", "push_force", "pull_force", "leg_speed", "motor_speed", "leg_power", "buckling_margin", "parasitic_motion", "parasitic_turn"}

// Poses of a zone never contradict what was proved of it. The limits are 3 % beyond the worst that the search meets.
func TestPosesDoNotContradict(t *testing.T) {
	poses, boxes := 1000, int64(2000)
	if !testing.Short() {
		poses, boxes = 1e6, 30000
	}
	r := rand.New(rand.NewPCG(3, 14))
	for _, f := range kin.Families() {
		task, values := some(t, r, f, allMeasures...)
		p := slackened(t, task, f.Name, values, 0.03, allMeasuresOf(f)...)
		res := prove(t, task, p, values, Settings{Workers: 1, Boxes: boxes})
		s := mustSubject(task, f.Name, values)
		v := newProber(s)
		for i := range s.props {
			s.props[i] = res.Outcomes[i].Property
		}
		box := enclose.Box{Low: task.Zones[0].Low, High: task.Zones[0].High}
		proved := 0
		for i := range res.Outcomes {
			if res.Outcomes[i].Answer == Proved {
				proved++
			}
		}
		if proved < len(res.Outcomes)/3 {
			report(t, res)
			t.Errorf("%s: %d of %d proved", f.Name, proved, len(res.Outcomes))
		}
		if res.Answer != Proved && testing.Verbose() {
			report(t, res)
		}
		t.Logf("%s: %v, %d of %d proved, %d boxes", f.Name, res.Answer, proved, len(res.Outcomes), res.Boxes)
		for range poses {
			v.at(inside(r, &box), 0)
			for i := range res.Outcomes {
				o := &res.Outcomes[i]
				if o.Answer != Proved {
					continue
				}
				var c Counter
				if v.refutes(i, &c) || o.worse(c.Value, o.Bound) && o.worse(c.Value*(1-1e-12), o.Bound) && o.worse(c.Value*(1+1e-12), o.Bound) {
					t.Fatalf("%s: %s is proved to %.17g, and %.17g is met at %v", f.Name, o.Name, o.Bound, c.Value, c.Pose)
				}
			}
		}
	}
}

func allMeasuresOf(f *kin.Family) (out []string) {
	for _, n := range allMeasures {
		if m := objective.MeasureNamed(n); m.Has == nil || m.Has(f) {
			out = append(out, n)
		}
	}
	return out
}

// A payload off the centre of a levelled arm turns by half a turn either way, on which the inverse Jacobian does not depend:
// boxes are split along that coordinate too.
func TestTurnOfPayloadIsSplit(t *testing.T) {
	f := kin.FamilyNamed("level-arm")
	task, values := some(t, rand.New(rand.NewPCG(3, 14)), f)
	task.Tool = kin.Vec{}
	p := slackened(t, task, f.Name, values, 0.03, "motor_torque", "leg_power")
	r := prove(t, task, p, values, Settings{Workers: 1, Boxes: 3000})
	if r.Answer != Proved {
		report(t, r)
		t.Error("it is not proved")
	}
}
