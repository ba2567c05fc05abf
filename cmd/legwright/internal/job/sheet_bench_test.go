package job

import (
	"encoding/json"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// The page's data of 200 designs of the example on one worker, as a search writes them at its end.
func BenchmarkSheet(b *testing.B) {
	text, err := brief.Load(briefs+"tilt-table.yaml", *Known())
	if err != nil {
		b.Fatal(err)
	}
	s, err := New(text)
	if err != nil {
		b.Fatal(err)
	}
	run := Settings(text)
	run.Evaluations, run.Progress = 1500, func(opt.Progress) {}
	found, err := s.Search(b.Context(), run)
	if err != nil {
		b.Fatal(err)
	}
	front := found.Front
	for n := len(front.Designs); len(front.Designs) < 200; {
		d := front.Designs[len(front.Designs)%n]
		d.ID, d.Rank, d.Marks = "", len(front.Designs)+1, nil
		front.Designs = append(front.Designs, d)
	}
	sources := &study.Sources{Brief: study.File{Name: "brief.yaml"}}
	var data *sheet.Data
	b.ResetTimer()
	for b.Loop() {
		if data, err = s.Sheet(front, SheetRun{Sources: sources, Workers: 1}); err != nil {
			b.Fatal(err)
		}
	}
	all, err := json.Marshal(data)
	if err != nil {
		b.Fatal(err)
	}
	b.ReportMetric(float64(len(all)), "bytes")
}
