package handover

import (
	"math"

	"legwright/cmd/legwright/internal/drawing"
	"legwright/kin"
)

// plan is one plan drawing in the making. Coordinates are mm.
type plan struct {
	*drawing.Drawing
	holes  []mark    // numbered on the drawing and in its table
	ring   []mark    // the joint centres of the legs, on a common circle or not
	radius float64   // of that circle, 0 for none
	lines  [][2]mark // cranks, arms, rails and the short sides of parallelograms
	hinges []axis
	ends   [2]drawing.Point // of the axes x and y
}

// mark is a place in plan.
type mark struct {
	name string
	drawing.Point
	z float64
}

func markOf(name string, v kin.Vec) mark {
	return mark{name, drawing.Point{X: clear(1000 * v.X), Y: clear(1000 * v.Y)}, clear(1000 * v.Z)}
}

// clear takes off what is rounding of a metre.
func clear(mm float64) float64 {
	if math.Abs(mm) < 1e-9 {
		return 0
	}
	return mm
}

// basePlan is the plan of the base, in the base frame.
func (d *design) basePlan() *drawing.Drawing {
	p := new(plan)
	at := map[string]mark{}
	for _, q := range d.plan.points {
		if q.plate != onPlatform {
			at[q.name] = markOf(q.name, q.base)
		}
		if q.plate == onBase && q.hole {
			p.holes = append(p.holes, at[q.name])
			if q.leg < d.legs() {
				p.ring = append(p.ring, at[q.name])
			}
		}
		if q.name == "B2" && !q.hole { // the shoulder of the palletising arm
			p.holes = append(p.holes, at[q.name])
		}
	}
	what := ""
	for _, l := range d.plan.links {
		switch l.what {
		case "crank", "arm", "upper arm", "forearm":
			if from, to := at[l.from], at[l.to]; from.name != "" && to.name != "" {
				p.lines, what = append(p.lines, [2]mark{from, to}), "Lines from the joints: cranks or arms at home."
			}
		case "travel":
			p.lines, what = append(p.lines, [2]mark{at[l.from], at[l.to]}), "Lines by the joints: travel of the carriages."
		}
	}
	for _, a := range d.plan.axes {
		if a.what == "hinge" && a.frame == onBase && math.Abs(a.dir.Z) < 0.999 {
			p.hinges = append(p.hinges, a)
		}
	}
	notes := []string{"Base frame, seen from +z (from the platform's side)."}
	if what != "" {
		notes = append(notes, what)
	}
	if len(p.hinges) > 0 {
		notes = append(notes, "Short bars across joints: axes of their hinges.")
	}
	d.draw(p, "Base plan", "base origin O", 0, notes)
	return p.Drawing
}

// platformPlan is the plan of the platform, in the platform frame.
func (d *design) platformPlan() *drawing.Drawing {
	p := new(plan)
	ends := map[string]mark{}
	for _, q := range d.plan.points {
		if q.plate != onPlatform {
			continue
		}
		m := markOf(q.name, q.own)
		ends[q.name] = m
		if q.hole {
			p.holes = append(p.holes, m)
		}
		if q.leg < d.legs() && q.name == "P"+legName(q.leg) {
			p.ring = append(p.ring, m)
		}
	}
	for i := range d.legs() {
		if a, b := ends["P"+legName(i)+"a"], ends["P"+legName(i)+"b"]; a.name != "" {
			p.lines = append(p.lines, [2]mark{a, b})
		}
	}
	note := "Platform frame, seen from +z (the joints lie on the side away from the viewer where the platform is above the base)."
	if f := d.a.Plan.Family; !f.Has(kin.Z) && !f.Has(kin.Roll) {
		note = "Platform frame, seen from +z."
	}
	d.draw(p, "Platform plan", "platform origin O", 60, []string{note})
	return p.Drawing
}

// legs is the number of legs, without a shaft.
func (d *design) legs() int { return d.a.Machine.Frame().Legs() - d.a.Plan.Family.Free }

// draw lays the plan out. first is the azimuth in degrees of the first pair of joints, where joints stand in pairs.
func (d *design) draw(p *plan, name, datum string, first float64, notes []string) {
	p.radius = common(p.ring)
	low, high := p.extent()
	const left, right, over, under = 22, 22, 20, 38 // mm on paper around the part
	size := drawing.Point{X: high.X - low.X, Y: high.Y - low.Y}
	paper, scale := drawing.Fit(size.X, size.Y, func(s drawing.Paper) (w, h float64) {
		return s.Width - 2*drawing.Margin - drawing.Column - left - right, s.Height - 2*drawing.Margin - over - under
	})
	mid := drawing.Point{X: (drawing.Margin + left + paper.Width - drawing.Margin - drawing.Column - right) / 2,
		Y: (drawing.Margin + under + paper.Height - drawing.Margin - over) / 2}
	p.Drawing = &drawing.Drawing{
		Title: name + ", design " + orDash(d.title.Design), Scale: scale, Paper: paper,
		Corner: drawing.Point{X: (low.X+high.X)/2 - mid.X*scale, Y: (low.Y+high.Y)/2 - mid.Y*scale},
	}
	p.centreLines(low, high)
	p.parts()
	p.dimensions(d, first*math.Pi/180, low)
	p.labels()
	p.ScaleBar(p.On(drawing.Margin+6, drawing.Margin+5))
	p.Sheet(d.column(p, name, datum, notes))
}

