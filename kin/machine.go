package kin

// Fail says why a pose has no posture.
type Fail int

// The ordinary answers of Machine.Move.
const (
	Reached    Fail = iota // the pose has a posture in the machine's working mode
	OutOfReach             // a leg cannot reach its joint
	NotFinite              // a coordinate or a dimension is NaN or infinite
	Stopped                // a passive part is beyond its stop; State.What names it
)

// State is what Machine.Move finds at one pose.
type State struct {
	Fail Fail
	Leg  int    // the leg that failed, or -1
	What string // the passive part at its stop, for Stopped

	// Q are the actuator coordinates: leg lengths or slider positions in metres, crank angles in radians.
	Q [6]float64

	// J holds a row of six for each leg: the rate of its actuator is the row times
	// (v, Lc·ω), Lc being the characteristic length. For a prismatic leg the row is
	// [n, (r×n)/Lc], n the unit vector from base joint to platform joint, r from
	// the tool point to the platform joint. Columns of freedoms that the family
	// lacks are zero.
	J [36]float64

	// BaseChord and PlatformChord are the squared distances between the unit vector
	// along the leg and the joint's mounting axis, 2-2cos(swing): exact near zero,
	// where a cosine loses half its digits. Where a drive and a rod make a leg, the
	// joint at the drive is measured in the drive's own frame (see rods.go).
	BaseChord, PlatformChord [6]float64

	// End and Rod are set for legs of a drive and a rod: where the rod leaves the crank
	// or the carriage, base frame, and the unit vector along the rod to the platform.
	End, Rod [6]Vec

	// Tool is the tool point in the base frame, and Rod holds the unit vectors along the legs,
	// where the platform's freedoms are tied: rows of J then do not tell.
	Tool Vec
}

// Machine is one geometry of some family.
type Machine interface {
	// Frame is what all families have in common.
	Frame() *Frame

	// Move fills s for the pose p. It allocates nothing. If s.Fail is not Reached,
	// the other fields are not to be used.
	Move(p *Pose, s *State)

	// Gap is the least distance between the surfaces of two legs that do not share
	// a joint, at the posture in s, and the two legs (0-based). It is +Inf with
	// -1, -1 if there is no such pair, negative when the legs overlap.
	Gap(s *State) (gap float64, i, j int)

	// GapBelow is Gap where that is below keep by more than 1e-12 of a leg's size. Elsewhere it may answer +Inf with -1, -1,
	// which takes a fraction of the time: for the least gap over many poses.
	GapBelow(s *State, keep float64) (gap float64, i, j int)

	// Constraints writes the unit constraint wrenches that the joints exert at the
	// posture in s, one row of six each, and tells how many: 6 less the number of
	// freedoms. A force is [u, (r×u)/Lc], a couple [0, m].
	Constraints(s *State, rows *[36]float64) int

	// Place gives the platform's origin and rotation in the base frame at the pose p.
	Place(p *Pose) (origin Vec, rot Rot)

	// Serial is how far the posture in s is from a serial singularity: the least over
	// the legs of the cosine between the force that the leg's rod can carry and the
	// way that its drive moves the rod's end. It is 1 for prismatic legs, 0 where a
	// crank and its rod are in line and the platform loses a freedom.
	Serial(s *State) float64

	// Tie fills t with the 6×6 matrix that maps the family's own freedoms (columns, as
	// in Frame.Freedoms) to the twist (v, Lc·ω) of the tool point at the pose p, for
	// families whose other freedoms follow from their own; Frame.Tied tells which.
	Tie(p *Pose, t *[36]float64)
}

// Frame is what every machine tells of itself.
type Frame struct {
	Freedoms []Freedom // the family's own, in the order of Coords
	Base     []Vec     // base joint centres, base frame: also crank pivots, and rails where their coordinate is 0
	Platform []Vec     // platform joint centres, platform frame
	Rods     []float64 // lengths of the legs' rods; nil for prismatic legs, which are as long as their coordinate
	Rails    []Vec     // unit directions of the rails, which start in Base; nil without rails
	Home     Vec       // platform origin at home, base frame
	HomeRot  Rot       // platform rotation at home
	Tool     Vec       // tool point, platform frame (a planar family: in the plane of its legs)
	Length   float64   // characteristic length Lc
	Tied     bool      // the other freedoms move with the family's own ones: see Machine.Tie and Settle
}

// Legs is the number of legs, each with one actuator.
func (f *Frame) Legs() int { return len(f.Base) }

// Place gives the platform's origin and rotation in the base frame at the pose p; where
// freedoms are tied, at a settled one (see Settle).
func (f *Frame) Place(p *Pose) (origin Vec, rot Rot) {
	rot = p.R.Mul(&f.HomeRot)
	t0 := f.HomeRot.Apply(f.Tool)
	t1 := rot.Apply(f.Tool)
	return Vec{
		X: f.Home.X + t0.X + p.P.X - t1.X,
		Y: f.Home.Y + t0.Y + p.P.Y - t1.Y,
		Z: f.Home.Z + t0.Z + p.P.Z - t1.Z,
	}, rot
}

// Axis is the direction from which the swing of a joint is measured.
type Axis struct {
	Kind AxisKind
	Vec  Vec // for AxisVector: a vector in base axes for base joints, in platform axes for platform joints
}

// AxisKind chooses the mounting axis of the joints.
type AxisKind int

// The mounting axes.
const (
	AxisHomeLeg AxisKind = iota // along the leg at home
	AxisPlate                   // the normal of the plate, from base to platform
	AxisVector                  // a vector
)

// Setup is what a machine needs to know besides its dimensions.
type Setup struct {
	Tool     Vec     // tool point, platform frame
	Axis     Axis    // mounting axes of the passive joints
	Diameter float64 // leg diameter, for Gap; of the rods where drives and rods make the legs
	Crank    float64 // diameter of cranks and arms, for Gap; 0 stands for Diameter
	Length   float64 // characteristic length; 0 stands for the platform radius

	// Neighbours makes Gap look only at legs that follow each other in number (and the
	// last and the first), as simpler studies do; other legs may then meet unseen.
	Neighbours bool
}
