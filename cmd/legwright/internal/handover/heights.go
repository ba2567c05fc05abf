package handover

import (
	"math"

	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// heights is the table of how high the platform stands.
func (d *design) heights() *table {
	t := d.sheet("heights of the platform", append([]string{"what", "height_mm", "remark"}, poseHeads...)...)
	t.note("heights", "along z of the base frame, above the base origin, of joint centres and the platform's origin: plates, motors and payload come on top. They are over the sampled poses of the duty and the worst poses found between them, not a proof")
	if f := d.a.Plan.Family; !f.Has(kin.Z) {
		t.note("plane", "the platform moves in its plane alone")
	}
	h := objective.PlatformHeights(d.task, d.a)
	put := func(what string, v float64, remark string, at *objective.Sample) {
		if math.IsInf(v, 0) {
			v, remark = math.NaN(), "no pose counts"
		}
		t.row(append([]string{what, number(v, units.Length), text(remark)}, d.pose(at)...)...)
	}
	put("platform origin, home", h.Home, "", nil)
	put("platform origin, lowest over the duty", h.Lowest, "", h.LowestAt)
	put("platform origin, highest over the duty", h.Highest, "", h.HighAt)
	put("platform joint centres, lowest over the duty", h.Under, "", nil)
	put("platform joint centres, highest over the duty", h.Over, "", nil)
	planar := !d.a.Plan.Family.Has(kin.Z)
	for i, what := range [2]string{"platform origin, all actuators at their least", "platform origin, all actuators at their most"} {
		e := &h.Ends[i]
		remark := endRemark(e)
		if planar {
			remark = notApply
		}
		put(what, e.Height, remark, nil)
	}
	const collapsed = "platform origin, collapsed"
	switch c := h.Collapsed(); {
	case planar:
		put(collapsed, math.NaN(), notApply, nil)
	case c == nil:
		put(collapsed, math.NaN(), "not known: "+notKnown(&h), nil)
	case h.Ends[0].Fails != "" || h.Ends[1].Fails != "":
		put(collapsed, c.Height, "the end that is known, below the lowest over the duty, "+endRemark(c), nil)
	default:
		put(collapsed, c.Height, "the lower of these two, "+endRemark(c), nil)
	}
	return t
}

const notApply = "does not apply: the platform moves in its plane alone"

// notKnown is why an end of the range has no height.
func notKnown(h *objective.Heights) string {
	for i := range h.Ends {
		if f := h.Ends[i].Fails; f != "" {
			return f
		}
	}
	panic("handover: both ends are known")
}

func endRemark(e *objective.End) string {
	switch {
	case e.Fails != "":
		return e.Fails
	case e.Level:
		return "as level as at home and straight above the base"
	}
	return "not level, or not straight above the base"
}
