package brief

import (
	"bytes"
	"fmt"
	"os"
	"strings"
	"testing"
)

// place is where the first occurrence of s stands.
func place(file string, text []byte, s string) Position {
	return position(file, text, bytes.Index(text, []byte(s)))
}

// every visits all keys of a table and of the tables below it.
func every(keys []key, visit func(string)) {
	for _, k := range keys {
		visit(k.name)
		every(k.keys, visit)
	}
}

// Every key of the schema occurs in whole.yaml or tilt.yaml, and each one there, misspelt, is told
// at its place with its right name.
func TestEveryKeyMisspelt(t *testing.T) {
	for _, file := range []string{"whole.yaml", "whole.toml", "whole.json"} {
		t.Run(file, func(t *testing.T) { misspellAll(t, "testdata/"+file) })
	}
}

func misspellAll(t *testing.T, file string) {
	text, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	tree, err := parse(file, format(file), text)
	if err != nil {
		t.Fatal(err)
	}
	lines := strings.SplitAfter(string(text), "\n")
	used := map[string]bool{}
	walk(tree, func(e entry) {
		used[e.name] = true
		at := e.value.key
		line := lines[at.Line-1]
		from := at.Column - 1
		if line[from] == '"' {
			from++
		}
		if !strings.HasPrefix(line[from:], e.name) {
			t.Fatalf("%s at %v: %q", e.value.path, at, line)
		}
		if strings.HasPrefix(strings.TrimSpace(line), "[") {
			return // a TOML header, which other lines repeat
		}
		bad := misspell(e.name)
		changed := strings.Join(lines[:at.Line-1], "") + line[:from] + bad + line[from+len(e.name):] + strings.Join(lines[at.Line:], "")
		_, err := Parse(file, []byte(changed), known())
		fs, ok := err.(Faults)
		if !ok {
			t.Errorf("%s misspelt %s: %v", e.value.path, bad, err)
			return
		}
		for _, f := range fs {
			if f.At == at && strings.Contains(f.Problem, bad) && f.Remedy == "did you mean "+e.name+"?" {
				return
			}
		}
		t.Errorf("%s misspelt %s at %v:\n%v", e.value.path, bad, at, err)
	})
	for _, keys := range [][]key{briefKeys(), actuatorKeys(), legKeys(), zoneKeys(), caseKeys(), loadKeys(), accelerationKeys(), speedKeys(), goalKeys(), limitKeys()} {
		every(keys, func(name string) {
			if !used[name] {
				t.Errorf("%s does not use the key %s", file, name)
			}
		})
	}
}

// misspell swaps the middle letters of a name, or doubles its last where they are the same.
func misspell(name string) string {
	i := len(name) / 2
	if len(name) < 4 || name[i-1] == name[i] {
		return name + name[len(name)-1:]
	}
	return fmt.Sprintf("%s%c%c%s", name[:i-1], name[i], name[i-1], name[i+1:])
}

func walk(n *node, visit func(entry)) {
	for _, e := range n.entries {
		visit(e)
		walk(e.value, visit)
	}
	for _, v := range n.items {
		walk(v, visit)
	}
}
