package proof

import (
	"time"

	"legwright/kin"
	"legwright/kin/enclose"
)

// Answer is what became of a proof.
type Answer int

// The answers.
const (
	Undecided Answer = iota
	Proved
	Refuted
)

// String is the word for the answer.
func (a Answer) String() string {
	switch a {
	case Proved:
		return "proved"
	case Refuted:
		return "refuted"
	}
	return "undecided"
}

// Settings say how far a proof goes.
type Settings struct {
	Gap      float64       // relative distance to which a limit that is nearly met is proved; 0 for DefaultGap
	Time     time.Duration // 0 for no end but that of the context
	Boxes    int64         // most boxes, 0 for any number; unlike Time it ends at the same place every time
	Workers  int           // 0 for all processors
	Progress func(Progress)
}

// MostGap is the widest gap: what is further from a limit says nothing of it.
const MostGap = 0.1

// DefaultGap is the gap where none is set.
const DefaultGap = 0.01

// Progress is what was done so far.
type Progress struct {
	Settled float64 // share of the zones' volume, all regions counting alike
	Boxes   int64
}

// Counter is a pose, checked in plain arithmetic, at which a property fails.
type Counter struct {
	Pose      kin.Coords
	Zone      int // -1 for home
	Leg, Mate int // 0-based, -1 for none
	Case      int // -1 for none
	Value     float64
	What      string      // the passive part at its stop, if that is why
	Other     *kin.Coords // a second pose at which the determinant has the other sign, both signs certified
}

// Outcome is what became of one property.
type Outcome struct {
	Property
	Answer Answer
	Target float64  // what was to be proved: the limit, or that less the gap
	Gapped bool     // the target is not the limit itself
	Found  float64  // worst value that the search met, in plain arithmetic
	At     *Counter // where; for a refuted property the pose that refutes it
	Bound  float64  // proved bound of the property over all zones, no worse than Target; of regular and regular wrenches, of σmin/σmax; NaN where it has none
	Boxes  int64    // boxes that were tested for it
	Left   float64  // share of the regions' volume in which it is not settled
	Needs  string   // name of the property without which this one means nothing, and which failed
	Poses  int      // single poses, of listed zones, at which it was checked instead
}

// Result is what Prove finds.
type Result struct {
	Answer      Answer
	Gap         float64
	Outcomes    []Outcome
	Left        []string // limits that a proof over boxes does not cover
	Boxes       int64
	Regions     int
	Listed      int // single poses that were checked in plain arithmetic instead
	OutOfTime   bool
	Interrupted bool
	Worst       *Rest // of the boxes not settled the worst, nil where all are

	trees []tree
}

// Rest is a box that was not settled.
type Rest struct {
	Zone  int
	Box   enclose.Box
	Open  []string // properties not settled in it
	Share float64  // of its region's volume
}
