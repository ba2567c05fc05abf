package handover

import (
	"math"

	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

// joints is the table of joint centres: all in the base frame with the machine at home, those of the
// platform also in its own frame.
func (d *design) joints() *table {
	t := d.sheet("joint coordinates at home", "point", "plate", "leg", "what",
		"base_frame_x_mm", "base_frame_y_mm", "base_frame_z_mm", "platform_frame_x_mm", "platform_frame_y_mm", "platform_frame_z_mm")
	roll, pitch, yaw := d.plan.rot.RPY()
	o := d.plan.origin
	t.note("platform frame at home", "origin at "+exact(o.X, units.Length)+", "+exact(o.Y, units.Length)+", "+exact(o.Z, units.Length)+
		" mm in the base frame, turned by roll "+exact(roll, units.Angle)+", pitch "+exact(pitch, units.Angle)+", yaw "+exact(yaw, units.Angle)+" deg (Rz Ry Rx)")
	if !d.plan.home {
		t.note("home", "the machine does not reach home: ends of cranks or arms, carriages and lengths there are left out")
	}
	for _, p := range d.plan.points {
		cells := append([]string{p.name, p.plate, legName(p.leg), text(p.what)}, vector(p.base)...)
		if p.plate == onPlatform {
			cells = append(cells, vector(p.own)...)
		}
		t.row(cells...)
	}
	return t
}

// vector is the three cells of a point.
func vector(v kin.Vec) []string {
	return []string{exact(v.X, units.Length), exact(v.Y, units.Length), exact(v.Z, units.Length)}
}

// axes is the table of directions: hinges, mounting axes, rails.
func (d *design) axes() *table {
	t := d.sheet("axes of joints at home", "point", "axis", "frame", "x", "y", "z", "azimuth_deg", "elevation_deg",
		"base_frame_x", "base_frame_y", "base_frame_z", "base_frame_azimuth_deg", "base_frame_elevation_deg")
	t.note("axes", "unit vectors in the frame of the plate. Azimuth from +x in the plate's x-y plane, counter-clockwise seen from +z, elevation from that plane towards +z. Swing is measured from mounting axes, a hinge is what a part turns about")
	if fr := d.a.Machine.Frame(); fr.Rods != nil && fr.Rails == nil && d.a.Plan.Family.Has(kin.Roll) {
		t.note("with a crank", "the mounting axis at the crank's end turns with the crank and is given for the machine at home")
	}
	for _, a := range d.plan.axes {
		cells := append([]string{a.point, text(a.what), a.frame}, direction(a.dir)...)
		t.row(append(cells, direction(a.base)...)...)
	}
	return t
}

// direction is the five cells of a unit vector. A vertical one has the azimuth 0.
func direction(v kin.Vec) []string {
	return []string{decimals(v.X, 9), decimals(v.Y, 9), decimals(v.Z, 9),
		exact(azimuth(v.X, v.Y), units.Angle), exact(math.Atan2(v.Z, math.Hypot(v.X, v.Y)), units.Angle)}
}

// azimuth is the angle of a place or direction in plan, from 0 to below 2π; 0 on the axis.
func azimuth(x, y float64) float64 {
	if math.Hypot(x, y) < 1e-12 {
		return 0
	}
	a := math.Atan2(y, x)
	if a < 0 {
		a += 2 * math.Pi
	}
	if a > 2*math.Pi-1e-12 {
		return 0
	}
	return a
}

// links is the table of lengths.
func (d *design) links() *table {
	t := d.sheet("lengths between joint centres", "leg", "what", "from", "to", "length_mm")
	for _, l := range d.plan.links {
		t.row(legName(l.leg), text(l.what), l.from, l.to, exact(l.length, units.Length))
	}
	return t
}

// holes is the hole table.
func (d *design) holes() *table {
	t := d.sheet("hole table", "hole", "plate", "x_mm", "y_mm", "z_mm", "radius_mm", "angle_deg", "diameter_mm", "for")
	t.note("holes", "joint centres, projected along z onto the plate. Base holes in the base frame, platform holes in the platform frame. The joints' own bolt patterns and the diameters are to be chosen with the joints")
	for _, p := range d.plan.points {
		if !p.hole {
			continue
		}
		v := p.base
		if p.plate == onPlatform {
			v = p.own
		}
		t.row(append(append([]string{p.name, p.plate}, vector(v)...),
			exact(math.Hypot(v.X, v.Y), units.Length), exact(azimuth(v.X, v.Y), units.Angle), "to be chosen", text(p.what))...)
	}
	return t
}
