package kin

// Unit is the SI unit of a dimension.
type Unit int

// The units of dimensions.
const (
	Metre Unit = iota
	Radian
	Sign // a working mode, -1 or 1
)

// Drive is the kind of a family's actuators.
type Drive int

// The kinds of actuators.
const (
	Linear Drive = iota // coordinates in metres, efforts in newtons
	Rotary              // coordinates in radians, efforts in newton metres
)

// Role tells whether a dimension bounds the actuators' range, which can be sized from the duty.
type Role int

// The roles of dimensions.
const (
	Shape Role = iota // places joints or links
	Least             // the least actuator coordinate
	Span              // the difference of the greatest and the least
)

// Dimension is one named number of a geometry.
type Dimension struct {
	Name      string
	Unit      Unit
	Role      Role
	Text      string  // meaning, and where it is measured
	Low, High float64 // a usual range for a machine that a person could just lift, SI
	Optional  bool    // may be left out of a brief: Default then holds
	Default   float64
	Zero      bool // may be 0, though the usual range lies above
	Joints    bool // not wanted where joint centres are given outright
}

// Joints are joint centres given outright, in place of the dimensions that place them.
type Joints struct {
	Base, Platform []Vec // base frame, platform frame (m)
	Home           Vec   // platform origin at home, base frame
	HomeRot        Rot   // platform rotation at home

	// Rails take the place of Base for families with carriages.
	Rails []Rail

	// Values are the family's dimension values, in the order of Dimensions, of which those that
	// do not place joints (rod length, working mode) are read. Families of prismatic legs read none.
	Values []float64
}

// Rail is the line on which a carriage moves. Its coordinate is 0 at Point and grows along Direction.
type Rail struct {
	Point, Direction Vec // base frame; Direction of any length but zero
}

// Starter is a duty for which the family's usual ranges hold good designs.
type Starter struct {
	Title    string
	Box      Coords // half ranges of the family's freedoms
	Mass     float64
	Centre   Vec
	Accel    float64 // of the mass centre, any direction
	Speed    float64 // of the tool point, any direction
	Spin     float64 // angular, any direction
	Diameter float64 // of the legs
	Swing    float64 // allowed swing of the passive joints
}

// Family is a kind of machine.
type Family struct {
	Name       string
	Text       string // one line
	Picture    string // where the dimensions are measured, in words
	Freedoms   []Freedom
	Legs       int
	Drive      Drive
	Rails      bool // Outright takes rails in place of base joints
	Free       int  // actuators, the last ones, that the dimensions of the roles Least and Span do not bound
	Dimensions []Dimension
	Starter    Starter
	Sources    []string

	// Build makes the machine with the dimension values d, in the order of Dimensions.
	Build func(d []float64, s *Setup) Machine

	// Outright makes a machine from joint centres; nil if the family cannot.
	Outright func(j *Joints, s *Setup) Machine

	// Twin gives the dimension values of the same machine turned about z by half a
	// turn, its legs renumbered; nil if the family has no such twins. A pose of
	// the one is the pose of the other with x, y, roll and pitch reversed, so that a
	// duty of ± ranges sees no difference, provided that what is fixed to the
	// platform or to the base (tool point, mass centres, mounting vectors, loads) lies
	// along z or is turned too.
	Twin func(d []float64) []float64
}

// Index is the place of the named dimension in Dimensions, or -1.
func (f *Family) Index(name string) int {
	for i := range f.Dimensions {
		if f.Dimensions[i].Name == name {
			return i
		}
	}
	return -1
}

// Range gives the places of the dimensions that bound the actuators' range.
func (f *Family) Range() (least, span int) {
	least, span = -1, -1
	for i := range f.Dimensions {
		switch f.Dimensions[i].Role {
		case Least:
			least = i
		case Span:
			span = i
		}
	}
	return least, span
}

// Has tells whether the platform has the freedom.
func (f *Family) Has(q Freedom) bool {
	for _, x := range f.Freedoms {
		if x == q {
			return true
		}
	}
	return false
}
