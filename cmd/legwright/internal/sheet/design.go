package sheet

// Design is one design. Its joints are the first points of Fixed and Platform, as Skeleton.Base and
// Skeleton.Joints number them.
type Design struct {
	ID       string   `json:"id"`
	Rank     int      `json:"rank"`
	Score    Exact    `json:"score"` // TOPSIS closeness under Goal.Weight, 0 to 1
	Family   int      `json:"family"`
	Feasible bool     `json:"feasible"`
	Marks    []string `json:"marks"`        // "knee", "best conditioning", …
	Sheets   bool     `json:"sheets"`       // whether the study folder holds its plans and tables
	Proof    string   `json:"proof"`        // "" not proved, "proved", "refuted", "undecided"
	Proved   string   `json:"proved"`       // the same in words, with what was shown or where it fails; "" where Proof is
	Stroke   string   `json:"whole_stroke"` // what was found of the whole actuator range, in words; "" if not looked at
	Notes    []string `json:"notes,omitempty"`

	Dimensions []Exact `json:"dimensions"`          // by Family.Dimensions; null for one without a value
	Measures   []Exact `json:"measures"`            // by Data.Measures; goals to all digits, others to seven; null for none or without bound
	Unbounded  []int   `json:"unbounded,omitempty"` // measures (index) that are null because they have no bound

	// One row for each limit: index into Data.Limits, bound, value, margin (relative to the bound; null
	// without bound), and 1 where it holds, else 0.
	Limits   [][5]Num `json:"limits"`
	Tightest int      `json:"tightest"` // row of Limits with the least margin; -1 for none

	// One row for each measure that a pose decides: measure, pose (index into Poses), leg and second leg of a
	// pair (from 1, 0 for none), zone and case (index, -1 for none).
	Deciding [][6]int `json:"deciding"`

	Range [2]Num   `json:"range"` // least and greatest actuator coordinate that the dimensions allow; null, null for none
	Legs  [][8]Num `json:"legs"`  // by leg: least, home and greatest coordinate, push, pull, speed, base swing, platform swing

	Fixed    []Fine `json:"fixed"`    // points that stand still, x y z each: base joints, ends of rails
	Platform []Fine `json:"platform"` // points of the platform, in the platform frame, x y z each
	Poses    []Pose `json:"poses"`    // home first, then the deciding ones

	Detail *Detail `json:"detail,omitempty"` // null for designs whose detail the command `legwright report DIR --detail ID` adds
}

// Pose is a posture.
type Pose struct {
	At     [6]Num  `json:"at"`               // x, y, z, roll, pitch, yaw about home, as the brief counts them
	Place  [6]Fine `json:"place"`            // of the platform: its origin in the base frame, and roll, pitch, yaw: R = Rz(yaw) Ry(pitch) Rx(roll)
	Moving []Fine  `json:"moving,omitempty"` // the moving points, x y z each, base frame
	Q      []Num   `json:"q"`                // actuator coordinates by leg: m or rad; empty where there is no posture
}

// Detail is what the sheet of one design shows besides, about 25 kB.
type Detail struct {
	Path        Track       `json:"path"`    // along Data.Path
	Corners     Track       `json:"corners"` // at Data.Corners
	Excursions  []Excursion `json:"excursions"`
	Together    []Together  `json:"together"`
	Maps        []Map       `json:"maps"`
	Sensitivity []Change    `json:"sensitivity"`
	Handover    *Handover   `json:"handover,omitempty"`
}

// Handover is what the page shows of the sheets in the study folder: about 10 kB, and 30 kB of plans.
type Handover struct {
	Tables   []Table `json:"tables"`
	Base     []byte  `json:"base,omitempty"`     // plan of the base, SVG in base64; nil where the page would grow too large
	Platform []byte  `json:"platform,omitempty"` // plan of the platform
}

// Table is a table of cells as they are shown.
type Table struct {
	Name  string     `json:"name"`
	File  string     `json:"file"` // in the design's folder, which has all its digits and columns
	Notes []string   `json:"notes"`
	Heads []string   `json:"heads"` // words joined by "_", the last one the unit if there is one
	Rows  [][]string `json:"rows"`
}

// Track holds postures at a list of poses, without the least digits: good for drawing.
type Track struct {
	Place        []int     `json:"place"`           // six for each pose, as Pose.Place, counts of Step
	Moving       []int     `json:"moving"`          // three for each moving point and pose, counts of Step
	Q            []int     `json:"q"`               // one for each leg and pose, counts of Step
	Conditioning []int     `json:"conditioning"`    // one for each pose, counts of 1e-4
	Lost         []int     `json:"lost,omitempty"`  // poses (numbers) without posture: their entries are 0, but for Place
	Fails        []Failure `json:"fails,omitempty"` // poses at which a pose limit fails
}

// Failure names the first pose limit that fails at a pose.
type Failure struct {
	Pose  int    `json:"pose"`
	Limit string `json:"limit"`
}

// Excursion is how far one coordinate goes alone from home until a pose limit fails. Such excursions
// are not reachable together.
type Excursion struct {
	Coordinate string `json:"coordinate"`
	Unit       string `json:"unit"`
	Low        *Num   `json:"low"` // null where nothing fails
	LowFails   string `json:"low_fails"`
	High       *Num   `json:"high"`
	HighFails  string `json:"high_fails"`
}

// Together is how far the coordinates of a zone go at the same time: the zone, drawn larger or smaller about home, until a
// pose limit fails on the way from home to one of the poses that lie farthest out.
type Together struct {
	Zone   int    `json:"zone"`   // index into Data.Zones
	Factor *Num   `json:"factor"` // 1 is the zone as asked; null where nothing fails up to 3
	Fails  string `json:"fails"`  // the limit that fails first beyond
	At     [6]Num `json:"at"`     // the pose of the zone towards which it fails, about home
}

// Map is the conditioning over two coordinates, all others at home (where the duty does not hold
// home, in the middle of its range: see At).
type Map struct {
	X      string `json:"x"` // coordinate to the right
	Y      string `json:"y"` // coordinate upwards
	XRange [2]Num `json:"x_range"`
	YRange [2]Num `json:"y_range"`
	At     [6]Num `json:"at"`     // where the other coordinates are
	N      int    `json:"n"`      // points along each, ends included
	Values []int  `json:"values"` // N·N counts of 1e-4, a row for each y from low to high; -1 without posture
	Fails  string `json:"fails"`  // N·N letters in the same order: "x" where a pose limit fails, else "."
}

// Change is what moving one dimension does to each goal: relative changes (0.01: one percent more).
type Change struct {
	Dimension int    `json:"dimension"` // index into Family.Dimensions
	Text      string `json:"text"`      // how it was moved: "±1 %", "one step of 5 mm", "to 250 mm and 300 mm", …
	Down      Num    `json:"down"`      // by how much, SI; 0 where it was not moved that way
	Up        Num    `json:"up"`
	Lower     []Num  `json:"lower"` // by goal, moved down; null where it has no value there: unreachable, or without bound
	Higher    []Num  `json:"higher"`

	LowerFails  string `json:"lower_fails,omitempty"` // the limit broken worst there, "" where all hold
	HigherFails string `json:"higher_fails,omitempty"`
}
