package report

import (
	"math"
	"strconv"
	"strings"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// scale is how a quantity is shown.
type scale struct {
	kind    units.Kind
	percent bool
}

// measureScale is the scale of a measure; a share of poses is shown in percent.
func measureScale(family, name string) scale {
	return scale{kind: study.MeasureKind(family, name), percent: name == "coverage"}
}

// limitScale is the scale of a limit with an SI unit.
func limitScale(name, unit string) scale {
	return scale{kind: study.KindOf(unit), percent: name == "coverage"}
}

// unit is the symbol that goes with the numbers, "" for bare ones.
func (c scale) unit() string {
	if c.percent {
		return "%"
	}
	return units.Display(c.kind).Symbol
}

// in converts an SI value.
func (c scale) in(si float64) float64 {
	if c.percent {
		return 100 * si
	}
	return units.Display(c.kind).From(si)
}

// number shows an SI value without its unit, with at most so many significant digits.
func (c scale) number(si float64, digits int) string {
	switch {
	case math.IsInf(si, -1):
		return "-inf"
	case math.IsInf(si, 0):
		return "inf"
	case math.IsNaN(si):
		return "none"
	}
	v := c.in(si)
	if most := c.finest(); v != 0 && most >= 0 {
		lead := int(math.Floor(math.Log10(math.Abs(v))))
		digits = max(min(digits, lead+1+most), 1)
	}
	return units.Digits(v, digits)
}

// exact is number for a figure that may be small without being nothing, such as an angle of error: with three significant
// digits at least.
func (c scale) exact(si float64, digits int) string {
	v := c.in(si)
	if most := c.finest(); most >= 0 && math.Abs(v) < math.Pow10(2-most) && math.Abs(v) > math.Pow10(-most-6) {
		return units.Digits(v, 3)
	}
	return c.number(si, digits)
}

// finest is the number of decimals beyond which a quantity means nothing to a designer (0.1 µm, 3.6″),
// -1 for any.
func (c scale) finest() int {
	switch c.kind {
	case units.Length:
		return 4
	case units.Angle:
		return 3
	}
	return -1
}

// text shows an SI value with its unit.
func (c scale) text(si float64, digits int) string {
	if math.IsInf(si, 0) {
		return "unbounded"
	}
	s := c.number(si, digits)
	if u := c.unit(); u != "" {
		return s + " " + u
	}
	return s
}

// The digits of numbers: in tables of several designs, and of one design.
const (
	fewDigits  = 4
	manyDigits = 5
)

// apart shows values of several designs with the same number of decimals: four significant digits of
// the largest, two more at most where the values differ too little to be told apart by that.
func (c scale) apart(values []float64) []string { return c.column(values, fewDigits, fewDigits+2) }

// column shows values with the same number of decimals: so many significant digits of the largest,
// as many as most where the values differ too little to be told apart by that.
func (c scale) column(values []float64, digits, most int) []string {
	largest, low, high := 0.0, math.Inf(1), math.Inf(-1)
	for _, v := range values {
		if v = c.in(v); !math.IsInf(v, 0) && !math.IsNaN(v) {
			largest = math.Max(largest, math.Abs(v))
			low, high = math.Min(low, v), math.Max(high, v)
		}
	}
	decimals := 0
	if largest > 0 {
		lead := int(math.Floor(math.Log10(largest)))
		decimals = digits - 1 - lead
		if high-low > 1e-9*largest {
			fine := 1 - int(math.Floor(math.Log10(high-low)))
			decimals = min(max(decimals, fine), most-1-lead)
		}
		decimals = min(max(decimals, 0), 12)
		if most := c.finest(); most >= 0 {
			decimals = min(decimals, most)
		}
	}
	out := make([]string, len(values))
	for i, v := range values {
		v = c.in(v)
		switch {
		case math.IsNaN(v):
		case math.IsInf(v, 0):
			out[i] = c.number(values[i], digits)
		default:
			out[i] = fixed(v, decimals)
		}
	}
	return out
}

// fixed is a number with so many decimals, and no minus before zero.
func fixed(v float64, decimals int) string {
	s := strconv.FormatFloat(v, 'f', decimals, 64)
	if f, err := strconv.ParseFloat(s, 64); err == nil && f == 0 {
		return strconv.FormatFloat(0, 'f', decimals, 64)
	}
	return s
}

// margin shows how far a limit is from failing: in percent of its bound, or as a quantity where the
// bound is zero.
func margin(l *study.Limit) string {
	v, b := float64(l.Value), float64(l.Bound)
	switch {
	case l.Unbounded && l.Holds:
		return "unbounded"
	case math.IsInf(float64(l.Margin), 0) || math.IsInf(v, 0):
		return "none"
	case b == 0:
		if l.Sense == study.AtMost {
			v = -v
		}
		c := limitScale(l.Measure, l.Unit)
		return strings.TrimSpace(signed(coarse(c.in(v))) + " " + c.unit())
	}
	share := 100 * float64(l.Margin)
	if t := coarse(share); t != "0" || l.Holds {
		return signed(t) + " %"
	}
	return units.Digits(share, 1) + " %" // fails by very little
}

// coarse shows a number with two or three digits and two decimals at most.
func coarse(v float64) string {
	if s := fixed(v, 2); math.Abs(v) < 10 && s != "0.00" {
		return s
	} else if s == "0.00" {
		return "0"
	}
	return units.Digits(v, 3)
}

// signed puts a plus before numbers above zero.
func signed(s string) string {
	if s != "0" && s[0] != '-' {
		return "+" + s
	}
	return s
}
