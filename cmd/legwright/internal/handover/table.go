package handover

import (
	"bytes"
	"encoding/csv"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/objective"
)

// table is a CSV sheet: first the title block, rows of a key that begins with # and a text, then the headings and
// the rows. Readers that know comments skip the block (encoding/csv with Comment '#'), spreadsheets show it.
type table struct {
	name  string
	notes [][2]string // what this table says besides what all say
	block [][2]string
	heads []string
	rows  [][]string
}

// sheet begins a table with its title block.
func (d *design) sheet(name string, heads ...string) *table {
	t := &table{name: name, heads: heads}
	t.block = append(t.block, [2]string{"sheet", name})
	t.block = append(t.block, d.block()...)
	t.block = append(t.block, [2]string{"units", unitsText}, [2]string{"datum", datumText})
	return t
}

// block is what all sheets say.
func (d *design) block() [][2]string {
	return [][2]string{
		{"status", statusText},
		{"design", orDash(d.title.Design) + ", " + d.a.Plan.Family.Name},
		{"brief", orDash(d.title.Brief)},
		{"brief SHA-256", orDash(d.title.Hash)},
		{"program", d.title.Program},
		{"mounting", d.mounting()},
		{"caution", study.FullCaution},
	}
}

// mounting is what the brief's mount says of z.
func (d *design) mounting() string {
	switch g := d.task.Gravity; {
	case g.X == 0 && g.Y == 0 && g.Z < 0:
		return "stands: z points up"
	case g.X == 0 && g.Y == 0 && g.Z > 0:
		return "hangs: z points down, to the platform"
	}
	return "gravity is not along z"
}

func orDash(s string) string {
	if s == "" {
		return "–"
	}
	return s
}

// note adds a row to the title block.
func (t *table) note(key, value string) { t.notes = append(t.notes, [2]string{key, value}) }

// row adds a row; cells that are wanting at its end stay empty.
func (t *table) row(cells ...string) {
	t.rows = append(t.rows, append(cells, make([]string, len(t.heads)-len(cells))...))
}

// bytes writes the table.
func (t *table) bytes() []byte {
	var b bytes.Buffer
	w := csv.NewWriter(&b)
	for _, r := range append(t.block, t.notes...) {
		w.Write([]string{"# " + r[0], text(r[1])})
	}
	w.Write(t.heads)
	for _, r := range t.rows {
		w.Write(r)
	}
	w.Flush()
	return b.Bytes()
}

// text is a cell that is no number, such that no spreadsheet takes it for a formula: control characters
// are left out, an apostrophe is put before what begins one, and no semicolon is left at which a spreadsheet might cut a cell in two.
func text(s string) string {
	s = strings.ReplaceAll(study.Clean(s), ";", ",")
	r, _ := utf8.DecodeRuneInString(strings.TrimSpace(s))
	if strings.ContainsRune("=+-@|%＝＋－＠", r) {
		return "'" + s
	}
	return s
}

// number is a length to 1e-4 mm or an angle to 1e-6 deg.
func number(si float64, k units.Kind) string {
	if k == units.Length {
		return decimals(units.Display(k).From(si), 4)
	}
	return exact(si, k)
}

// exact is a value that others are derived from, joint centres foremost: to 1e-6 of its unit.
func exact(si float64, k units.Kind) string { return decimals(units.Display(k).From(si), 6) }

// unbounded stands for what is infinite. It is a word, as a spreadsheet would take -inf for a formula.
const unbounded = "unbounded"

// decimals is a number with at most so many decimals; nothing for NaN.
func decimals(v float64, most int) string {
	switch {
	case math.IsNaN(v):
		return ""
	case math.IsInf(v, 0):
		return unbounded
	}
	s := strconv.FormatFloat(v, 'f', most, 64)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	if s == "-0" {
		return "0"
	}
	return s
}

// figure is a force, moment, speed or the like: six significant digits.
func figure(si float64, k units.Kind) string {
	if math.IsInf(si, 0) || math.IsNaN(si) {
		return decimals(si, 0)
	}
	return units.Digits(units.Display(k).From(si), 6)
}

// pose is the six cells of a pose about home, and its zone.
func (d *design) pose(s *objective.Sample) []string {
	if s == nil {
		return make([]string, 7)
	}
	out := make([]string, 0, 7)
	for q, c := range s.Coords {
		k := units.Length
		if q > 2 {
			k = units.Angle
		}
		out = append(out, number(c, k))
	}
	zone := ""
	if s.Zone < len(d.task.Zones) {
		zone = text(d.task.Zones[s.Zone].Name)
	}
	return append(out, zone)
}

var poseHeads = []string{"x_mm", "y_mm", "z_mm", "roll_deg", "pitch_deg", "yaw_deg", "zone"}
