package job

import (
	"fmt"
	"math"
	"runtime"
	"slices"
	"strings"
	"sync"

	"legwright/cmd/legwright/internal/handover"
	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// SheetRun says what goes into the page of a study besides what always does.
type SheetRun struct {
	Sources *study.Sources
	Folder  string   // of the study, for the commands that the page shows
	Detail  []string // ids of designs that are to be shown in full, whatever their rank, with every map
	Workers int      // 0 for all processors; they change nothing
}

// sheetBytes is how large the data may become, to stay below 3 MB with the page around them.
const sheetBytes = 2_800_000

// Sheet is everything that the page of a finished study shows. In full are the designs of study.HandedOver. Figures are those of the
// front's records; what is drawn comes from the machines, built anew from their dimensions. An error says that the brief is
// not the one that the front was found with, or that a design of Detail is not there.
func (s *Study) Sheet(f *study.Front, r SheetRun) (*sheet.Data, error) {
	if err := s.belongs(f, r.Detail); err != nil {
		return nil, err
	}
	b := &sheetBuilder{study: s, front: f, run: &r}
	d := b.head()
	b.families(d)
	limitKinds(d, f)
	b.way(d)
	d.Designs = make([]sheet.Design, len(f.Designs))
	faults := make([]error, len(f.Designs))
	each(len(f.Designs), r.Workers, func(i int) { faults[i] = b.design(d, i) })
	for _, err := range faults { // one says enough
		if err != nil {
			return nil, err
		}
	}
	sheet.Fit(d, sheetBytes, r.Detail)
	return d, nil
}

// each calls do with 0 to n-1 on so many workers.
func each(n, workers int, do func(i int)) {
	if workers <= 0 {
		workers = runtime.GOMAXPROCS(0)
	}
	var wg sync.WaitGroup
	next := make(chan int)
	for range min(workers, max(n, 1)) {
		wg.Go(func() {
			for i := range next {
				do(i)
			}
		})
	}
	for i := range n {
		next <- i
	}
	close(next)
	wg.Wait()
}

// belongs tells whether the front can have been found with the study's brief.
func (s *Study) belongs(f *study.Front, detail []string) error {
	const other = "the brief is not the one that the front was found with; put that one back, or search again"
	if len(f.Goals) != len(s.goals()) {
		return fmt.Errorf("%d goals in the brief, %d in front.json: %s", len(s.goals()), len(f.Goals), other)
	}
	for i, g := range s.goals() {
		if f.Goals[i].Measure != g.Measure.Name || (f.Goals[i].Sense == study.Maximise) != g.Maximise {
			return fmt.Errorf("goal %d: %s", i+1, other)
		}
	}
	for i := range f.Designs {
		if s.planOf(f.Designs[i].Family) < 0 {
			return fmt.Errorf("design %s: the family %s is not in the brief: %s", f.Designs[i].ID, study.Clean(f.Designs[i].Family), other)
		}
	}
	for _, id := range detail {
		if !slices.ContainsFunc(f.Designs, func(d study.Design) bool { return d.ID == id }) {
			return fmt.Errorf("--detail %s: there is no such design; the front has %s", study.Clean(id), listed(f))
		}
	}
	return nil
}

// listed are the ids of the best designs, for hints.
func listed(f *study.Front) string {
	var ids []string
	for i := range f.Designs {
		if i == 5 {
			return strings.Join(ids, ", ") + fmt.Sprintf(" and %d more", len(f.Designs)-5)
		}
		ids = append(ids, f.Designs[i].ID)
	}
	if len(ids) == 0 {
		return "none"
	}
	return strings.Join(ids, ", ")
}

// planOf is the place of a family's plan, -1 for none.
func (s *Study) planOf(family string) int {
	return slices.IndexFunc(s.Plans, func(p *objective.Plan) bool { return p.Family.Name == family })
}

// sheetBuilder fills the data of a page.
type sheetBuilder struct {
	study *Study
	front *study.Front
	run   *SheetRun
	path  *objective.Way
	scout []kin.Coords
	full  []bool // designs that are shown in full
}

// head is all that is said of the study as a whole.
func (b *sheetBuilder) head() *sheet.Data {
	s, f := b.study, b.front
	d := &sheet.Data{
		Format: sheet.Format, Title: s.Brief.Title, Program: strings.TrimPrefix(f.Program, "legwright "),
		Brief: s.inWords(b.run.Sources.BriefName()), Hash: SourcesHash(b.run.Sources),
		Seed: f.Seed, Status: f.Status, Evaluations: f.Evaluations, Budget: f.Budget, Feasible: f.Feasible, Poses: f.Poses,
		Hypervolume: sheet.Num(f.Hypervolume),
		Caution:     study.Caution, Cautions: study.FullCaution,
		LeftOut: study.LeftOut(f.Poses), Notes: []string{},
		Hanging: s.Brief.Mount == "ceiling", Folder: b.run.Folder, Units: unitTable(),
		First: []sheet.First{}, Steps: []string{}, SheetUnits: handover.Units, SheetDatum: handover.Datum,
	}
	for _, n := range f.Notes {
		if !slices.Contains(d.LeftOut, n) {
			d.Notes = append(d.Notes, n)
		}
	}
	for _, v := range f.ReferencePoint {
		d.Reference = append(d.Reference, sheet.Exact(v))
	}
	for _, name := range f.MeasureNames() {
		d.Measures = append(d.Measures, measureColumn(f, name))
	}
	for _, g := range f.Goals {
		at := slices.IndexFunc(d.Measures, func(c sheet.Column) bool { return c.Name == g.Measure })
		if at < 0 { // no design has it
			at = len(d.Measures)
			d.Measures = append(d.Measures, measureColumn(f, g.Measure))
		}
		w, ok := f.Weights[g.Measure]
		if !ok {
			w = 1
		}
		d.Goals = append(d.Goals, sheet.Goal{Measure: at, More: g.Sense == study.Maximise, Weight: w})
	}
	for _, c := range study.Choose(f, study.FirstShown) {
		near := c.Near
		if near == nil {
			near = []string{}
		}
		d.First = append(d.First, sheet.First{Design: c.Index, Near: near})
	}
	for _, n := range report.Nearest(f) {
		d.Nearest = append(d.Nearest, sheet.Nearest(n))
	}
	b.zones(d)
	return d
}

// zones are those of the brief, with the cases that occur in each.
func (b *sheetBuilder) zones(d *sheet.Data) {
	t := b.study.Tasks[0]
	d.Cases = []string{}
	for i := range t.Cases {
		d.Cases = append(d.Cases, t.Cases[i].Name)
	}
	kinds := map[objective.ZoneKind]string{objective.Box: "box", objective.Axes: "axes", objective.Ellipsoid: "ellipsoid", objective.Listed: "poses"}
	for i := range t.Zones {
		z := sheet.Zone{Name: t.Zones[i].Name, Kind: kinds[t.Zones[i].Kind], Text: d.Brief.Zones[i], In: []int{}}
		low, high := t.Zones[i].Low, t.Zones[i].High
		for k, c := range t.Zones[i].Poses {
			for q, v := range c {
				if k == 0 {
					low[q], high[q] = v, v
				}
				low[q], high[q] = math.Min(low[q], v), math.Max(high[q], v)
			}
		}
		for q := range low {
			z.Low[q], z.High[q] = sheet.Num(low[q]), sheet.Num(high[q])
		}
		for c := range t.Cases {
			if t.Cases[c].In(i) {
				z.In = append(z.In, c)
			}
		}
		d.Zones = append(d.Zones, z)
	}
}

// measureColumn is the column of a measure of the front.
func measureColumn(f *study.Front, name string) sheet.Column {
	c := sheet.Column{Name: name}
	family := ""
	for i := range f.Designs {
		if _, ok := f.Designs[i].Measures[name]; ok {
			family = f.Designs[i].Family
			break
		}
	}
	c.Unit = study.MeasureKind(family, name).SI()
	if name == "coverage" {
		c.Unit = "%"
	}
	if m := objective.MeasureNamed(name); m != nil {
		c.Text = m.Text
		switch m.Sense {
		case objective.Larger:
			c.Sense = "larger"
		case objective.Smaller:
			c.Sense = "smaller"
		}
	}
	return c
}

// unitTable tells how quantities are shown, by their SI units.
func unitTable() map[string]sheet.Unit {
	out := map[string]sheet.Unit{"": {Factor: 1, Finest: -1}, "%": {Symbol: "%", Factor: 100, Finest: -1}}
	finest := map[units.Kind]int{units.Length: 4, units.Angle: 3} // 0.1 µm, 3.6″
	for _, k := range []units.Kind{units.Length, units.Angle, units.Force, units.Torque, units.Speed, units.AngularSpeed,
		units.Power, units.Stiffness, units.TurnStiffness, units.Mass, units.Gain} {
		u := units.Display(k)
		out[k.SI()] = sheet.Unit{Symbol: u.Symbol, Factor: u.From(1), Finest: -1}
		if n, ok := finest[k]; ok {
			out[k.SI()] = sheet.Unit{Symbol: u.Symbol, Factor: u.From(1), Finest: n}
		}
	}
	return out
}
