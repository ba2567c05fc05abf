package brief

import (
	"bytes"
	"errors"
	"io"
	"regexp"
	"strconv"
	"strings"

	"go.yaml.in/yaml/v3"
)

var yamlLine = regexp.MustCompile(`^(?:yaml: )?(?:line (\d+): )?`)

// parseYAML reads one YAML document. Anchors, aliases, tags and a second document are faults.
func parseYAML(file string, data []byte) (*node, error) {
	d := yaml.NewDecoder(bytes.NewReader(data))
	var doc, more yaml.Node
	if err := d.Decode(&doc); errors.Is(err, io.EOF) {
		return nil, Fault{Position{file, 1, 1}, "", "the file holds no value", "write at least family, dimensions, duty and goals"}
	} else if err != nil {
		return nil, yamlFault(file, data, err)
	}
	switch err := d.Decode(&more); {
	case err == nil:
		return nil, Fault{Position{file, more.Line, more.Column}, "", "a second document begins here", "keep one document in a file"}
	case !errors.Is(err, io.EOF):
		return nil, yamlFault(file, data, err)
	}
	return fromYAML(file, doc.Content[0], 0)
}

// yamlFault gives the parser's complaint a place: it tells the line, sometimes, and no column.
func yamlFault(file string, data []byte, err error) Fault {
	m := yamlLine.FindStringSubmatch(err.Error())
	line, _ := strconv.Atoi(m[1])
	at := Position{file, max(line, 1), 1}
	if lines := bytes.Split(data, []byte("\n")); at.Line <= len(lines) {
		text := lines[at.Line-1]
		at.Column += len(text) - len(bytes.TrimLeft(text, " \t"))
	}
	return Fault{at, "", "not readable as YAML: " + strings.TrimPrefix(err.Error(), m[0]), "check indentation, brackets and quotes around here"}
}

func fromYAML(file string, y *yaml.Node, depth int) (*node, error) {
	at := Position{file, y.Line, y.Column}
	n := &node{at: at, key: at, text: y.Value}
	switch {
	case depth > maxDepth:
		return nil, tooDeep(at)
	case y.Kind == yaml.AliasNode:
		n.shape, n.text = reserved, "*"+y.Value
	case y.Anchor != "":
		n.shape, n.text = reserved, "&"+y.Anchor
	case y.Style&yaml.TaggedStyle != 0:
		n.shape, n.text = reserved, y.Tag
	case y.Kind == yaml.ScalarNode:
		n.shape = yamlScalar(y.ShortTag())
	case y.Kind == yaml.SequenceNode:
		n.shape = list
		for _, c := range y.Content {
			v, err := fromYAML(file, c, depth+1)
			if err != nil {
				return nil, err
			}
			n.items = append(n.items, v)
		}
	case y.Kind == yaml.MappingNode:
		n.shape = mapping
		for i := 0; i+1 < len(y.Content); i += 2 {
			k := y.Content[i]
			v, err := fromYAML(file, y.Content[i+1], depth+1)
			if err != nil {
				return nil, err
			}
			v.key = Position{file, k.Line, k.Column}
			n.entries = append(n.entries, entry{yamlKey(k), v})
		}
	}
	return n, nil
}

// yamlKey is the spelling of a key; one that is no plain scalar matches no known name.
func yamlKey(k *yaml.Node) string {
	switch {
	case k.Kind == yaml.AliasNode:
		return "*" + k.Value
	case k.Kind != yaml.ScalarNode:
		return "? [a list or mapping as key]"
	case k.Anchor != "":
		return "&" + k.Anchor + " " + k.Value
	}
	return k.Value
}

func yamlScalar(tag string) shape {
	switch tag {
	case "!!null":
		return empty
	case "!!int", "!!float":
		return number
	case "!!bool":
		return boolean
	case "!!timestamp":
		return moment
	}
	return text
}
