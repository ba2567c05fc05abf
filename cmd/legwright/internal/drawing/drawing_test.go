package drawing

import (
	"math"
	"testing"
)

// sample is a small sheet with every kind of element, at 1:5 on A4: a part of 400 × 300 mm, and texts that try
// what the formats take for signs of their own.
func sample() *Drawing {
	d := &Drawing{Title: `plan <&"'> ` + hostile, Scale: 5, Paper: A4, Corner: Point{-600, -450}}
	d.Circles = []Circle{{Joint, Point{100.5, -50.25}, 6, "B1"}, {Centre, Point{}, 200, ""}}
	d.Lines = []Line{{Drive, Point{100.5, -50.25}, Point{-199.5, 349.75}}}
	d.Distance(Point{-200, 0}, Point{200, 0}, -250, "Ø 400")
	d.Distance(Point{0, 0}, Point{0, 12}, 20, "12")
	d.Angle(Point{}, 120, 0, math.Pi/3, "60°")
	d.Angle(Point{}, 150, 1, 1.05, "2.865°")
	d.ScaleBar(d.On(15, 15))
	d.Label(Point{100.5, -50.25}, 0, "B1")
	d.Sheet(&Block{
		Heads: []string{"joint", "x", "y"}, Rows: [][]string{{"B1", "100.5", "-50.25"}},
		Notes: []string{"a note " + hostile}, Lines: []string{"Base plan", "Design 001", hostile}, Small: []string{"a caution"}, Stamp: "STAMP",
	})
	return d
}

const hostile = "</text><script>alert(1)</script> ]]> & 100% %%c %%% ^J \\U+0041 \\P € Ä ±5° 3%° %Ø %± 𝄞 x\x00\x07y\u202e end"

// near fails the test where got is farther than tol from want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %g, want %g within %g", what, got, want, tol)
	}
}

// The scale is the first of the usual series at which the part fits, and A3 is taken only where it helps.
func TestFit(t *testing.T) {
	room := func(p Paper) (w, h float64) { return p.Width - 100, p.Height - 60 } // 197 × 150, 320 × 237
	for _, c := range []struct {
		w, h  float64
		paper Paper
		scale float64
	}{
		{197, 150, A4, 1}, {198, 150, A4, 2}, {100, 151, A4, 2}, {1900, 1400, A4, 10}, {1000, 500, A4, 10},
		{450, 250, A3, 2},   // 1:5 on A4 would fill less than half of it
		{950, 700, A4, 5},   // A3 would allow nothing larger
		{19, 15, A4, 0.1},   // a small part is drawn larger
		{1e7, 1e7, A4, 1e3}, // nothing fits: the smallest picture
	} {
		p, s := Fit(c.w, c.h, room)
		if p != c.paper || s != c.scale {
			t.Errorf("%g × %g: %s at 1:%g, want %s at 1:%g", c.w, c.h, p.Name, s, c.paper.Name, c.scale)
		}
	}
}

// Dimension lines have the length that they give, whichever way round, and lie where they are moved to. A narrow one has
// its arrows outside: its line is longer. Exactly but for rounding, 1e-9 mm.
func TestDimensionsMeasure(t *testing.T) {
	d := &Drawing{Scale: 2}
	a, b := Point{10, 20}, Point{310, 420}
	d.Distance(a, b, -30, "500")
	line := d.Lines[2] // after the two extension lines
	near(t, "length", math.Hypot(line.To.X-line.From.X, line.To.Y-line.From.Y), 500, 1e-9)
	// to the right of the way from a to b: (0.8, -0.6) times 30
	near(t, "x", line.From.X, 10+24, 1e-9)
	near(t, "y", line.From.Y, 20-18, 1e-9)
	if n := len(d.Texts); n != 1 || d.Texts[0].Text != "500" || d.Texts[0].Angle < -math.Pi/2 || d.Texts[0].Angle > math.Pi/2 {
		t.Errorf("texts %v", d.Texts)
	}
	tips := 0
	for _, l := range d.Lines[3:] { // arrows: their tips are the ends of the line
		if l.From == line.From || l.From == line.To {
			tips++
		}
	}
	if tips != 4 {
		t.Errorf("%d strokes of arrows at the ends, want 4", tips)
	}

	d = &Drawing{Scale: 2}
	d.Angle(Point{5, 5}, 100, 0.2, 1.2, "57.296°")
	e := d.Arcs[0]
	if len(d.Arcs) != 1 || e.From != 0.2 || e.To != 1.2 || e.Radius != 100 || e.Centre != (Point{5, 5}) {
		t.Errorf("arcs %v", d.Arcs)
	}
}

// Texts of dimensions are never read upside down.
func TestUpright(t *testing.T) {
	for i := -40; i <= 40; i++ {
		a := float64(i) * math.Pi / 10
		u := upright(a)
		if u < -math.Pi/2-1e-6 || u > math.Pi/2+1e-6 {
			t.Errorf("upright(%g) = %g", a, u)
		}
		near(t, "same line", math.Abs(math.Sin(u-a)), 0, 1e-9)
	}
}

// A label keeps clear of what is drawn if there is room: of a line on the side where it would go, and of other labels.
func TestLabelsKeepClear(t *testing.T) {
	d := &Drawing{Scale: 1}
	d.Lines = append(d.Lines, Line{Centre, Point{0, 0}, Point{100, 0}})
	for range 3 {
		d.Label(Point{}, 0, "B1")
	}
	for i := range d.Texts {
		b := d.Texts[i].box()
		if b.meets(d.Lines[0].From, d.Lines[0].To) {
			t.Errorf("label %d lies on the line", i)
		}
		rest := &Drawing{Scale: 1, Texts: append(append([]Text(nil), d.Texts[:i]...), d.Texts[i+1:]...)}
		if rest.crossed(b) > 0 {
			t.Errorf("label %d lies on another", i)
		}
	}
}

// Lines are broken at blanks, long words anywhere, and nothing is lost.
func TestWrap(t *testing.T) {
	got := wrap("to be or nottobethatisthe question", 10*0.78*2, 2)
	want := []string{"to be or", "nottobetha", "tisthe", "question"}
	if len(got) != len(want) {
		t.Fatalf("%q", got)
	}
	for i := range want {
		if got[i] != want[i] {
			t.Errorf("line %d %q, want %q", i, got[i], want[i])
		}
	}
}
