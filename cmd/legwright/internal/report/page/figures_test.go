package page

import (
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
)

// Each column of the sensitivities is the change of its goal, less first, then more.
func TestSensitivityColumns(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	changes := s.data.Designs[eval[int](p, `legwright.store.picked`)].Detail.Sensitivity
	rows := eval[[][]string](p, `[...document.querySelectorAll(".sensitivity tbody tr")].map((r) => [...r.cells].map((c) => c.textContent))`)
	if len(rows) != len(changes) || len(rows) == 0 {
		t.Fatalf("%d rows for %d dimensions", len(rows), len(changes))
	}
	moved := false
	for i, c := range changes {
		for k := range s.data.Goals {
			for side, v := range []float64{float64(c.Lower[k]), float64(c.Higher[k])} {
				text := rows[i][2+2*k+side]
				if math.IsNaN(v) {
					if text != "–" {
						t.Errorf("row %d, goal %d: %q where nothing is known", i, k, text)
					}
					continue
				}
				if got := number(t, text); math.Abs(got-100*v) > 0.0051+0.006*math.Abs(100*v) {
					t.Errorf("row %d, goal %d: %q, want %g %%", i, k, text, 100*v)
				}
				moved = moved || math.Abs(v) > 1e-3
			}
		}
	}
	if !moved {
		t.Error("nothing moves, which tests nothing")
	}
	p.quiet()
}

// The map shows each value where its coordinates are: to the right with x, upwards with y.
func TestMapIsTheRightWayUp(t *testing.T) {
	d := made(3, "Map")
	m := &d.Designs[d.First[1].Design].Detail.Maps[0] // of the knee, which is picked first
	for k := range m.Values {
		m.Values[k] = 1000 + k // all differ
	}
	p := open(t, d, 1440, 900, false)
	type cell struct{ X, Y, Value float64 }
	cells := eval[[]cell](p, `[...document.querySelectorAll(".map [data-value]")].map((r) => ({X: Number(r.getAttribute("x")), Y: Number(r.getAttribute("y")), Value: Number(r.dataset.value)}))`)
	if len(cells) != m.N*m.N {
		t.Fatalf("%d cells", len(cells))
	}
	// Places of the cells by order alone: columns from the left, rows from below.
	var xs, ys []float64
	for _, c := range cells {
		xs, ys = append(xs, c.X), append(ys, -c.Y)
	}
	slices.Sort(xs)
	slices.Sort(ys)
	xs, ys = slices.Compact(xs), slices.Compact(ys)
	if len(xs) != m.N || len(ys) != m.N {
		t.Fatalf("%d columns and %d rows, want %d", len(xs), len(ys), m.N)
	}
	for _, c := range cells {
		column, _ := slices.BinarySearch(xs, c.X)
		row, _ := slices.BinarySearch(ys, -c.Y)
		if want := m.Values[row*m.N+column]; float64(want) != c.Value {
			t.Fatalf("column %d, row %d from below: %g, want %d", column, row, c.Value, want)
		}
	}
	p.quiet()
}

// The bars of the legs are as long as the share of the limit that is used.
func TestLegBars(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	d := &s.data.Designs[eval[int](p, `legwright.store.picked`)]
	f := &s.data.Families[d.Family]
	widths := eval[[][]float64](p, `[...document.querySelectorAll(".legs tbody tr")].map((r) => [...r.cells].slice(3).map((c) => { const b = c.querySelector(".short .part, .short .over"); return b ? Number(b.getAttribute("width")) : -1; }))`)
	bars := 0
	for leg, row := range widths {
		limits := []float64{-1, -1, -1, -1, -1}
		if f.Push != nil {
			limits[0] = float64(*f.Push)
		}
		if f.Pull != nil {
			limits[1] = float64(*f.Pull)
		}
		if f.Speed != nil {
			limits[2] = float64(*f.Speed)
		}
		if f.BaseSwing != nil {
			limits[3] = float64(*f.BaseSwing)
		}
		if f.PlatformSwing != nil {
			limits[4] = float64(*f.PlatformSwing)
		}
		for k, limit := range limits {
			want := -1.0
			if limit > 0 {
				want = min(100, 100*float64(d.Legs[leg][3+k])/limit)
				bars++
			}
			if math.Abs(row[k]-want) > 1e-4 { // limits have seven digits
				t.Errorf("leg %d, bar %d: %g %% of its limit, want %g", leg+1, k+1, row[k], want)
			}
		}
	}
	if bars == 0 {
		t.Error("no limit has a bar, which tests nothing")
	}
	p.quiet()
}

// The first of the limits is the one that the first screen calls tightest, and coverage stands last.
func TestTightestLimitFirst(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	d := &s.data.Designs[eval[int](p, `legwright.store.picked`)]
	names := eval[[]string](p, `[...document.querySelectorAll(".limits tbody tr")].filter((r) => /^at /.test(r.cells[2].textContent)).map((r) => r.querySelector("bdi").textContent)`)
	if len(names) != len(d.Limits) {
		t.Fatalf("%d limits, want %d", len(names), len(d.Limits))
	}
	if want := strings.ReplaceAll(s.data.Limits[int(d.Limits[d.Tightest][0])].Measure, "_", " "); names[0] != want {
		t.Errorf("%s first, want %s", names[0], want)
	}
	if at := slices.Index(names, "coverage"); at >= 0 && at != len(names)-1 {
		t.Errorf("coverage in place %d of %d", at+1, len(names))
	}
	p.quiet()
}

// The script adds one name to the window.
func TestOneGlobalName(t *testing.T) {
	p := open(t, made(3, "Names"), 1280, 800, false)
	const names = `Object.getOwnPropertyNames(window)`
	with := eval[[]string](p, names)
	blank := filepath.Join(t.TempDir(), "blank.html")
	if err := os.WriteFile(blank, []byte("<!doctype html><title>blank</title>"), 0o666); err != nil {
		t.Fatal(err)
	}
	p.do(chromedp.Navigate("file://" + blank))
	without := eval[[]string](p, names)
	var added []string
	for _, n := range with {
		if !slices.Contains(without, n) {
			added = append(added, n)
		}
	}
	if !slices.Equal(added, []string{"legwright"}) {
		t.Errorf("the page adds %q to the window, want legwright alone", added)
	}
}
