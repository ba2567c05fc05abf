package drawing

import (
	"bytes"
	"fmt"
	"math"
	"strconv"
	"strings"
)

// DXF writes the drawing as DXF R12 (AC1009) text, in mm at real size. It has the layers of the SVG and
// the entities LINE, CIRCLE, ARC and TEXT. Source: DXF Reference, release 12 (from memory).
func (d *Drawing) DXF() []byte {
	w := new(dxfWriter)
	w.header(d)
	w.tables(d)
	w.pair(0, "SECTION")
	w.pair(2, "ENTITIES")
	for i := range d.Lines {
		e := &d.Lines[i]
		w.entity("LINE", e.Layer)
		w.point(0, e.From)
		w.point(1, e.To)
	}
	for i := range d.Circles {
		e := &d.Circles[i]
		w.entity("CIRCLE", e.Layer)
		w.point(0, e.Centre)
		w.real(40, e.Radius)
	}
	for i := range d.Arcs {
		e := &d.Arcs[i]
		w.entity("ARC", e.Layer)
		w.point(0, e.Centre)
		w.real(40, e.Radius)
		w.real(50, degrees(e.From))
		w.real(51, degrees(e.To))
	}
	for i := range d.Texts {
		w.text(&d.Texts[i])
	}
	w.pair(0, "ENDSEC")
	w.pair(0, "EOF")
	return w.b.Bytes()
}

// dxfWriter writes pairs of a group code and a value, a line each.
type dxfWriter struct{ b bytes.Buffer }

func (w *dxfWriter) pair(code int, value string) { fmt.Fprintf(&w.b, "%3d\n%s\n", code, value) }

func (w *dxfWriter) real(code int, v float64) {
	s := strconv.FormatFloat(v, 'f', 9, 64)
	s = strings.TrimRight(s, "0")
	if strings.HasSuffix(s, ".") {
		s += "0"
	}
	if s == "-0.0" {
		s = "0.0"
	}
	w.pair(code, s)
}

func (w *dxfWriter) whole(code, v int) { w.pair(code, strconv.Itoa(v)) }

// point is the n-th point of an entity.
func (w *dxfWriter) point(n int, p Point) {
	w.real(10+n, p.X)
	w.real(20+n, p.Y)
	w.real(30+n, 0)
}

func (w *dxfWriter) entity(name string, l Layer) {
	w.pair(0, name)
	w.pair(8, layerForms[l].name)
}

func (w *dxfWriter) header(d *Drawing) {
	far := d.Corner.plus(d.Paper.Width*d.Scale, d.Paper.Height*d.Scale)
	w.pair(0, "SECTION")
	w.pair(2, "HEADER")
	w.pair(9, "$ACADVER")
	w.pair(1, "AC1009")
	w.pair(9, "$EXTMIN")
	w.point(0, d.Corner)
	w.pair(9, "$EXTMAX")
	w.point(0, far)
	w.pair(9, "$LTSCALE")
	w.real(40, d.Scale)
	w.pair(0, "ENDSEC")
}

// dxfLine is a line type: lengths in mm on paper, which $LTSCALE enlarges, gaps negative.
type dxfLine struct {
	name, text string
	dashes     []float64
}

func (w *dxfWriter) tables(d *Drawing) {
	lines := []dxfLine{{"CONTINUOUS", "Solid line", nil}, {"CENTER", "Center ____ _ ____ _", []float64{6, -1.2, 1.2, -1.2}}}
	w.pair(0, "SECTION")
	w.pair(2, "TABLES")
	w.table("LTYPE", len(lines))
	for _, l := range lines {
		sum := 0.0
		for _, x := range l.dashes {
			sum += math.Abs(x)
		}
		w.pair(0, "LTYPE")
		w.pair(2, l.name)
		w.whole(70, 0)
		w.pair(3, l.text)
		w.whole(72, 65)
		w.whole(73, len(l.dashes))
		w.real(40, sum)
		for _, x := range l.dashes {
			w.real(49, x)
		}
	}
	w.pair(0, "ENDTAB")
	w.table("LAYER", int(layers))
	for _, f := range layerForms {
		w.pair(0, "LAYER")
		w.pair(2, f.name)
		w.whole(70, 0)
		w.whole(62, f.colour)
		line := lines[0].name
		if f.dashed {
			line = lines[1].name
		}
		w.pair(6, line)
	}
	w.pair(0, "ENDTAB")
	w.table("STYLE", 1)
	w.pair(0, "STYLE")
	w.pair(2, "STANDARD")
	w.whole(70, 0)
	w.real(40, 0)
	w.real(41, narrow)
	w.real(50, 0)
	w.whole(71, 0)
	w.real(42, 2.5*d.Scale)
	w.pair(3, "txt")
	w.pair(4, "")
	w.pair(0, "ENDTAB")
	w.pair(0, "ENDSEC")
}

func (w *dxfWriter) table(name string, entries int) {
	w.pair(0, "TABLE")
	w.pair(2, name)
	w.whole(70, entries)
}

func (w *dxfWriter) text(e *Text) {
	w.entity("TEXT", e.Layer)
	w.point(0, e.At)
	w.real(40, e.Height)
	w.real(41, narrow)
	w.pair(1, dxfText(e.Text))
	w.real(50, e.Angle*180/math.Pi)
	if e.Align != Left {
		w.whole(72, int(e.Align))
		w.point(1, e.At)
	}
}

// narrow is the width of letters over that of the font txt, which is wider than a sans-serif face.
const narrow = 0.8

// degrees is an angle from 0 to 360.
func degrees(a float64) float64 {
	d := math.Mod(a*180/math.Pi, 360)
	if d < 0 {
		d += 360
	}
	return d
}

// dxfLongest is the longest text that release 12 takes.
const dxfLongest = 255

// dxfText makes a text fit for a group: signs that DXF has codes for, other letters beyond ASCII as \U+XXXX, no
// control characters, and nothing of the text itself read as a code. A text that is too long is cut.
func dxfText(s string) string {
	var b strings.Builder
	var last rune
	for _, r := range s {
		c := string(r)
		switch {
		case r == '°':
			c = "%%d"
		case r == 'Ø':
			c = "%%c"
		case r == '±':
			c = "%%p"
		case r == '^':
			c = "^ " // the same
		case r == '\\':
			c = `\U+005C`
		case r < ' ' || r == 0x7f:
			c = " "
		case r > 0xffff:
			c = "?"
		case r > '~':
			c = fmt.Sprintf(`\U+%04X`, r)
		}
		if last == '%' && c[0] == '%' {
			c = " " + c // two of them begin a code
		}
		if b.Len()+len(c) > dxfLongest {
			break
		}
		b.WriteString(c)
		last = r
	}
	return b.String()
}
