package brief

import (
	"bytes"
	"encoding/json"
	"errors"
	"io"
)

// parseJSON reads one JSON value.
func parseJSON(file string, data []byte) (*node, error) {
	p := &jsonParser{data: data, locator: locator{file: file, data: data}, d: json.NewDecoder(bytes.NewReader(data))}
	p.d.UseNumber()
	n, err := p.value(0)
	if err != nil {
		return nil, p.fault(err)
	}
	end := int(p.d.InputOffset())
	if rest := bytes.TrimLeft(data[end:], " \t\r\n"); len(rest) > 0 {
		return nil, Fault{p.locator.at(len(data) - len(rest)), "", "something follows the end of the value", "keep one value in a file"}
	}
	return n, nil
}

type jsonParser struct {
	data    []byte
	locator locator
	d       *json.Decoder
	from    int // where the token begins that was asked for last
}

// fault gives a syntax error its place.
func (p *jsonParser) fault(err error) error {
	var f Fault
	if errors.As(err, &f) {
		return f
	}
	offset, what := int(p.d.InputOffset()), err.Error()
	var syntax *json.SyntaxError
	switch {
	case errors.As(err, &syntax):
		offset = max(int(syntax.Offset)-1, p.from)
	case errors.Is(err, io.EOF), errors.Is(err, io.ErrUnexpectedEOF):
		offset, what = len(p.data), "the file ends too early"
	}
	return Fault{p.locator.at(offset), "", "not readable as JSON: " + what, "check commas, brackets and quotes around here"}
}

// next gives the next token and where it begins.
func (p *jsonParser) next() (json.Token, Position, error) {
	from := int(p.d.InputOffset())
	for from < len(p.data) && bytes.IndexByte([]byte(" \t\r\n,:"), p.data[from]) >= 0 {
		from++
	}
	p.from = from
	t, err := p.d.Token()
	return t, p.locator.at(from), err
}

func (p *jsonParser) value(depth int) (*node, error) {
	t, at, err := p.next()
	if err != nil {
		return nil, err
	}
	if depth > maxDepth {
		return nil, tooDeep(at)
	}
	n := &node{at: at, key: at}
	switch t := t.(type) {
	case nil:
		n.shape = empty
	case bool:
		n.shape = boolean
	case json.Number:
		n.shape, n.text = number, t.String()
	case string:
		n.shape, n.text = text, t
	case json.Delim:
		n.shape = list
		if t == '{' {
			n.shape = mapping
		}
		for p.d.More() {
			if err := p.member(n, depth); err != nil {
				return nil, err
			}
		}
		if _, _, err := p.next(); err != nil {
			return nil, err
		}
	}
	return n, nil
}

// member reads one item of a list or one key and value of a mapping.
func (p *jsonParser) member(n *node, depth int) error {
	if n.shape == list {
		v, err := p.value(depth + 1)
		n.items = append(n.items, v)
		return err
	}
	k, at, err := p.next()
	if err != nil {
		return err
	}
	v, err := p.value(depth + 1)
	if err != nil {
		return err
	}
	v.key = at
	name, _ := k.(string) // the decoder lets nothing else stand for a key
	n.entries = append(n.entries, entry{name, v})
	return nil
}