// common is the radius on which all marks lie about the origin, 0 if there is none.
func common(ring []mark) float64 {
	if len(ring) < 3 {
		return 0
	}
	r := math.Hypot(ring[0].X, ring[0].Y)
	for _, m := range ring {
		if math.Abs(math.Hypot(m.X, m.Y)-r) > 1e-6 {
			return 0
		}
	}
	if r < 1e-6 {
		return 0
	}
	return r
}

// extent is the rectangle that holds everything of the part, and the origin.
func (p *plan) extent() (low, high drawing.Point) {
	see := func(x, y float64) {
		low.X, low.Y = math.Min(low.X, x), math.Min(low.Y, y)
		high.X, high.Y = math.Max(high.X, x), math.Max(high.Y, y)
	}
	see(-p.radius, -p.radius)
	see(p.radius, p.radius)
	for _, m := range p.holes {
		see(m.X, m.Y)
	}
	for _, l := range p.lines {
		see(l[0].X, l[0].Y)
		see(l[1].X, l[1].Y)
	}
	if high.X-low.X < 1 && high.Y-low.Y < 1 { // a single point
		see(-10, -10)
		see(10, 10)
	}
	return low, high
}

// centreLines draws the axes of the frame, the pitch circle and the line to each joint.
func (p *plan) centreLines(low, high drawing.Point) {
	k := p.Scale
	line := func(a, b drawing.Point) {
		p.Lines = append(p.Lines, drawing.Line{Layer: drawing.Centre, From: a, To: b})
	}
	x, y := drawing.Point{X: high.X + 13*k}, drawing.Point{Y: high.Y + 12*k}
	line(drawing.Point{X: low.X - 6*k}, x)
	line(drawing.Point{Y: low.Y - 6*k}, y)
	p.ends = [2]drawing.Point{x, y}
	if p.radius == 0 {
		return
	}
	p.Circles = append(p.Circles, drawing.Circle{Layer: drawing.Centre, Radius: p.radius})
	for _, m := range p.ring {
		out := (p.radius + 3*k) / p.radius
		line(drawing.Point{}, drawing.Point{X: m.X * out, Y: m.Y * out})
	}
}

// parts draws the joints and what is fixed to them.
func (p *plan) parts() {
	k := p.Scale
	for _, l := range p.lines {
		p.Lines = append(p.Lines, drawing.Line{Layer: drawing.Drive, From: l[0].Point, To: l[1].Point})
		if l[0].Point == l[1].Point { // upright
			p.Circles = append(p.Circles, drawing.Circle{Layer: drawing.Drive, Centre: l[0].Point, Radius: 2.4 * k})
		}
	}
	for _, h := range p.hinges {
		for _, m := range p.holes {
			if m.name != h.point {
				continue
			}
			dir := drawing.Point{X: 5 * k * h.dir.X, Y: 5 * k * h.dir.Y}
			p.Lines = append(p.Lines, drawing.Line{Layer: drawing.Drive,
				From: drawing.Point{X: m.X - dir.X, Y: m.Y - dir.Y}, To: drawing.Point{X: m.X + dir.X, Y: m.Y + dir.Y}})
		}
	}
	for _, m := range p.holes {
		p.Circles = append(p.Circles, drawing.Circle{Layer: drawing.Joint, Centre: m.Point, Radius: 1.2 * k, Name: m.name})
		for _, c := range [2]drawing.Point{{X: 2 * k}, {Y: 2 * k}} {
			p.Lines = append(p.Lines, drawing.Line{Layer: drawing.Size,
				From: drawing.Point{X: m.X - c.X, Y: m.Y - c.Y}, To: drawing.Point{X: m.X + c.X, Y: m.Y + c.Y}})
		}
	}
}

// labels numbers the joints; those at one place share a label.
func (p *plan) labels() {
	done := map[string]bool{}
	for i, m := range p.holes {
		if done[m.name] {
			continue
		}
		text := m.name
		for _, o := range p.holes[i+1:] {
			if math.Hypot(o.X-m.X, o.Y-m.Y) < 1e-6 {
				text, done[o.name] = text+", "+o.name, true
			}
		}
		p.Label(m.Point, math.Atan2(m.Y, m.X), text)
	}
	p.Label(drawing.Point{}, -3*math.Pi/4, "O")
	p.Label(p.ends[0], math.Pi/4, "x")
	p.Label(p.ends[1], math.Pi/4, "y")
}
