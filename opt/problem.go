package opt

import (
	"errors"
	"fmt"
	"math"
)

// Kind says how the values of a variable relate to each other.
type Kind uint8

const (
	// Real is any number of [Low, High].
	Real Kind = iota
	// Ordered is one of Levels steps; x holds the index 0..Levels-1 and
	// neighbouring indices are similar designs.
	Ordered
	// Choice is one of Levels alternatives without order; x holds the index.
	Choice
)

// String returns the kind's name.
func (k Kind) String() string {
	switch k {
	case Real:
		return "real"
	case Ordered:
		return "ordered"
	case Choice:
		return "choice"
	}
	return fmt.Sprintf("kind %d", uint8(k))
}

// Var is one variable of a design.
type Var struct {
	Name string
	Kind Kind
	// Low and High bound a Real variable, Low <= High; Low == High fixes it.
	Low, High float64
	// Levels counts the values of an Ordered or Choice variable, at least 1.
	Levels int
}

// bounds returns the range of x for the variable.
func (v *Var) bounds() (low, high float64) {
	if v.Kind == Real {
		return v.Low, v.High
	}
	return 0, float64(v.Levels - 1)
}

// free reports whether the variable can take more than one value.
func (v *Var) free() bool {
	low, high := v.bounds()
	return high > low
}

// Space is a box of variables. A Problem may have several, for instance one
// per kind of machine; their designs compete on one front but never mate.
type Space struct {
	Name string
	Vars []Var
}

// Result is what Problem.Evaluate fills. The slices belong to the caller of
// Evaluate and have the right lengths; they hold NaN (Goals) and 0 (Excess)
// on entry.
type Result struct {
	// Goals are to be minimised, one per Problem.Goals. They are only read
	// when Violation is 0.
	Goals []float64
	// Excess has one entry per limit: <= 0 holds, > 0 is the relative
	// violation.
	Excess []float64
	// Violation is 0 for a feasible design, > 0 otherwise; less is better
	// (constrained domination, Deb 2000). +Inf marks a design that failed.
	Violation float64
	// Fault says why a design failed, in the evaluator's words; optional.
	Fault string
	// Recalled says that the result was known from a Settings.Record of an
	// earlier run.
	Recalled bool
}

// Problem is what Search works on.
type Problem struct {
	Spaces []Space
	Goals  int // number of goals, at least 1
	Limits int // number of limits, may be 0
	// Evaluate appraises design x of Spaces[space]. It must be safe for
	// concurrent use; worker, 0..Settings.Workers-1, is never in use twice at
	// the same time, so it may select scratch memory. The result must not
	// depend on it. x must not be changed or kept. A panic, or a NaN or
	// infinite goal of a feasible design, makes the design a failed one and
	// the search goes on.
	Evaluate func(worker, space int, x []float64, r *Result)
	// Confirm, if set, looks closer at a feasible design that would have been
	// on the front when it was handed in: it is called right after Evaluate, for
	// the same design on the same worker, and what it makes of the result, which it
	// finds in r, takes the place of it everywhere. It must never make a design
	// better: one that the front beats is not confirmed, and never joins it.
	// What holds for Evaluate holds for Confirm.
	Confirm func(worker, space int, x []float64, r *Result)
}

// check returns what is wrong with the problem, all of it, or nil.
func (p *Problem) check() error {
	var errs []error
	bad := func(format string, a ...any) { errs = append(errs, fmt.Errorf("opt: Problem."+format, a...)) }
	if p.Evaluate == nil {
		bad("Evaluate is nil; give a function")
	}
	if p.Goals < 1 {
		bad("Goals is %d; at least 1 is needed", p.Goals)
	}
	if p.Limits < 0 {
		bad("Limits is %d; it must not be negative, 0 means none", p.Limits)
	}
	if len(p.Spaces) == 0 {
		bad("Spaces is empty; give at least one space")
	}
	for i := range p.Spaces {
		s := &p.Spaces[i]
		if len(s.Vars) == 0 {
			bad("Spaces[%d] (%s) has no variables; give at least one", i, s.Name)
		}
		for j := range s.Vars {
			v := &s.Vars[j]
			at := fmt.Sprintf("Spaces[%d].Vars[%d] (%s)", i, j, v.Name)
			switch v.Kind {
			case Real:
				if !(v.Low <= v.High) || math.IsInf(v.Low, 0) || math.IsInf(v.High, 0) || math.IsInf(v.High-v.Low, 0) {
					bad("%s runs from %v to %v; both must be finite with Low <= High", at, v.Low, v.High)
				}
			case Ordered, Choice:
				if v.Levels < 1 {
					bad("%s has %d levels; at least 1 is needed", at, v.Levels)
				}
			default:
				bad("%s has unknown %v; write Real, Ordered or Choice", at, v.Kind)
			}
		}
	}
	return errors.Join(errs...)
}
