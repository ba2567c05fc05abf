package main

import (
	"bytes"
	"math"
	"os"
	"strings"
	"testing"
	"unicode"

	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

// line tells of an error that is not one line of bounded length that prints.
func line(t *testing.T, err error) {
	t.Helper()
	if text := err.Error(); text == "" || len(text) > 2000 || strings.ContainsAny(text, "\n\r\x1b") {
		t.Errorf("an error that is not a line: %.3000q", text)
	}
}

// A list of quantities, of --actuators and --near, gives as many finite numbers, which read back to the same bits.
func FuzzQuantities(f *testing.F) {
	for _, s := range []string{"910 mm, 905 mm, 880 mm, 900 mm, 902 mm, 911 mm", "0 mm,0 mm,10 mm,0 deg,-1e-3 rad,5 deg", "", ",,,,,", "1 mm;2 mm", "1,5 mm"} {
		f.Add(s, true)
		f.Add(s, false)
	}
	f.Fuzz(func(t *testing.T, text string, near bool) {
		flag, kind := "--actuators", func(int) units.Kind { return units.Length }
		if near {
			flag, kind = "--near", func(i int) units.Kind {
				if kin.Freedom(i).Angular() {
					return units.Angle
				}
				return units.Length
			}
		}
		v, err := quantities(flag, text, 6, kind)
		if err != nil {
			line(t, err)
			if !strings.HasPrefix(err.Error(), flag+": ") {
				t.Errorf("an error that does not name the flag: %v", err)
			}
			return
		}
		var written []string
		for i := range v {
			written = append(written, units.Exact(v[i], kind(i)))
		}
		back, err := quantities(flag, strings.Join(written, ","), 6, kind)
		if err != nil || len(v) != 6 {
			t.Fatalf("%q is %v, which reads back as %v: %v", text, v, back, err)
		}
		for i := range v {
			if v[i]-v[i] != 0 || math.Float64bits(back[i]) != math.Float64bits(v[i]) {
				t.Errorf("%q is %v, which reads back as %v", text, v, back)
			}
		}
	})
}

// Weights of --weight that are taken are those of the front's goals, and rank it.
func FuzzWeight(f *testing.F) {
	for _, s := range []string{"leg_force=3", "footprint=0", "leg_force=-1", "leg_force=NaN", "leg_force=0x1p-2", "=1", "stroke=1", "leg_force", "leg_force=1=2"} {
		f.Add(s, "footprint=2")
	}
	f.Fuzz(func(t *testing.T, a, b string) {
		front := &study.Front{Goals: []study.Goal{{Measure: "leg_force", Sense: study.Minimise}, {Measure: "footprint", Sense: study.Minimise}}}
		for i := range 3 {
			x := study.Number(i)
			front.Designs = append(front.Designs, study.Design{Measures: map[string]study.Number{"leg_force": x, "footprint": 5 - x*x}})
		}
		w, err := parseWeights(front, []string{a, b})
		if err != nil {
			line(t, err)
			return
		}
		if len(w) != 2 {
			t.Errorf("%q, %q give %v", a, b, w)
		}
		study.Rank(front, w)
		for i := range front.Designs {
			if s := float64(front.Designs[i].Score); !(s >= 0 && s <= 1) {
				t.Errorf("weights %v give a score of %v", w, s)
			}
		}
	})
}

// A front of any text is refused, or is ranked and shown; nothing in it reaches the terminal that does not print.
func FuzzScreens(f *testing.F) {
	for _, name := range []string{"front.json", "infeasible.json"} {
		text, err := os.ReadFile("internal/study/testdata/" + name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text, uint8(80))
		f.Add(text, uint8(0))
	}
	f.Fuzz(func(t *testing.T, b []byte, width uint8) {
		front, err := study.Decode(b)
		if err != nil {
			line(t, err)
			return
		}
		study.Rank(front, nil)
		var out bytes.Buffer
		page := report.PageOf(&out)
		page.Width, page.Dir = int(width), "out"
		if err := report.FirstScreen(&out, front, page); err != nil {
			t.Error(err)
		}
		if err := report.Table(&out, front, 3, page); err != nil {
			t.Error(err)
		}
		if i := strings.IndexFunc(out.String(), func(r rune) bool { return r != '\n' && unicode.IsControl(r) }); i >= 0 {
			t.Errorf("%q is shown", out.String()[max(0, i-40):min(out.Len(), i+40)])
		}
		report.Steps(front)
		report.Shortfall(front)
	})
}
