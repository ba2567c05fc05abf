package proof

import (
	"math"

	"legwright/kin"
	"legwright/objective"
)

// prober looks at single poses in plain arithmetic.
type prober struct {
	*subject
	*objective.Probe
	signs   *certifier
	home    int // sign of the determinant at home
	pose    kin.Coords
	zone    int
	reached bool
	cond    *objective.Measure
	whole   *objective.Measure
}

func newProber(s *subject) *prober {
	v := &prober{subject: s, Probe: objective.NewProbe(s.task, s.plan, s.values), signs: newCertifier(s),
		cond: objective.MeasureNamed("conditioning"), whole: objective.MeasureNamed("regularity")}
	_, v.home = v.Home()
	return v
}

// at moves to a pose.
func (v *prober) at(c kin.Coords, zone int) {
	v.pose, v.zone = c, zone
	v.reached = v.At(c, zone)
}

// refutes tells whether property i fails at the pose by more than rounding, and then describes it.
func (v *prober) refutes(i int, c *Counter) bool {
	p := &v.props[i]
	*c = Counter{Pose: v.pose, Zone: v.zone, Leg: -1, Mate: -1, Case: -1}
	if !v.reached {
		if p.kind != reach {
			return false
		}
		c.Leg, c.What = v.Fault()
		return true
	}
	switch p.kind {
	case reach:
		return false
	case shortest, longest:
		q := v.Q()
		c.Value = q[0]
		for l := range v.ranged {
			if c.Leg < 0 || p.worse(q[l], c.Value) {
				c.Value, c.Leg = q[l], l
			}
		}
		return p.off(c.Value) > objective.Tolerance*math.Max(1, math.Abs(p.Limit)/p.Scale)
	case regular:
		ratio, sign := v.Singular()
		c.Value = ratio
		if ratio < v.task.Singular {
			return true
		}
		if sign != v.home && v.home != 0 && v.signs.sign(v.pose) == -v.home && v.signs.sign(kin.Coords{}) == v.home {
			c.Other = new(kin.Coords)
			return true
		}
		return false
	case held:
		w := v.Read(v.whole)
		c.Value = w.Value
		return w.Value < v.task.Singular
	}
	w := v.Read(p.Measure)
	c.Value, c.Leg, c.Mate, c.Case = w.Value, w.Leg, w.Mate, w.Case
	return p.off(w.Value) > objective.Tolerance
}

// doubtful tells whether the determinant at the pose, which has a posture, is not beyond doubt of the same sign as at home.
func (v *prober) doubtful() bool {
	return v.reached && (v.home == 0 || v.signs.sign(v.pose) != v.home)
}

// signsOf looks at the listed poses of a zone, and at that of one in which nothing moves, for the sign of the determinant: one that
// is in doubt leaves property i open.
func (p *prover) signsOf(i, zone int, v *prober) {
	z := &p.task.Zones[zone]
	poses := z.Poses
	if z.Kind != objective.Listed {
		if len(z.Moving()) > 0 {
			return
		}
		poses = []kin.Coords{z.Resting()}
	}
	for _, c := range poses {
		if v.at(c, zone); v.reached {
			p.meet(i, v)
			if v.doubtful() {
				p.unsettled |= 1 << i
			}
		}
	}
}

// easyGap is the relative distance from which on limits of coordinates, swings and rates are proved as they are,
// whatever the gap: few boxes do.
const easyGap = 1e-4

// search drives every property to its worst over every zone and home, and refutes what fails there. What is left is
// proved of its limit or, where the worst value comes nearer to that than the gap, of the limit moved out by the gap.
func (p *prover) search(gap float64) {
	r := objective.NewRefiner(p.task, p.plan.Family)
	r.Begin(p.machine)
	v := p.probe[0]
	for i := range p.props {
		o := &p.out[i]
		o.Found = math.NaN()
		for z := range p.task.Zones {
			if p.props[i].kind == regular {
				p.signsOf(i, z, v)
			}
			for _, q := range p.drives(&p.props[i]) {
				if p.stop() {
					p.unsettled |= p.alive // not looked at: single poses are not looked at elsewhere
					break
				}
				if e, ok := r.Worst(z, q); ok {
					v.at(e.Sample.Coords, z)
					p.meet(i, v)
				}
			}
		}
		if k := p.props[i].kind; k <= regular {
			v.at(kin.Coords{}, -1)
			p.meet(i, v)
		}
		o.Target, o.Gapped = o.Limit, false
		near := gap
		if o.kind <= longest || o.kind == baseSwing || o.kind == otherSwing || o.kind == drift || o.kind == twist || o.kind == rate {
			near = min(gap, easyGap)
		}
		if o.Bounded && o.off(o.Found) > -near {
			o.Target, o.Gapped = o.within(gap), true
		}
	}
}

// drives are the searches that may refute a property.
func (p *prover) drives(q *Property) (out []objective.Property) {
	switch q.kind {
	case reach, shortest, longest:
		for l := range p.legs {
			if q.kind == reach || l < p.ranged {
				out = append(out, objective.Property{Leg: l, Most: q.kind != shortest})
			}
		}
	case regular:
		out = append(out, objective.Property{Measure: p.probe[0].cond})
	case held:
		out = append(out, objective.Property{Measure: p.probe[0].whole})
	default:
		out = append(out, objective.Property{Measure: q.Measure})
	}
	return out
}

// meet takes note of property i at the pose in work.
func (p *prover) meet(i int, v *prober) {
	o := &p.out[i]
	var c Counter
	bad := v.refutes(i, &c)
	if !v.reached && !bad {
		return
	}
	worst := math.IsNaN(o.Found) || o.worse(c.Value, o.Found)
	if bad && o.Answer != Refuted || (bad || o.Answer != Refuted) && worst {
		o.Found, o.At = c.Value, &c
	}
	if bad {
		o.Answer = Refuted
		p.alive &^= 1 << i
	}
}
