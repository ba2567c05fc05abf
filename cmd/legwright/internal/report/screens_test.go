package report

import (
	"bytes"
	"flag"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/study"

	"github.com/jedib0t/go-pretty/v6/text"
)

var update = flag.Bool("update", false, "write the texts under testdata anew")

// screens are all screens, each with the name of its text under testdata.
var screens = []struct {
	name string
	draw func(w io.Writer, p Page) error
}{
	{"first", func(w io.Writer, p Page) error { return FirstScreen(w, lensTable(), p) }},
	{"table", func(w io.Writer, p Page) error { return Table(w, lensTable(), 8, p) }},
	{"appraisal", func(w io.Writer, p Page) error {
		d := lensTable().Designs[0]
		return Appraisal(w, &d, p)
	}},
	{"failing", func(w io.Writer, p Page) error { return Appraisal(w, broken(), p) }},
	{"infeasible", func(w io.Writer, p Page) error { return FirstScreen(w, cramped(), p) }},
	{"families", func(w io.Writer, p Page) error { return FirstScreen(w, drives(), p) }},
	{"nofamily", func(w io.Writer, p Page) error {
		f := cramped()
		f.Families = drives().Families[2:]
		return FirstScreen(w, f, p)
	}},
}

func TestScreens(t *testing.T) {
	for _, s := range screens {
		for _, width := range []int{80, 100} {
			name := s.name + map[int]string{80: "80", 100: "100"}[width] + ".txt"
			t.Run(name, func(t *testing.T) {
				var b bytes.Buffer
				if err := s.draw(&b, Page{Width: width, Dir: "out/lens table"}); err != nil {
					t.Fatal(err)
				}
				for i, l := range strings.Split(b.String(), "\n") {
					if text.StringWidth(l) > width {
						t.Errorf("line %d has %d columns: %s", i+1, text.StringWidth(l), l)
					}
					if strings.TrimRight(l, " ") != l {
						t.Errorf("line %d ends in blanks", i+1)
					}
				}
				path := filepath.Join("testdata", name)
				if *update {
					if err := os.WriteFile(path, b.Bytes(), 0o644); err != nil {
						t.Fatal(err)
					}
				}
				want, err := os.ReadFile(path)
				if err != nil {
					t.Fatal(err)
				}
				if b.String() != string(want) {
					t.Errorf("differs from %s (go test -update writes it anew):\n%s", path, b.String())
				}
			})
		}
	}
}

// Colours mark headings and failures, and change nothing else.
func TestColourChangesNoText(t *testing.T) {
	for _, s := range screens {
		var plain, coloured bytes.Buffer
		if err := s.draw(&plain, Page{Width: 90}); err != nil {
			t.Fatal(err)
		}
		if err := s.draw(&coloured, Page{Width: 90, Colour: true}); err != nil {
			t.Fatal(err)
		}
		if strings.Contains(plain.String(), "\x1b") {
			t.Errorf("%s: escapes on a plain page", s.name)
		}
		if !strings.Contains(coloured.String(), "\x1b[") {
			t.Errorf("%s: no colour on a coloured page", s.name)
		}
		if got := text.StripEscape(coloured.String()); got != plain.String() {
			t.Errorf("%s: the coloured text differs:\n%s\n%s", s.name, got, plain.String())
		}
	}
}

// What is no terminal gets no colour; a terminal is out of reach for a test.
func TestPageOfABuffer(t *testing.T) {
	if p := PageOf(new(bytes.Buffer)); p.Colour || p.Width != 100 {
		t.Errorf("got %+v", p)
	}
	f, err := os.CreateTemp(t.TempDir(), "")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	if p := PageOf(f); p.Colour || p.Width != 100 {
		t.Errorf("file: got %+v", p)
	}
}

// Texts of files must not reach the terminal as commands.
func TestScreensStripControls(t *testing.T) {
	const bad = "a\x1b[2Jb\rc\u009bd\u202ee\nf"
	f := lensTable()
	f.Title = bad
	f.Notes = []string{bad}
	f.Status = bad
	f.Goals[0].Measure = bad
	for i := range f.Designs {
		d := &f.Designs[i]
		d.Family = bad
		d.Measures[bad] = study.Number(i)
		d.Dimensions[bad] = 1
		d.Marks = append(d.Marks, bad)
		d.Notes = []string{bad}
		d.Worst[bad] = study.Worst{Zone: bad, Case: bad, Leg: 1}
		for k := range d.Limits {
			d.Limits[k].Measure, d.Limits[k].Origin, d.Limits[k].Unit = bad, bad, bad
		}
		for k := range d.Excursions {
			d.Excursions[k].Coordinate, d.Excursions[k].LowFails, d.Excursions[k].HighFails = bad, bad, bad
		}
	}
	g := cramped()
	for i := range g.Help.Binding {
		g.Help.Binding[i].Constraint = bad
	}
	for i := range g.Help.Relaxations {
		g.Help.Relaxations[i].Constraint, g.Help.Relaxations[i].Origin = bad, bad
	}
	var b bytes.Buffer
	p := Page{Width: 100, Dir: bad}
	for _, err := range []error{FirstScreen(&b, f, p), Table(&b, f, 0, p), Appraisal(&b, &f.Designs[0], p), infeasible(&b, g, p)} {
		if err != nil {
			t.Fatal(err)
		}
	}
	for _, r := range b.String() {
		if r != '\n' && study.Clean(string(r)) != string(r) {
			t.Fatalf("control character %U on the screen", r)
		}
	}
	if !strings.Contains(b.String(), "a[2Jbcde f") {
		t.Error("the text itself is gone")
	}
}

type closed struct{}

func (closed) Write([]byte) (int, error) { return 0, io.ErrClosedPipe }

func TestWriteErrorsAreReported(t *testing.T) {
	for _, s := range screens {
		if err := s.draw(closed{}, Page{}); err != io.ErrClosedPipe {
			t.Errorf("%s: got %v", s.name, err)
		}
	}
}
