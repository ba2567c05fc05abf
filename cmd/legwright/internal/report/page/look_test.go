package page

import (
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"github.com/chromedp/chromedp"
)

// The page in several widths and two schemes, in the folder that LEGWRIGHT_LOOK names, to be looked at.
func TestLook(t *testing.T) {
	dir := os.Getenv("LEGWRIGHT_LOOK")
	if dir == "" {
		t.Skip("LEGWRIGHT_LOOK names no folder for pictures")
	}
	for _, c := range []struct {
		name  string
		study func() (*searched, error)
		width int64
		dark  bool
	}{{"tilt", tilt, 1440, false}, {"tilt", tilt, 1440, true}, {"tilt", tilt, 360, false}, {"tilt", tilt, 360, true}, {"drives", drives, 2560, false}, {"drives", drives, 1440, true}} {
		p := open(t, need(t, c.study).data, c.width, 900, c.dark)
		p.do(chromedp.Sleep(300e6))
		b, err := chromedp.Run(p.ctx, chromedp.FullScreenshot(90))
		if err != nil {
			t.Fatal(err)
		}
		scheme := map[bool]string{false: "light", true: "dark"}[c.dark]
		if err := os.WriteFile(filepath.Join(dir, fmt.Sprintf("%s-%d-%s.jpg", c.name, c.width, scheme)), b, 0o666); err != nil {
			t.Fatal(err)
		}
		p.quiet()
		p.do(chromedp.EmulateReset(), chromedp.Sleep(200e6))
		pdf, err := chromedp.Run(p.ctx, chromedp.PrintToPDF(chromedp.PDFPreferCSSPageSize(), chromedp.PDFPrintBackground()))
		if err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(filepath.Join(dir, c.name+".pdf"), pdf, 0o666); err != nil {
			t.Fatal(err)
		}
	}
}
