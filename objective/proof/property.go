package proof

import (
	"math"

	"legwright/kin"
	"legwright/objective"
)

// kind tells how a property is tested over a box.
type kind int

const (
	reach      kind = iota // every pose has a posture
	shortest               // no actuator coordinate is below the bound
	longest                // none is above it
	regular                // no pose is singular
	held                   // nor is the 6×6 of actuation and constraint wrenches
	baseSwing              // joints' swing
	otherSwing             // the same at the platform
	drift                  // parasitic_motion
	twist                  // parasitic_turn
	apart                  // legs keep their distance
	conditioned
	wrenches // the measure regularity
	slowest  // gain_least
	fastest  // gain_most
	effort
	push
	pull
	rate
	power
	buckling
)

// measured are the measures of poses that can be proved.
var measured = map[string]kind{
	"base_swing": baseSwing, "platform_swing": otherSwing, "leg_clearance": apart,
	"conditioning": conditioned, "regularity": wrenches, "gain_least": slowest, "gain_most": fastest,
	"leg_force": effort, "motor_torque": effort, "push_force": push, "pull_force": pull,
	"leg_speed": rate, "motor_speed": rate, "leg_power": power,
	"buckling_margin": buckling, "parasitic_motion": drift, "parasitic_turn": twist,
}

// Property is one thing to be proved for every pose of every zone.
type Property struct {
	Name    string             // reach, shortest needed, longest needed, regular, regular wrenches, or the measure's
	Measure *objective.Measure // nil where it is none
	Origin  string             // key of the brief that asks for it
	Unit    objective.Unit
	Bounded bool    // it has a limit and a unit; reach and regular have not
	AtLeast bool    // the limit is a least value
	Limit   float64 // what the brief and the design ask for
	Scale   float64 // unit of relative distances from the limit

	kind kind
}

// off is how far the value is beyond the limit, relatively; negative where it keeps a distance.
func (p *Property) off(value float64) float64 {
	e := (value - p.Limit) / p.Scale
	if p.AtLeast {
		e = -e
	}
	if math.IsNaN(e) {
		return math.Inf(1)
	}
	return e
}

// within gives the limit moved outwards by a relative distance.
func (p *Property) within(gap float64) float64 {
	if p.AtLeast {
		return p.Limit - gap*p.Scale
	}
	return p.Limit + gap*p.Scale
}

// worse tells whether a is a worse value than b.
func (p *Property) worse(a, b float64) bool {
	if p.AtLeast {
		return a < b
	}
	return a > b
}

// matrix tells whether the test looks at the inverse Jacobian's matrix as a whole.
func (k kind) matrix() bool { return k == regular || k == held || k >= conditioned && k != rate }

// Properties lists what Prove shows of a design with the dimension values, all of which must be known.
func Properties(t *objective.Task, p *objective.Plan, values []float64) []Property {
	s, _ := newSubject(t, p, values)
	return s.props
}

// properties lists what is to be proved of a design, and what the brief asks for that cannot be.
func properties(t *objective.Task, p *objective.Plan, values []float64, f *kin.Frame) (out []Property, left []string) {
	out = append(out, Property{Name: "reach", Origin: "duty", kind: reach})
	if least, span := p.RangeOf(); least >= 0 {
		unit := objective.Metre
		if p.Family.Drive == kin.Rotary {
			unit = objective.Radian
		}
		low, high := "shortest needed", "longest needed"
		if p.Family.Drive == kin.Rotary || p.Family.Rails {
			low, high = "least needed", "most needed"
		}
		scale, reserve := math.Max(values[span], 1e-3), t.Actuator.Reserve
		out = append(out,
			Property{Name: low, Origin: "dimensions." + p.Family.Dimensions[least].Name, Unit: unit, Bounded: true, AtLeast: true,
				Limit: values[least] + reserve, Scale: scale, kind: shortest},
			Property{Name: high, Origin: "dimensions." + p.Family.Dimensions[span].Name, Unit: unit, Bounded: true,
				Limit: values[least] + values[span] - reserve, Scale: scale, kind: longest})
	}
	out = append(out, Property{Name: "regular", Origin: "singular_below", AtLeast: true, Limit: t.Singular, Scale: 1, kind: regular})
	if len(f.Freedoms) < 6 {
		out = append(out, Property{Name: "regular wrenches", Origin: "singular_below", AtLeast: true, Limit: t.Singular, Scale: 1, kind: held})
	}
	for i := range t.Limits {
		l := &t.Limits[i]
		k, ok := measured[l.Measure.Name]
		sense := l.Measure.Sense == objective.Larger
		switch {
		case l.Measure.Has != nil && !l.Measure.Has(p.Family):
			continue
		case l.Measure.Scan == nil: // of the design itself, or coverage, which the other properties are about
			continue
		case !ok || l.AtLeast != sense:
			left = append(left, l.Measure.Name)
			continue
		}
		out = append(out, Property{Name: l.Measure.Name, Measure: l.Measure, Origin: l.Origin, Unit: l.Measure.UnitOf(p.Family), Bounded: true,
			AtLeast: l.AtLeast, Limit: l.Bound, Scale: l.Scale(t), kind: k})
	}
	return out, left
}

// Slack is how far the value keeps from the limit, relative to Scale; negative beyond it.
func (p *Property) Slack(value float64) float64 { return -p.off(value) }
