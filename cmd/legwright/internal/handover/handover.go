// Package handover writes what one design is handed over with: tables of joints, holes, actuators and
// forces (CSV), and plan drawings of base and platform (SVG and DXF R12). It gives the files' bytes; package
// study puts them into a study folder.
package handover

import (
	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// Title is what every sheet says of where it comes from.
type Title struct {
	Program string // with its version
	Design  string // id, "" for a design that has none
	Brief   string // the brief's title, as given
	Hash    string // SHA-256 of the brief and its pose files, hexadecimal
}

// The words of every sheet.
const (
	unitsText  = "mm, degrees, N, N m, mm/s, rad/s"
	statusText = "not for construction until checked"
	datumText  = "base frame: origin at the centre of the base joints' circle (level-arm: on the column's axis at floor level), z from base to platform. Platform frame: origin at the centre of the platform joints' circle, at home as the joint table gives it. Angles counter-clockwise seen from +z"
)

// design is one design with what its sheets say.
type design struct {
	task  *objective.Task
	a     *objective.Appraisal
	title Title
	plan  model

	forcesOf []objective.CaseLoads
}

// Files are the sheets of an appraised design, by the names that study.SheetNames lists. The same design gives the same bytes.
func Files(t *objective.Task, a *objective.Appraisal, title Title) map[string][]byte {
	d := &design{task: t, a: a, title: title, plan: newModel(a)}
	base, platform := d.basePlan(), d.platformPlan()
	return map[string][]byte{
		study.JointsSheet:           d.joints().bytes(),
		study.AxesSheet:             d.axes().bytes(),
		study.LinksSheet:            d.links().bytes(),
		study.HolesSheet:            d.holes().bytes(),
		study.ActuatorsSheet:        d.actuators().bytes(),
		study.ForcesSheet:           d.forces().bytes(),
		study.TogetherSheet:         d.together().bytes(),
		study.HeightsSheet:          d.heights().bytes(),
		study.BasePlan + ".svg":     base.SVG(),
		study.BasePlan + ".dxf":     base.DXF(),
		study.PlatformPlan + ".svg": platform.SVG(),
		study.PlatformPlan + ".dxf": platform.DXF(),
	}
}
