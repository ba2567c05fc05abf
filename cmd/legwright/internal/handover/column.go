package handover

import (
	"fmt"
	"math"

	"legwright/cmd/legwright/internal/drawing"
	"legwright/cmd/legwright/internal/study"
)

// column is what stands beside the drawing.
func (d *design) column(p *plan, name, datum string, notes []string) *drawing.Block {
	b := &drawing.Block{Heads: []string{"joint", "x mm", "y mm", "z mm", "angle °"}, Notes: notes, Stamp: "NOT FOR CONSTRUCTION UNTIL CHECKED"}
	for _, m := range p.holes {
		b.Rows = append(b.Rows, []string{m.name, decimals(m.X, 3), decimals(m.Y, 3), decimals(m.z, 3),
			decimals(azimuth(m.X/1000, m.Y/1000)*180/math.Pi, 4)})
	}
	b.Notes = append(b.Notes, "Circles mark joint centres; hole sizes are to be chosen.")
	b.Lines = []string{
		name,
		"Design " + orDash(d.title.Design) + " · " + d.a.Plan.Family.Name,
		cut(orDash(d.title.Brief), 120),
		"Units mm, degrees · scale " + ratio(p.Scale) + " on " + p.Paper.Name,
		"Datum: " + datum,
		"Machine " + d.mounting(),
		"Brief SHA-256 " + cut(orDash(d.title.Hash), 20),
		d.title.Program,
	}
	b.Small = []string{study.FullCaution}
	return b
}

// ratio is a scale as drawings write it.
func ratio(s float64) string {
	if s < 1 {
		return fmt.Sprintf("%g:1", 1/s)
	}
	return fmt.Sprintf("1:%g", s)
}

// cut is a text of at most so many letters.
func cut(s string, most int) string {
	r := []rune(study.Clean(s))
	if len(r) <= most {
		return string(r)
	}
	return string(r[:most]) + "…"
}
