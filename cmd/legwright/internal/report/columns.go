package report

import (
	"math"
	"strconv"
	"strings"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// designs are some designs of a front, to be shown in the columns of a grid.
type designs struct {
	front *study.Front
	rows  []*study.Design
}

func (d *designs) text(name string, keep int, cell func(*study.Design) string) column {
	c := column{name: name, head: words(name), left: true, keep: keep}
	for _, r := range d.rows {
		c.cells = append(c.cells, study.Clean(cell(r)))
	}
	return c
}

// figures is a column of numbers; those that a design does not have stay empty.
func (d *designs) figures(name string, keep int, s scale, of func(*study.Design) (study.Number, bool)) column {
	values := make([]float64, len(d.rows))
	for i, r := range d.rows {
		values[i] = math.NaN()
		if v, ok := of(r); ok {
			values[i] = float64(v)
		}
	}
	return column{name: name, head: words(name), unit: s.unit(), cells: s.apart(values), keep: keep}
}

func (d *designs) measure(name string, keep int) column {
	family := ""
	for _, r := range d.rows {
		if _, ok := r.Measures[name]; ok {
			family = r.Family
		}
	}
	c := d.figures(study.Clean(name), keep, measureScale(family, name), func(r *study.Design) (study.Number, bool) {
		v, ok := r.Measures[name]
		return v, ok
	})
	if name == torque {
		c.head += "\n" + payloadOnly
	}
	return c
}

// Torques leave out the arms, cranks and rods that the motors move too; their headings say so.
const (
	torque      = "motor_torque"
	payloadOnly = "(payload only)"
)

func (d *designs) dimension(name string, keep int) column {
	family := ""
	for _, r := range d.rows {
		if _, ok := r.Dimensions[name]; ok {
			family = r.Family
		}
	}
	return d.figures(study.Clean(name), keep, scale{kind: study.DimensionKind(family, name)}, func(r *study.Design) (study.Number, bool) {
		v, ok := r.Dimensions[name]
		return v, ok
	})
}

func (d *designs) id() column {
	return d.text("id", 0, func(r *study.Design) string { return r.ID })
}

func (d *designs) rank() column {
	c := d.text("rank", 0, func(r *study.Design) string { return strconv.Itoa(r.Rank) })
	c.left = false
	return c
}

func (d *designs) score(keep int) column {
	return d.figures("score", keep, scale{}, func(r *study.Design) (study.Number, bool) { return r.Score, true })
}

func (d *designs) tightest(keep int) column {
	c := d.text("tightest limit", keep, func(r *study.Design) string {
		if l := r.Tightest(); l != nil {
			return l.Measure
		}
		return ""
	})
	c.head = "tightest\nlimit"
	return c
}

func (d *designs) margin(keep int) column {
	c := d.text("margin", keep, func(r *study.Design) string {
		if l := r.Tightest(); l != nil {
			return margin(l)
		}
		return ""
	})
	c.left = false
	return c
}

// strokeUsed has the travel between the shortest and the longest leg, and the range between the least
// and the greatest angle of a crank, in a column each, as far as there are such designs.
func (d *designs) strokeUsed(keep int) (cols []column) {
	for _, k := range []units.Kind{units.Length, units.Angle} {
		some := false
		c := d.figures("stroke used", keep, scale{kind: k}, func(r *study.Design) (study.Number, bool) {
			v, ok := r.StrokeUsed()
			drive, _, _ := study.DriveKinds(r.Family)
			ok = ok && drive == k
			some = some || ok
			return v, ok
		})
		c.head = "stroke\nused"
		if k != units.Length {
			c.name, c.head = "range used", "range\nused"
		}
		if some {
			cols = append(cols, c)
		}
	}
	return cols
}

// has tells whether any of the designs has the measure.
func (d *designs) has(measure string) bool {
	for _, r := range d.rows {
		if v, ok := r.Measures[measure]; ok && (v != 0 || measure != "home_height") { // planar stages have no height
			return true
		}
	}
	return false
}

// families lists the families of a front's designs.
func families(f *study.Front) []string {
	var out []string
	for i := range f.Designs {
		if !among(f.Designs[i].Family, out) {
			out = append(out, f.Designs[i].Family)
		}
	}
	return out
}

// goal tells whether the measure is a goal.
func goal(f *study.Front, measure string) bool {
	for _, g := range f.Goals {
		if g.Measure == measure {
			return true
		}
	}
	return false
}

// margins explains the column of margins.
const margins = "margin: room left before the tightest limit fails, in % of its bound (of the stroke for the range of the legs), or as a length or an angle where the bound is 0."

// without says which columns were left out.
func (s *sheet) without(columns []string) {
	if len(columns) > 0 {
		s.say("No room here for " + strings.Join(columns, ", ") + "; front.csv has every column.")
	}
}
