package objective

import (
	"math"

	"legwright/kin"
)

// Probe evaluates one design in plain arithmetic at single poses, wherever they are wanted. It is scratch for one
// goroutine.
type Probe struct {
	task    *Task
	v       *View
	sample  Sample
	reached bool
}

// NewProbe makes a probe of the design with the dimension values, of which sized ones are not looked at.
func NewProbe(t *Task, p *Plan, values []float64) *Probe {
	b := &Probe{task: t, v: newView(t)}
	b.v.serve(p.Family)
	b.v.begin(p.build(t, values))
	return b
}

// Machine is the design's machine.
func (b *Probe) Machine() kin.Machine { return b.v.machine }

// Home gives the actuator coordinates at home and the sign of the determinant there, 0 where home is singular
// or has no posture.
func (b *Probe) Home() (q [6]float64, sign int) { return b.v.homeQ, b.v.homeSign }

// At moves to a pose of the zone, or of none (with all cases) where zone is -1, and tells whether it has a posture; Fault then tells why not.
func (b *Probe) At(c kin.Coords, zone int) bool {
	if zone < 0 {
		zone = len(b.task.Zones)
	}
	b.sample = Sample{Coords: c, Pose: kin.NewPose(c), Zone: zone}
	b.v.keep, b.v.near = math.Inf(1), math.Inf(1)
	b.reached = b.v.at(&b.sample, -1, NeedMatrix|NeedEfforts|NeedRates|NeedGap|NeedExact)
	return b.reached
}

// Fault is the leg that failed at the pose, or -1, and the passive part at its stop, or "".
func (b *Probe) Fault() (leg int, what string) { return b.v.S.Leg, b.v.S.What }

// Q are the actuator coordinates at the pose.
func (b *Probe) Q() [6]float64 { return b.v.S.Q }

// Singular gives 1/kappa of the inverse Jacobian at the pose and the sign of its determinant.
func (b *Probe) Singular() (conditioning float64, sign int) { return math.Sqrt(b.v.ratio2), b.v.sign }

// Read gives a measure's value at the pose, with the leg, its mate and the case that decide it.
func (b *Probe) Read(m *Measure) Worst {
	t := tracker{m: m}
	t.reset()
	if b.reached {
		m.Scan(b.v, &t.w)
	} else {
		m.lost(b.v, &t.w)
	}
	t.w.Value = m.value(&t.w)
	return t.w
}

// Moving lists the coordinates that change within the zone.
func (z *Zone) Moving() []int { return z.moving() }

// Resting is home, but for the coordinates that the zone fixes elsewhere.
func (z *Zone) Resting() kin.Coords { return z.fixed() }

// RangeOf gives the places of the dimensions that bound the actuators' range, -1 where the family has none.
func (p *Plan) RangeOf() (least, span int) { return p.least, p.span }

// Derived tells whether dimension i is found from the duty.
func (p *Plan) Derived(i int) bool { return p.derived(i) }

// Resize finds the derived dimensions of the actuator range anew, from the least and the greatest coordinate needed.
func (p *Plan) Resize(a *Actuator, least, most float64, values []float64) {
	p.size(a, least, most, values)
}

// Scale is the unit in which excesses over the limit are counted: its bound, or a scale of its measure where that is 0.
func (l *Limit) Scale(t *Task) float64 {
	if l.Bound != 0 {
		return math.Abs(l.Bound)
	}
	if l.Measure.Scale != nil {
		return l.Measure.Scale(t)
	}
	return 1
}

// PerPose tells whether a limit on the measure is one on every pose by itself.
func (m *Measure) PerPose() bool { return m.perPose() }

// Strict is the task with every pose counting, whatever coverage it asks for.
func (t *Task) Strict() *Task {
	s := *t
	s.Coverage, s.CoverageGoal = 1, false
	return &s
}
