package page

import (
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
)

// number reads a figure of the page.
func number(t *testing.T, text string) float64 {
	t.Helper()
	text, _, _ = strings.Cut(strings.ReplaceAll(text, "−", "-"), "\u00a0")
	text = strings.TrimSuffix(text, "%")
	v, err := strconv.ParseFloat(strings.TrimSpace(text), 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// The tables of the hand-over stand in the page itself: joints where the record has them (0.001 mm), legs as
// long as there, and both plans drawn at the proportions of their paper.
func TestHandOverTables(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	i := eval[int](p, `legwright.store.picked`)
	d := &s.front.Designs[i]
	rows := eval[[][][]string](p, `[...document.querySelectorAll("#files .handed")].map((t) => [...t.rows].map((r) => [...r.cells].map((c) => c.textContent)))`)
	if len(rows) != 5 {
		t.Fatalf("%d tables, want 5", len(rows))
	}
	joints := map[string][]string{}
	for _, r := range rows[0] {
		joints[r[0]] = r
	}
	for k := range d.Joints.Base {
		for c := range 3 {
			for _, x := range []struct {
				name string
				at   int
				want float64
			}{{fmt.Sprintf("B%d", k+1), 4, d.Joints.Base[k][c]}, {fmt.Sprintf("P%d", k+1), 7, d.Joints.Platform[k][c]}} {
				if got := number(t, joints[x.name][x.at+c]); math.Abs(got-1000*x.want) > 0.00051 {
					t.Errorf("%s: %g, want %g mm", x.name, got, 1000*x.want)
				}
			}
		}
		shortest := -1
		for at, head := range rows[2][0] {
			if head == "shortest mm" {
				shortest = at
			}
		}
		if shortest < 0 {
			t.Fatalf("headings %q", rows[2][0])
		}
		if got := number(t, rows[2][k+1][shortest]); math.Abs(got-1000*float64(d.Legs[k].Shortest)) > 0.00051 {
			t.Errorf("leg %d: shortest %g, want %g mm", k+1, got, 1000*float64(d.Legs[k].Shortest))
		}
	}
	if got := len(rows[3]) - 1; got < 12*len(s.data.Cases) {
		t.Errorf("%d rows of joint forces for %d cases", got, len(s.data.Cases))
	}
	eval[bool](p, `Promise.all([...document.images].map((i) => i.decode())).then(() => true)`, awaited)
	for _, size := range eval[[][]float64](p, `[...document.querySelectorAll(".plan")].map((i) => [i.naturalWidth, i.naturalHeight])`) {
		if math.Abs(size[0]/size[1]-math.Sqrt2) > 0.01 { // A paper, ISO 216
			t.Errorf("a plan of %g x %g", size[0], size[1])
		}
	}
	if n := eval[int](p, `document.querySelectorAll(".plan").length`); n != 2 {
		t.Errorf("%d plans, want 2", n)
	}
	p.quiet()
}

// What is printed holds the legs' figures and the tables of the hand-over, as an independent reader finds them.
func TestPrintedText(t *testing.T) {
	reader, err := exec.LookPath("pdftotext")
	if err != nil {
		t.Skip("no pdftotext found: install the package poppler-utils to read what is printed")
	}
	s := need(t, tilt)
	p := open(t, s.data, 1280, 900, false)
	i := eval[int](p, `legwright.store.picked`)
	pdf, err := chromedp.Run(p.ctx, chromedp.PrintToPDF(chromedp.PDFPreferCSSPageSize(), chromedp.PDFPrintBackground()))
	if err != nil {
		t.Fatal(err)
	}
	path := filepath.Join(t.TempDir(), "report.pdf")
	if err := os.WriteFile(path, pdf, 0o666); err != nil {
		t.Fatal(err)
	}
	out, err := exec.Command(reader, "-layout", path, "-").Output()
	if err != nil {
		t.Fatal(err)
	}
	text := strings.Join(strings.Fields(string(out)), " ")
	want := []string{"What each leg does", "Not for construction until checked", s.data.Hash}
	for _, table := range s.data.Designs[i].Detail.Handover.Tables {
		want = append(want, table.Name[1:], strings.ReplaceAll(table.Rows[0][len(table.Rows[0])-1], "-", "−")) // the first letter is set large
	}
	for _, w := range want {
		if !strings.Contains(text, w) {
			t.Errorf("the print lacks %q", w)
		}
	}
}
