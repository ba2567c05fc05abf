package opt

import "fmt"

// Origins of a Design: how it was made.
const (
	OriginSample = "sample" // Latin hypercube or fresh random design
	OriginSBX    = "sbx"    // simulated binary crossover
	OriginDE2    = "de2"    // differential evolution, few coordinates
	OriginDE9    = "de9"    // differential evolution, most coordinates
	OriginReset  = "reset"  // one coordinate drawn anew
	OriginLocal  = "local"  // best step by a linear model of goals and limits
	OriginPolish = "polish" // Nelder-Mead
)

// Design is one evaluated design.
type Design struct {
	Space     int       // index into Problem.Spaces
	X         []float64 // one value per variable, indices for Ordered and Choice
	Goals     []float64 // NaN where an infeasible design has none
	Excess    []float64 // as Result.Excess
	Violation float64   // 0 feasible, +Inf failed
	Origin    string    // what made it, one of the Origin constants
	Order     int       // when it was counted, 0 for the first of the run
	Fault     string    // why it failed, "" otherwise
}

// Status says why a search ended.
type Status uint8

const (
	// BudgetSpent: all evaluations are used up and Front has designs.
	BudgetSpent Status = iota
	// NoFeasible: the budget is spent and no design was feasible; see
	// Outcome.Near.
	NoFeasible
	// Interrupted: the context ended first; what was found is reported.
	Interrupted
	// Exhausted: every design of the discrete spaces was tried.
	Exhausted
	// TimeSpent: Settings.Time was over first.
	TimeSpent
	// Stalled: Settings.Stall ended it.
	Stalled
	// Stopped: Settings.StopAt was reached.
	Stopped
)

// String returns the status in words.
func (s Status) String() string {
	switch s {
	case BudgetSpent:
		return "budget spent"
	case NoFeasible:
		return "budget spent, no feasible design"
	case Interrupted:
		return "interrupted"
	case Exhausted:
		return "every design tried"
	case TimeSpent:
		return "time spent"
	case Stalled:
		return "hypervolume stalled"
	case Stopped:
		return "stopped where asked"
	}
	return fmt.Sprintf("status %d", uint8(s))
}

// Point is the state of a search after a number of evaluations.
type Point struct {
	Evaluations int
	Hypervolume float64 // of the archive up to the reference of then; with 4 goals or more of a subset picked from it
	Feasible    float64 // feasible share of all evaluations so far
}

// Outcome is what a Search found. Designs share memory with nothing else.
type Outcome struct {
	// Front holds at most Settings.Front non-dominated designs in ascending
	// order of their goals: the best in each goal (if Settings.Front is at
	// least 4 per goal) and those that cover most hypervolume.
	Front []Design
	// Archive is the number of non-dominated designs Front was picked from.
	Archive int
	// Kept are those designs, in ascending order of their goals, if
	// Settings.Archive asks for them.
	Kept []Design
	// Reference bounds the hypervolume: Settings.Reference, or fixed once 30
	// feasible designs are counted (at the first polish or at the end, if there
	// are fewer): per goal the worst value among those of them that no other
	// beats, plus half their range (half its magnitude, or 1, where the range
	// is nothing), but no less than the upper quartile of all of them. Unless
	// it was given it moves out, at History points, to a tenth of the range
	// beyond all but the worst twentieth of the archive in each goal. nil when no
	// design was feasible.
	Reference []float64
	// Hypervolume that Front covers up to Reference.
	Hypervolume float64
	Evaluations int    // at most Settings.StopAt
	Feasible    int    // feasible designs among the evaluated
	Population  int    // per space at the start
	Grown       int    // at the end, of the space that grew most
	Polished    int    // evaluations that Nelder-Mead took
	Children    int    // per generation and space, while the space has its turn
	Status      Status // why it ended
	// Spaces tells what became of each of Problem.Spaces.
	Spaces  []SpaceOutcome
	History []Point
	// Near holds the infeasible designs of least violation, best first.
	Near []Design
	// Single has one list per limit: designs that violate this limit only,
	// least excess first, at most 10.
	Single [][]Design
	// Failed holds the first designs, at most 20, that panicked or gave no
	// numbers; Failures counts all of them.
	Failed   []Design
	Failures int
}
