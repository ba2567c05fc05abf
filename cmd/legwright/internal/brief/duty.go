package brief

// Duty is what the platform must do.
type Duty struct {
	Zones []Zone `json:"zones" mapstructure:"zones"`
	Cases []Case `json:"cases" mapstructure:"cases"`
}

// Shapes of a zone.
const (
	Box       = "box"       // all coordinates at once
	Axes      = "axes"      // each coordinate alone
	Ellipsoid = "ellipsoid" // surface and inside
	Recorded  = "file"      // poses of a file
)

// Zone is a set of required poses about home.
type Zone struct {
	Name    string       `json:"name"`
	Shape   string       `json:"shape"`
	Ranges  []Range      `json:"ranges,omitempty"`  // in the order x, y, z, roll, pitch, yaw
	Samples int          `json:"samples,omitempty"` // poses in all, of a zone in which something moves
	File    string       `json:"file,omitempty"`    // as the brief gives it
	Poses   [][6]float64 `json:"poses,omitempty"`
}

// Range is the excursion of one coordinate about home, in m or rad. Low equals High where the zone
// fixes it.
type Range struct {
	Coordinate string  `json:"coordinate"`
	Index      int     `json:"index"` // 0 to 5: x, y, z, roll, pitch, yaw
	Low        float64 `json:"low"`
	High       float64 `json:"high"`
}

// Moving counts the coordinates that move.
func (z *Zone) Moving() int {
	count := 0
	for i := range z.Ranges {
		if z.Ranges[i].Low < z.Ranges[i].High {
			count++
		}
	}
	return count
}

// Case is one alternative of loads that act together and speeds.
type Case struct {
	Name   string     `json:"name"`
	Loads  []CaseLoad `json:"loads"`
	Speeds Speeds     `json:"speeds"`
	Zones  []string   `json:"zones"` // names; nil: every zone
}

// Speeds are the speeds of the tool point, in m/s and rad/s.
type Speeds struct {
	Linear  Set `json:"linear"`
	Angular Set `json:"angular"`
}

// CaseLoad is one load: a body that is carried, what the surroundings apply, or both.
type CaseLoad struct {
	Name         string       `json:"name"`
	Mass         float64      `json:"mass"`    // kg
	Centre       [3]float64   `json:"centre"`  // m, platform axes, from the platform origin
	Inertia      [6]float64   `json:"inertia"` // kg m², xx yy zz xy xz yz of the tensor about the mass centre, platform axes
	Acceleration Acceleration `json:"acceleration"`
	Force        [3]float64   `json:"force"`         // N on the platform, base axes
	ForceSpread  [3]float64   `json:"force_spread"`  // N, ± on each base axis
	Moment       [3]float64   `json:"moment"`        // N m on the platform, base axes
	MomentSpread [3]float64   `json:"moment_spread"` // N m, ± on each base axis
	At           *[3]float64  `json:"at"`            // m, platform axes: where the force acts; nil: the tool point
}

// Acceleration is that of the load's mass centre, or of the tool point if AtTool; m/s² and rad/s².
type Acceleration struct {
	Linear  Set  `json:"linear"`
	Angular Set  `json:"angular"`
	AtTool  bool `json:"at_tool"`
}

// Set is a set of vectors in base axes: none (the zero vector alone), any direction with a norm up
// to Radius, or each component within ±Half.
type Set struct {
	Kind   SetKind    `json:"kind"`
	Radius float64    `json:"radius,omitempty"`
	Half   [3]float64 `json:"half"`
}

// SetKind tells the sets apart.
type SetKind string

// The kinds of set.
const (
	NoSet   SetKind = "none"
	BallSet SetKind = "ball"
	BoxSet  SetKind = "box"
)
