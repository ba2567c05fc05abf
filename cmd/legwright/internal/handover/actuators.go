package handover

import (
	"math"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

// actuators is the actuator schedule: what each leg's actuator must do over the duty, and the range that it has.
func (d *design) actuators() *table {
	f := d.a.Plan.Family
	coordinate, effort, rate := study.DriveKinds(f.Name)
	c, e, r := units.Suffix(coordinate), units.Suffix(effort), units.Suffix(rate)
	names := [2]string{"push_", "pull_"}
	if f.Drive == kin.Rotary {
		names = [2]string{"torque_positive_", "torque_negative_"}
	}
	t := d.sheet("actuator schedule", "leg", "range_least_"+c, "range_most_"+c, "stroke_"+c, "shortest_"+c, "home_"+c, "longest_"+c,
		"used_"+c, "reserve_low_"+c, "reserve_high_"+c, names[0]+e, names[1]+e, "speed_"+r)
	searched := " Between the samples every leg's coordinates and efforts are searched for, of speeds only the largest of all legs."
	if d.task.Coverage < 1 || d.task.CoverageGoal {
		searched = ""
	}
	t.note("figures", "worst over home, the sampled poses of the duty and the worst poses found between them, not a proof."+searched+" Legs, arms and rods are massless, without friction, play and terms in ω²")
	t.note("reserve", "wanted free at each end of the stroke: "+number(d.task.Actuator.Reserve, coordinate)+" "+units.Display(coordinate).Symbol)
	switch {
	case f.Drive == kin.Rotary:
		t.note("coordinate", "angle of the "+d.turning()+", counter-clockwise about its hinge (axis table). Shortest is the least angle needed, longest the greatest. A positive torque acts with growing angle")
	case f.Rails:
		t.note("coordinate", "distance of the carriage along its rail from the point where it is 0 (joint table). Push acts on the carriage with growing coordinate")
	default:
		t.note("coordinate", "distance between the leg's joint centres. Push: the leg is in compression")
	}
	bounded := len(d.a.Legs) - f.Free
	if f.Free > 0 {
		t.note("range", "the last actuator turns the tool and has no range of this kind")
	}
	if f.Index("upper_arm") >= 0 {
		t.note("range", "of the two links, by their own stops. The elbow's stops may bind first. Column and tool turn within half a turn of home")
	}
	type worst struct{ least, most, push, pull, speed float64 }
	w := worst{least: math.Inf(1), most: math.Inf(-1)}
	line := func(name string, x worst, home string, leg int) {
		low, high := d.rangeOf(leg)
		if x.least > x.most { // neither home nor a pose of the duty is reached
			x.least, x.most, home = math.NaN(), math.NaN(), ""
		}
		cells := []string{name, "", "", "", number(x.least, coordinate), home, number(x.most, coordinate), number(x.most-x.least, coordinate), "", "", figure(x.push, effort), figure(x.pull, effort), figure(x.speed, rate)}
		if !math.IsNaN(low) {
			cells[1], cells[2], cells[3] = number(low, coordinate), number(high, coordinate), number(high-low, coordinate)
			cells[8], cells[9] = number(x.least-low, coordinate), number(high-x.most, coordinate)
		}
		t.row(cells...)
	}
	for i := range d.a.Legs {
		l := &d.a.Legs[i]
		x := worst{l.Least, l.Most, l.Push, l.Pull, l.Speed}
		line(legName(i), x, number(l.Home, coordinate), i)
		if i < bounded {
			w = worst{math.Min(w.least, x.least), math.Max(w.most, x.most), math.Max(w.push, x.push), math.Max(w.pull, x.pull), math.Max(w.speed, x.speed)}
		}
	}
	if least, _ := f.Range(); least >= 0 {
		line("all", w, "", 0)
	}
	return t
}

// turning is what a rotary actuator turns.
func (d *design) turning() string {
	switch f := d.a.Plan.Family; {
	case f.Index("upper_arm") >= 0:
		return "column, link or tool"
	case f.Index("rod_spacing") >= 0:
		return "arm"
	}
	return "crank"
}

// rangeOf is the range of a leg's actuator, NaN without one.
func (d *design) rangeOf(leg int) (low, high float64) {
	f := d.a.Plan.Family
	least, span := f.Range()
	switch {
	case f.Index("upper_arm") >= 0 && (leg == 1 || leg == 2): // a palletising arm's links have stops of their own
		name := [3]string{1: "upper_angle", 2: "forearm_angle"}[leg]
		least, span = f.Index(name+"_min"), f.Index(name+"_range")
	case leg >= d.legs():
		least = -1
	}
	if least < 0 {
		return math.NaN(), math.NaN()
	}
	return d.a.Values[least], d.a.Values[least] + d.a.Values[span]
}
