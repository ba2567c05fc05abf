package drawing

import (
	"bytes"
	"encoding/xml"
	"io"
	"math"
	"strconv"
	"strings"
	"testing"
)

// svgElement is an element as a reader of XML finds it.
type svgElement struct {
	name  string
	layer string // id of the group
	attr  map[string]string
	text  string
}

// readSVG reads the elements in order, and fails where the text is not well-formed XML.
func readSVG(t *testing.T, b []byte) []svgElement {
	t.Helper()
	dec := xml.NewDecoder(bytes.NewReader(b))
	dec.Strict = true
	var out []svgElement
	var open []int
	layer := ""
	for {
		tok, err := dec.Token()
		if err == io.EOF {
			return out
		}
		if err != nil {
			t.Fatalf("not well-formed: %v", err)
		}
		switch e := tok.(type) {
		case xml.StartElement:
			x := svgElement{name: e.Name.Local, attr: map[string]string{}}
			for _, a := range e.Attr {
				x.attr[a.Name.Local] = a.Value
			}
			if x.name == "g" && x.attr["id"] != "" {
				layer = x.attr["id"]
			}
			x.layer = layer
			open = append(open, len(out))
			out = append(out, x)
		case xml.CharData:
			if n := len(open); n > 0 {
				out[open[n-1]].text += string(e)
			}
		case xml.EndElement:
			open = open[:len(open)-1]
		}
	}
}

func (e *svgElement) number(t *testing.T, key string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(e.attr[key], 64)
	if err != nil {
		t.Fatalf("%s of <%s>: %v", key, e.name, err)
	}
	return v
}

// The sheet has its physical size, a unit of the view box is a millimetre, and every line, circle and text lies where
// the drawing has it, over the scale. The numbers are written to 1e-6 mm.
func TestSVGIsToScale(t *testing.T) {
	d := sample()
	es := readSVG(t, d.SVG())
	root := es[0]
	if root.name != "svg" || root.attr["width"] != "297mm" || root.attr["height"] != "210mm" || root.attr["viewBox"] != "0 0 297 210" {
		t.Fatalf("root %v", root)
	}
	const tol = 1e-6
	x := func(p Point) float64 { return (p.X + 600) / 5 }
	y := func(p Point) float64 { return 210 - (p.Y+450)/5 }
	var lines, circles, arcs int
	texts := map[string]int{}
	for i := range es {
		e := &es[i]
		switch e.name {
		case "line":
			want := find(d.Lines, func(l Line) bool {
				return math.Abs(x(l.From)-e.number(t, "x1")) <= tol && math.Abs(y(l.From)-e.number(t, "y1")) <= tol &&
					math.Abs(x(l.To)-e.number(t, "x2")) <= tol && math.Abs(y(l.To)-e.number(t, "y2")) <= tol
			})
			if want == nil || layerForms[want.Layer].name != e.layer {
				t.Errorf("line %v on layer %s is not in the drawing", e.attr, e.layer)
			}
			lines++
		case "circle":
			want := find(d.Circles, func(c Circle) bool {
				return math.Abs(x(c.Centre)-e.number(t, "cx")) <= tol && math.Abs(y(c.Centre)-e.number(t, "cy")) <= tol &&
					math.Abs(c.Radius/5-e.number(t, "r")) <= tol && c.Name == e.attr["id"]
			})
			if want == nil {
				t.Errorf("circle %v is not in the drawing", e.attr)
			}
			circles++
		case "path":
			arcs++
		case "text":
			texts[e.text]++
		}
	}
	if lines != len(d.Lines) || circles != len(d.Circles) || arcs != len(d.Arcs) {
		t.Errorf("%d lines, %d circles, %d arcs, want %d, %d, %d", lines, circles, arcs, len(d.Lines), len(d.Circles), len(d.Arcs))
	}
	for i := range d.Texts {
		clean := strings.NewReplacer("\x00", "\ufffd", "\x07", "\ufffd").Replace(d.Texts[i].Text)
		if texts[clean] == 0 {
			t.Errorf("text %q is missing", clean)
		}
	}
}

// An arc ends where its angles say: the path's two points lie on them, to 1e-6 mm.
func TestSVGArcs(t *testing.T) {
	d := &Drawing{Scale: 2, Paper: A4}
	for _, e := range []Arc{{Size, Point{100, 100}, 50, 0.3, 1}, {Size, Point{100, 100}, 50, 1, 5.5}, {Size, Point{200, 80}, 20, -0.4, 0.4}} {
		d.Arcs = []Arc{e}
		es := readSVG(t, d.SVG())
		var path string
		for i := range es {
			if es[i].name == "path" {
				path = es[i].attr["d"]
			}
		}
		f := strings.Fields(strings.NewReplacer("M", " ", "A", " ").Replace(path))
		num := func(i int) float64 { v, _ := strconv.ParseFloat(f[i], 64); return v }
		for k, a := range [2]float64{e.From, e.To} {
			sin, cos := math.Sincos(a)
			near(t, "x", num(7*k), (e.Centre.X+e.Radius*cos)/2, 1e-6)
			near(t, "y", num(7*k+1), 210-(e.Centre.Y+e.Radius*sin)/2, 1e-6)
		}
		large := "0"
		if e.To-e.From > math.Pi {
			large = "1"
		}
		if f[5] != large || f[6] != "0" || num(2) != e.Radius/2 || num(3) != e.Radius/2 {
			t.Errorf("arc %v: path %s", e, path)
		}
	}
}

// The scale bar has the length that it is labelled with.
func TestScaleBar(t *testing.T) {
	for _, scale := range []float64{0.1, 0.5, 1, 2, 5, 10, 20, 50} {
		d := &Drawing{Scale: scale, Paper: A4}
		d.ScaleBar(Point{3, 4})
		l := d.Lines[0]
		text := strings.TrimSuffix(d.Texts[1].Text, " mm")
		want, err := strconv.ParseFloat(text, 64)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "bar", l.To.X-l.From.X, want, 1e-9)
		if on := want / scale; on < 20 || on > 50 {
			t.Errorf("1:%g: the bar is %g mm on paper", scale, on)
		}
	}
}

// find is the first element for which ok holds, or nil.
func find[E any](es []E, ok func(E) bool) *E {
	for i := range es {
		if ok(es[i]) {
			return &es[i]
		}
	}
	return nil
}
