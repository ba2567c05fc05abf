package brief

import "legwright/cmd/legwright/internal/units"

// Brief is what a machine must do, what may vary and what counts as better: the input file in SI
// units and radians, every default filled in. It prints as JSON. Where a number says "0: not
// given", the reader refuses 0 in the file.
type Brief struct {
	Title                string     `json:"title" mapstructure:"title"`
	Families             []Family   `json:"families" mapstructure:"family"`
	Mount                string     `json:"mount" mapstructure:"mount"`     // floor or ceiling
	Gravity              [3]float64 `json:"gravity" mapstructure:"gravity"` // m/s², base axes
	Tool                 [3]float64 `json:"tool" mapstructure:"tool"`       // m, platform axes
	Actuator             Actuator   `json:"actuator" mapstructure:"actuator"`
	Joints               Joints     `json:"joints" mapstructure:"joints"`
	Legs                 Legs       `json:"legs" mapstructure:"legs"`
	CharacteristicLength Length     `json:"characteristic_length" mapstructure:"characteristic_length"`
	SingularBelow        float64    `json:"singular_below" mapstructure:"singular_below"`
	Duty                 Duty       `json:"duty" mapstructure:"duty"`
	Goals                []Goal     `json:"goals" mapstructure:"goals"`
	Limits               []Limit    `json:"limits" mapstructure:"limits"`
	Ranking              Ranking    `json:"ranking" mapstructure:"ranking"`
	Search               Search     `json:"search" mapstructure:"search"`

	places places
}

// Family is one family of the brief with its dimensions, in the order of the file.
type Family struct {
	Name       string      `json:"name"`
	Dimensions []Dimension `json:"dimensions"`
}

// Form is the way in which a dimension is given.
type Form string

// The forms of a dimension.
const (
	Fixed   Form = "fixed"   // Value
	Ranged  Form = "range"   // from Low to High
	Stepped Form = "steps"   // Low, Low+Step, … not above High
	Chosen  Form = "choices" // one of Choices
	Sized   Form = "sized"   // the least that the duty needs
	PerLeg  Form = "each"    // Each: one dimension for each leg
)

// Dimension is one dimension of a family as the brief gives it, in SI units.
type Dimension struct {
	Name    string      `json:"name"`
	Kind    units.Kind  `json:"kind"`
	Form    Form        `json:"form"`
	Value   float64     `json:"value,omitempty"`
	Low     float64     `json:"low,omitempty"`
	High    float64     `json:"high,omitempty"`
	Step    float64     `json:"step,omitempty"`
	Choices []float64   `json:"choices,omitempty"`
	Each    []Dimension `json:"each,omitempty"` // names end in _1, _2, …
}

// Actuator holds the ratings of the actuators. Push, Pull, Stiffness, Speed, Error and Reserve are
// those of families that push; Torque and the Turn fields those of families that turn.
type Actuator struct {
	DeadLength    *float64  `json:"dead_length" mapstructure:"dead_length"` // m; nil: nothing is checked
	DeadRatio     float64   `json:"dead_ratio" mapstructure:"dead_ratio"`
	Reserve       float64   `json:"reserve" mapstructure:"reserve"`           // m
	TurnReserve   float64   `json:"turn_reserve" mapstructure:"turn_reserve"` // rad
	Strokes       []float64 `json:"strokes" mapstructure:"strokes"`           // m, rising; nil: any stroke
	Push          float64   `json:"push" mapstructure:"push"`                 // N; 0: not given
	Pull          float64   `json:"pull" mapstructure:"pull"`                 // N; 0: not given
	Torque        float64   `json:"torque" mapstructure:"torque"`             // N m; 0: not given
	Speed         float64   `json:"speed" mapstructure:"speed"`               // m/s; 0: not given
	TurnSpeed     float64   `json:"turn_speed" mapstructure:"turn_speed"`     // rad/s; 0: not given
	Power         float64   `json:"power" mapstructure:"power"`               // W; 0: not given
	Stiffness     float64   `json:"stiffness" mapstructure:"stiffness"`       // N/m; 0: not given
	TurnStiffness float64   `json:"turn_stiffness" mapstructure:"turn_stiffness"`
	Error         float64   `json:"error" mapstructure:"error"`           // m, ±; 0: not given
	TurnError     float64   `json:"turn_error" mapstructure:"turn_error"` // rad, ±; 0: not given
}

