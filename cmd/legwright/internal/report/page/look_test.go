package page

import (
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"github.com/chromedp/chromedp"
)

// The page in two widths and two schemes, in the folder that LEGWRIGHT_LOOK names, to be looked at.
func TestLook(t *testing.T) {
	dir := os.Getenv("LEGWRIGHT_LOOK")
	if dir == "" {
		t.Skip("LEGWRIGHT_LOOK names no folder for pictures")
	}
	for _, width := range []int64{360, 1440} {
		for _, dark := range []bool{false, true} {
			p := open(t, made(200, "A platform that was made up"), width, 900, dark)
			p.do(chromedp.Sleep(200e6))
			b, err := chromedp.Run(p.ctx, chromedp.FullScreenshot(90))
			if err != nil {
				t.Fatal(err)
			}
			name := fmt.Sprintf("page-%d-%v.jpg", width, dark)
			if err := os.WriteFile(filepath.Join(dir, name), b, 0o666); err != nil {
				t.Fatal(err)
			}
			p.quiet()
		}
	}
}
