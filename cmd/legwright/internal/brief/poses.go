package brief

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode/utf8"

	"legwright/cmd/legwright/internal/units"
)

const (
	maxPoseFile   = 64 << 20 // bytes of a pose file
	maxPoseLine   = 1000     // bytes of a line: six numbers take far fewer
	maxPoseFaults = 20       // faults of rows that are told one by one
)

// poseColumn is one column of a pose file.
type poseColumn struct {
	heading string
	index   int // of the coordinate
	unit    units.Unit
	lacking string // the family without this freedom, or ""
}

type poseReader struct {
	file   string
	csv    *csv.Reader
	faults Faults
	more   int // faults beyond the bound
}

// parsePoses reads a pose file: x, y, z in m, roll, pitch, yaw in rad, about home. Each heading names
// a coordinate and its unit, as x_mm or yaw_deg; a coordinate without a column is 0. Columns of
// freedoms that one of the families lacks must be 0; without families all six may move.
func parsePoses(file string, data []byte, families []*KnownFamily) ([][6]float64, Faults) {
	data = bytes.TrimPrefix(data, []byte("\ufeff"))
	if i := firstBad(data); i >= 0 {
		return nil, Faults{{position(file, data, i), "", fmt.Sprintf("byte 0x%02x is not UTF-8 text", data[i]), "save the file as UTF-8 CSV"}}
	}
	if f := oddLine(file, data); f != nil {
		return nil, Faults{*f}
	}
	p := &poseReader{file: file, csv: csv.NewReader(bytes.NewReader(data))}
	p.csv.FieldsPerRecord = -1
	p.csv.ReuseRecord = true
	p.csv.TrimLeadingSpace = true
	head, err := p.csv.Read()
	if err != nil {
		p.broken(err, "the file is empty")
		return nil, p.faults
	}
	columns := p.headings(head, families)
	if len(p.faults) > 0 {
		return nil, p.faults
	}
	poses := p.rows(columns)
	if p.more > 0 {
		p.faults = append(p.faults, Fault{Position{File: file}, "", fmt.Sprintf("%d more faults follow", p.more), "mend these first"})
	}
	if len(p.faults) > 0 {
		return nil, p.faults
	}
	return poses, nil
}

// oddLine finds a line that is too long, or a quoted field that goes over lines, so that no row holds more than a line.
func oddLine(file string, data []byte) *Fault {
	n := 0
	for line := range bytes.Lines(data) {
		n++
		switch {
		case len(line) > maxPoseLine:
			return &Fault{Position{file, n, 1}, "", fmt.Sprintf("a line of more than %d bytes", maxPoseLine), "write one line per pose, with a number for each heading"}
		case bytes.Count(line, []byte{'"'})%2 == 1:
			at := utf8.RuneCount(line[:bytes.IndexByte(line, '"')])
			return &Fault{Position{file, n, at + 1}, "", "a quotation mark without its other", "write plain numbers between commas, without quotes"}
		}
	}
	return nil
}

// broken notes an error of the CSV text itself.
func (p *poseReader) broken(err error, atEnd string) {
	var syntax *csv.ParseError
	switch {
	case errors.Is(err, io.EOF):
		p.note(Position{p.file, 1, 1}, "", atEnd, "write a line of headings, x_mm,y_mm,z_mm,roll_deg,pitch_deg,yaw_deg, and one line per pose")
	case errors.As(err, &syntax):
		p.note(Position{p.file, syntax.Line, max(syntax.Column, 1)}, "", "not readable as CSV: "+syntax.Err.Error(), "write plain numbers between commas, without quotes")
	default:
		p.note(Position{File: p.file}, "", "not readable: "+err.Error(), "check the file")
	}
}

func (p *poseReader) note(at Position, key, problem, remedy string) {
	if len(p.faults) >= maxPoseFaults {
		p.more++
		return
	}
	p.faults = append(p.faults, Fault{at, key, problem, remedy})
}

func (p *poseReader) field(i int) Position {
	line, column := p.csv.FieldPos(i)
	return Position{p.file, line, column}
}

// headings reads the first line.
func (p *poseReader) headings(head []string, families []*KnownFamily) (columns []poseColumn) {
	seen := map[int]bool{}
	if len(head) == 1 && strings.ContainsAny(head[0], ";\t") {
		p.note(p.field(0), "", "the columns are not parted by commas", "part them by commas, with decimal points in the numbers")
		return nil
	}
	for i, h := range head {
		h = strings.Clone(strings.TrimSpace(h))
		name, unit := cutHeading(h)
		index := slices.Index(coordinates[:], name)
		if index < 0 {
			hint := "the columns are x, y, z, roll, pitch, yaw, each with its unit, as x_mm"
			if c := near(name, coordinates[:]); c != "" {
				hint = fmt.Sprintf("did you mean %s_%s?", c, units.Suffix(coordinateKind(slices.Index(coordinates[:], c))))
			}
			p.note(p.field(i), short(h), "unknown column", hint)
			continue
		}
		if seen[index] {
			p.note(p.field(i), short(h), "a second column of "+name, "give each coordinate once")
		}
		seen[index] = true
		u, err := units.Lookup(unit, coordinateKind(index))
		var bad *units.Error
		if errors.As(err, &bad) {
			p.note(p.field(i), short(h), bad.Problem, fmt.Sprintf("write %s_%s", name, units.Suffix(coordinateKind(index))))
			continue
		}
		c := poseColumn{heading: h, index: index, unit: u}
		for _, f := range families {
			if !f.has(name) {
				c.lacking = f.Name
			}
		}
		columns = append(columns, c)
	}
	return columns
}

// cutHeading parts "x_mm", "x mm", "x [mm]" and "x (mm)".
func cutHeading(h string) (name, unit string) {
	i := strings.IndexAny(h, "_ [(")
	if i < 0 {
		return h, ""
	}
	return h[:i], strings.Trim(h[i:], "_ []()")
}

// rows reads the poses.
func (p *poseReader) rows(columns []poseColumn) (poses [][6]float64) {
	for {
		row, err := p.csv.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			p.broken(err, "")
			return nil
		}
		if len(poses) >= maxPoses {
			p.note(p.field(0), "", fmt.Sprintf("more than %d poses", maxPoses), "give fewer")
			return nil
		}
		poses = append(poses, p.row(row, columns))
	}
	if len(poses) == 0 && len(p.faults) == 0 {
		p.note(Position{p.file, 2, 1}, "", "the file holds no pose", "write one line per pose below the headings")
	}
	return poses
}

func (p *poseReader) row(row []string, columns []poseColumn) (pose [6]float64) {
	if len(row) != len(columns) {
		p.note(p.field(0), "", fmt.Sprintf("%d numbers below %d headings", len(row), len(columns)), "write one number for each heading, with a decimal point")
		return pose
	}
	for i, c := range columns {
		v, err := c.unit.Parse(strings.TrimSpace(row[i]))
		var bad *units.Error
		switch {
		case errors.As(err, &bad):
			p.note(p.field(i), c.heading, short(bad.Problem), bad.Remedy)
		case c.lacking != "" && v != 0:
			p.note(p.field(i), c.heading, c.lacking+" does not move in "+coordinates[c.index], "leave the column out or write 0")
		case c.index >= 3 && (v < -halfTurn || v > halfTurn):
			p.note(p.field(i), c.heading, strings.TrimSpace(row[i])+" is beyond half a turn", "write an angle from -180 deg to 180 deg")
		}
		pose[c.index] = v
	}
	return pose
}
