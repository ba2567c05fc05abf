package page

import (
	"context"
	"os"
	"path/filepath"
	"sync"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
)

// searched is a small real study and the data of its page.
type searched struct {
	front *study.Front
	data  *sheet.Data
	tool  [3]float64                                  // of the brief
	again func(detail ...string) (*sheet.Data, error) // the data with these designs in full
}

// tilt is the example brief, searched with a small budget; once for all tests.
var tilt = sync.OnceValues(func() (*searched, error) { return search("tilt-table.yaml", 1500) })

// drives is a study of three families.
var drives = sync.OnceValues(func() (*searched, error) { return search("three-drives.yaml", 1500) })

func search(name string, evaluations int) (*searched, error) {
	path := filepath.Join("..", "..", "..", "..", "..", "testdata", "briefs", name)
	text, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	b, err := brief.Parse(path, text, *job.Known())
	if err != nil {
		return nil, err
	}
	s, err := job.New(b)
	if err != nil {
		return nil, err
	}
	run := job.Settings(b)
	run.Evaluations = evaluations
	found, err := s.Search(context.Background(), run)
	if err != nil {
		return nil, err
	}
	sources := &study.Sources{Brief: study.File{Name: path, Bytes: text}}
	data := func(detail ...string) (*sheet.Data, error) {
		return s.Sheet(found.Front, job.SheetRun{Sources: sources, Folder: "out", Detail: detail})
	}
	d, err := data()
	return &searched{found.Front, d, b.Tool, data}, err
}

// need gives a study or ends the test.
func need(t testing.TB, get func() (*searched, error)) *searched {
	t.Helper()
	chromium(t) // nothing to search for without a browser
	v, err := get()
	if err != nil {
		t.Fatal(err)
	}
	return v
}
