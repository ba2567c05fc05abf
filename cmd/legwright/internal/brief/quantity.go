package brief

import (
	"errors"
	"fmt"
	"regexp"
	"strconv"

	"legwright/cmd/legwright/internal/units"
)

// quantity reads one quantity of one of the kinds.
func (r *reader) quantity(n *node, kinds ...units.Kind) (float64, units.Kind, bool) {
	bare := kinds[0].Bare()
	if n.shape != text && n.shape != number || n.shape == text && blank(n.text) {
		r.wrong(n, "a "+kinds[0].String()+", such as "+kinds[0].Sample())
		return 0, 0, false
	}
	if bare && n.shape == text && units.IsNumber(n.text) {
		r.refuse(n, fmt.Sprintf("%q is text", n.text), "write the number without quotes")
		return 0, 0, false
	}
	if bare && n.shape == number && !units.IsNumber(n.text) {
		r.refuse(n, fmt.Sprintf("%s is not a finite decimal number", short(n.text)), "write "+kinds[0].Sample())
		return 0, 0, false
	}
	v, k, err := units.Parse(n.text, kinds...)
	var bad *units.Error
	if errors.As(err, &bad) {
		r.refuse(n, bad.Problem, bad.Remedy)
		return 0, 0, false
	}
	if k == units.Count && v != float64(int64(v)) {
		r.refuse(n, n.text+" is not a whole number", "write a whole number")
		return 0, 0, false
	}
	if k == units.Sign && v != 1 && v != -1 {
		r.refuse(n, n.text+" is not a sign", "write 1 or -1")
		return 0, 0, false
	}
	return v, k, true
}

func blank(s string) bool {
	for _, c := range s {
		if c != ' ' && c != '\t' && c != '\n' && c != '\r' {
			return false
		}
	}
	return true
}

// sign is what a number may be.
type sign int

const (
	anySign sign = iota
	notNegative
	aboveZero
)

func (r *reader) signed(n *node, v float64, s sign) bool {
	switch {
	case s == aboveZero && v <= 0:
		r.refuse(n, n.text+" is not above 0", "write a value above 0")
		return false
	case s == notNegative && v < 0:
		r.refuse(n, n.text+" is below 0", "write 0 or more")
		return false
	}
	return true
}

// measured reads a key with one quantity.
func measured(k units.Kind, s sign) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		if v, _, ok := r.quantity(n, k); ok && r.signed(n, v, s) {
			return v
		}
		return nil
	}
}

// vector reads three quantities.
func (r *reader) vector(n *node, k units.Kind, s sign) ([3]float64, bool) {
	var v [3]float64
	return v, r.fill(n, v[:], k, s)
}

// fill reads as many quantities as dst has room for.
func (r *reader) fill(n *node, dst []float64, k units.Kind, s sign) bool {
	write := fmt.Sprintf("a list of %d: [%s, …]", len(dst), k.Sample())
	items := r.items(n, write)
	if items == nil {
		return false
	}
	if len(items) != len(dst) {
		r.refuse(n, fmt.Sprintf("has %d items", len(items)), "write "+write)
		return false
	}
	good := true
	for i, item := range items {
		v, _, ok := r.quantity(item, k)
		good = ok && r.signed(item, v, s) && good
		dst[i] = v
	}
	return good
}

func triple(k units.Kind, s sign) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		if v, ok := r.vector(n, k, s); ok {
			return v
		}
		return nil
	}
}

var wholeNumber = regexp.MustCompile(`^(0|[1-9][0-9]*)$`)

// counted reads a whole number from low to high, both included.
func counted(low, high int64) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		write := fmt.Sprintf("write a whole number from %d to %d", low, high)
		if n.shape != number {
			r.wrong(n, write[len("write "):])
			return nil
		}
		if !wholeNumber.MatchString(n.text) {
			r.refuse(n, short(n.text)+" is not a plain whole number", write)
			return nil
		}
		v, err := strconv.ParseInt(n.text, 10, 64)
		if err != nil || v < low || v > high {
			r.refuse(n, short(n.text)+" is out of bounds", write)
			return nil
		}
		return v
	}
}

// ratio reads a bare number or percentage within bounds.
func ratio(low, high float64) func(*reader, *node) any {
	return func(r *reader, n *node) any {
		v, _, ok := r.quantity(n, units.Ratio)
		if !ok {
			return nil
		}
		if v < low || v > high {
			r.refuse(n, n.text+" is out of bounds", fmt.Sprintf("write a number from %g to %g", low, high))
			return nil
		}
		return v
	}
}
