package drawing

import (
	"encoding/json"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

type dxfPair struct {
	code  int
	value string
}

// readDXF reads the pairs of group codes and values; R12 allows codes 0 to 255 and from 999 on, and lines of 255 letters.
func readDXF(t *testing.T, b []byte) []dxfPair {
	t.Helper()
	lines := strings.Split(strings.TrimSuffix(string(b), "\n"), "\n")
	if len(lines)%2 != 0 {
		t.Fatalf("%d lines are no pairs", len(lines))
	}
	var out []dxfPair
	for i := 0; i < len(lines); i += 2 {
		code, err := strconv.Atoi(strings.TrimSpace(lines[i]))
		if err != nil || code < 0 || code > 255 {
			t.Fatalf("line %d: group code %q", i+1, lines[i])
		}
		v := lines[i+1]
		if code >= 10 && code < 60 || code >= 140 && code < 148 {
			if _, err := strconv.ParseFloat(v, 64); err != nil {
				t.Fatalf("line %d: number %q", i+2, v)
			}
		}
		if code >= 60 && code < 80 {
			if _, err := strconv.Atoi(v); err != nil {
				t.Fatalf("line %d: whole number %q", i+2, v)
			}
		}
		if len(v) > 255 {
			t.Fatalf("line %d: %d letters", i+2, len(v))
		}
		for _, r := range v {
			if r < ' ' || r > '~' {
				t.Fatalf("line %d: %q is not ASCII", i+2, v)
			}
		}
		out = append(out, dxfPair{code, v})
	}
	return out
}

// The text is R12: sections and tables are opened and closed, every entity lies on a layer of the table, and there
// are as many entities of each kind as the drawing has elements.
func TestDXFIsReleaseTwelve(t *testing.T) {
	d := sample()
	ps := readDXF(t, d.DXF())
	section, table := "", ""
	layersHad := map[string]bool{}
	count := map[string]int{}
	entity := ""
	for i, p := range ps {
		next := func() string { return ps[i+1].value }
		switch {
		case p.code == 9 && p.value == "$ACADVER" && next() != "AC1009":
			t.Errorf("version %s", next())
		case p.code != 0:
			if p.code == 8 && section == "ENTITIES" && !layersHad[p.value] {
				t.Errorf("%s on layer %s, which no table has", entity, p.value)
			}
			if p.code == 2 && entity == "LAYER" {
				layersHad[p.value] = true
			}
		case p.value == "SECTION":
			if section != "" {
				t.Errorf("section in section %s", section)
			}
			section = next()
		case p.value == "ENDSEC":
			if section == "" || table != "" {
				t.Error("ENDSEC without a section, or in a table")
			}
			section = ""
		case p.value == "TABLE":
			table = next()
			entity = ""
		case p.value == "ENDTAB":
			table = ""
		case p.value == "EOF":
			if i != len(ps)-1 || section != "" {
				t.Error("EOF within the text")
			}
		default:
			entity = p.value
			if section == "ENTITIES" {
				count[entity]++
			}
		}
	}
	want := map[string]int{"LINE": len(d.Lines), "CIRCLE": len(d.Circles), "ARC": len(d.Arcs), "TEXT": len(d.Texts)}
	for k, n := range want {
		if count[k] != n {
			t.Errorf("%d of %s, want %d", count[k], k, n)
		}
		delete(count, k)
	}
	if len(count) > 0 || ps[len(ps)-1].value != "EOF" {
		t.Errorf("other entities: %v", count)
	}
}

// readBack asks ezdxf, a reader that has nothing to do with this program, what the file holds.
const readBack = `
import json, sys, ezdxf
from ezdxf import recover
doc, auditor = recover.readfile(sys.argv[1])
doc2 = ezdxf.readfile(sys.argv[1])
out = {"version": doc.dxfversion, "errors": len(auditor.errors), "layers": sorted(l.dxf.name for l in doc.layers if l.dxf.name not in ("0", "Defpoints", "DEFPOINTS")), "entities": []}
assert len(doc2.modelspace()) == len(doc.modelspace())
for e in doc.modelspace():
    d, t = e.dxf, e.dxftype()
    r = {"type": t, "layer": d.layer}
    if t == "LINE":
        r["n"] = [d.start.x, d.start.y, d.end.x, d.end.y]
    elif t == "CIRCLE":
        r["n"] = [d.center.x, d.center.y, d.radius]
    elif t == "ARC":
        r["n"] = [d.center.x, d.center.y, d.radius, d.start_angle, d.end_angle]
    elif t == "TEXT":
        p = d.align_point if d.hasattr("align_point") else d.insert
        r["n"] = [p.x, p.y, d.height, d.rotation]
        r["text"] = e.plain_text()
    out["entities"].append(r)
print(json.dumps(out))
`

// independent is a Python with the named module, or skips the test.
func independent(t *testing.T, module string) string {
	t.Helper()
	for _, python := range []string{"/usr/bin/python3", "python3"} {
		if exec.Command(python, "-c", "import "+module).Run() == nil {
			return python
		}
	}
	if os.Getenv("CI") != "" {
		t.Fatalf("no Python with %s; install Debian's python3-%s", module, module)
	}
	t.Skipf("no Python with %s: install Debian's python3-%s to have the files read by another program", module, module)
	return ""
}

// An independent reader finds no fault and every element where the drawing has it, in real mm, with its text. Numbers
// are written to 1e-9.
func TestDXFReadByAnother(t *testing.T) {
	python := independent(t, "ezdxf")
	d := sample()
	file := filepath.Join(t.TempDir(), "plan.dxf")
	if err := os.WriteFile(file, d.DXF(), 0o666); err != nil {
		t.Fatal(err)
	}
	text, err := exec.Command(python, "-c", readBack, file).Output()
	if err != nil {
		t.Fatalf("ezdxf: %v\n%s", err, err.(*exec.ExitError).Stderr)
	}
	var got struct {
		Version  string
		Errors   int
		Layers   []string
		Entities []struct {
			Type, Layer, Text string
			N                 []float64
		}
	}
	if err := json.Unmarshal(text, &got); err != nil {
		t.Fatal(err)
	}
	if got.Version != "AC1009" || got.Errors != 0 || len(got.Layers) != int(layers) {
		t.Fatalf("version %s, %d faults, layers %v", got.Version, got.Errors, got.Layers)
	}
	type entity struct {
		layer, text string
		n           []float64
	}
	want := map[string][]entity{}
	add := func(kind string, l Layer, text string, n ...float64) {
		want[kind] = append(want[kind], entity{layerForms[l].name, text, n})
	}
	for _, e := range d.Lines {
		add("LINE", e.Layer, "", e.From.X, e.From.Y, e.To.X, e.To.Y)
	}
	for _, e := range d.Circles {
		add("CIRCLE", e.Layer, "", e.Centre.X, e.Centre.Y, e.Radius)
	}
	for _, e := range d.Arcs {
		add("ARC", e.Layer, "", e.Centre.X, e.Centre.Y, e.Radius, degrees(e.From), degrees(e.To))
	}
	for _, e := range d.Texts {
		add("TEXT", e.Layer, e.Text, e.At.X, e.At.Y, e.Height, e.Angle*180/math.Pi)
	}
	at := map[string]int{}
	for _, g := range got.Entities {
		k := at[g.Type]
		at[g.Type]++
		if k >= len(want[g.Type]) {
			t.Fatalf("too many of %s", g.Type)
		}
		w := want[g.Type][k]
		if g.Layer != w.layer || len(g.N) != len(w.n) {
			t.Fatalf("%s %d: %v, want %v", g.Type, k, g, w)
		}
		for i := range w.n {
			near(t, g.Type, g.N[i], w.n[i], 1e-9)
		}
		if plain := asDXFShows(w.text); g.Type == "TEXT" && g.Text != plain {
			t.Errorf("text %q, want %q", g.Text, plain)
		}
	}
	for kind, ws := range want {
		if at[kind] != len(ws) {
			t.Errorf("%d of %s, want %d", at[kind], kind, len(ws))
		}
	}
}

// asDXFShows is a text without what R12 cannot hold.
func asDXFShows(s string) string {
	for strings.Contains(s, "%%") {
		s = strings.ReplaceAll(s, "%%", "% %")
	}
	s = strings.NewReplacer("%°", "% °", "%Ø", "% Ø", "%±", "% ±").Replace(s) // these begin with two per cent signs
	return strings.NewReplacer("\x00", " ", "\x07", " ", "𝄞", "?").Replace(s)
}
