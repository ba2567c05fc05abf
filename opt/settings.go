package opt

import (
	"errors"
	"fmt"
	"math"
	"runtime"
	"time"
)

// Settings steer a Search. The zero value works, but for Evaluations.
type Settings struct {
	// Evaluations is the budget: no more designs than this are evaluated,
	// first sample and polish included. Required, at least 4 per space.
	Evaluations int
	// StopAt ends the search after so many evaluations of the Evaluations that
	// it is laid out for; 0 means all of them. At least the first sample.
	StopAt int
	// Time ends the search at the first generation barrier after so long, 0
	// means never; while all results are recalled it does not count. Outcome.Evaluations then depends on the machine; the search
	// with StopAt set to it has the same Outcome but for Status.
	Time time.Duration
	// Stall ends the search when the front has ceased to grow.
	Stall Stall
	// Population is the size per space that the search starts with; it grows
	// from there to the size that Outcome reports. 0 chooses from dimension,
	// goals and budget. Larger suits smooth problems and long runs, smaller
	// multimodal problems and short runs.
	Population int
	// Children are made per generation and space, 0 means 8. More keep more
	// workers busy; the number changes the result, so it is never derived
	// from the machine.
	Children int
	// Seed selects the random streams.
	Seed uint64
	// Workers evaluate side by side, 0 means runtime.GOMAXPROCS(0). The
	// Outcome does not depend on it.
	Workers int
	// Front is the largest number of designs to report, 0 means 200.
	Front int
	// Reference is the point that bounds the hypervolume, one value per goal.
	// nil fixes it from the first feasible designs, see Outcome.Reference.
	Reference []float64
	// Polish is the largest share of the budget that Nelder-Mead may take,
	// below 1. 0 means the default of 0.05; negative means none.
	Polish float64
	// Start are designs that the first sample holds, as many as fit: what an
	// earlier search of a similar problem has found. Values out of range are
	// brought into it. They are evaluated anew and count like others.
	Start []Start
	// NearMisses is how many infeasible designs to keep, 0 means 50.
	NearMisses int
	// Archive asks for Outcome.Kept.
	Archive bool
	// Record, if set, is called for each evaluated design in the order of
	// counting, from one goroutine at a time, unless Evaluate said that the
	// result was recalled. Neither x nor the result may be kept.
	Record func(space int, x []float64, r *Result)
	// Progress, if set, is called at generation barriers, from one goroutine
	// at a time.
	Progress func(Progress)
}

// Progress is a glance at a running search.
type Progress struct {
	Evaluations int     // spent so far
	Budget      int     // Settings.Evaluations
	Feasible    int     // feasible designs among the evaluated
	Archive     int     // feasible designs that no other beats
	Hypervolume float64 // at the last History point
	Phase       string  // "sample", "search" or "polish"
}

const (
	defaultChildren   = 8
	defaultFront      = 200
	defaultPolish     = 0.05
	defaultNearMisses = 50
	leastPerSpace     = 4 // evaluations: differential evolution wants four designs
)

// resolve returns s with defaults filled in, or what is wrong with it.
func (s Settings) resolve(p *Problem) (Settings, error) {
	var errs []error
	bad := func(format string, a ...any) { errs = append(errs, fmt.Errorf("opt: Settings."+format, a...)) }
	if least := leastPerSpace * len(p.Spaces); s.Evaluations < least {
		bad("Evaluations is %d; at least %d are needed for %d space(s)", s.Evaluations, least, len(p.Spaces))
	}
	if s.StopAt == 0 {
		s.StopAt = s.Evaluations
	}
	if s.StopAt > s.Evaluations {
		bad("StopAt is %d, beyond the %d evaluations of the whole search; write fewer, or 0 for all", s.StopAt, s.Evaluations)
	}
	if s.StopAt < 0 {
		bad("StopAt is %d; it must not be negative, 0 means all evaluations", s.StopAt)
	}
	if s.Time < 0 {
		bad("Time is %v; it must not be negative, 0 means no end", s.Time)
	}
	if t := s.Stall; t.Evaluations < 0 || t.Evaluations > 0 && !(t.Gain > 0 && t.Gain < 1) {
		bad("Stall is %d evaluations with a gain of %v; write a positive number with a gain between 0 and 1", t.Evaluations, t.Gain)
	}
	count := func(name string, v *int, def, least int) {
		if *v == 0 {
			*v = def
		}
		if *v < least {
			bad("%s is %d; write at least %d, or 0 for the default", name, *v, least)
		}
	}
	if s.Population != 0 {
		count("Population", &s.Population, 0, leastPerSpace)
	}
	count("Children", &s.Children, defaultChildren, 1)
	count("Workers", &s.Workers, runtime.GOMAXPROCS(0), 1)
	count("Front", &s.Front, defaultFront, 1)
	count("NearMisses", &s.NearMisses, defaultNearMisses, 1)
	for i, d := range s.Start {
		if d.Space < 0 || d.Space >= len(p.Spaces) || len(d.X) != len(p.Spaces[d.Space].Vars) {
			bad("Start[%d] is of space %d with %d variables; the problem has no such space", i, d.Space, len(d.X))
		}
	}
	if s.Reference != nil && len(s.Reference) != p.Goals {
		bad("Reference has %d values; one per goal, %d, are needed", len(s.Reference), p.Goals)
	}
	for k, v := range s.Reference {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			bad("Reference[%d] is %v; write a finite number", k, v)
		}
	}
	switch {
	case s.Polish == 0:
		s.Polish = defaultPolish
	case s.Polish < 0:
		s.Polish = 0
	case !(s.Polish < 1):
		bad("Polish is %v; write a share below 1, 0 for the default or -1 for none", s.Polish)
	}
	return s, errors.Join(errs...)
}
