package handover

import (
	"math"
	"slices"
	"strconv"

	"legwright/cmd/legwright/internal/units"
	"legwright/objective"

	"gonum.org/v1/gonum/spatial/r3"
)

var componentHeads = [6]string{"fx", "fy", "fz", "mx", "my", "mz"}

// componentUnit is the kind of a component: three forces, three moments.
func componentUnit(k int) units.Kind {
	if k < 3 {
		return units.Force
	}
	return units.Torque
}

// signs says what the forces are.
const signs = "what the leg exerts on the plate, components along the axes of the base frame. Moments are about the joint's own centre, of joints that carry any. Payload only: legs, arms and rods are massless, without friction, play and terms in ω²"

// loads computes the joint forces once.
func (d *design) loads() []objective.CaseLoads {
	if d.forcesOf == nil {
		d.forcesOf = objective.JointForces(d.task, d.a)
	}
	return d.forcesOf
}

// forces is the table of the largest joint forces: for each case and joint the least and the greatest of each component, and
// the largest resultant with its components at that moment.
func (d *design) forces() *table {
	heads := []string{"case", "point", "plate", "part"}
	for k, c := range componentHeads {
		s := units.Suffix(componentUnit(k))
		heads = append(heads, c+"_least_"+s, c+"_most_"+s)
	}
	heads = append(heads, "resultant_N", "resultant_is")
	t := d.sheet("joint forces, largest", slices.Concat(heads, thenHeads(), poseHeads)...)
	t.note("forces", signs)
	t.note("least and most", "of each component over the case's sets, the sampled poses in its zones and the worst poses found between them: exact at each pose, each load's sets taken independently. They are not simultaneous, and not a proof for all poses")
	t.note("resultant", "largest size of the force (fx fy fz), with the components then and the pose about home. Exact: the joint's force has one direction at a pose. Found: it has not, and a climb over the sets found this one")
	d.open(t)
	cases := d.loads()
	for i := range cases {
		zero := d.zero(&cases[i])
		for k := range cases[i].Joints {
			j := &cases[i].Joints[k]
			cells := []string{d.caseName(&cases[i]), d.jointName(&j.Joint), j.Plate, text(j.Part)}
			if j.At == nil {
				t.row(cells...)
				continue
			}
			for q := range j.Least {
				if q > 2 && !j.Moments {
					cells = append(cells, "", "")
					continue
				}
				cells = append(cells, figure(zero.tidy(j.Least[q], q), componentUnit(q)), figure(zero.tidy(j.Most[q], q), componentUnit(q)))
			}
			is := "found"
			switch {
			case math.IsInf(j.Largest, 0):
				is = "singular"
			case j.One:
				is = "exact"
			}
			cells = append(cells, figure(j.Largest, units.Force), is)
			t.row(append(append(cells, components(&j.Then, j.Moments, zero)...), d.pose(j.At)...)...)
		}
	}
	return t
}

// thenHeads head the components at the moment of the largest resultant.
func thenHeads() (heads []string) {
	for k, c := range componentHeads {
		heads = append(heads, c+"_then_"+units.Suffix(componentUnit(k)))
	}
	return heads
}

// components are the six cells of a load.
func components(load *[6]float64, moments bool, zero noise) []string {
	out := make([]string, 6)
	for q, x := range load {
		if q < 3 || moments {
			out[q] = figure(zero.tidy(x, q), componentUnit(q))
		}
	}
	return out
}

// noise is what forces and moments may be by rounding alone.
type noise struct{ force, moment float64 }

// zero is the noise of a case: 1e-7 of its largest force, acting at the machine's size for moments. Where a platform is held
// badly, forces lose that many digits.
func (d *design) zero(c *objective.CaseLoads) noise {
	most := 0.0
	for i := range c.Joints {
		for q := range 3 {
			for _, x := range [2]float64{c.Joints[i].Least[q], c.Joints[i].Most[q]} {
				if !math.IsInf(x, 0) {
					most = math.Max(most, math.Abs(x))
				}
			}
		}
	}
	fr := d.a.Machine.Frame()
	return noise{1e-7 * most, 1e-7 * most * (r3.Norm(fr.Home) + fr.Length)}
}

// tidy makes what is zero but for rounding zero.
func (n noise) tidy(x float64, component int) float64 {
	least := n.force
	if component > 2 {
		least = n.moment
	}
	if math.Abs(x) <= least {
		return 0
	}
	return x
}

// together is the table of joint forces that act at one moment: for each case, that at which the joint with the largest
// resultant has its largest.
func (d *design) together() *table {
	heads := []string{"case", "point", "plate", "part"}
	for k, c := range componentHeads {
		heads = append(heads, c+"_"+units.Suffix(componentUnit(k)))
	}
	t := d.sheet("joint forces, together", append(heads, poseHeads...)...)
	t.note("forces", signs)
	t.note("moment", "of each case that at which the largest resultant of all joints acts. The last row of a case is what the legs exert on the platform together, moments about the tool point")
	d.open(t)
	cases := d.loads()
	for i := range cases {
		c := &cases[i]
		if why := notTogether(c); why != "" {
			t.note("left out", d.task.Cases[c.Case].Name+": "+why)
			continue
		}
		zero := d.zero(c)
		pose := d.pose(c.Joints[c.Decides].At)
		for k := range c.Joints {
			j := &c.Joints[k].Joint
			t.row(append(append([]string{d.caseName(c), d.jointName(j), j.Plate, text(j.Part)}, components(&c.Together[k], j.Moments, zero)...), pose...)...)
		}
		t.row(append(append([]string{d.caseName(c), "", onPlatform, "sum, about the tool point"}, components(&c.Wrench, true, zero)...), pose...)...)
	}
	return t
}

// notTogether is why a case has no forces that act at one moment, or "".
func notTogether(c *objective.CaseLoads) string {
	for i := range c.Joints {
		if math.IsInf(c.Joints[i].Largest, 0) {
			return "the legs cannot hold the platform at a pose of the case (joint forces, largest: singular)"
		}
	}
	if c.Decides < 0 {
		return "no pose of the case counts"
	}
	return ""
}

// open notes what the figures do not tell.
func (d *design) open(t *table) {
	for _, n := range objective.NotDetermined(d.a.Plan.Family) {
		t.note("not determined", n)
	}
	if len(d.task.Cases) == 0 {
		t.note("cases", "the brief has no cases: there are no forces")
	}
}

func (d *design) caseName(c *objective.CaseLoads) string { return text(d.task.Cases[c.Case].Name) }

// jointName is the point at which a joint's load acts, as the joint table names it.
func (d *design) jointName(j *objective.Joint) string {
	n := strconv.Itoa(j.Leg + 1)
	switch {
	case j.Leg < 0 && j.Plate == onPlatform:
		return "P1"
	case j.Leg < 0 && j.Part != "whole base":
		return "B2"
	case j.Leg < 0:
		return "origin"
	case j.Part == "rod a":
		return "P" + n + "a"
	case j.Part == "rod b":
		return "P" + n + "b"
	case j.Part == "carriage":
		return "K" + n
	case j.Plate == onPlatform:
		return "P" + n
	}
	return "B" + n
}
