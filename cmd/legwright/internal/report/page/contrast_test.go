package page

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"
)

// contrast is the contrast ratio of two sRGB colours #rrggbb (Web Content Accessibility Guidelines 2.1,
// "relative luminance" and "contrast ratio").
func contrast(t *testing.T, a, b string) float64 {
	t.Helper()
	luminance := func(c string) float64 {
		sum := 0.0
		for i, w := range []float64{0.2126, 0.7152, 0.0722} {
			n, err := strconv.ParseUint(c[1+2*i:3+2*i], 16, 8)
			if err != nil {
				t.Fatal(err)
			}
			v := float64(n) / 255
			if v <= 0.03928 {
				v /= 12.92
			} else {
				v = math.Pow((v+0.055)/1.055, 2.4)
			}
			sum += w * v
		}
		return sum
	}
	x, y := luminance(a), luminance(b)
	return (max(x, y) + 0.05) / (min(x, y) + 0.05)
}

// Text stands out by 4.5 to 1 from what is behind it and signs by 3 to 1, in both schemes and on paper.
func TestContrast(t *testing.T) {
	if got := contrast(t, "#000000", "#ffffff"); got != 21 { // by definition
		t.Fatalf("black on white: %g, want 21", got)
	}
	if got := contrast(t, "#767676", "#ffffff"); math.Abs(got-4.54) > 0.005 { // the usual least grey for text, from memory
		t.Fatalf("#767676 on white: %g, want 4.54", got)
	}
	colour := regexp.MustCompile(`--([a-z]+[0-9]?): (#[0-9a-f]+);`)
	var schemes []map[string]string
	for _, name := range []string{"paper.css", "print.css"} {
		for _, block := range regexp.MustCompile(`(?s):root \{.*?\}`).FindAllString(read(name), -1) {
			c := map[string]string{}
			for _, m := range colour.FindAllStringSubmatch(block, -1) {
				v := m[2]
				if len(v) == 4 {
					v = fmt.Sprintf("#%c%c%c%c%c%c", v[1], v[1], v[2], v[2], v[3], v[3])
				}
				c[m[1]] = v
			}
			schemes = append(schemes, c)
		}
	}
	if len(schemes) != 3 {
		t.Fatalf("%d schemes, want 3", len(schemes))
	}
	for i, c := range schemes {
		for _, pair := range strings.Fields("ink/paper ink/wash soft/paper a/paper b/paper good/paper bad/paper ink/awash ink/bwash paper/a paper/b paper/ink") {
			front, back, _ := strings.Cut(pair, "/")
			if got := contrast(t, c[front], c[back]); got < 4.5 {
				t.Errorf("scheme %d: %s has a contrast of %.2f", i, pair, got)
			}
		}
		for _, front := range strings.Fields("strong tone0 tone1 tone2 tone3 tone4 tone5") {
			if got := contrast(t, c[front], c["paper"]); got < 3 {
				t.Errorf("scheme %d: %s on paper has a contrast of %.2f", i, front, got)
			}
		}
	}
}
