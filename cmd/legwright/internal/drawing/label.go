package drawing

import "math"

// Label writes a short text near a point, on the side of the angle `away` if it is free there, else where it
// meets the least of what is drawn already. Labels come last.
func (d *Drawing) Label(p Point, away float64, text string) {
	k := d.Scale
	best, at := math.Inf(1), Text{}
	for ring, r := range []float64{4.5, 7, 10} {
		for i := range 16 {
			turn := float64((i+1)/2) * math.Pi / 8 // to both sides by turns
			if i%2 == 1 {
				turn = -turn
			}
			a := away + turn
			c := p.at(r*k, a)
			t := Text{Note, c.plus(0, -textHeight*k/2), textHeight * k, 0, Middle, text}
			cost := 10*float64(d.crossed(t.box().wider(0.4*k))) + float64(ring) + float64((i+1)/2)/8
			if cost < best {
				best, at = cost, t
			}
		}
	}
	d.Texts = append(d.Texts, at)
}

// box is a rectangle, turned by an angle: its middle and half its sizes.
type box struct {
	mid, half   Point
	sin, cosine float64
}

// box is about what a text covers.
func (t *Text) box() box {
	w := width(t.Text, t.Height)
	along := 0.0
	switch t.Align {
	case Left:
		along = w / 2
	case Right:
		along = -w / 2
	}
	mid := t.At.at(along, t.Angle)
	mid = mid.at(t.Height/2, t.Angle+math.Pi/2)
	sin, cos := math.Sincos(t.Angle)
	return box{mid: mid, half: Point{w / 2, t.Height / 2}, sin: sin, cosine: cos}
}

func (b box) wider(by float64) box {
	b.half = b.half.plus(by, by)
	return b
}

// own is a point seen from the box.
func (b *box) own(p Point) Point {
	x, y := p.X-b.mid.X, p.Y-b.mid.Y
	return Point{x*b.cosine + y*b.sin, -x*b.sin + y*b.cosine}
}

// meets tells whether the line between two points enters the box (Liang and Barsky 1984, from memory).
func (b *box) meets(from, to Point) bool {
	p, q := b.own(from), b.own(to)
	low, high := 0.0, 1.0
	clip := func(d, room float64) bool {
		switch {
		case d == 0:
			return room >= 0
		case d > 0:
			high = math.Min(high, room/d)
		default:
			low = math.Max(low, room/d)
		}
		return low <= high
	}
	dx, dy := q.X-p.X, q.Y-p.Y
	return clip(-dx, p.X+b.half.X) && clip(dx, b.half.X-p.X) && clip(-dy, p.Y+b.half.Y) && clip(dy, b.half.Y-p.Y)
}

// crossed counts the elements that enter the box.
func (d *Drawing) crossed(b box) int {
	n := 0
	for i := range d.Lines {
		if b.meets(d.Lines[i].From, d.Lines[i].To) {
			n++
		}
	}
	reach := math.Hypot(b.half.X, b.half.Y)
	round := func(c Point, r, from, to float64) {
		if math.Abs(math.Hypot(c.X-b.mid.X, c.Y-b.mid.Y)-r) > reach {
			return
		}
		steps := 90
		for i := range steps {
			a := from + (to-from)*float64(i)/float64(steps)
			if b.meets(c.at(r, a), c.at(r, a+(to-from)/float64(steps))) {
				n++
				return
			}
		}
	}
	for _, c := range d.Circles {
		round(c.Centre, c.Radius, 0, 2*math.Pi)
	}
	for _, a := range d.Arcs {
		round(a.Centre, a.Radius, a.From, a.To)
	}
	for i := range d.Texts {
		t := d.Texts[i].box()
		if b.meets(corner(&t, -1, -1), corner(&t, 1, 1)) || b.meets(corner(&t, -1, 1), corner(&t, 1, -1)) || b.meets(corner(&t, -1, 0), corner(&t, 1, 0)) {
			n++
		}
	}
	return n
}

// corner is the point of the box at so many half sizes from its middle.
func corner(b *box, x, y float64) Point {
	x, y = x*b.half.X, y*b.half.Y
	return b.mid.plus(x*b.cosine-y*b.sin, x*b.sin+y*b.cosine)
}
