package brief

import (
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
	"unicode"
)

// aliasBomb is a YAML text of a few hundred bytes that stands for 9^9 values if aliases are followed.
func aliasBomb() string {
	var b strings.Builder
	b.WriteString("a: &a [x, x, x, x, x, x, x, x, x]\n")
	for c := 'b'; c <= 'i'; c++ {
		fmt.Fprintf(&b, "%c: &%c [%s]\n", c, c, strings.TrimSuffix(strings.Repeat(fmt.Sprintf("*%c, ", c-1), 9), ", "))
	}
	b.WriteString("family: *i\n")
	return b.String()
}

// Absurd sizes are refused by stated bounds, before memory is asked for: none of these allocates more
// than a sensible brief might.
func TestAbsurdSizes(t *testing.T) {
	const most = 32 << 20
	long := strings.Repeat("p", 5000)
	for _, c := range []struct{ why, old, new, want string }{
		{"poses", "samples: 20", "samples: 1000000000", "write a whole number from 1 to 1000000"},
		{"more poses than a number holds", "samples: 20", "samples: " + "9999999999999999999", "out of bounds"},
		{"poses of all zones", "[{name: work", "[{name: z1, samples: 900000, box: {x: 1 mm}}, {name: z2, samples: 900000, box: {x: 1 mm}}, {name: work", "poses, more than 1000000"},
		{"population", "goals:", "search: {population: 10000000}\ngoals:", "write a whole number from 0 to 100000"},
		{"evaluations", "goals:", "search: {evaluations: 1000000000000}\ngoals:", "to 1000000000"},
		{"front", "goals:", "search: {front: 1000000000}\ngoals:", "to 100000"},
		{"time", "goals:", "search: {time: 1e9 h}\ngoals:", "longer than ten years"},
		{"no time", "goals:", "search: {time: 0 s}\ngoals:", "not above 0"},
		{"bare time", "goals:", "search: {time: 20}\ngoals:", "20 has no unit"},
		{"stall", "goals:", "search: {stall: {evaluations: 1000000000000, gain: 0.1 %}}\ngoals:", "to 1000000000"},
		{"stall that always ends", "goals:", "search: {stall: {evaluations: 100, gain: 150 %}}\ngoals:", "no gain"},
		{"stall without gain", "goals:", "search: {stall: {evaluations: 100}}\ngoals:", "search.stall.gain: is missing"},
		{"steps", "platform_radius: 100 mm", "platform_radius: {from: 1 mm, to: 1000 m, step: 1e-12 mm}", "step"},
		{"aliases", "family:", aliasBomb() + "family:", ""},
		{"a title", "family:", "title: " + long + "\nfamily:", "longer than a title"},
		{"a path", "samples: 20", "samples: 20}, {name: more, file: " + long + ".csv", "duty.zones[1].file"},
		{"a name", "goals:", long[:1000] + ": 1\ngoals:", "unknown key"},
	} {
		if !strings.Contains(absurdBase, c.old) {
			t.Fatalf("%s: the brief has no %q", c.why, c.old)
		}
		var before, after runtime.MemStats
		runtime.ReadMemStats(&before)
		_, err := Parse("b.yaml", []byte(strings.Replace(absurdBase, c.old, c.new, 1)), known())
		runtime.ReadMemStats(&after)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: got\n%v\nwant\n%s", c.why, err, c.want)
			continue
		}
		if n := after.TotalAlloc - before.TotalAlloc; n > most {
			t.Errorf("%s: refused after %d bytes of memory", c.why, n)
		}
		if len(err.Error()) > 8000 {
			t.Errorf("%s: a message of %d bytes", c.why, len(err.Error()))
		}
	}
	if _, err := Parse("b.yaml", []byte(absurdBase), known()); err != nil {
		t.Errorf("the sensible one: %v", err)
	}
}

const absurdBase = `family: 3-RPR
dimensions: {base_radius: [200 mm, 500 mm], platform_radius: 100 mm, home_heading: 70 deg, leg_min: sized, stroke: sized}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm}, samples: 20}]}
goals: [{minimise: footprint}]
`

// Files beyond the bound are refused by their size, before they are read.
func TestAbsurdFiles(t *testing.T) {
	dir := t.TempDir()
	sparse := func(name string, size int64) string {
		path := filepath.Join(dir, name)
		f, err := os.Create(path)
		if err != nil {
			t.Fatal(err)
		}
		defer f.Close()
		if err := f.Truncate(size); err != nil {
			t.Skip("no sparse files here")
		}
		return path
	}
	const huge = 1 << 40
	sparse("poses.csv", huge)
	text := strings.Replace(absurdBase, "samples: 20", "samples: 20}, {name: more, file: poses.csv", 1)
	for _, err := range []error{
		func() error { _, err := Load(sparse("huge.yaml", huge), known()); return err }(),
		func() error { _, err := Parse(filepath.Join(dir, "b.yaml"), []byte(text), known()); return err }(),
		func() error { _, err := Load(filepath.Join(dir, strings.Repeat("p", 5000)), known()); return err }(),
	} {
		if err == nil || len(err.Error()) > 8000 {
			t.Errorf("got %v", err)
		} else {
			t.Log(err)
		}
	}
}

// Control characters of a file do not reach the terminal with an error.
func TestFaultsPrint(t *testing.T) {
	for _, c := range []struct{ file, text string }{
		{"b.toml", "\x1b"}, {"b.toml", "\x1b[31m = 1"}, {"b.yaml", "\"\\e[31m\": 1"}, {"b.yaml", "family: \"\\e]0;x\\a\""},
		{"b.json", "{\"\\u001b[31m\": 1}"}, {"b.json", "\x1b"}, {"b.json", "{\"\\u202e\\n\": 1}"}, {"b\n\x1b.json", "{"},
	} {
		_, err := Parse(c.file, []byte(c.text), known())
		if err == nil {
			t.Errorf("%s %q: is taken", c.file, c.text)
			continue
		}
		for _, l := range strings.Split(err.Error(), "\n") {
			if strings.IndexFunc(l, func(r rune) bool { return !unicode.IsPrint(r) }) >= 0 || !strings.Contains(l, ".") {
				t.Errorf("%s %q: %q", c.file, c.text, l)
			}
		}
	}
}
