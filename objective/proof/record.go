package proof

import (
	"bufio"
	"bytes"
	"compress/flate"
	"encoding/base64"
	"encoding/binary"
	"math/bits"
	"strings"
)

// Record is what a proof has shown, complete enough to be checked without any search: see Check.
type Record struct {
	Gap    float64  `json:"gap"`
	Claims []Claim  `json:"claims"`
	Trees  []Branch `json:"trees"`
}

// Claim is one property that was proved.
type Claim struct {
	Property string  `json:"property"`
	Place    int     `json:"place"`  // among the properties of the design
	Target   float64 `json:"target"` // the bound that was proved, SI
}

// Branch is how one region was split: its boxes in depth-first order, the lower half first. Each takes a byte, of
// which 0 to 5 is the coordinate along which it is halved, 6 a box that is settled, 7 one without a pose of the region;
// 8 is added where claims are proved on the box, whose bits then follow (unsigned, seven bits a byte). The bytes are
// deflated and written in base64: ten bytes for each box at most, about half a byte as a rule.
type Branch struct {
	Region int    `json:"region"`
	Claims []int  `json:"claims"` // places in Record.Claims
	Boxes  int    `json:"boxes"`
	Splits string `json:"splits"`
}

const closes = 8

// Record gives the record of everything that was proved.
func (r *Result) Record() (*Record, error) {
	out := &Record{Gap: r.Gap}
	claimed := uint64(0)
	place := map[int]int{}
	for i := range r.Outcomes {
		o := &r.Outcomes[i]
		if o.Answer != Proved {
			continue
		}
		claimed |= 1 << i
		place[i] = len(out.Claims)
		out.Claims = append(out.Claims, Claim{o.Name, i, o.Target})
	}
	for k := range r.trees {
		t := &r.trees[k]
		props := t.props & claimed
		if props == 0 {
			continue
		}
		b := Branch{Region: t.number}
		for i := range r.Outcomes {
			if props>>i&1 == 1 {
				b.Claims = append(b.Claims, place[i])
			}
		}
		var text []byte
		b.Boxes, text = t.encode(props)
		var err error
		if b.Splits, err = deflated(text); err != nil {
			return nil, err
		}
		out.Trees = append(out.Trees, b)
	}
	return out, nil
}

// encode writes the branches as far as they are about props, and their number of boxes.
func (t *tree) encode(props uint64) (boxes int, out []byte) {
	type at struct {
		node int32
		open uint64
	}
	stack := []at{{0, props}}
	for len(stack) > 0 {
		a := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		boxes++
		n := &t.nodes[a.node]
		closed := n.closed & a.open
		open := a.open &^ closed
		code := n.split
		if open == 0 {
			code = settled
		}
		if code == unsettled {
			panic("proof: a record of a box that is not settled")
		}
		if closed != 0 {
			out = append(out, code|closes)
			out = binary.AppendUvarint(out, packed(closed, props))
		} else {
			out = append(out, code)
		}
		if code < settled {
			stack = append(stack, at{n.first + 1, open}, at{n.first, open})
		}
	}
	return boxes, out
}

// packed moves the bits of x that are set in mask together; unpacked moves them back.
func packed(x, mask uint64) (out uint64) {
	for n := 0; mask != 0; n++ {
		i := bits.TrailingZeros64(mask)
		out |= x >> i & 1 << n
		mask &= mask - 1
	}
	return out
}

func unpacked(x, mask uint64) (out uint64) {
	for n := 0; mask != 0; n++ {
		i := bits.TrailingZeros64(mask)
		out |= x >> n & 1 << i
		mask &= mask - 1
	}
	return out
}

func deflated(b []byte) (string, error) {
	var z bytes.Buffer
	w, err := flate.NewWriter(&z, flate.BestCompression)
	if err != nil {
		return "", err
	}
	if _, err := w.Write(b); err != nil {
		return "", err
	}
	if err := w.Close(); err != nil {
		return "", err
	}
	return base64.StdEncoding.EncodeToString(z.Bytes()), nil
}

// inflate reads back what deflated wrote, as far as it is asked for: no record takes memory beyond its own text.
func inflate(s string) *bufio.Reader {
	return bufio.NewReader(flate.NewReader(base64.NewDecoder(base64.StdEncoding, strings.NewReader(s))))
}
