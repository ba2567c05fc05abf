package proof

import (
	"context"
	"encoding/binary"
	"errors"
	"fmt"
	"io"

	"legwright/kin"
	"legwright/kin/enclose"
	"legwright/objective"
)

// ErrTime says that the time of Check was over first: it has shown nothing.
var ErrTime = errors.New("time is out")

// Check replays a record for the design: it looks for nothing and splits no box by itself, but tests anew, on every box of
// the record, what is said to be proved there, and that the boxes leave no part of any region out. It gives the number of
// boxes, and an error that says what the record does not show. The context ends it with its own error.
func Check(ctx context.Context, t *objective.Task, plan *objective.Plan, values []float64, rec *Record, set Settings) (boxes int64, err error) {
	s, _ := newSubject(t, plan, values)
	p := newProver(ctx, s, set)
	all := regions(s.task.Zones)
	if err := p.admit(rec); err != nil {
		return 0, err
	}
	covered := make([]uint64, len(all))
	for k := range rec.Trees {
		b := &rec.Trees[k]
		if b.Region < 0 || b.Region >= len(all) {
			return 0, fmt.Errorf("tree %d is of region %d, and the duty has %d", k+1, b.Region, len(all))
		}
		props := uint64(0)
		for _, c := range b.Claims {
			if c < 0 || c >= len(rec.Claims) {
				return 0, fmt.Errorf("tree %d is about claim %d, and there are %d", k+1, c, len(rec.Claims))
			}
			props |= 1 << rec.Claims[c].Place
		}
		covered[b.Region] |= props
		n, err := p.replay(&all[b.Region], props, b.Splits, int64(b.Boxes))
		if boxes += n; err != nil {
			return boxes, fmt.Errorf("tree %d: %w", k+1, err)
		}
	}
	for _, c := range rec.Claims {
		for r := range all {
			if covered[r]>>c.Place&1 == 0 {
				return boxes, fmt.Errorf("%s is shown for no box of zone %q", c.Property, s.task.Zones[all[r].zone].Name)
			}
		}
		if s.props[c.Place].kind == regular && !p.sameSide(all) {
			return boxes, errors.New("regular: the sign of the determinant is not that at home in every zone")
		}
	}
	return boxes, p.single(rec)
}

// admit sets the targets that the record claims, if the gap allows them.
func (p *prover) admit(rec *Record) error {
	if !(rec.Gap >= 0 && rec.Gap <= MostGap) {
		return fmt.Errorf("a gap of %g is none", rec.Gap)
	}
	if len(rec.Claims) == 0 {
		return errors.New("it claims nothing")
	}
	seen := uint64(0)
	for _, c := range rec.Claims {
		if c.Place < 0 || c.Place >= len(p.props) || p.props[c.Place].Name != c.Property {
			return fmt.Errorf("property %d, %.60q, is none that this design and brief ask for", c.Place, c.Property)
		}
		if seen>>c.Place&1 == 1 {
			return fmt.Errorf("%s is claimed twice", c.Property)
		}
		seen |= 1 << c.Place
		q := &p.props[c.Place]
		if c.Target != q.Limit && !(q.Bounded && c.Target == q.within(rec.Gap)) {
			return fmt.Errorf("%s is claimed to %g, which is neither the limit %g nor that less the gap of %g", q.Name, c.Target, q.Limit, rec.Gap)
		}
		p.aim(c.Place, c.Target)
	}
	return nil
}

// replay tests the boxes of one region, which are to be so many.
func (p *prover) replay(g *region, props uint64, splits string, told int64) (boxes int64, err error) {
	text := inflate(splits)
	for _, b := range p.bench {
		b.enter(g)
	}
	type open struct {
		box  enclose.Box
		left uint64
	}
	stack := []open{{g.box, props}}
	for len(stack) > 0 || len(p.cells) > 0 {
		full := len(p.cells) == batch || len(stack) == 0
		if (full || boxes%batch == 0) && p.stop() {
			p.cells = p.cells[:0]
			if err := p.ctx.Err(); err != nil {
				return boxes, err
			}
			return boxes, ErrTime
		}
		if full {
			p.test(g, p.cells)
			for i := range p.cells {
				if want := p.cells[i].open; p.slots[i].closed&want != want {
					err = errors.New("a box does not keep what is claimed for it")
				}
			}
			if p.cells = p.cells[:0]; err != nil {
				return boxes, err
			}
			continue
		}
		at := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		if boxes++; boxes > told {
			return boxes, fmt.Errorf("it has more boxes than the %d that it tells of", told)
		}
		code, err := text.ReadByte()
		if err != nil {
			return boxes, fmt.Errorf("it ends before its last box: %w", err)
		}
		if code&closes != 0 {
			mask, err := binary.ReadUvarint(text)
			if err != nil {
				return boxes, fmt.Errorf("the claims of a box cannot be read: %w", err)
			}
			closed := unpacked(mask, props)
			at.left &^= closed
			p.cells = append(p.cells, cell{box: at.box, open: closed, depth: 1})
		}
		switch code &^= closes; {
		case code == settled:
			if at.left != 0 {
				return boxes, errors.New("a box is left unsettled")
			}
		case code == outside:
			if !g.beyond(&at.box) {
				return boxes, errors.New("a box that holds poses of the zone is said to hold none")
			}
		case code < settled:
			q := int(code)
			if !(at.box.Low[q] < at.box.High[q]) {
				return boxes, errors.New("a box is split along a coordinate that does not move")
			}
			mid := at.box.Low[q]/2 + at.box.High[q]/2
			low, high := at, at
			low.box.High[q], high.box.Low[q] = mid, mid
			stack = append(stack, high, low)
		default:
			return boxes, errors.New("a box has no known end")
		}
	}
	if _, err := text.ReadByte(); !errors.Is(err, io.EOF) {
		return boxes, errors.New("it goes on after its last box")
	}
	if boxes != told {
		return boxes, fmt.Errorf("it has %d boxes, not %d", boxes, told)
	}
	return boxes, nil
}

// single looks at home and at the listed poses in plain arithmetic.
func (p *prover) single(rec *Record) error {
	v := p.probe[0]
	look := func(c kin.Coords, zone int) error {
		v.at(c, zone)
		for _, q := range rec.Claims {
			var at Counter
			o := &p.props[q.Place]
			if zone < 0 && o.kind > regular {
				continue
			}
			if v.refutes(q.Place, &at) || o.kind == regular && v.doubtful() {
				return fmt.Errorf("%s does not hold at the pose %v, or is in doubt there", q.Property, c)
			}
		}
		return nil
	}
	if err := look(kin.Coords{}, -1); err != nil {
		return err
	}
	for i := range p.task.Zones {
		z := &p.task.Zones[i]
		poses := z.Poses
		if z.Kind != objective.Listed {
			if poses = nil; len(z.Moving()) == 0 {
				poses = []kin.Coords{z.Resting()}
			}
		}
		for _, c := range poses {
			if err := look(c, i); err != nil {
				return err
			}
		}
	}
	return nil
}

// sameSide tells whether the determinant has beyond doubt the same sign in the middle of every region as at home.
func (p *prover) sameSide(all []region) bool {
	v := p.probe[0]
	home := v.signs.sign(kin.Coords{})
	for i := range all {
		var c kin.Coords
		for q := range c {
			c[q] = all[i].box.Low[q]/2 + all[i].box.High[q]/2
		}
		if s := v.signs.sign(c); s == 0 || s != home {
			return false
		}
	}
	return home != 0
}
