package main

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"runtime"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/objective"
)

const readme = "../../README.md"

// readmePath stays right when a test changes its folder.
var readmePath, _ = filepath.Abs(readme)

var (
	console  = regexp.MustCompile("(?s)```console\n(.*?)```")
	measures = regexp.MustCompile("(?s)<!-- measures -->\n.*?<!-- /measures -->")
)

// The sessions of the README are what the program prints. They run whole examples, so
// they are left out of short runs; last bits differ between platforms. What goes to
// /dev/null there is run all the same.
func TestReadmeSession(t *testing.T) {
	if testing.Short() {
		t.Skip("runs the whole embedded example")
	}
	if runtime.GOARCH != "amd64" {
		t.Skip("the text is that of amd64")
	}
	text := read(t, readme)
	dir := t.TempDir()
	if err := os.CopyFS(filepath.Join(dir, "testdata/briefs"), os.DirFS("../../testdata/briefs")); err != nil {
		t.Fatal(err)
	}
	t.Chdir(dir)
	now := console.ReplaceAllStringFunc(text, func(block string) string {
		var out strings.Builder
		out.WriteString("```console\n")
		for _, line := range strings.Split(block, "\n") {
			command, ok := strings.CutPrefix(line, "$ legwright ")
			if !ok {
				continue
			}
			command, silent := strings.CutSuffix(command, " > /dev/null")
			var stdout, stderr bytes.Buffer
			if got := run(strings.Fields(command), &stdout, &stderr); got != exitDone {
				t.Errorf("%s: status %d\n%s", line, got, stderr.String())
			}
			out.WriteString(line + "\n")
			if !silent {
				out.WriteString(stdout.String())
			}
		}
		return out.String() + "```"
	})
	compare(t, text, now)
}

// The README's table of measures is that of the registry.
func TestReadmeMeasures(t *testing.T) {
	var b strings.Builder
	b.WriteString("<!-- measures -->\n| name | meaning | unit | needs |\n|---|---|---|---|\n")
	for _, m := range objective.Measures() {
		unit := study.UnitKind(m.Unit).SI()
		if study.UnitKind(m.Unit) == units.Ratio {
			unit = "1"
		}
		fmt.Fprintf(&b, "| %s | %s | %s | %s |\n", m.Name, m.Text, unit, strings.Join(m.Inputs, ", "))
	}
	b.WriteString("<!-- /measures -->")
	text := read(t, readme)
	compare(t, text, measures.ReplaceAllLiteralString(text, b.String()))
}

func read(t *testing.T, file string) string {
	t.Helper()
	b, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

// compare fails if the README is not what it should be, or writes it with -update.
func compare(t *testing.T, text, now string) {
	t.Helper()
	if text == now {
		return
	}
	if *update {
		if err := os.WriteFile(readmePath, []byte(now), 0o666); err != nil {
			t.Fatal(err)
		}
		return
	}
	old, fresh := strings.Split(text, "\n"), strings.Split(now, "\n")
	for i := range fresh {
		if i >= len(old) || old[i] != fresh[i] {
			t.Fatalf("README.md, line %d: it should say\n%s\n(go test ./cmd/legwright -update writes it again)", i+1, fresh[i])
		}
	}
	t.Fatal("README.md is longer than it should be; go test ./cmd/legwright -update writes it again")
}

// DEVELOPERS.md lists the modules that the program asks for, with their versions.
func TestDevelopersModules(t *testing.T) {
	text := read(t, "../../DEVELOPERS.md")
	direct, _, _ := strings.Cut(read(t, "../../go.mod"), ")")
	for _, line := range strings.Split(direct, "\n") {
		f := strings.Fields(line)
		if len(f) != 2 || !strings.Contains(f[0], "/") {
			continue
		}
		if row := "| " + f[0] + " | " + f[1] + " |"; !strings.Contains(text, row) {
			t.Errorf("DEVELOPERS.md lacks the row %q", row)
		}
	}
}
