// Package drawing holds a plan drawing as a list of lines, arcs, circles and texts, and writes it as SVG
// (to scale, in mm on paper) and as DXF R12 (in mm, real size).
//
// Coordinates are real millimetres, x to the right and y up, whatever the scale; what is to have a
// size on paper (texts, arrows, frame) is drawn larger by Drawing.Scale.
package drawing

import "math"

// Point is a place on the drawing, real mm.
type Point struct{ X, Y float64 }

// Layer tells what an element is for.
type Layer int

// The layers.
const (
	Frame  Layer = iota // the sheet's frame, title block and tables
	Centre              // centre lines and pitch circles
	Joint               // joint centres
	Drive               // cranks, rails, hinges and the short sides of parallelograms
	Size                // dimensions
	Note                // texts
	layers
)

// layerForm is how a layer is drawn.
type layerForm struct {
	name   string
	colour int     // of the DXF palette, 7 is black or white
	ink    string  // SVG
	width  float64 // mm on paper
	dashed bool    // a centre line: long and short dashes
}

var layerForms = [layers]layerForm{
	Frame:  {"FRAME", 7, "#000", 0.35, false},
	Centre: {"CENTRE", 3, "#1a6b4a", 0.18, true},
	Joint:  {"JOINTS", 7, "#000", 0.5, false},
	Drive:  {"DRIVES", 5, "#23409a", 0.35, false},
	Size:   {"DIMENSIONS", 1, "#8c2f10", 0.18, false},
	Note:   {"NOTES", 7, "#000", 0.25, false},
}

// Align is the side of a text at which it is held. The held point lies on the baseline.
type Align int

// The alignments.
const (
	Left Align = iota
	Middle
	Right
)

// Line is a straight line.
type Line struct {
	Layer    Layer
	From, To Point
}

// Circle is a whole circle. Name marks a joint, as tables number it.
type Circle struct {
	Layer  Layer
	Centre Point
	Radius float64
	Name   string
}

// Arc runs counter-clockwise from one angle to the other, radians from +x.
type Arc struct {
	Layer    Layer
	Centre   Point
	Radius   float64
	From, To float64
}

// Text is a line of text, turned by Angle (radians). Height is that of capital letters.
type Text struct {
	Layer  Layer
	At     Point
	Height float64
	Angle  float64
	Align  Align
	Text   string
}

// Drawing is one sheet.
type Drawing struct {
	Title   string
	Scale   float64 // real mm for each mm on paper: 10 for 1:10
	Paper   Paper
	Corner  Point // real place of the sheet's lower left corner
	Lines   []Line
	Circles []Circle
	Arcs    []Arc
	Texts   []Text
}

// Paper is a sheet size in mm, lying.
type Paper struct {
	Name          string
	Width, Height float64
}

// The papers that plans are drawn on.
var (
	A4 = Paper{"A4", 297, 210}
	A3 = Paper{"A3", 420, 297}
)

// scales are the usual ones of engineering drawings (ISO 5455, from memory), the largest picture first.
var scales = []float64{0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100, 200, 500, 1000}

// Fit chooses paper and scale for a part that takes width × height real mm, where room gives the space on a
// paper in mm. It takes A4, unless the picture would be smaller there than half of the room and A3 allows a larger scale.
func Fit(width, height float64, room func(Paper) (w, h float64)) (Paper, float64) {
	best := func(p Paper) float64 {
		w, h := room(p)
		for _, s := range scales {
			if width <= w*s && height <= h*s {
				return s
			}
		}
		return scales[len(scales)-1]
	}
	small, large := best(A4), best(A3)
	w, h := room(A4)
	if large < small && width/small < w/2 && height/small < h/2 {
		return A3, large
	}
	return A4, small
}

// width is about what a text takes in a plain sans-serif face, for its height.
func width(text string, height float64) float64 {
	n := 0
	for range text {
		n++
	}
	return 0.85 * height * float64(n)
}

func (p Point) plus(x, y float64) Point { return Point{p.X + x, p.Y + y} }

// at is the point at the distance from p, at the angle.
func (p Point) at(r, angle float64) Point {
	sin, cos := math.Sincos(angle)
	return p.plus(r*cos, r*sin)
}
