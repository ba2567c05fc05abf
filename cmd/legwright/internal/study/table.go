package study

import (
	"encoding/csv"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"

	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
	"legwright/opt"
)

// plain is a number for a CSV file in the unit in which its column is headed: 15 significant digits,
// so that 0.5701 m is 570.1 mm; inf for an unbounded value.
func plain(si float64, k units.Kind) string {
	switch {
	case math.IsInf(si, 1):
		return "inf"
	case math.IsInf(si, -1):
		return "-inf"
	case math.IsNaN(si):
		return ""
	}
	return strconv.FormatFloat(units.Display(k).From(si), 'g', 15, 64)
}

// column is one column of the front's table.
type column struct {
	head string
	cell func(d *Design) string
}

// writeTable writes the front as CSV: a row for each design in the order of rank, the unit in each
// heading, inf for an unbounded value, nothing where a design has no such dimension or measure.
func writeTable(w io.Writer, f *Front) error {
	cols := []column{
		{"id", func(d *Design) string { return d.ID }},
		{"rank", func(d *Design) string { return strconv.Itoa(d.Rank) }},
		{"score", func(d *Design) string { return plain(float64(d.Score), units.Ratio) }},
		{"family", func(d *Design) string { return d.Family }},
		{"marks", func(d *Design) string { return strings.Join(d.Marks, "; ") }},
	}
	for _, name := range f.DimensionNames() {
		k := f.dimensionKind(name)
		cols = append(cols, column{units.Heading(name, k), func(d *Design) string { return among(d.Dimensions, name, k) }})
	}
	for _, name := range f.MeasureNames() {
		if f.isDimension(name) {
			continue // stroke, leg_min and home_height are measures too
		}
		k := f.measureKind(name)
		cols = append(cols, column{units.Heading(name, k), func(d *Design) string { return among(d.Measures, name, k) }})
	}
	cols = append(cols,
		column{"tightest_limit", func(d *Design) string {
			if l := d.Tightest(); l != nil {
				return l.Measure
			}
			return ""
		}},
		column{"tightest_margin_percent", func(d *Design) string {
			if l := d.Tightest(); l != nil {
				return plain(100*float64(l.Margin), units.Ratio)
			}
			return ""
		}})

	c := csv.NewWriter(w)
	row := make([]string, len(cols))
	for i := range cols {
		row[i] = cols[i].head
	}
	c.Write(row)
	for i := range f.Designs {
		for j := range cols {
			row[j] = cols[j].cell(&f.Designs[i])
		}
		c.Write(row)
	}
	c.Flush()
	return c.Error()
}

func among(m map[string]Number, name string, k units.Kind) string {
	v, ok := m[name]
	if !ok {
		return ""
	}
	return plain(float64(v), k)
}

// DimensionNames lists the dimensions of the front's families in the order of the registry, and any
// that the registry does not have after them.
func (f *Front) DimensionNames() []string {
	var known []string
	for _, fam := range kin.Families() {
		if !slices.ContainsFunc(f.Designs, func(d Design) bool { return d.Family == fam.Name }) {
			continue
		}
		for i := range fam.Dimensions {
			known = append(known, fam.Dimensions[i].Name)
		}
	}
	return present(f.Designs, known, func(d *Design) map[string]Number { return d.Dimensions })
}

// MeasureNames lists the measures that the front's designs have, in the order of the registry, and
// any that the registry does not have after them.
func (f *Front) MeasureNames() []string { return measureNames(f.Designs) }

// MeasureNames lists the design's measures, in the order of the registry.
func (d *Design) MeasureNames() []string { return measureNames([]Design{*d}) }

func measureNames(ds []Design) []string {
	var known []string
	for _, m := range objective.Measures() {
		known = append(known, m.Name)
	}
	return present(ds, known, func(d *Design) map[string]Number { return d.Measures })
}

// present lists the keys that any design has: the known ones in their order, then the others by name.
func present(ds []Design, known []string, of func(*Design) map[string]Number) []string {
	have := map[string]bool{}
	for i := range ds {
		for name := range of(&ds[i]) {
			have[name] = true
		}
	}
	var out []string
	for _, name := range known {
		if have[name] {
			out = append(out, name)
			delete(have, name)
		}
	}
	var others []string
	for name := range have {
		others = append(others, name)
	}
	slices.Sort(others)
	return append(out, others...)
}

func (f *Front) isDimension(name string) bool {
	return slices.ContainsFunc(f.Designs, func(d Design) bool { _, ok := d.Dimensions[name]; return ok })
}

func (f *Front) dimensionKind(name string) units.Kind {
	for i := range f.Designs {
		if _, ok := f.Designs[i].Dimensions[name]; ok {
			return DimensionKind(f.Designs[i].Family, name)
		}
	}
	return units.Ratio
}

// measureKind is that of the first design that has the measure; all designs of a front agree.
func (f *Front) measureKind(name string) units.Kind {
	for i := range f.Designs {
		if _, ok := f.Designs[i].Measures[name]; ok {
			return MeasureKind(f.Designs[i].Family, name)
		}
	}
	return units.Ratio
}

// writeProgress writes the course of a search as CSV.
func writeProgress(w io.Writer, history []opt.Point) {
	io.WriteString(w, "evaluations,hypervolume,feasible_share\n")
	for _, p := range history {
		io.WriteString(w, strconv.Itoa(p.Evaluations)+","+plain(p.Hypervolume, units.Ratio)+","+plain(p.Feasible, units.Ratio)+"\n")
	}
}
