package study

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"legwright/opt"
)

// MostParts bounds into how many parts a study may be cut.
const MostParts = 100_000

// mostCounted bounds what is counted of a part: the sums over all parts stay far from what an int holds.
const mostCounted = math.MaxInt32

// check looks for what merging relies on, so that a damaged part.json is refused rather than merged.
func (p *Part) check() error {
	o := p.Outcome
	switch {
	case p.Of < 1 || p.Of > MostParts || p.Number < 1 || p.Number > p.Of:
		return fmt.Errorf("part %d of %d makes no sense", p.Number, p.Of)
	case o == nil:
		return errors.New("outcome: is missing")
	case !counts(p.Whole, p.Budget):
		return fmt.Errorf("whole or budget is not from 0 to %d", mostCounted)
	case !counts(o.Evaluations, o.Feasible, o.Failures, o.Population, o.Polished):
		return fmt.Errorf("outcome: a count is not from 0 to %d", mostCounted)
	case o.Evaluations < o.Feasible+o.Failures:
		return fmt.Errorf("outcome: %d feasible and %d failed designs of %d", o.Feasible, o.Failures, o.Evaluations)
	case o.Status < 0 || o.Status > int(opt.Stopped):
		return fmt.Errorf("outcome.status: %d is unknown", o.Status)
	case len(o.Spaces) != len(p.Dimensions):
		return fmt.Errorf("outcome.spaces: has %d items for %d families", len(o.Spaces), len(p.Dimensions))
	case (o.Reference == nil) != (len(o.Kept) == 0):
		return errors.New("outcome.reference: there is one if any design is feasible, and only then")
	}
	goals := len(o.Reference)
	if err := p.designs("outcome.kept", o.Kept, goals, -1); err != nil {
		return err
	}
	if err := p.designs("outcome.near", o.Near, -1, len(o.Single)); err != nil {
		return err
	}
	if err := p.designs("outcome.failed", o.Failed, -1, -1); err != nil {
		return err
	}
	for i, l := range o.Single {
		if err := p.designs(fmt.Sprintf("outcome.single[%d]", i), l, -1, len(o.Single)); err != nil {
			return err
		}
	}
	for i := range o.Spaces {
		s := &o.Spaces[i]
		if !counts(s.Evaluations, s.Feasible) {
			return fmt.Errorf("outcome.spaces[%d]: a count is not from 0 to %d", i, mostCounted)
		}
		if n := len(s.Best); n != 0 && n != goals {
			return fmt.Errorf("outcome.spaces[%d].best: has %d designs for %d goals", i, n, goals)
		}
		if err := p.designs(fmt.Sprintf("outcome.spaces[%d].best", i), s.Best, goals, -1); err != nil {
			return err
		}
		if err := p.designs(fmt.Sprintf("outcome.spaces[%d].near", i), s.Near, -1, len(o.Single)); err != nil {
			return err
		}
	}
	return nil
}

// counts tells whether numbers may be counts.
func counts(ns ...int) bool {
	return !slices.ContainsFunc(ns, func(n int) bool { return n < 0 || n > mostCounted })
}

// designs checks a list; goals or limits below 0 are not looked at.
func (p *Part) designs(at string, ds []PartDesign, goals, limits int) error {
	for i := range ds {
		d := &ds[i]
		switch {
		case d.Space < 0 || d.Space >= len(p.Dimensions):
			return fmt.Errorf("%s[%d].space: there is no family %d", at, i, d.Space)
		case len(d.X) != p.Dimensions[d.Space]:
			return fmt.Errorf("%s[%d].x: has %d numbers, not %d", at, i, len(d.X), p.Dimensions[d.Space])
		case goals >= 0 && (len(d.Goals) != goals || d.Violation != 0 || d.Fault != ""):
			return fmt.Errorf("%s[%d].goals: has %d numbers for %d goals, or is not feasible", at, i, len(d.Goals), goals)
		case limits >= 0 && (len(d.Excess) != limits || !(d.Violation > 0)):
			return fmt.Errorf("%s[%d].excess: has %d numbers for %d limits, or violates none", at, i, len(d.Excess), limits)
		}
	}
	return nil
}
