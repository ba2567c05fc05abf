package drawing

import "strings"

// Margin and Column are the width of the frame's margin and of the column at the right that holds table and title
// block, mm on paper.
const (
	Margin = 10.0
	Column = 84.0
)

// On is the place that lies so many mm from the sheet's lower left corner.
func (d *Drawing) On(x, y float64) Point { return d.Corner.plus(x*d.Scale, y*d.Scale) }

// rule draws a line of the frame between places on paper.
func (d *Drawing) rule(x1, y1, x2, y2 float64) {
	d.Lines = append(d.Lines, Line{Frame, d.On(x1, y1), d.On(x2, y2)})
}

// write puts a text at a place on paper.
func (d *Drawing) write(x, y, height float64, align Align, text string) {
	d.Texts = append(d.Texts, Text{Frame, d.On(x, y), height * d.Scale, 0, align, text})
}

// Block is what the column of a sheet says.
type Block struct {
	Heads []string   // of the table at the top
	Rows  [][]string // the first cell stands left, the others right
	Notes []string   // below the table
	Lines []string   // title block: the first is the sheet's name, the second is written large
	Small []string   // the end of the title block, in small letters
	Stamp string     // in a box of its own
}

// Sheet draws the frame and the column.
func (d *Drawing) Sheet(b *Block) {
	w, h := d.Paper.Width, d.Paper.Height
	left, right := w-Margin-Column, w-Margin
	d.rule(Margin, Margin, right, Margin)
	d.rule(right, Margin, right, h-Margin)
	d.rule(right, h-Margin, Margin, h-Margin)
	d.rule(Margin, h-Margin, Margin, Margin)
	d.rule(left, Margin, left, h-Margin)
	d.table(b, left, right, h-Margin)
	d.block(b, left, right)
}

// table draws table and notes from the top down.
func (d *Drawing) table(b *Block, left, right, top float64) {
	const row = 4.6
	y := top
	cells := func(texts []string, height float64) {
		n := len(texts) - 1
		for i, s := range texts {
			if i == 0 {
				d.write(left+2, y-row+1.3, height, Left, s)
				continue
			}
			d.write(right-2-float64(n-i)*(Column-16)/float64(n), y-row+1.3, height, Right, s)
		}
		y -= row
		d.rule(left, y, right, y)
	}
	if len(b.Heads) > 0 {
		cells(b.Heads, smallHeight)
		for _, r := range b.Rows {
			cells(r, 2.1)
		}
	}
	y -= 1
	for _, n := range b.Notes {
		for _, s := range wrap(n, Column-4, smallHeight) {
			y -= 2.9
			d.write(left+2, y, smallHeight, Left, s)
		}
		y -= 0.8
	}
}

// block draws the title block from the bottom up.
func (d *Drawing) block(b *Block, left, right float64) {
	y := Margin + 1.6
	for i := len(b.Small) - 1; i >= 0; i-- {
		lines := wrap(b.Small[i], Column-4, smallHeight)
		for k := len(lines) - 1; k >= 0; k-- {
			d.write(left+2, y, smallHeight, Left, lines[k])
			y += 2.8
		}
		y += 0.6
	}
	d.rule(left, y, right, y)
	d.write((left+right)/2, y+2, textHeight, Middle, b.Stamp)
	y += 6.4
	d.rule(left, y, right, y)
	y += 1.6
	for i := len(b.Lines) - 1; i >= 0; i-- {
		size, step := 2.1, 3.4
		if i < 2 {
			size, step = 3, 4.6
		}
		if i == 2 {
			step = 4.4
		}
		lines := wrap(b.Lines[i], Column-4, size)
		for k := len(lines) - 1; k >= 0; k-- {
			d.write(left+2, y, size, Left, lines[k])
			y += step
		}
	}
	d.rule(left, y, right, y)
}

// wrap breaks a text into lines that fit into so many mm, at blanks, and words that do not fit anywhere.
func wrap(text string, room, height float64) []string {
	most := int(room / (0.78 * height))
	var out []string
	line := ""
	for _, word := range strings.Fields(text) {
		for r := []rune(word); len(r) > most; r = []rune(word) {
			if line != "" {
				out, line = append(out, line), ""
			}
			out = append(out, string(r[:most]))
			word = string(r[most:])
		}
		switch {
		case line == "":
			line = word
		case len([]rune(line))+1+len([]rune(word)) <= most:
			line += " " + word
		default:
			out, line = append(out, line), word
		}
	}
	if line != "" {
		out = append(out, line)
	}
	return out
}
