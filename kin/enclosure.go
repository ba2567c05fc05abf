package kin

import "legwright/kin/enclose"

// Reach tells what is known of a box of poses.
type Reach int

// What can be known.
const (
	Unsure   Reach = iota // not every pose of the box is known to have a posture
	AllReach              // every pose of the box has a posture in the working mode, within all passive stops
	NoReach               // no pose of the box has one
)

// Enclosure is a State, but over a whole box of poses. It is scratch: Enclose fills it again and again.
type Enclosure struct {
	Reach Reach
	Leg   int    // the leg that decides, or -1
	What  string // the passive part at its stop, or ""

	Q [6]enclose.Form  // actuator coordinates, as State.Q, without jumps by full turns
	J [36]enclose.Form // rows of the inverse Jacobian over (v, Lc·ω), as State.J

	// Wrenches are the unit wrenches of the actuators and then of the constraints, rows of the 6×6 of the
	// measure "regularity" (see Wrenches): forces [u, (r×u)/Lc], couples [0, m].
	Wrenches [36]enclose.Form

	BaseChord, PlatformChord [6]enclose.Form // 2-2cos(swing), as in State

	P enclose.Vec      // the tool point from its place at home, base axes: where freedoms are tied, parasitic ones included
	R [9]enclose.Form  // the rotation from home, row by row, as Pose.R; settled where freedoms are tied
	T [36]enclose.Form // as Machine.Tie, where freedoms are tied

	Links []Link   // the legs' links with thickness
	Pairs [][2]int // indices into Links: the pairs that Machine.Gap looks at
}

// Link is a straight part with thickness.
type Link struct {
	Leg      int
	From, To enclose.Vec // ends of its axis, base frame
	Radius   float64
	Hold     Hold
	Tip      Vec // unless Loose: To at home, from the tool point, base axes
}

// Hold tells how the far end of a link goes with the platform: the difference of two such ends is enclosed by less than each.
type Hold int

// How ends go.
const (
	Loose   Hold = iota // not with the platform
	Shifted             // with a platform that does not turn
	Turned              // with one that turns as Enclosure.R
)

// Encloser is a machine that can enclose its postures over boxes of poses: every family's machines are.
type Encloser interface {
	Machine

	// Enclose fills e for all poses of the box. What a pose says of freedoms that the family lacks
	// is not looked at. It allocates nothing once e has been filled for this machine.
	Enclose(b *enclose.Box, e *Enclosure)
}
