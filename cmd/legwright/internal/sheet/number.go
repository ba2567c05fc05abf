package sheet

import (
	"math"
	"strconv"
)

// Exact is a number to all its digits; null for NaN and infinite ones.
type Exact float64

// Num is a number to seven significant digits; null for NaN and infinite ones.
type Num float64

// Fine is a number rounded to ten decimals; null for NaN and infinite ones.
type Fine float64

// MarshalJSON writes the shortest text that reads back to the same bits.
func (v Exact) MarshalJSON() ([]byte, error) { return text(float64(v), -1), nil }

// MarshalJSON writes at most seven significant digits.
func (v Num) MarshalJSON() ([]byte, error) { return text(float64(v), 7), nil }

// MarshalJSON writes at most ten decimals.
func (v Fine) MarshalJSON() ([]byte, error) {
	x := float64(v)
	if finite(x) && math.Abs(x) < 1e5 {
		x = math.Round(x*1e10) / 1e10
	}
	return text(x, -1), nil
}

// Rounded is v to so many significant digits.
func Rounded(v float64, digits int) float64 {
	if !finite(v) {
		return v
	}
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'g', digits, 64), 64)
	if err != nil {
		panic("sheet: a number that was written cannot be read")
	}
	return r
}

// Count is v in whole steps.
func Count(v, step float64) int {
	if !finite(v) {
		return 0
	}
	return int(math.Round(v / step))
}

// Pointer is for numbers that may be missing: nil where there is no bound.
func Pointer(v float64) *Num {
	if !finite(v) {
		return nil
	}
	n := Num(v)
	return &n
}

func finite(v float64) bool { return !math.IsInf(v, 0) && !math.IsNaN(v) }

// text writes a number so that it takes few letters: no zero with a sign, no exponent of one digit with a zero before.
func text(v float64, digits int) []byte {
	if !finite(v) {
		return []byte("null")
	}
	if digits > 0 {
		v = Rounded(v, digits)
	}
	if v == 0 {
		return []byte("0")
	}
	format := byte('f')
	if a := math.Abs(v); a >= 1e15 || a < 1e-5 {
		format = 'e'
	}
	return strconv.AppendFloat(nil, v, format, -1, 64)
}
