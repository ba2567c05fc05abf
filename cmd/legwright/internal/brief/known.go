package brief

import (
	"slices"

	"legwright/cmd/legwright/internal/units"
)

// Known are the names that briefs and designs may use.
type Known struct {
	Families []KnownFamily
	Measures []KnownMeasure
}

// KnownFamily is a family of robots as far as a brief needs it.
type KnownFamily struct {
	Name       string
	Freedoms   []string // of x, y, z, roll, pitch, yaw: the coordinates that its zones may name
	Rotary     bool     // actuators turn (torque, rad/s) rather than push (force, m/s)
	Legs       int      // joints on each plate; 0 if a design file cannot give them outright
	Rails      bool     // a design file may give the rails outright
	Dimensions []KnownDimension
}

// KnownDimension is one dimension of a family.
type KnownDimension struct {
	Name     string
	Kind     units.Kind
	Each     int    // above 1: a list of so many, one for each leg, as leg_azimuths
	Sizable  bool   // may be `sized`
	Optional bool   // the family has a default
	Positive bool   // must be above 0
	Zero     bool   // may be 0, but not less
	Places   Places // what it places; a design file may give that outright instead
}

// sign is what the dimension's value may be.
func (d *KnownDimension) sign() sign {
	switch {
	case d.Positive:
		return aboveZero
	case d.Zero:
		return notNegative
	}
	return anySign
}

// Places says what a dimension is for.
type Places int

// A design file may give joints, home or rails in place of the dimensions that place them.
const (
	PlacesNothing Places = iota
	PlacesJoints
	PlacesHome
	PlacesRails
)

// KnownMeasure is one measure that goals and limits may name.
type KnownMeasure struct {
	Name     string
	Kind     units.Kind
	Turn     units.Kind // the kind where all actuators turn, if it differs; Ratio for none
	Sense    Sense      // the way in which it is better; "" if either may be wanted
	Families []string   // that have it; nil: all
	Share    bool       // lies from 0 to 1
	Needs    []string   // keys of the brief without which it has no value, as "actuator.stiffness"
}

// Sense is the direction of a goal.
type Sense string

// The directions.
const (
	Maximise Sense = "maximise"
	Minimise Sense = "minimise"
)

// coordinates are the six coordinates of a pose in order; the first three are lengths.
var coordinates = [6]string{"x", "y", "z", "roll", "pitch", "yaw"}

func coordinateKind(i int) units.Kind {
	if i < 3 {
		return units.Length
	}
	return units.Angle
}

// Family gives the family of that name.
func (k *Known) Family(name string) (*KnownFamily, bool) {
	for i := range k.Families {
		if k.Families[i].Name == name {
			return &k.Families[i], true
		}
	}
	return nil, false
}

// Measure gives the measure of that name.
func (k *Known) Measure(name string) (*KnownMeasure, bool) {
	for i := range k.Measures {
		if k.Measures[i].Name == name {
			return &k.Measures[i], true
		}
	}
	return nil, false
}

// Dimension gives the dimension of that name.
func (f *KnownFamily) Dimension(name string) (*KnownDimension, bool) {
	for i := range f.Dimensions {
		if f.Dimensions[i].Name == name {
			return &f.Dimensions[i], true
		}
	}
	return nil, false
}

func (f *KnownFamily) has(coordinate string) bool { return slices.Contains(f.Freedoms, coordinate) }

func (m *KnownMeasure) of(family string) bool {
	return m.Families == nil || slices.Contains(m.Families, family)
}

func familyNames(k *Known) (names []string) {
	for _, f := range k.Families {
		names = append(names, f.Name)
	}
	return names
}

func measureNames(k *Known) (names []string) {
	for _, m := range k.Measures {
		names = append(names, m.Name)
	}
	return names
}

func dimensionNames(f *KnownFamily) (names []string) {
	for _, d := range f.Dimensions {
		names = append(names, d.Name)
	}
	return names
}
