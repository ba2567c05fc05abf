package brief

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"
	"unicode"
)

// Position is a place in a file; line and column count from 1, columns in characters. A zero line
// means the file as a whole.
type Position struct {
	File   string `json:"file"`
	Line   int    `json:"line"`
	Column int    `json:"column"`
}

// String is file:line:column.
func (p Position) String() string {
	if p.Line == 0 {
		return p.File
	}
	return fmt.Sprintf("%s:%d:%d", p.File, p.Line, p.Column)
}

// order is the line for sorting.
func (p Position) order() int {
	if p.Line == 0 {
		return math.MaxInt
	}
	return p.Line
}

// Fault is one thing wrong with a file.
type Fault struct {
	At      Position `json:"at"`
	Key     string   `json:"key,omitempty"` // dotted path, list items from 0: "goals[1].maximise"
	Problem string   `json:"problem"`
	Remedy  string   `json:"remedy"` // what to write instead
}

// Error is the fault on one line. What would not print, of the texts of a file, shows as a question mark.
func (f Fault) Error() string {
	var b strings.Builder
	b.WriteString(f.At.String())
	if f.Key != "" {
		b.WriteString(": " + f.Key)
	}
	b.WriteString(": " + f.Problem)
	if f.Remedy != "" {
		b.WriteString("; " + f.Remedy)
	}
	return strings.Map(func(r rune) rune {
		if unicode.IsPrint(r) {
			return r
		}
		return '?'
	}, b.String())
}

// Faults are all the faults found in one go.
type Faults []Fault

// Error is one line per fault.
func (fs Faults) Error() string {
	lines := make([]string, len(fs))
	for i, f := range fs {
		lines[i] = f.Error()
	}
	return strings.Join(lines, "\n")
}

// Sort orders the faults by file and place: the first file named stays first, and what concerns a
// file as a whole comes after its lines.
func (fs Faults) Sort() {
	files := map[string]int{}
	for _, f := range fs {
		if _, ok := files[f.At.File]; !ok {
			files[f.At.File] = len(files)
		}
	}
	slices.SortStableFunc(fs, func(a, b Fault) int {
		return cmp.Or(
			cmp.Compare(files[a.At.File], files[b.At.File]),
			cmp.Compare(a.At.order(), b.At.order()),
			cmp.Compare(a.At.Column, b.At.Column),
		)
	})
}

// Err is the sorted faults as an error, nil if there are none.
func (fs Faults) Err() error {
	if len(fs) == 0 {
		return nil
	}
	fs.Sort()
	return fs
}

// places remembers where each key of a file stands.
type places struct {
	file string
	at   map[string]Position
}

// find gives the place of the key, or of the nearest key around it.
func (p *places) find(path string) Position {
	for path != "" {
		if at, ok := p.at[path]; ok {
			return at
		}
		path = path[:max(strings.LastIndexAny(path, ".["), 0)]
	}
	return Position{p.file, 1, 1}
}
