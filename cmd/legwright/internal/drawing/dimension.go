package drawing

import "math"

// Sizes on paper, mm.
const (
	textHeight  = 2.5
	smallHeight = 1.8
	arrowLength = 2.5
	gap         = 1 // between an element and what points to it
)

// arrow draws the head of an arrow at the tip, which points in the direction of the angle.
func (d *Drawing) arrow(tip Point, angle float64) {
	const half = 12 * math.Pi / 180
	for _, a := range [2]float64{angle + math.Pi - half, angle + math.Pi + half} {
		d.Lines = append(d.Lines, Line{Size, tip, tip.at(arrowLength*d.Scale, a)})
	}
}

// upright turns the angle of a text by half a turn where it would stand on its head.
func upright(angle float64) float64 {
	a := math.Mod(angle, 2*math.Pi)
	if a > math.Pi {
		a -= 2 * math.Pi
	} else if a <= -math.Pi {
		a += 2 * math.Pi
	}
	if a > math.Pi/2+1e-9 {
		return a - math.Pi
	}
	if a < -math.Pi/2+1e-9 {
		return a + math.Pi
	}
	return a
}

// Distance draws the dimension between two points along their line, moved off it by so many real mm to the left
// as one goes from a to b. The text stands over the dimension line, or beyond b where it does not fit between the arrows.
func (d *Drawing) Distance(a, b Point, off float64, text string) {
	k := d.Scale
	angle := math.Atan2(b.Y-a.Y, b.X-a.X)
	length := math.Hypot(b.X-a.X, b.Y-a.Y)
	side := angle + math.Pi/2
	from, to := a.at(off, side), b.at(off, side)
	sign := math.Copysign(1, off)
	if math.Abs(off) > 2*gap*k {
		for _, p := range [2]Point{a, b} {
			d.Lines = append(d.Lines, Line{Size, p.at(sign*gap*k, side), p.at(off+sign*1.5*k, side)})
		}
	}
	room := length - 2*arrowLength*k
	w := width(text, textHeight*k)
	read := upright(angle)
	over := read + math.Pi/2
	if w <= room {
		d.Lines = append(d.Lines, Line{Size, from, to})
		d.arrow(from, angle+math.Pi)
		d.arrow(to, angle)
		mid := Point{(from.X + to.X) / 2, (from.Y + to.Y) / 2}
		d.Texts = append(d.Texts, Text{Size, mid.at(gap*k, over), textHeight * k, read, Middle, text})
		return
	}
	// arrows from outside, the text along the prolonged line
	tail := to.at(2*arrowLength*k+w, angle)
	d.Lines = append(d.Lines, Line{Size, from.at(2*arrowLength*k, angle+math.Pi), tail})
	d.arrow(from, angle)
	d.arrow(to, angle+math.Pi)
	mid := to.at(1.7*arrowLength*k+w/2, angle)
	d.Texts = append(d.Texts, Text{Size, mid.at(gap*k, over), textHeight * k, read, Middle, text})
}

// Angle draws the dimension of the angle from one direction to the next, counter-clockwise about the centre, at the radius
// (real mm). The text stands beyond the arc, in the middle of it or, where that is narrow, after its end.
func (d *Drawing) Angle(centre Point, radius, from, to float64, text string) {
	k := d.Scale
	d.Arcs = append(d.Arcs, Arc{Size, centre, radius, from, to})
	lean := arrowLength * k / radius / 2
	wide := (to - from) * radius
	if wide > 3*arrowLength*k {
		d.arrow(centre.at(radius, from), from-math.Pi/2+lean)
		d.arrow(centre.at(radius, to), to+math.Pi/2-lean)
	} else {
		d.Arcs = append(d.Arcs, Arc{Size, centre, radius, from - 2*arrowLength*k/radius, from}, Arc{Size, centre, radius, to, to + 2*arrowLength*k/radius})
		d.arrow(centre.at(radius, from), from+math.Pi/2-lean)
		d.arrow(centre.at(radius, to), to-math.Pi/2+lean)
	}
	w := width(text, textHeight*k)
	at := (from + to) / 2
	if wide < w {
		at = to + (2*arrowLength*k+w/2)/radius
		d.Arcs = append(d.Arcs, Arc{Size, centre, radius, to, at + w/2/radius})
	}
	tangent := upright(at + math.Pi/2)
	r := radius + gap*k
	if sin, cos := math.Sincos(tangent + math.Pi/2 - at); cos < 0 && math.Abs(sin) < 0.1 {
		r += textHeight * k // read from outside: the baseline lies farther out
	}
	d.Texts = append(d.Texts, Text{Size, centre.at(r, at), textHeight * k, tangent, Middle, text})
}

// ScaleBar draws a bar of a round length, about 40 mm on paper, with its two ends numbered.
func (d *Drawing) ScaleBar(at Point) {
	k := d.Scale
	length := 50 * k
	for _, x := range []float64{1, 2, 5} {
		p := math.Pow10(int(math.Floor(math.Log10(50*k)))) * x
		if p <= 50*k {
			length = p
		}
	}
	end := at.plus(length, 0)
	d.Lines = append(d.Lines, Line{Frame, at, end})
	for i := range 6 {
		h := 1.0
		if i == 0 || i == 5 {
			h = 2
		}
		p := at.plus(length*float64(i)/5, 0)
		d.Lines = append(d.Lines, Line{Frame, p, p.plus(0, h*k)})
	}
	d.Texts = append(d.Texts,
		Text{Frame, at.plus(0, 3*k), textHeight * k, 0, Middle, "0"},
		Text{Frame, end.plus(0, 3*k), textHeight * k, 0, Middle, short(length) + " mm"})
}
