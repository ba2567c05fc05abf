package brief

import (
	"bytes"
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/pelletier/go-toml/v2"
	"github.com/pelletier/go-toml/v2/unstable"
)

// parseTOML reads a TOML document.
func parseTOML(file string, data []byte) (*node, error) {
	if at, deep := brackets(data); deep {
		return nil, tooDeep(position(file, data, at))
	}
	top := Position{file, 1, 1}
	t := &tomlParser{
		data:    data,
		locator: locator{file: file, data: data},
		root:    &node{shape: mapping, key: top, at: top},
		headed:  map[*node]bool{},
		child:   map[childKey]*node{},
	}
	t.current = t.root
	t.p.Reset(data)
	for t.large == nil && t.p.NextExpression() {
		t.expression(t.p.Expression())
	}
	if t.large != nil {
		return nil, *t.large
	}
	var all map[string]any
	invalid := toml.Unmarshal(data, &all) // the library's own verdict, dates and escapes included
	if t.p.Error() == nil && repeats(t.root) {
		return t.root, nil // the reader of the mapping names every key given twice, with its place
	}
	var de *toml.DecodeError
	if errors.As(invalid, &de) {
		line, column := de.Position()
		what := strings.TrimPrefix(de.Error(), "toml: ")
		return nil, Fault{inCharacters(file, data, line, column), "", "not readable as TOML: " + what, `check brackets and quotes (quantities are strings: "650 mm")`}
	}
	if invalid != nil {
		return nil, Fault{top, "", "not readable as TOML: " + invalid.Error(), "give each table and key once"}
	}
	return t.root, nil
}

// inCharacters gives the position of a column in bytes.
func inCharacters(file string, data []byte, line, column int) Position {
	offset := 0
	for range line - 1 {
		offset += bytes.IndexByte(data[offset:], '\n') + 1
	}
	return position(file, data, offset+column-1)
}

// repeats reports whether a mapping of the tree has a key twice.
func repeats(n *node) bool {
	seen := map[string]bool{}
	for _, e := range n.entries {
		if seen[e.name] || repeats(e.value) {
			return true
		}
		seen[e.name] = true
	}
	return slices.ContainsFunc(n.items, repeats)
}

// maxKeys bounds the keys and headers of a document; go-toml looks through the earlier ones at each.
const maxKeys = 10_000

// brackets finds nesting that would only exhaust the stack; brackets within strings count too,
// which no sensible title notices.
func brackets(data []byte) (offset int, deep bool) {
	depth := 0
	for i, c := range data {
		switch c {
		case '[', '{':
			depth++
		case ']', '}':
			depth = max(depth-1, 0)
		}
		if depth > 10*maxDepth {
			return i, true
		}
	}
	return 0, false
}

// tomlParser builds the tree from the expressions of the document in order.
type tomlParser struct {
	data    []byte
	locator locator
	p       unstable.Parser
	root    *node
	current *node          // table that keys go to
	headed  map[*node]bool // tables that a header or a value has closed
	child   map[childKey]*node
	cursor  int    // end of the last token read
	keyed   int    // keys so far
	large   *Fault // where the document grows too large or deep
}

// childKey finds the first value of a key in a table.
type childKey struct {
	in   *node
	name string
}

// add puts a value into a table.
func (t *tomlParser) add(in *node, name string, v *node) {
	in.entries = append(in.entries, entry{name, v})
	if _, ok := t.child[childKey{in, name}]; !ok {
		t.child[childKey{in, name}] = v
	}
}

func (t *tomlParser) expression(e *unstable.Node) {
	switch e.Kind {
	case unstable.KeyValue:
		t.keyValue(t.current, e, 0)
	case unstable.Table, unstable.ArrayTable:
		t.header(e)
	}
}

