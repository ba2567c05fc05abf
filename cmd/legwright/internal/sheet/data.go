// Package sheet is what the report page shows, as the JSON that goes into it once. It only holds
// data; package job fills it and package report draws it.
//
// Every number is SI and radians unless its field says otherwise. A measure, a limit or a leg figure is null where it has
// no value or no bound; the Unbounded lists tell the two apart. Three forms of numbers keep the file
// small: Exact (all digits), Num (seven significant digits) and Fine (rounded to 1e-10). Tracks and
// maps are whole numbers: counts of a step that the field names.
//
// Points are in the base frame (metres: origin at the centre of the base joints' circle, z from base to
// platform) unless they are said to be in the platform frame. On a machine that hangs (Data.Hanging) z points down.
package sheet

// Format names the layout.
const Format = "legwright-sheet/1"

// Data is everything that the page shows.
type Data struct {
	Format  string `json:"format"`
	Title   string `json:"title"`   // of the brief, as given: any text
	Program string `json:"program"` // version alone: 0.1.0
	Brief   Brief  `json:"brief"`

	Seed        int64    `json:"seed"`
	Status      string   `json:"status"`      // as in front.json: how the search ended
	Evaluations int      `json:"evaluations"` // spent
	Budget      int      `json:"budget"`      // allowed; 0 if not known
	Feasible    int      `json:"feasible"`    // designs among Evaluations that hold every limit
	Poses       int      `json:"poses"`       // sampled poses of the duty
	Hypervolume Num      `json:"hypervolume"`
	Reference   []Exact  `json:"reference"` // reference point of the hypervolume, by goal; null without bound
	Caution     string   `json:"caution"`
	Cautions    string   `json:"full_caution"`
	Notes       []string `json:"notes"` // what holds for the whole study
	LeftOut     []string `json:"left_out"`
	First       []First  `json:"first"` // the designs of the first screen, in the order of rank
	Steps       []string `json:"steps"` // what a step along the front costs, in words; from the knee

	Hanging bool   `json:"hanging"` // mount: ceiling
	Folder  string `json:"folder"`  // of the study as the command line gave it, for the commands shown; "" if not known

	Units    map[string]Unit `json:"units"` // by SI symbol ("m", "rad", "N", …), "%" for shares of 1, "" for bare numbers
	Goals    []Goal          `json:"goals"`
	Measures []Column        `json:"measures"` // columns of Design.Measures
	Limits   []LimitKind     `json:"limits"`   // that designs of the study have
	Zones    []Zone          `json:"zones"`
	Cases    []string        `json:"cases"`
	Families []Family        `json:"families"` // that have designs here, or that the brief names
	Designs  []Design        `json:"designs"`  // best rank first; about 1.5 kB each, 6 kB with cranks

	// The poses of every Detail.Path and Detail.Corners: coordinates about home, six counts of Step for each pose.
	Path    []int  `json:"path"`       // at most 200 poses, closed: begins and ends at home
	Way     []int  `json:"way"`        // places in Path (pose numbers) that are required poses or home; the others lie between
	Corners []int  `json:"corners"`    // poses of the duty that lie farthest out, at most 64, and the centres of zones
	Hash    string `json:"brief_hash"` // SHA-256 of the brief and its pose files, in hex

	// The words of every sheet of the hand-over: units and datum.
	SheetUnits string `json:"sheet_units"`
	SheetDatum string `json:"sheet_datum"`

	Help    []string  `json:"help,omitempty"`    // where no design holds every limit: what binds and what would have to give
	Nearest []Nearest `json:"nearest,omitempty"` // and the designs that came nearest, which Help numbers
}

// Nearest is a design that breaks some limits.
type Nearest struct {
	Number int         `json:"number"` // from 1
	Text   string      `json:"text"`   // its family and dimensions
	Broken [][4]string `json:"broken"` // limit, value, wanted, margin
}

// Step is the step of the counts in tracks and of pose coordinates: m or rad.
const Step = 1e-5

// Brief is the brief in words. Every text has its units; texts from the file are as given.
type Brief struct {
	File      string   `json:"file"`      // name of the copy in the study folder
	Paragraph string   `json:"paragraph"` // all of the below in prose
	Zones     []string `json:"zones"`     // "work: x ±150 mm, y ±150 mm, all at once, 500 poses"
	Cases     []string `json:"cases"`
	Limits    []string `json:"limits"`
	Open      []string `json:"open"` // dimensions that the search varied, with their ranges
}

