package page

import (
	"math"
	"regexp"
	"strconv"
	"testing"

	"github.com/chromedp/chromedp"
)

// The page prints to A4, in a number of sheets that a person would read, light whatever the screen is.
func TestPrintsToA4(t *testing.T) {
	p := open(t, need(t, tilt).data, 1280, 900, true)
	pdf, err := chromedp.Run(p.ctx, chromedp.PrintToPDF(chromedp.PDFPreferCSSPageSize(), chromedp.PDFPrintBackground()))
	if err != nil {
		t.Fatal(err)
	}
	if n := len(regexp.MustCompile(`/Type\s*/Page\b[^s]`).FindAll(pdf, -1)); n < 4 || n > 12 {
		t.Errorf("%d sheets, want 4 to 12", n)
	}
	box := regexp.MustCompile(`/MediaBox\s*\[\s*0\s+0\s+([\d.]+)\s+([\d.]+)`).FindSubmatch(pdf)
	if box == nil {
		t.Fatal("no size of paper in the PDF")
	}
	for i, want := range []float64{595.28, 841.89} { // A4 in points, ISO 216
		if got, err := strconv.ParseFloat(string(box[i+1]), 64); err != nil || math.Abs(got-want) > 1 {
			t.Errorf("paper %s x %s pt, want A4", box[1], box[2])
		}
	}
	p.quiet()
}
