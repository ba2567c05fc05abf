package objective

import "legwright/kin"

// Demand is what one case asks of the actuators of one machine, for use at poses that a View does not visit: wrenches
// as they must be exerted on the platform, moments divided and angular speeds multiplied by the characteristic length.
type Demand struct {
	Wrench, Spread [6]float64 // the same at every pose, and ± on it, base axes
	Turns          bool       // the platform has a rotational freedom: else moments are the joints' affair
	Bodies         []Body
	Points         []Point
	Linear, Spin   Set // speeds
}

// Body is a mass; its vectors are in platform axes turned by the home rotation, so that a pose's rotation
// brings them into base axes.
type Body struct {
	Mass            float64
	Centre          kin.Vec    // from the tool point
	Inertia         [6]float64 // about the centre: xx, yy, zz, xy, xz, yz
	Linear, Angular Set        // accelerations that may occur and that the platform can follow, base axes
	AtTool          bool       // the linear one is the tool point's
}

// Point is a force that the surroundings apply away from the tool point.
type Point struct {
	At            kin.Vec // from the tool point, as Body.Centre
	Force, Spread kin.Vec // base axes
}

// DemandOf makes the case ready for machines with the frame.
func DemandOf(c *Case, f *kin.Frame) Demand {
	var d demand
	d.prepare(c, f)
	out := Demand{Wrench: d.w0, Spread: d.dw, Turns: d.turns, Linear: d.linear, Spin: d.spin}
	for i := range d.body {
		b := &d.body[i]
		out.Bodies = append(out.Bodies, Body{Mass: b.l.Mass, Centre: b.centre, Inertia: b.inertia,
			Linear: b.l.Linear, Angular: b.angular, AtTool: b.l.AtTool})
	}
	for i := range d.point {
		p := &d.point[i]
		out.Points = append(out.Points, Point{At: p.at, Force: p.l.Force, Spread: p.l.ForceSpread})
	}
	return out
}