// First is a design of the first screen.
type First struct {
	Design int      `json:"design"` // index into Data.Designs
	Near   []string `json:"near"`   // marks of designs left out because they differ too little from this one
}

// Unit tells how quantities are shown: value · Factor, then Symbol; at most Finest decimals, -1 for any.
type Unit struct {
	Symbol string  `json:"symbol"`
	Factor float64 `json:"factor"`
	Finest int     `json:"finest"`
}

// Goal is one goal of the study.
type Goal struct {
	Measure int     `json:"measure"` // index into Data.Measures
	More    bool    `json:"more"`    // to be maximised
	Weight  float64 `json:"weight"`  // in the ranking of the designs as they stand here
}

// Column is a measure or a dimension.
type Column struct {
	Name string `json:"name"` // as in the brief: leg_force
	Text string `json:"text"` // meaning in words
	Unit string `json:"unit"` // key of Data.Units

	Sense string `json:"sense,omitempty"` // of a measure: "larger" or "smaller" is better, "" for neither

	// Of a dimension: how it was given ("fixed", "range", "steps", "choices", "sized", "derived"), and the
	// least and the greatest value allowed, null where there is none.
	Form string  `json:"form,omitempty"`
	Low  *Num    `json:"low,omitempty"`
	High *Num    `json:"high,omitempty"`
	Step float64 `json:"step,omitempty"` // of "steps": between neighbouring values
}

// LimitKind is a limit; its bound may differ from design to design (of the actuator range) and is in Design.Limits.
type LimitKind struct {
	Measure string `json:"measure"` // "leg_clearance", but also "dead length", "longest needed", …
	Origin  string `json:"origin"`  // key of the brief that states it
	Unit    string `json:"unit"`    // key of Data.Units
	AtLeast bool   `json:"at_least"`
}

// Zone is a zone of required poses.
type Zone struct {
	Name string `json:"name"`
	Kind string `json:"kind"`         // "box", "axes", "ellipsoid", "poses"
	Low  [6]Num `json:"low"`          // x, y, z, roll, pitch, yaw about home; of the poses themselves for "poses"
	High [6]Num `json:"high"`         // equal to Low where the coordinate does not move
	Text string `json:"text"`         // as in Brief.Zones
	In   []int  `json:"in,omitempty"` // cases that occur there: indices into Data.Cases
}

// Family is a family with what its designs have in common.
type Family struct {
	Name       string   `json:"name"`
	Text       string   `json:"text"`       // one line
	Freedoms   []string `json:"freedoms"`   // x, y, z, roll, pitch, yaw
	Rotary     bool     `json:"rotary"`     // actuators turn
	Bounded    int      `json:"bounded"`    // legs, the first ones, whose coordinate Design.Range bounds
	Dimensions []Column `json:"dimensions"` // columns of Design.Dimensions

	Coordinate string `json:"coordinate"` // keys of Data.Units: of the legs' coordinates,
	Effort     string `json:"effort"`     // efforts,
	Rate       string `json:"rate"`       // and rates

	// Limits of single legs, null where the brief gives none. Push and Pull are both the torque of rotary families.
	Push          *Num `json:"push"`
	Pull          *Num `json:"pull"`
	Speed         *Num `json:"speed"`
	BaseSwing     *Num `json:"base_swing"`
	PlatformSwing *Num `json:"platform_swing"`
	Reserve       Num  `json:"reserve"` // kept free at each end of the range

	Skeleton Skeleton `json:"skeleton"`
	Summary  string   `json:"summary,omitempty"` // what became of it beside other families, in words
}

// Skeleton says which points of a machine lines join; points are numbered through: first the fixed ones
// (Design.Fixed), then those on the platform (Design.Platform), then the moving ones (Pose.Moving).
type Skeleton struct {
	Fixed    int      `json:"fixed"`    // number of points that stand still
	Platform int      `json:"platform"` // number of points that move with the platform, the last two its origin and the tool point (see Tool)
	Moving   int      `json:"moving"`   // number of other points: ends of cranks, carriages, links
	Kinds    []string `json:"kinds"`    // what lines are: "base", "platform", "leg", "crank", "rod", "rail", "shaft", "link", "bar", "tool"
	Lines    [][4]int `json:"lines"`    // kind (index into Kinds), leg (from 1, 0 for none), and the two points
	Base     []int    `json:"base"`     // the points that are base joints, by leg
	Joints   []int    `json:"joints"`   // the points that are platform joints, by leg
	Origin   int      `json:"origin"`   // the point that is the platform's origin
	Tool     int      `json:"tool"`     // the point that is the tool point: of a tool that turns on its platform a moving point
}
