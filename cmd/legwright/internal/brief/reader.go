package brief

import (
	"fmt"
	"strings"
)

// maxFaults bounds how many faults are told; the others are counted.
const maxFaults = 500

// reader checks a tree against tables of keys and collects values and faults.
type reader struct {
	known  *Known
	places places
	faults Faults
	more   int // faults beyond the bound

	families []*KnownFamily  // of the file, as far as known
	zones    map[string]bool // names of all zones, faulty ones included
	goals    map[string]bool // measures of all goals
	measures []measureUse    // of goals and limits, for their needs
	samples  int             // poses of all zones
	strokes  []float64
	dead     deadLength
}

// measureUse is a measure named by a goal or limit.
type measureUse struct {
	n       *node
	measure *KnownMeasure
}

// key is one key of a mapping: its name, whether it must be there, and the function that turns its
// value into what Brief holds; nil from the function means a fault has been noted.
type key struct {
	name string
	need bool
	read func(*reader, *node) any
	keys []key // for a mapping without a function of its own
}

func newReader(file string, known *Known) *reader {
	return &reader{
		known:  known,
		places: places{file, map[string]Position{}},
		zones:  map[string]bool{},
		goals:  map[string]bool{},
	}
}

func (r *reader) fault(at Position, path, problem, remedy string) {
	if r.full() {
		r.more++
		return
	}
	r.faults = append(r.faults, Fault{at, path, problem, remedy})
}

// full reports whether further faults are only counted.
func (r *reader) full() bool { return len(r.faults) >= maxFaults }

// err is all the faults, nil if there are none.
func (r *reader) err() error {
	if r.more > 0 {
		r.faults = append(r.faults, Fault{Position{File: r.places.file}, "", fmt.Sprintf("%d more faults follow", r.more), "mend these first"})
	}
	return r.faults.Err()
}

// refuse notes a fault of the value.
func (r *reader) refuse(n *node, problem, remedy string) {
	at := n.at
	if n.shape == mapping || n.shape == empty {
		at = n.key
	}
	r.fault(at, n.path, problem, remedy)
}

// wrong notes that the value has the wrong shape.
func (r *reader) wrong(n *node, write string) {
	var what string
	switch n.shape {
	case empty:
		what = "has no value"
	case reserved:
		what = fmt.Sprintf("%q: anchors, aliases and tags are not read", short(n.text))
	case text:
		what = fmt.Sprintf("%q is text", short(n.text))
		if strings.TrimSpace(n.text) == "" {
			what = "is empty"
		}
	case number:
		what = fmt.Sprintf("%s is a bare number", short(n.text))
	case boolean:
		what = "true or false is no value here"
		if n.text != "" {
			what = fmt.Sprintf("%s is true or false", n.text)
		}
	case moment:
		what = fmt.Sprintf("%s is a date or time", short(n.text))
	case list:
		what = "is a list"
		if len(n.items) == 0 {
			what = "is an empty list"
		}
	case mapping:
		what = "is a mapping of keys"
		if len(n.entries) == 0 {
			what = "is an empty mapping"
		}
	}
	r.refuse(n, what, "write "+write)
}

func short(s string) string {
	if rs := []rune(s); len(rs) > 60 {
		return string(rs[:60]) + "…"
	}
	return s
}

// names lists the keys of a table.
func names(keys []key) (s []string) {
	for _, k := range keys {
		s = append(s, k.name)
	}
	return s
}

// mapping reads a mapping by its table of keys; nil if it is none.
func (r *reader) mapping(n *node, keys []key) map[string]any {
	if !r.isMapping(n, "keys with values: "+strings.Join(names(keys), ", ")) {
		return nil
	}
	excused := r.strangers(n, names(keys))
	out := map[string]any{}
	for _, k := range keys {
		v, ok := n.child(k.name)
		switch {
		case ok:
			if value := r.value(k, v); value != nil {
				out[k.name] = value
			}
		case k.need && !excused[k.name]:
			r.missing(n, k.name)
		}
	}
	return out
}

func (r *reader) value(k key, n *node) any {
	if k.read != nil {
		return k.read(r, n)
	}
	if m := r.mapping(n, k.keys); m != nil {
		return m
	}
	return nil
}

// isMapping checks the shape and notes keys given twice.
func (r *reader) isMapping(n *node, write string) bool {
	if n.shape != mapping || len(n.entries) == 0 {
		r.wrong(n, write)
		return false
	}
	seen := map[string]Position{}
	for _, e := range n.entries {
		folded := strings.ToLower(e.name)
		if first, ok := seen[folded]; ok {
			r.fault(e.value.key, e.value.path, fmt.Sprintf("already given on line %d", first.Line), "give each key once (case does not tell keys apart)")
			continue
		}
		seen[folded] = e.value.key
	}
	return true
}

// strangers notes keys that are none of the names. It returns the names that the strangers most
// likely mean, whose absence needs no fault of its own.
func (r *reader) strangers(n *node, names []string) map[string]bool {
	excused := map[string]bool{}
	seen := map[string]bool{}
	for _, e := range n.entries {
		folded := strings.ToLower(e.name)
		twice := seen[folded]
		seen[folded] = true
		r.places.at[e.value.path] = e.value.key
		switch {
		case contains(names, e.name):
			continue
		case r.full(): // spare the search for near names
			if !twice {
				r.more++
			}
			continue
		}
		if c := near(e.name, names); c != "" {
			excused[c] = true
		}
		if !twice {
			r.fault(e.value.key, e.value.path, fmt.Sprintf("unknown key %q", short(e.name)), suggest(e.name, names))
		}
	}
	return excused
}

func contains(names []string, name string) bool {
	for _, n := range names {
		if n == name {
			return true
		}
	}
	return false
}

// missing notes that the mapping lacks a key.
func (r *reader) missing(n *node, name string) { r.lacks(n, name, name) }

// lacks notes that the mapping lacks a key, with what to add.
func (r *reader) lacks(n *node, name, add string) {
	path := name
	if n.path != "" {
		path = n.path + "." + name
	}
	r.fault(n.key, path, "is missing", "add "+add)
}

// items checks that the value is a list that is not empty.
func (r *reader) items(n *node, write string) []*node {
	if n.shape != list || len(n.items) == 0 {
		r.wrong(n, write)
		return nil
	}
	for _, v := range n.items {
		r.places.at[v.path] = v.key
	}
	return n.items
}

// word reads a string that is not empty.
func (r *reader) word(n *node, write string) (string, bool) {
	if n.shape != text || strings.TrimSpace(n.text) == "" {
		r.wrong(n, write)
		return "", false
	}
	return n.text, true
}

// oneOf reads one of the names.
func (r *reader) oneOf(n *node, what string, names []string) (string, bool) {
	s, ok := r.word(n, "one of "+strings.Join(names, ", "))
	if !ok {
		return "", false
	}
	if !contains(names, s) && r.full() {
		r.more++
		return s, false
	}
	if !contains(names, s) {
		r.refuse(n, fmt.Sprintf("unknown %s %q", what, short(s)), suggest(s, names))
		return s, false
	}
	return s, true
}
