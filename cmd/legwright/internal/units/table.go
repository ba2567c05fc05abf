package units

import (
	"math"
	"strings"
)

// Unit is one way to write a kind of quantity. A quantity of v units is v · 10^Exp · Factor in SI;
// the power of ten is applied to the decimal digits, so that "650.1 mm" is the float64 nearest to
// 0.6501.
type Unit struct {
	Kind   Kind
	Symbol string
	Exp    int
	Factor float64
}

// Sources of the factors: the International System of Units (SI Brochure, 9th edition, 2019);
// inch and standard gravity as defined there and in ISO 80000-3 (from memory).
var table = [...]Unit{
	{Ratio, "%", -2, 1},

	{Length, "mm", -3, 1},
	{Length, "cm", -2, 1},
	{Length, "m", 0, 1},
	{Length, "um", -6, 1},
	{Length, "in", -4, 254},

	{Angle, "deg", 0, math.Pi / 180},
	{Angle, "°", 0, math.Pi / 180},
	{Angle, "rad", 0, 1},
	{Angle, "mrad", -3, 1},
	{Angle, "urad", -6, 1},

	{Mass, "kg", 0, 1},
	{Mass, "g", -3, 1},
	{Mass, "t", 3, 1},

	{Inertia, "kg m2", 0, 1},
	{Inertia, "kg cm2", -4, 1},
	{Inertia, "kg mm2", -6, 1},
	{Inertia, "g m2", -3, 1},

	{Force, "N", 0, 1},
	{Force, "mN", -3, 1},
	{Force, "kN", 3, 1},
	{Force, "MN", 6, 1},

	{Torque, "N m", 0, 1},
	{Torque, "kN m", 3, 1},
	{Torque, "N mm", -3, 1},
	{Torque, "N cm", -2, 1},

	{Speed, "m/s", 0, 1},
	{Speed, "mm/s", -3, 1},
	{Speed, "cm/s", -2, 1},
	{Speed, "um/s", -6, 1},

	{AngularSpeed, "rad/s", 0, 1},
	{AngularSpeed, "deg/s", 0, math.Pi / 180},
	{AngularSpeed, "°/s", 0, math.Pi / 180},
	{AngularSpeed, "mrad/s", -3, 1},
	{AngularSpeed, "rpm", 0, math.Pi / 30},

	{Acceleration, "m/s2", 0, 1},
	{Acceleration, "mm/s2", -3, 1},
	{Acceleration, "g", 0, 9.80665},

	{AngularAcceleration, "rad/s2", 0, 1},
	{AngularAcceleration, "deg/s2", 0, math.Pi / 180},
	{AngularAcceleration, "°/s2", 0, math.Pi / 180},

	{Power, "W", 0, 1},
	{Power, "kW", 3, 1},

	{Stiffness, "N/um", 6, 1},
	{Stiffness, "N/mm", 3, 1},
	{Stiffness, "N/m", 0, 1},
	{Stiffness, "kN/mm", 6, 1},
	{Stiffness, "kN/m", 3, 1},
	{Stiffness, "kN/um", 9, 1},

	{TurnStiffness, "N m/rad", 0, 1},
	{TurnStiffness, "kN m/rad", 3, 1},
	{TurnStiffness, "N m/deg", 0, 180 / math.Pi},
	{TurnStiffness, "N m/mrad", 3, 1},

	{Pressure, "GPa", 9, 1},
	{Pressure, "MPa", 6, 1},
	{Pressure, "kPa", 3, 1},
	{Pressure, "Pa", 0, 1},
	{Pressure, "N/mm2", 6, 1},

	{Gain, "m/rad", 0, 1},
	{Gain, "mm/rad", -3, 1},

	{Duration, "h", 0, 3600},
	{Duration, "min", 0, 60},
	{Duration, "s", 0, 1},
}

// respell maps the usual spellings of a unit to one: no blanks, dots, stars or carets between or
// after the symbols, one spelling of micro.
var respell = strings.NewReplacer(
	" ", "", "\t", "", "\u00a0", "", "\u202f", "", "·", "", "⋅", "", "*", "", "^", "",
	"²", "2", "µ", "u", "μ", "u", "degrees", "deg", "degree", "deg", "º", "°",
)

// find gives the unit of the kind with the symbol, in any usual spelling.
func find(symbol string, k Kind) (Unit, bool) {
	s := respell.Replace(symbol)
	for _, u := range table {
		if u.Kind == k && respell.Replace(u.Symbol) == s {
			return u, true
		}
	}
	return Unit{}, false
}

// kindsOf lists the kinds that have a unit of this symbol.
func kindsOf(symbol string) (ks []Kind) {
	for k := range kinds {
		if _, ok := find(symbol, k); ok {
			ks = append(ks, k)
		}
	}
	return ks
}

// folded gives the symbol of the kind that differs from the one given only in case.
func folded(symbol string, k Kind) (string, bool) {
	s := respell.Replace(symbol)
	for _, u := range table {
		if u.Kind == k && strings.EqualFold(respell.Replace(u.Symbol), s) {
			return u.Symbol, true
		}
	}
	return "", false
}

// Symbols lists the units of a kind as one writes them, the usual one first.
func Symbols(k Kind) (s []string) {
	for _, u := range table {
		if u.Kind == k && !strings.HasPrefix(u.Symbol, "°") {
			s = append(s, u.Symbol)
		}
	}
	return s
}
