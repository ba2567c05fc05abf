package kin

import "gonum.org/v1/gonum/spatial/r3"

// outline draws rails, cranks, and rods, of parallelograms both rods and their short sides.
func (m *rods) outline(o *Outline, least, most float64) {
	o.Fixed = append(o.Fixed, m.frame.Base[:m.n]...)
	rails := !m.leg[0].crank && most > least
	if rails {
		for i := range m.leg[:m.n] {
			o.Fixed = append(o.Fixed, m.leg[i].point(least), m.leg[i].point(most))
		}
	}
	f := m.frame
	f.Base, f.Platform = f.Base[:m.n], f.Platform[:m.n] // a shaft is no rod
	var corners []Vec                                   // of the parallelograms
	if m.links.twin {
		for i := range m.leg[:m.n] {
			side := m.frame.HomeRot.Unapply(m.links.side[i])
			corners = append(corners, r3.Sub(f.Platform[i], side), r3.Add(f.Platform[i], side))
		}
	}
	o.plate(&f, corners)
	ends := len(o.Fixed) + len(o.Platform)
	for i := range m.leg[:m.n] {
		if rails {
			o.line(RailLine, i, m.n+2*i, m.n+2*i+1)
		}
		end := ends + i
		if m.links.twin {
			end = ends + 3*i
		}
		if m.leg[i].crank {
			o.line(CrankLine, i, o.Base[i], end)
		}
		if !m.links.twin {
			o.line(RodLine, i, end, o.Joints[i])
			continue
		}
		at := len(o.Fixed) + m.n + 2*i
		o.line(BarLine, i, end+1, end+2)
		o.line(RodLine, i, end+1, at)
		o.line(RodLine, i, end+2, at+1)
		o.line(BarLine, i, at, at+1)
	}
	if o.Moving = m.n; m.links.twin {
		o.Moving = 3 * m.n
	}
}

// ends3 are the moving points: the ends of the drives, each followed by those of the two rods of a parallelogram.
func (m *rods) ends3(s *State) []Vec {
	var out []Vec
	for i := range m.n {
		out = append(out, s.End[i])
		if m.links.twin {
			out = append(out, r3.Sub(s.End[i], m.links.side[i]), r3.Add(s.End[i], m.links.side[i]))
		}
	}
	return out
}

// hand is the length of the hand that shows where the tool points.
func (m *toolDelta) hand() float64 { return m.leg[0].rod / 8 }

// addShaft adds the telescopic shaft, whose foot is the fourth base joint, and the tool, which turns on the platform.
func (m *toolDelta) addShaft(o *Outline) {
	// The foot comes last of the fixed points: the numbers after it move up by one.
	foot := len(o.Fixed)
	up := func(k *int) {
		if *k >= foot {
			*k++
		}
	}
	for i := range o.Lines {
		up(&o.Lines[i].A)
		up(&o.Lines[i].B)
	}
	for i := range o.Joints {
		up(&o.Joints[i])
	}
	up(&o.Origin)
	o.Fixed = append(o.Fixed, Vec{})
	o.Base, o.Joints = append(o.Base, foot), append(o.Joints, o.Origin)
	o.Lines = without(o.Lines, ToolLine)
	o.Platform[len(o.Platform)-1] = Vec{} // the tool point does not keep to the platform
	o.Tool = len(o.Fixed) + len(o.Platform) + o.Moving
	o.Moving += 2
	o.line(ShaftLine, 3, foot, o.Origin)
	if m.frame.Tool != (Vec{}) {
		o.line(ToolLine, 3, o.Origin, o.Tool)
	}
	o.line(ToolLine, 3, o.Origin, o.Tool+1)
}

// without leaves out the lines of a kind.
func without(lines []Line, k LineKind) []Line {
	var out []Line
	for _, l := range lines {
		if l.Kind != k {
			out = append(out, l)
		}
	}
	return out
}
