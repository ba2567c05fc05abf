package objective

import (
	"math"

	"legwright/kin"
)

// SetKind is the shape of a set of vectors about zero.
type SetKind int

// The shapes of sets.
const (
	None    SetKind = iota // only zero
	AnyWay                 // every direction, up to a magnitude
	PerAxis                // each base axis up to its own magnitude, independently
)

// Set is a set of vectors about zero, such as the accelerations that may occur.
type Set struct {
	Kind   SetKind
	Radius float64 // AnyWay
	Half   kin.Vec // PerAxis
}

// reach is the largest value of e·v over the set.
func (s *Set) reach(x, y, z float64) float64 {
	switch s.Kind {
	case AnyWay:
		return s.Radius * math.Sqrt(x*x+y*y+z*z)
	case PerAxis:
		return math.Abs(x)*s.Half.X + math.Abs(y)*s.Half.Y + math.Abs(z)*s.Half.Z
	}
	return 0
}

// Largest is the largest component that a vector of the set can have.
func (s *Set) Largest() float64 {
	if s.Kind == AnyWay {
		return s.Radius
	}
	return math.Max(s.Half.X, math.Max(s.Half.Y, s.Half.Z))
}

// farthest is the largest norm of a vector of the set.
func (s *Set) farthest() float64 {
	if s.Kind == AnyWay {
		return s.Radius
	}
	return norm(s.Half)
}

// Load is one thing that the actuators must carry, move or resist.
type Load struct {
	Name string

	// A mass with its centre and its inertia about that centre (xx, yy, zz, xy, xz, yz), platform axes.
	Mass    float64
	Centre  kin.Vec
	Inertia [6]float64
	// Accelerations that may occur, base axes: of the mass centre (or of the tool point if AtTool), and angular.
	Linear, Angular Set
	AtTool          bool

	// Forces and moments that the surroundings apply to the platform, base axes: at the tool point, or
	// at the point At (platform axes) if Off is set. Spreads are ± on each base axis.
	Force, ForceSpread   kin.Vec
	Moment, MomentSpread kin.Vec
	At                   kin.Vec
	Off                  bool
}

// Case is a set of loads that act together, and the speeds of the tool point meanwhile.
type Case struct {
	Name            string
	Loads           []Load
	Linear, Angular Set   // speeds
	Zones           []int // zones in which it occurs; nil for all
}

// In tells whether the case occurs in the zone.
func (c *Case) In(zone int) bool {
	if c.Zones == nil {
		return true
	}
	for _, z := range c.Zones {
		if z == zone {
			return true
		}
	}
	return false
}
