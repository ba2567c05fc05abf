package brief

import (
	"bytes"
	"fmt"
	"path/filepath"
	"strings"
	"unicode/utf8"
)

// Bounds on what is read, far above any sensible file.
const (
	maxFile  = 1 << 20 // bytes of a brief or a design file
	maxDepth = 30      // lists and mappings within each other
)

type shape int

const (
	empty    shape = iota // null, or nothing after the colon
	text                  // a string
	number                // a bare number, in its own spelling
	boolean               // true or false
	moment                // a date or a time
	list                  // items in order
	mapping               // keys with values
	reserved              // an anchor, an alias, a tag
)

// node is one value of a file, whatever the format.
type node struct {
	shape   shape
	text    string // spelling of a scalar
	entries []entry
	items   []*node
	path    string   // of the key: "duty.zones[0].box"
	key     Position // where its key stands, or itself if it has none
	at      Position // where it stands
}

// entry is one key of a mapping.
type entry struct {
	name  string
	value *node
}

// child gives the value of the key.
func (n *node) child(name string) (*node, bool) {
	for _, e := range n.entries {
		if e.name == name {
			return e.value, true
		}
	}
	return nil, false
}

// place names the whole tree: paths from the top.
func (n *node) place(path string) {
	n.path = path
	for _, e := range n.entries {
		if path == "" {
			e.value.place(e.name)
		} else {
			e.value.place(path + "." + e.name)
		}
	}
	for i, v := range n.items {
		v.place(fmt.Sprintf("%s[%d]", path, i))
	}
}

// format is the format of the file by its name, "" if it is none of the three.
func format(file string) string {
	switch strings.ToLower(filepath.Ext(file)) {
	case ".yaml", ".yml":
		return "yaml"
	case ".toml":
		return "toml"
	case ".json":
		return "json"
	}
	return ""
}

// parse reads the text into a tree. The error is a Fault.
func parse(file, format string, data []byte) (*node, error) {
	data, err := plain(file, data)
	if err != nil {
		return nil, err
	}
	var n *node
	switch format {
	case "yaml":
		n, err = parseYAML(file, data)
	case "toml":
		n, err = parseTOML(file, data)
	case "json":
		n, err = parseJSON(file, data)
	default:
		panic("brief: parse of an unknown format")
	}
	if err != nil {
		return nil, err
	}
	n.place("")
	return n, nil
}

// plain refuses what is no UTF-8 text of a sensible size and takes the byte order mark away.
func plain(file string, data []byte) ([]byte, error) {
	data = bytes.TrimPrefix(data, []byte("\ufeff"))
	if len(data) > maxFile {
		return nil, Fault{Position{File: file}, "", fmt.Sprintf("the file has more than %d bytes", maxFile), "give recorded poses as a CSV file of their own"}
	}
	if i := firstBad(data); i >= 0 {
		return nil, Fault{position(file, data, i), "", fmt.Sprintf("byte 0x%02x is not UTF-8 text", data[i]), "save the file as UTF-8"}
	}
	if len(bytes.TrimSpace(data)) == 0 {
		return nil, Fault{Position{file, 1, 1}, "", "the file is empty", "write at least family, dimensions, duty and goals"}
	}
	return data, nil
}

func firstBad(data []byte) int {
	for i := 0; i < len(data); {
		r, n := utf8.DecodeRune(data[i:])
		if r == 0 || r == utf8.RuneError && n == 1 {
			return i
		}
		i += n
	}
	return -1
}

// locator turns byte offsets into positions. It goes on from the last one, so that a file read from
// front to back costs no more than one pass.
type locator struct {
	file         string
	data         []byte
	offset       int
	line, column int // of offset, from 0
}

// at gives line and column of a byte.
func (l *locator) at(offset int) Position {
	offset = min(max(offset, 0), len(l.data))
	if offset < l.offset {
		l.offset, l.line, l.column = 0, 0, 0
	}
	passed := l.data[l.offset:offset]
	if i := bytes.LastIndexByte(passed, '\n'); i >= 0 {
		l.line += bytes.Count(passed, []byte("\n"))
		l.column = 0
		passed = passed[i+1:]
	}
	l.column += utf8.RuneCount(passed)
	l.offset = offset
	return Position{l.file, l.line + 1, l.column + 1}
}

// position gives line and column of one byte.
func position(file string, data []byte, offset int) Position {
	l := locator{file: file, data: data}
	return l.at(offset)
}

func tooDeep(at Position) Fault {
	return Fault{at, "", fmt.Sprintf("more than %d levels within each other", maxDepth), "write the keys of the brief as the starter shows them"}
}
