package handover

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"
	"unicode/utf8"

	"legwright/cmd/legwright/internal/study"
)

// read is a sheet as encoding/csv reads it: the rows of the title block, and the table, whose rows are all as long as its
// headings.
func read(t *testing.T, b []byte) (block map[string]string, heads []string, rows []map[string]string) {
	t.Helper()
	r := csv.NewReader(bytes.NewReader(b))
	r.Comment = '#'
	all, err := r.ReadAll() // all rows of one length
	if err != nil {
		t.Fatal(err)
	}
	block = map[string]string{}
	for _, line := range strings.SplitAfter(string(b), "\n") {
		if !strings.HasPrefix(line, "# ") {
			break
		}
		cells, err := csv.NewReader(strings.NewReader(line)).Read()
		if err != nil || len(cells) != 2 {
			t.Fatalf("%q: %v", line, err)
		}
		block[strings.TrimPrefix(cells[0], "# ")] += cells[1]
	}
	heads = all[0]
	for _, cells := range all[1:] {
		row := map[string]string{}
		for i, c := range cells {
			row[heads[i]] = c
		}
		rows = append(rows, row)
	}
	return block, heads, rows
}

// cell is the number in a cell.
func cell(t *testing.T, row map[string]string, head string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(row[head], 64)
	if err != nil {
		t.Fatalf("%s of %v: %v", head, row, err)
	}
	return v
}

// Every file is one that a study folder knows, and says what it is: units, datum, hash, program, design, caution, status.
func TestTitleBlocks(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		if len(files) != len(study.SheetNames()) {
			t.Errorf("%d files, study knows %d", len(files), len(study.SheetNames()))
		}
		total := 0
		for name, b := range files {
			total += len(b)
			if !slices.Contains(study.SheetNames(), name) {
				t.Errorf("study does not know %s", name)
			}
			if filepath.Ext(name) == ".csv" {
				block, _, rows := read(t, b)
				for key, want := range map[string]string{
					"status": statusText, "design": "007, " + d.a.Plan.Family.Name, "brief SHA-256": wicked.Hash, "program": wicked.Program,
					"caution": "not an assessment of safety", "units": "mm", "datum": "origin", "mounting": "z points up", "sheet": "",
				} {
					if !strings.Contains(block[key], want) || block[key] == "" {
						t.Errorf("%s: %s is %q", name, key, block[key])
					}
				}
				if len(rows) == 0 {
					t.Errorf("%s has no rows", name)
				}
				continue
			}
			for _, want := range []string{"007", d.a.Plan.Family.Name, wicked.Hash, wicked.Program, "assessment of safety", "Units mm", "Datum", "NOT FOR CONSTRUCTION UNTIL CHECKED"} {
				if !strings.Contains(string(b), want) {
					t.Errorf("%s does not say %q", name, want)
				}
			}
		}
		if total > 120_000 {
			t.Errorf("%d bytes in all", total)
		}
	})
}

// No cell is a formula: what begins with = + - @ or a tab is a number, whether a reader cuts cells at commas, semicolons
// or tabs, in the title block too.
func TestNoCellIsAFormula(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, _ map[string][]byte) {
		if f := d.a.Plan.Family; testing.Short() && f.Name != "delta-4" {
			t.Skip("one family is enough for a short run")
		}
		for i, z := range []string{"=1+1", "+1", "-1+1;@x", "@SUM(1)", "\t=1", "\r=1", "a;=cmd", " =1", "＝1", "x\n=1"} {
			task := *d.task
			task.Cases, task.Zones = slices.Clone(task.Cases), slices.Clone(task.Zones)
			task.Cases[i%2].Name, task.Zones[0].Name = z, z
			for name, b := range Files(&task, d.a, Title{Program: z, Design: z, Brief: z, Hash: z}) {
				if filepath.Ext(name) != ".csv" {
					continue
				}
				for _, comma := range ",;\t" {
					r := csv.NewReader(bytes.NewReader(b))
					r.Comma, r.FieldsPerRecord, r.LazyQuotes = comma, -1, true
					all, err := r.ReadAll()
					if err != nil {
						t.Fatal(err)
					}
					for _, row := range all {
						for _, c := range row {
							first, _ := utf8.DecodeRuneInString(strings.TrimLeft(c, " "))
							if !strings.ContainsRune("=+-@\t\r＝＋－＠", first) || c == "" {
								continue
							}
							if comma != ',' { // whole lines begin with the first cell, a name
								t.Fatalf("%s cut at %q: %q", name, comma, c)
							}
							if _, err := strconv.ParseFloat(c, 64); err != nil {
								t.Fatalf("%s: %q", name, c)
							}
						}
					}
				}
			}
		}
	})
}

// No text of the sheets' own has a semicolon, which would become a comma. The caution is one that other outputs have too.
func TestNotesHaveNoSemicolons(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, _ map[string][]byte) {
		own := *d
		own.title = Title{Program: "p", Design: "d", Brief: "b", Hash: "h"}
		for _, s := range []*table{own.joints(), own.axes(), own.links(), own.holes(), own.actuators(), own.forces(), own.together(), own.heights()} {
			for _, r := range slices.Concat(s.block, s.notes) {
				if r[0] != "caution" && strings.Contains(r[1], ";") {
					t.Errorf("%s: %s", r[0], r[1])
				}
			}
		}
	})
}

