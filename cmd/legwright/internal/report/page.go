// Package report draws study records on a terminal: the first screen of a search, the ranked table,
// an appraisal, what helps where nothing is feasible, and the line of progress. It only draws: every
// figure comes from the records of package study.
package report

import (
	"io"
	"os"
	"strings"

	"legwright/cmd/legwright/internal/study"

	"github.com/jedib0t/go-pretty/v6/text"
	"golang.org/x/term"
)

// Page is where a screen is drawn.
type Page struct {
	Width  int    // columns; 0 for 100
	Colour bool   // mark headings and failures with terminal colours
	Dir    string // the study folder, for hints of what to do next; "" for none
}

const (
	usualWidth = 100
	leastWidth = 60
	mostProse  = 100 // columns beyond which running text is hard to read
)

// PageOf is the page that suits a writer: as wide as the terminal, coloured unless NO_COLOR is set or
// the terminal is dumb; 100 columns without colour for anything else.
func PageOf(w io.Writer) Page {
	p := Page{Width: usualWidth}
	f, ok := w.(*os.File)
	if !ok || !term.IsTerminal(int(f.Fd())) {
		return p
	}
	if width, _, err := term.GetSize(int(f.Fd())); err == nil && width > 0 {
		p.Width = width
	}
	p.Colour = os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb"
	return p
}

// sheet collects the lines of a screen.
type sheet struct {
	Page
	b strings.Builder
}

func (p Page) sheet() *sheet {
	if p.Width == 0 {
		p.Width = usualWidth
	}
	p.Width = max(p.Width, leastWidth)
	return &sheet{Page: p}
}

// to writes the screen.
func (s *sheet) to(w io.Writer) error {
	_, err := io.WriteString(w, s.b.String())
	return err
}

func (s *sheet) gap() { s.b.WriteByte('\n') }

// heading writes a line that stands out.
func (s *sheet) heading(t string) {
	for _, line := range fold(study.Clean(t), s.Width, "", "") {
		s.b.WriteString(s.bold(line) + "\n")
	}
}

// say writes running text, folded to the width.
func (s *sheet) say(t string) { s.fold(t, "", "") }

// item writes running text as an entry of a list.
func (s *sheet) item(t string) { s.fold(t, "- ", "  ") }

func (s *sheet) fold(t, first, rest string) {
	for _, line := range fold(study.Clean(t), min(s.Width, mostProse), first, rest) {
		s.b.WriteString(line + "\n")
	}
}

func (s *sheet) bold(t string) string  { return s.paint(t, text.Bold) }
func (s *sheet) alarm(t string) string { return s.paint(t, text.FgRed) }

// paint is independent of what the table library believes of the terminal.
func (s *sheet) paint(t string, c text.Color) string {
	if !s.Colour || t == "" {
		return t
	}
	return c.EscapeSeq() + t + text.Reset.EscapeSeq()
}

// nbsp keeps the words on both sides of it in one line.
const nbsp = "\u00a0"

// together keeps a text in one line.
func together(t string) string { return strings.ReplaceAll(t, " ", nbsp) }

// fold breaks text between words into lines of at most width columns.
func fold(t string, width int, first, rest string) []string {
	var lines []string
	line, empty := first, true
	for _, word := range strings.FieldsFunc(t, func(r rune) bool { return r == ' ' }) {
		word = strings.ReplaceAll(word, nbsp, " ")
		if !empty && text.StringWidth(line)+1+text.StringWidth(word) > width {
			lines = append(lines, line)
			line, empty = rest, true
		}
		if !empty {
			line += " "
		}
		line += word
		empty = false
	}
	return append(lines, line)
}

// leftOut writes the notes of a record, what its figures leave out, and the caution.
func (s *sheet) leftOut(poses int, notes []string, caution string) {
	standing := study.LeftOut(poses)
	if len(notes) > 0 {
		shown := false
		for _, n := range notes {
			if !among(n, standing) {
				if !shown {
					s.heading("Notes")
					shown = true
				}
				s.item(n)
			}
		}
		if shown {
			s.gap()
		}
	}
	s.heading("What the figures leave out")
	for _, n := range standing {
		s.item(n)
	}
	s.say(caution)
}

func among(t string, list []string) bool {
	for _, x := range list {
		if x == t {
			return true
		}
	}
	return false
}
