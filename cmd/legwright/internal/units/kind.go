// Package units reads and writes physical quantities: "650 mm", "12 deg", "30 N/um".
// Inside the program every number is in SI units and radians.
package units

import "fmt"

// Kind is what a number measures.
type Kind int

// The kinds of quantity. Ratio is a bare number or a percentage, Count a bare whole number,
// Sign a bare 1 or -1; all others carry a unit.
const (
	Ratio Kind = iota
	Count
	Sign
	Length
	Angle
	Mass
	Inertia
	Force
	Torque
	Speed
	AngularSpeed
	Acceleration
	AngularAcceleration
	Power
	Stiffness
	TurnStiffness
	Pressure
	Gain // metres of platform motion per radian of a crank
	Duration
	kinds
)

// form is how a kind is named and shown.
type form struct {
	name    string // in prose and in JSON
	si      string // symbol of the SI unit, "" for bare numbers
	display string // symbol of the unit on screens and in tables
	suffix  string // the same in a column heading
	sample  string // for hints
}

var forms = [kinds]form{
	Ratio:               {"ratio", "", "", "", "0.5"},
	Count:               {"count", "", "", "", "100"},
	Sign:                {"sign", "", "", "", "1"},
	Length:              {"length", "m", "mm", "mm", "650 mm"},
	Angle:               {"angle", "rad", "deg", "deg", "12 deg"},
	Mass:                {"mass", "kg", "kg", "kg", "40 kg"},
	Inertia:             {"inertia", "kg m2", "kg m2", "kgm2", "40 kg m2"},
	Force:               {"force", "N", "N", "N", "3 kN"},
	Torque:              {"torque", "N m", "N m", "Nm", "20 N m"},
	Speed:               {"speed", "m/s", "mm/s", "mm_s", "0.4 m/s"},
	AngularSpeed:        {"angular speed", "rad/s", "rad/s", "rad_s", "0.5 rad/s"},
	Acceleration:        {"acceleration", "m/s2", "m/s2", "m_s2", "4 m/s2"},
	AngularAcceleration: {"angular acceleration", "rad/s2", "rad/s2", "rad_s2", "3 rad/s2"},
	Power:               {"power", "W", "W", "W", "400 W"},
	Stiffness:           {"stiffness", "N/m", "N/um", "N_um", "30 N/um"},
	TurnStiffness:       {"turning stiffness", "N m/rad", "N m/rad", "Nm_rad", "5000 N m/rad"},
	Pressure:            {"pressure", "Pa", "GPa", "GPa", "210 GPa"},
	Gain:                {"gain", "m/rad", "mm/rad", "mm_rad", "200 mm/rad"},
	Duration:            {"duration", "s", "s", "s", "2 h"},
}

// String is the kind in words.
func (k Kind) String() string {
	if k < 0 || k >= kinds {
		return fmt.Sprintf("kind %d", int(k))
	}
	return forms[k].name
}

// MarshalText writes the kind in words.
func (k Kind) MarshalText() ([]byte, error) { return []byte(k.String()), nil }

// UnmarshalText reads what MarshalText wrote.
func (k *Kind) UnmarshalText(b []byte) error {
	for i := range forms {
		if forms[i].name == string(b) {
			*k = Kind(i)
			return nil
		}
	}
	return fmt.Errorf("unknown kind of quantity %q", b)
}

// Bare reports whether numbers of the kind carry no unit.
func (k Kind) Bare() bool { return forms[k].si == "" }

// Sample is a quantity of the kind as one would write it, for hints.
func (k Kind) Sample() string { return forms[k].sample }

// SI is the symbol of the SI unit, "" for bare numbers.
func (k Kind) SI() string { return forms[k].si }
