package drawing

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"math"
	"strconv"
	"strings"
)

// SVG writes the drawing in mm on paper: width and height give the sheet's size, and a unit of the view box is a millimetre.
func (d *Drawing) SVG() []byte {
	b := new(bytes.Buffer)
	w, h := short(d.Paper.Width), short(d.Paper.Height)
	fmt.Fprintf(b, `<?xml version="1.0" encoding="UTF-8"?>
<svg xmlns="http://www.w3.org/2000/svg" width="%smm" height="%smm" viewBox="0 0 %s %s">
<title>%s</title>
<rect width="%s" height="%s" fill="#fff"/>
`, w, h, w, h, escape(d.Title), w, h)
	for l := range layers {
		f := &layerForms[l]
		dash := ""
		if f.dashed {
			dash = ` stroke-dasharray="6 1.2 1.2 1.2"`
		}
		fmt.Fprintf(b, "<g id=%q fill=\"none\" stroke=%q stroke-width=\"%s\"%s>\n", f.name, f.ink, short(f.width), dash)
		for i := range d.Lines {
			if e := &d.Lines[i]; e.Layer == l {
				x1, y1 := d.place(e.From)
				x2, y2 := d.place(e.To)
				fmt.Fprintf(b, "<line x1=\"%s\" y1=\"%s\" x2=\"%s\" y2=\"%s\"/>\n", x1, y1, x2, y2)
			}
		}
		for i := range d.Circles {
			if e := &d.Circles[i]; e.Layer == l {
				x, y := d.place(e.Centre)
				id := ""
				if e.Name != "" {
					id = ` id="` + escape(e.Name) + `"`
				}
				fmt.Fprintf(b, "<circle%s cx=\"%s\" cy=\"%s\" r=\"%s\"/>\n", id, x, y, short(e.Radius/d.Scale))
			}
		}
		for i := range d.Arcs {
			if e := &d.Arcs[i]; e.Layer == l {
				d.svgArc(b, e)
			}
		}
		b.WriteString("</g>\n")
		fmt.Fprintf(b, "<g fill=%q stroke=\"#fff\" stroke-width=\"0.7\" paint-order=\"stroke\" font-family=\"Arial, Helvetica, 'Liberation Sans', sans-serif\">\n", f.ink)
		for i := range d.Texts {
			if e := &d.Texts[i]; e.Layer == l {
				d.svgText(b, e)
			}
		}
		b.WriteString("</g>\n")
	}
	b.WriteString("</svg>\n")
	return b.Bytes()
}

// place is a point in mm on paper, y down.
func (d *Drawing) place(p Point) (x, y string) {
	return short((p.X - d.Corner.X) / d.Scale), short(d.Paper.Height - (p.Y-d.Corner.Y)/d.Scale)
}

func (d *Drawing) svgArc(b *bytes.Buffer, e *Arc) {
	x1, y1 := d.place(e.Centre.at(e.Radius, e.From))
	x2, y2 := d.place(e.Centre.at(e.Radius, e.To))
	large := 0
	if turn := math.Mod(e.To-e.From+4*math.Pi, 2*math.Pi); turn > math.Pi {
		large = 1
	}
	r := short(e.Radius / d.Scale)
	fmt.Fprintf(b, "<path d=\"M%s %sA%s %s 0 %d 0 %s %s\"/>\n", x1, y1, r, r, large, x2, y2)
}

// capital is the height of capitals over the font size of usual sans-serif faces.
const capital = 0.716

func (d *Drawing) svgText(b *bytes.Buffer, e *Text) {
	x, y := d.place(e.At)
	anchor := [...]string{Left: "", Middle: ` text-anchor="middle"`, Right: ` text-anchor="end"`}[e.Align]
	turn := ""
	if e.Angle != 0 {
		turn = fmt.Sprintf(` transform="rotate(%s %s %s)"`, short(-e.Angle*180/math.Pi), x, y)
	}
	fmt.Fprintf(b, "<text x=\"%s\" y=\"%s\" font-size=\"%s\"%s%s>%s</text>\n", x, y, short(e.Height/d.Scale/capital), anchor, turn, escape(e.Text))
}

// short is a number with at most six decimals.
func short(v float64) string {
	s := strconv.FormatFloat(v, 'f', 6, 64)
	s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	if s == "-0" {
		return "0"
	}
	return s
}

// escape makes a text fit for XML, between tags and in an attribute. What XML cannot hold becomes U+FFFD.
func escape(s string) string {
	var b strings.Builder
	xml.EscapeText(&b, []byte(s))
	return b.String()
}