// header opens the table of [a.b] or a new item of [[a.b]].
func (t *tomlParser) header(e *unstable.Node) {
	at := t.root
	keys := t.keys(e)
	for i, k := range keys {
		last := i == len(keys)-1
		next, ok := t.child[childKey{at, k.name}]
		switch {
		case !ok && last && e.Kind == unstable.ArrayTable:
			next = &node{shape: list, key: k.at, at: k.at}
			t.add(at, k.name, next)
			ok = true
		case !ok:
			next = t.table(at, k)
		}
		if last && e.Kind == unstable.ArrayTable && next.shape == list && !t.headed[next] {
			item := &node{shape: mapping, key: k.at, at: k.at}
			next.items = append(next.items, item)
			t.current = item
			return
		}
		if next.shape == list && !last && len(next.items) > 0 && !t.headed[next] {
			next = next.items[len(next.items)-1]
		}
		if next.shape != mapping || ok && last && t.headed[next] {
			// Given twice: both stay in the tree, where the reader of the mapping sees them.
			next = t.table(at, k)
		}
		at = next
	}
	t.headed[at] = true
	t.current = at
}

// table adds a new table under the key.
func (t *tomlParser) table(in *node, k tomlKey) *node {
	n := &node{shape: mapping, key: k.at, at: k.at}
	t.add(in, k.name, n)
	return n
}

type tomlKey struct {
	name string
	at   Position
}

// keys reads the dotted key of an expression.
func (t *tomlParser) keys(e *unstable.Node) (ks []tomlKey) {
	for it := e.Key(); it.Next(); {
		raw := it.Node().Raw
		t.cursor = int(raw.Offset + raw.Length)
		ks = append(ks, tomlKey{string(it.Node().Data), t.locator.at(int(raw.Offset))})
		if len(ks) > maxDepth && t.large == nil {
			f := tooDeep(ks[0].at)
			t.large = &f
		}
	}
	if t.keyed++; t.keyed > maxKeys && t.large == nil {
		t.large = &Fault{ks[0].at, "", fmt.Sprintf("more than %d keys", maxKeys), "give recorded poses as a CSV file of their own"}
	}
	return ks
}

func (t *tomlParser) keyValue(in *node, e *unstable.Node, depth int) {
	keys := t.keys(e)
	for _, k := range keys[:len(keys)-1] {
		next, ok := t.child[childKey{in, k.name}]
		if !ok || next.shape != mapping || t.headed[next] {
			next = t.table(in, k)
		}
		in = next
	}
	k := keys[len(keys)-1]
	v := t.value(e.Value(), depth+1)
	v.key = k.at
	t.add(in, k.name, v)
}

// value reads a value, which begins at the next byte that is neither blank, comment nor separator:
// the parser itself keeps no place for lists.
func (t *tomlParser) value(e *unstable.Node, depth int) *node {
	t.skip()
	at := t.locator.at(t.cursor)
	n := &node{at: at, key: at, text: string(e.Data)}
	if depth > maxDepth && t.large == nil {
		f := tooDeep(at)
		t.large = &f
	}
	switch e.Kind {
	case unstable.String:
		n.shape = text
		t.cursor += int(e.Raw.Length)
	case unstable.Integer, unstable.Float:
		n.shape = number
		t.cursor += len(e.Data)
	case unstable.Bool:
		n.shape = boolean
		t.cursor += len(e.Data)
	case unstable.Array, unstable.InlineTable:
		n.shape = list
		if e.Kind == unstable.InlineTable {
			n.shape = mapping
		}
		t.cursor++
		for it := e.Children(); it.Next(); {
			if n.shape == list {
				n.items = append(n.items, t.value(it.Node(), depth+1))
			} else {
				t.keyValue(n, it.Node(), depth)
			}
		}
		t.skip()
		t.cursor++
		t.headed[n] = true
	default:
		n.shape = moment
		t.cursor += len(e.Data)
	}
	return n
}

// skip moves the cursor over blanks, line ends, commas, equals signs and comments.
func (t *tomlParser) skip() {
	for t.cursor < len(t.data) {
		switch t.data[t.cursor] {
		case ' ', '\t', '\r', '\n', ',', '=':
			t.cursor++
		case '#':
			for t.cursor < len(t.data) && t.data[t.cursor] != '\n' {
				t.cursor++
			}
		default:
			return
		}
	}
}