// Joints holds the limits of the joints. Swings are half cone angles about the mounting axis.
type Joints struct {
	BaseSwing     float64 `json:"base_swing" mapstructure:"base_swing"`         // rad; 0: not given
	PlatformSwing float64 `json:"platform_swing" mapstructure:"platform_swing"` // rad; 0: not given
	Axis          Axis    `json:"axis" mapstructure:"axis"`
	Stiffness     float64 `json:"stiffness" mapstructure:"stiffness"` // N/m; 0: not given
}

// Axis is the direction from which swings are measured: "home_leg", "plate" (the plate's normal) or
// "vector", which is in base axes for base joints and in platform axes for platform joints and need
// not have length 1.
type Axis struct {
	Kind   string     `json:"kind"`
	Vector [3]float64 `json:"vector"`
}

// Legs holds what is known of the legs' bodies.
type Legs struct {
	Diameter      float64 `json:"diameter" mapstructure:"diameter"`             // m
	RodDiameter   float64 `json:"rod_diameter" mapstructure:"rod_diameter"`     // m; 0: not given
	CrankDiameter float64 `json:"crank_diameter" mapstructure:"crank_diameter"` // m, of cranks and arms; 0: as diameter
	Modulus       float64 `json:"modulus" mapstructure:"modulus"`               // Pa; 0: not given
	EndFixity     float64 `json:"end_fixity" mapstructure:"end_fixity"`
}

// Length is the characteristic length: "value" (m), "platform_radius" or "duty".
type Length struct {
	Kind  string  `json:"kind"`
	Value float64 `json:"value,omitempty"`
}

// Goal is a measure to be made large or small.
type Goal struct {
	Measure string     `json:"measure"`
	Sense   Sense      `json:"sense"`
	Kind    units.Kind `json:"kind"`
}

// Limit is a measure that must hold: at least (AtLeast true) or at most Bound.
type Limit struct {
	Measure string     `json:"measure"`
	AtLeast bool       `json:"at_least"`
	Bound   float64    `json:"bound"` // SI
	Kind    units.Kind `json:"kind"`
}

// Ranking holds the weight of every goal: 1 where the brief gives none.
type Ranking struct {
	Weights map[string]float64 `json:"weights" mapstructure:"weights"`
}

// Search is how the search runs.
type Search struct {
	Evaluations int                `json:"evaluations" mapstructure:"evaluations"`
	Population  int                `json:"population" mapstructure:"population"` // 0: the search chooses
	Seed        int64              `json:"seed" mapstructure:"seed"`
	Front       int                `json:"front" mapstructure:"front"`
	Reference   map[string]float64 `json:"reference" mapstructure:"reference"` // SI, of every goal; nil: not given
	Time        float64            `json:"time" mapstructure:"time"`           // s; 0: no end
	Stall       Stall              `json:"stall" mapstructure:"stall"`
}

// Stall ends a search whose hypervolume has grown by less than Gain, relative to what it was, over so
// many evaluations; 0 evaluations: it does not.
type Stall struct {
	Evaluations int     `json:"evaluations" mapstructure:"evaluations"`
	Gain        float64 `json:"gain" mapstructure:"gain"`
}

// Fault is a fault of the brief at the place of the key (a dotted path as in "duty.zones[0].box" or
// "goals[1]"), or of the nearest key around it.
func (b *Brief) Fault(path, problem, remedy string) Fault {
	return Fault{b.places.find(path), path, problem, remedy}
}

// File is the file that the brief came from.
func (b *Brief) File() string { return b.places.file }

// DimensionPath is the path of a family's dimension for Fault.
func (b *Brief) DimensionPath(family, name string) string {
	if _, ok := b.places.at["dimensions."+family]; ok {
		return "dimensions." + family + "." + name
	}
	return "dimensions." + name
}
