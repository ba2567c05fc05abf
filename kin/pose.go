package kin

import "gonum.org/v1/gonum/spatial/r3"

// Vec is a vector of three components.
type Vec = r3.Vec

// Coords are the six pose coordinates about home, in the order of Freedom:
// x, y, z in metres along the base axes, roll, pitch, yaw in radians.
type Coords [6]float64

// Freedom numbers one of the six pose coordinates.
type Freedom int

// The six freedoms of a rigid body, in the order of Coords.
const (
	X Freedom = iota
	Y
	Z
	Roll
	Pitch
	Yaw
)

var freedomNames = [6]string{"x", "y", "z", "roll", "pitch", "yaw"}

// String is the name of the freedom as briefs and tables write it.
func (f Freedom) String() string { return freedomNames[f] }

// Angular tells whether the freedom is a rotation.
func (f Freedom) Angular() bool { return f >= Roll }

// Pose is a displacement of the platform from home: P is the position of the
// tool point relative to its home position (base axes), R the rotation that
// comes before the home rotation, so that the platform's rotation matrix is R·R_home.
type Pose struct {
	P Vec
	R Rot
}

// NewPose gives the pose with the coordinates c: R = Rz(yaw) Ry(pitch) Rx(roll).
func NewPose(c Coords) Pose {
	return Pose{P: Vec{X: c[X], Y: c[Y], Z: c[Z]}, R: RPY(c[Roll], c[Pitch], c[Yaw])}
}

// Coords are the coordinates of the pose; pitch lies in [-π/2, π/2].
func (p Pose) Coords() Coords {
	roll, pitch, yaw := p.R.RPY()
	return Coords{p.P.X, p.P.Y, p.P.Z, roll, pitch, yaw}
}
