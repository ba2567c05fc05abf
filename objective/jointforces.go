package objective

import (
	"math"

	"legwright/kin"
)

// JointLoad is what one joint exerts on its plate in one case, over the sampled poses that count (Task.Coverage) in the
// case's zones, and the poses that decide the appraisal's worst values: three forces (N) and three moments about the
// joint's centre (N m), base axes. Least and Most are exact at each pose, for each load's sets taken independently. They are
// infinite where a pose is singular.
type JointLoad struct {
	Joint
	Least, Most [6]float64

	// Largest is the largest resultant force, at the pose At, and Then the components at that moment. It
	// is exact where the joint's force has one direction (Joint.One); elsewhere it is a force that the sets do
	// give, found by climbing, and never less than any of these.
	Largest float64
	At      *Sample // nil where no pose counts
	Then    [6]float64
}

// CaseLoads are the joints' loads in one case.
type CaseLoads struct {
	Case   int
	Joints []JointLoad

	// What acts at one moment: that at which Decides, the joint of a leg with the largest resultant, has its
	// largest. Together holds all joints' components then, Wrench what the legs exert on the platform about the
	// tool point (N, N m), Tool the tool point in the base frame.
	Decides  int
	Together [][6]float64
	Wrench   [6]float64
	Tool     kin.Vec
	worst    float64
}

// JointForces finds the joint forces of an appraised design for every case. Efforts are resolved by
// the equilibrium of the massless legs and of the platform; NotDetermined says what that leaves open.
func JointForces(t *Task, a *Appraisal) []CaseLoads {
	v := newView(t)
	v.serve(a.Plan.Family)
	v.begin(a.Machine)
	d := Design{Family: a.Plan.Family, Values: a.Values, Machine: a.Machine}
	l := newPoseLimits(t, v, a.Plan, &d)
	s := newEquilibrium(a.Plan.Family, a.Machine)
	out := make([]CaseLoads, len(t.Cases))
	for c := range out {
		out[c] = newCaseLoads(c, s.joints)
	}
	var w spread
	look := func(p *Sample) {
		v.keep = 0
		if !v.at(p, -1, NeedMatrix) {
			return
		}
		held := s.at(v)
		for _, c := range v.active[p.Zone] {
			if !held {
				out[c].unheld(p)
				continue
			}
			w.at(&v.demands[c], v.stand, t.Gravity, v.invLc)
			out[c].look(&w, s, p, v)
		}
	}
	for k := range t.samples {
		if p := &t.samples[k]; !t.soft() || l.fails(p) == "" {
			look(p)
		}
	}
	for _, p := range a.deciding() {
		look(p)
	}
	return out
}

// deciding are the poses at which worst values are met: samples, and poses between them.
func (a *Appraisal) deciding() []*Sample {
	var out []*Sample
	put := func(s *Sample) {
		if s != nil {
			out = append(out, s)
		}
	}
	for i := range a.Readings {
		if a.Readings[i].Measure.Scan != nil {
			put(a.Readings[i].Pose)
		}
	}
	for i := range a.Legs {
		put(a.Legs[i].LeastAt)
		put(a.Legs[i].MostAt)
	}
	return out
}

func newCaseLoads(c int, joints []Joint) CaseLoads {
	out := CaseLoads{Case: c, Decides: -1, Joints: make([]JointLoad, len(joints)), worst: -1}
	for i := range out.Joints {
		j := &out.Joints[i]
		j.Joint, j.Largest = joints[i], -1
		for k := range j.Least {
			j.Least[k], j.Most[k] = math.Inf(1), math.Inf(-1)
		}
	}
	return out
}

// unheld records a pose at which the platform is not held.
func (c *CaseLoads) unheld(p *Sample) {
	for i := range c.Joints {
		j := &c.Joints[i]
		j.Largest, j.At = inf(), p
		for k := range j.Least {
			j.Least[k], j.Most[k] = -inf(), inf()
		}
	}
}

// look brings the case up to date with the reactions at a pose.
func (c *CaseLoads) look(w *spread, s *equilibrium, p *Sample, v *View) {
	for i := range c.Joints {
		j, r := &c.Joints[i], &s.out[i]
		var ends [6]float64
		rows := 3
		if j.Moments {
			rows = 6
		}
		for k := range rows {
			lo, hi := w.extremes(&r[k])
			j.Least[k], j.Most[k] = math.Min(j.Least[k], lo), math.Max(j.Most[k], hi)
			if k < 3 {
				ends[k], ends[3+k] = lo, hi
			}
		}
		at, force, ok := w.farthest(r, &ends, j.Largest)
		if !ok {
			continue
		}
		j.Largest, j.At, j.Then = force, p, r.of(&at)
		if (j.Leg >= 0 || s.arm && i == 0) && force > c.worst {
			c.together(i, force, &at, s, v)
		}
	}
}

// together keeps what acts at one moment.
func (c *CaseLoads) together(joint int, force float64, w *[6]float64, s *equilibrium, v *View) {
	c.Decides, c.worst = joint, force
	c.Together = c.Together[:0]
	for i := range s.out {
		c.Together = append(c.Together, s.out[i].of(w))
	}
	c.Wrench = *w
	for q := 3; q < 6; q++ {
		c.Wrench[q] *= s.frame.Length
	}
	origin, rot := s.machine.Place(v.stand)
	c.Tool = add(origin, rot.Apply(s.frame.Tool))
}
