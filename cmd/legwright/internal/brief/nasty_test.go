package brief

import (
	"fmt"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/bounded"
)

// Large texts, made to cost as much as they can, cost no more than is stated.
func TestLargestTexts(t *testing.T) {
	size := maxFile / 4
	if testing.Short() {
		size /= 64
	}
	of := func(s string) string { return strings.Repeat(s, size/len(s)) }
	numbered := func(form string) string {
		var b strings.Builder
		for i := 0; b.Len() < size-100; i++ {
			fmt.Fprintf(&b, form, i)
		}
		return b.String()
	}
	k := known()
	for file, texts := range map[string][]string{
		"b.yaml": {
			of("["), of("{a: "), of("- "), of("? "), of("? \n"), of("\"\n"), of("a:"), of(": "), of("! "), of("%"), of("---\n"), of("- 1\n"), of("a: 1\n"),
			"a: [" + of("1,") + "]", "[" + of("{a: 1},") + "]", "family: [" + of("6-UPS, ") + "]", "a: |\n" + of("  x\n"), "a: " + of("x"),
			numbered("k%d: 1\n"), numbered("a%d: &a%[1]d 1\n"), "family: 3-RPR\ndimensions:\n" + numbered("  k%d: 1\n"),
			"family: 3-RPR\nduty: {zones: [" + numbered("{name: z%d, box: {x: 1 mm}, samples: 1},") + "]}", "duty: {cases: [" + numbered("{name: c%d},") + "]}",
			"family: 3-RPR\ngoals: [" + of("{minimise: footprint},") + "]", "family: 3-RPR\nlimits: [" + of("{measure: stroke, at_least: 1 mm},") + "]",
		},
		"b.toml": {
			of("["), of("a."), of("[[a]]\n"), of("a=1\n"), of("a.b.c.d=1\n"), of("#\n"), "a=[" + of("1,") + "]", "a=[" + of("{a=1},") + "]", "a=[" + of("1979-05-27,") + "]",
			"a=\"" + of("\\n") + "\"", numbered("[t%d]\n"), numbered("k%d=1\n"), numbered("[a.b.c.d%d]\n"), numbered("[a%d]\nx=1\n") + "!",
		},
		"b.json": {
			of("["), of("{\"a\":"), "{" + numbered("\"k%d\":1,") + "\"z\":1}", "{" + of("\"a\":1,") + "\"z\":1}", "[" + of("1,") + "1]", "[" + of("[],") + "1]", "\"" + of("\\n") + "\"",
		},
	} {
		for _, text := range texts {
			for _, read := range []func() error{
				func() error { _, err := Parse(file, []byte(text), k); return err },
				func() error { _, err := ParseDesign(file, []byte(text), k); return err },
			} {
				bounded.Read(t, len(text), func() {
					if err := read(); err == nil {
						t.Errorf("%s: %.60q… is taken", file, text)
					} else if len(err.Error()) > 200_000 {
						t.Errorf("%s: %.60q… is refused with %d bytes", file, text, len(err.Error()))
					}
				})
			}
		}
	}
}

// A pose file cannot have lines without end, so that no row and no heading takes much memory or time.
func TestLongLinesOfPoses(t *testing.T) {
	const size = 8 << 20
	of := func(s string) string { return strings.Repeat(s, size/len(s)) }
	for _, c := range []struct{ text, want string }{
		{of("a,"), "p.csv:1:1: a line of more than 1000 bytes"},
		{of(","), "p.csv:1:1: a line of"},
		{of("x_mm,"), "p.csv:1:1: a line of"},
		{"x_mm\n1\n" + of("1,"), "p.csv:3:1: a line of"},
		{"x_mm\n" + of("1,\"\n\","), "p.csv:2:3: a quotation mark without its other"},
		{"x_mm\n" + of("a\n"), "more faults follow"},
	} {
		bounded.Read(t, len(c.text)/16, func() {
			if _, err := posesFor([]byte(c.text), nil); err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("%.20q…: %v", c.text, err)
			}
		})
	}
}