// Every cell of a column of numbers is one, or empty, or says that there is no bound or that it is to be chosen.
func TestCellsOfNumbers(t *testing.T) {
	plain := regexp.MustCompile(`^(-?[0-9]+(\.[0-9]+)?(e[-+][0-9]+)?|unbounded|to be chosen|)$`)
	column := regexp.MustCompile(`_(mm|deg|N|Nm|mm_s|rad_s|x|y|z)$|^[xyz]$`)
	everyFamily(t, func(t *testing.T, _ *design, files map[string][]byte) {
		for name, b := range files {
			if filepath.Ext(name) != ".csv" {
				continue
			}
			_, heads, rows := read(t, b)
			seen := 0
			for _, row := range rows {
				for _, h := range heads {
					if !column.MatchString(h) {
						continue
					}
					seen++
					if !plain.MatchString(row[h]) {
						t.Errorf("%s: %s is %q", name, h, row[h])
					}
				}
			}
			if seen == 0 {
				t.Errorf("%s has no columns of numbers: %v", name, heads)
			}
		}
	})
}

// One family calls the same part by one word in all its sheets.
func TestOneWordForAPart(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		other := "arm"
		if strings.HasPrefix(d.a.Plan.Family.Name, "delta") {
			other = "crank"
		} else if d.a.Plan.Family.Name == "level-arm" {
			return
		}
		word := regexp.MustCompile(`(?i)\b` + other + `s?\b`)
		for _, name := range []string{"joints.csv", "links.csv", "forces.csv", "forces-together.csv"} {
			_, _, rows := read(t, files[name])
			for _, row := range rows {
				if s := row["what"] + " " + row["part"]; word.MatchString(s) {
					t.Errorf("%s: %q", name, s)
				}
			}
		}
	})
}

// Texts keep what they say.
func TestText(t *testing.T) {
	for in, want := range map[string]string{
		"running": "running", "": "", "=x": "'=x", "a;b": "a,b", "\u202eevil": "evil", "-3": "'-3", "100 %": "100 %",
	} {
		if got := text(in); got != want {
			t.Errorf("text(%q) = %q, want %q", in, got, want)
		}
	}
}

// readBack reads a CSV by Python's own reader, which knows no comments.
const readBack = `
import csv, json, sys
print(json.dumps({f: list(csv.reader(open(f, newline="", encoding="utf-8"), strict=True)) for f in sys.argv[1:]}))
`

// An independent parser finds the same cells.
func TestCSVReadByAnother(t *testing.T) {
	python, err := exec.LookPath("python3")
	if err != nil {
		if os.Getenv("CI") != "" {
			t.Fatal("no python3")
		}
		t.Skip("no python3: install it to have the tables read by another program")
	}
	readBy(t, exec.Command(python, "-c", readBack))
}

// readBackPapa reads tables with Papa Parse (MIT) from the npm registry and writes their cells as JSON.
const readBackPapa = `
const fs = require('fs'), papa = require('papaparse');
const out = {};
for (const f of process.argv.slice(1)) out[f] = papa.parse(fs.readFileSync(f, 'utf8'), {skipEmptyLines: true}).data;
process.stdout.write(JSON.stringify(out));`

// LEGWRIGHT_NPM names a folder with node_modules/papaparse in it.
func TestCSVReadByPapaParse(t *testing.T) {
	dir := os.Getenv("LEGWRIGHT_NPM")
	node, err := exec.LookPath("node")
	if dir == "" || err != nil {
		t.Skip("npm install --prefix DIR papaparse@5.5.3 and LEGWRIGHT_NPM=DIR have the tables read by a third program")
	}
	cmd := exec.Command(node, "-e", readBackPapa)
	cmd.Env = append(os.Environ(), "NODE_PATH="+filepath.Join(dir, "node_modules"))
	readBy(t, cmd)
}

// readBy has a program read the tables of every family and compares the cells; the files' names are added to the command.
func readBy(t *testing.T, program *exec.Cmd) {
	everyFamily(t, func(t *testing.T, _ *design, files map[string][]byte) {
		dir := t.TempDir()
		cmd := exec.Command(program.Path, program.Args[1:]...)
		cmd.Env = program.Env
		for name, b := range files {
			if filepath.Ext(name) == ".csv" {
				path := filepath.Join(dir, name)
				if err := os.WriteFile(path, b, 0o666); err != nil {
					t.Fatal(err)
				}
				cmd.Args = append(cmd.Args, path)
			}
		}
		out, err := cmd.Output()
		if err != nil {
			t.Fatal(err)
		}
		var got map[string][][]string
		if err := json.Unmarshal(out, &got); err != nil {
			t.Fatal(err)
		}
		if len(got) == 0 {
			t.Fatal("nothing was read")
		}
		for path, rows := range got {
			r := csv.NewReader(bytes.NewReader(files[filepath.Base(path)]))
			r.FieldsPerRecord = -1
			want, err := r.ReadAll()
			if err != nil {
				t.Fatal(err)
			}
			if !slices.EqualFunc(rows, want, slices.Equal) {
				t.Errorf("%s: read differently", filepath.Base(path))
			}
		}
	})
}
