package study

import "legwright/objective"

// Counterexample is a pose that a proof found to refute a design of a front under way. From then on the search has held it
// to be required.
type Counterexample struct {
	Pose     Pose   `json:"pose"`
	Zone     string `json:"zone"`
	Property string `json:"property"` // what failed there
}

// NewCounterexample is the record of a further required pose.
func NewCounterexample(t *objective.Task, x objective.Further, property string) Counterexample {
	return Counterexample{Pose: poseAt(x.Coords), Zone: t.Zones[x.Zone].Name, Property: property}
}
