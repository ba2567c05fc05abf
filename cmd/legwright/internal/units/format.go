package units

import (
	"math"
	"strconv"
)

// Display is the unit in which screens, tables and CSV files show a kind: mm, deg, N, …
func Display(k Kind) Unit {
	u, ok := find(forms[k].display, k)
	if !ok {
		u = Unit{Kind: k, Factor: 1}
	}
	return u
}

// Suffix is the unit of Display as it ends a column heading: "mm", "deg", "Nm", "rad_s"; "" for
// bare numbers.
func Suffix(k Kind) string { return forms[k].suffix }

// Heading is a column heading with the unit of Display: "base_radius_mm".
func Heading(name string, k Kind) string {
	if s := Suffix(k); s != "" {
		return name + "_" + s
	}
	return name
}

// From converts an SI value to the unit.
func (u Unit) From(si float64) float64 {
	v := si / u.Factor
	if u.Exp > 0 {
		return v / math.Pow10(u.Exp)
	}
	return v * math.Pow10(-u.Exp)
}

// Format shows an SI value in the unit of Display with so many significant digits: "650 mm". An
// unbounded value shows as "unbounded", NaN as "undefined".
func Format(si float64, k Kind, digits int) string {
	switch {
	case math.IsInf(si, 0):
		return "unbounded"
	case math.IsNaN(si):
		return "undefined"
	}
	u := Display(k)
	s := Digits(u.From(si), digits)
	if u.Symbol == "" {
		return s
	}
	return s + " " + u.Symbol
}

// Digits is a number with at most so many significant digits, without trailing zeros, and without
// an exponent unless it is very large or small.
func Digits(v float64, digits int) string {
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'e', max(digits-1, 0), 64), 64)
	if err != nil {
		r = v
	}
	if r == 0 {
		return "0"
	}
	if a := math.Abs(r); a >= 1e9 || a < 1e-6 {
		return strconv.FormatFloat(r, 'g', -1, 64)
	}
	return strconv.FormatFloat(r, 'f', -1, 64)
}

// Exact is an SI value that Parse reads back to the same bits: "0.6543210987 m".
func Exact(si float64, k Kind) string {
	s := strconv.FormatFloat(si, 'g', -1, 64)
	if unit := k.SI(); unit != "" {
		return s + " " + unit
	}
	return s
}
