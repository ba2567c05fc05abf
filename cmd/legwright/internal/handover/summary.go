package handover

import (
	"math"
	"slices"
	"strconv"
	"strings"

	"legwright/objective"
)

// Units and Datum are the words of every sheet on its numbers.
const (
	Units = unitsText
	Datum = datumText
)

// Summary is what a page shows of a design's sheets: the tables that one looks up, rounded for reading, and the plans.
type Summary struct {
	Joints, Axes, Actuators, Forces, Heights Table
	Base, Platform                           []byte // SVG
}

// Table is a sheet without its title block. Cells are as in the file, numbers to 0.001 mm or degrees, directions to
// 1e-5, forces and the like to five digits. Columns that are empty throughout are left out.
type Table struct {
	Name  string
	Notes []string // what to know of its figures
	Heads []string // as in the file: resultant_N
	Rows  [][]string
}

// Summarize makes the summary of an appraised design from the same tables and plans as Files.
func Summarize(t *objective.Task, a *objective.Appraisal, title Title) Summary {
	d := &design{task: t, a: a, title: title, plan: newModel(a)}
	base, platform := d.basePlan(), d.platformPlan()
	return Summary{
		Joints:    d.joints().short(),
		Axes:      d.axes().short("base_frame_x", "base_frame_y", "base_frame_z", "base_frame_azimuth_deg", "base_frame_elevation_deg"),
		Actuators: d.actuators().short(),
		Forces:    d.forces().short(slices.Concat(poseHeads, thenHeads())...),
		Heights:   d.heights().short(),
		Base:      base.SVG(), Platform: platform.SVG(),
	}
}

// short is the table for a page, without the columns left out.
func (t *table) short(without ...string) Table {
	out := Table{Name: t.name, Rows: make([][]string, len(t.rows))}
	for _, n := range t.notes {
		out.Notes = append(out.Notes, n[0]+": "+n[1])
	}
	for k, h := range t.heads {
		empty := !slices.ContainsFunc(t.rows, func(r []string) bool { return r[k] != "" })
		if empty || slices.Contains(without, h) {
			continue
		}
		out.Heads = append(out.Heads, h)
		for i, r := range t.rows {
			out.Rows[i] = append(out.Rows[i], rounded(r[k], h))
		}
	}
	return out
}

// rounded is a cell for reading under its heading.
func rounded(cell, head string) string {
	v, err := strconv.ParseFloat(cell, 64)
	switch {
	case err != nil || head == "leg" || math.IsInf(v, 0):
		return cell
	case strings.HasSuffix(head, "_mm"), strings.HasSuffix(head, "_deg"):
		return decimals(v, 3)
	case head == "x", head == "y", head == "z":
		return decimals(v, 5)
	}
	return decimals(v, max(0, 4-exponent(v)))
}

// exponent is the power of ten of a number's first digit, 0 for 0.
func exponent(v float64) int {
	if v == 0 {
		return 0
	}
	return int(math.Floor(math.Log10(math.Abs(v))))
}
