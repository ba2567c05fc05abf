package report

import (
	"strings"

	"github.com/jedib0t/go-pretty/v6/table"
	"github.com/jedib0t/go-pretty/v6/text"
)

// column is a column of a grid.
type column struct {
	name  string // what it is called where it is left out
	head  string // lines of the heading
	unit  string // last line of the heading, "" for none
	cells []string
	left  bool // text rather than numbers
	keep  int  // the least goes first where there is no room; 0 is never left out
	most  int  // columns to which text is folded, 0 for no folding
}

// words breaks a name at its underscores into lines.
func words(name string) string { return strings.ReplaceAll(name, "_", "\n") }

// grid draws columns side by side in the width that there is, and tells which were left out.
func (s *sheet) grid(cols []column) (leftOut []string) {
	for {
		drawn, width := draw(cols)
		at := -1
		for i := range cols {
			if cols[i].keep > 0 && (at < 0 || cols[i].keep <= cols[at].keep) {
				at = i
			}
		}
		if width <= s.Width || at < 0 {
			s.b.WriteString(drawn + "\n")
			return leftOut
		}
		leftOut = append([]string{cols[at].name}, leftOut...)
		cols = append(append([]column(nil), cols[:at]...), cols[at+1:]...)
	}
}

// fits tells whether the columns fit side by side.
func fits(cols []column, width int) bool {
	_, w := draw(cols)
	return w <= width
}

// blocks draws columns side by side, those for which there is no room in further grids below that
// repeat the first column. Nothing is left out.
func (s *sheet) blocks(cols []column) {
	for first := true; len(cols) > 1 || first; first = false {
		n := len(cols)
		for n > 2 && !fits(cols[:n], s.Width) {
			n--
		}
		if !first {
			s.gap()
		}
		drawn, _ := draw(cols[:n])
		s.b.WriteString(drawn + "\n")
		cols = append([]column{cols[0]}, cols[n:]...)
	}
}

// draw is the text of a grid and its width.
func draw(cols []column) (drawn string, width int) {
	t := table.NewWriter()
	style := table.Style{
		Box:     table.BoxStyle{MiddleHorizontal: "-", PaddingRight: "  "},
		Options: table.Options{SeparateHeader: true},
		Format:  table.FormatOptions{Header: text.FormatDefault, Row: text.FormatDefault},
	}
	t.SetStyle(style)
	t.SuppressTrailingSpaces()
	units, rows := false, 0
	for i := range cols {
		units = units || cols[i].unit != ""
		rows = max(rows, len(cols[i].cells))
	}
	head := make(table.Row, len(cols))
	for i := range cols {
		h := cols[i].head
		if units {
			h += "\n" + cols[i].unit
			if cols[i].unit == "" {
				h += " "
			}
		}
		head[i] = h
	}
	t.AppendHeader(head)
	for r := range rows {
		row := make(table.Row, len(cols))
		for i := range cols {
			row[i] = ""
			if r < len(cols[i].cells) {
				row[i] = cols[i].cells[r]
			}
		}
		t.AppendRow(row)
	}
	configs := make([]table.ColumnConfig, len(cols))
	for i := range cols {
		c := table.ColumnConfig{Number: i + 1, Align: text.AlignRight, AlignHeader: text.AlignRight, VAlignHeader: text.VAlignBottom}
		if cols[i].left {
			c.Align, c.AlignHeader = text.AlignLeft, text.AlignLeft
		}
		if cols[i].most > 0 {
			c.WidthMax, c.WidthMaxEnforcer = cols[i].most, text.WrapSoft
		}
		configs[i] = c
	}
	t.SetColumnConfigs(configs)
	return trim(t.Render())
}

// trim takes blanks off the ends of lines, shortens rules to the width of the text, and gives that width.
func trim(drawn string) (string, int) {
	lines := strings.Split(drawn, "\n")
	rule := func(l string) bool { return len(l) > 0 && strings.Trim(l, "-") == "" }
	width := 0
	for i, l := range lines {
		lines[i] = strings.TrimRight(l, " ")
		if !rule(l) {
			width = max(width, text.StringWidthWithoutEscSequences(lines[i]))
		}
	}
	for i, l := range lines {
		if rule(l) {
			lines[i] = l[:min(len(l), width)]
		}
	}
	return strings.Join(lines, "\n"), width
}
