package units

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"
	"unicode"
)

// Error says what is wrong with a quantity and what to write instead.
type Error struct{ Problem, Remedy string }

// Error is one line. What would not print, of the text that was read, shows as a question mark.
func (e *Error) Error() string {
	return strings.Map(func(r rune) rune {
		if unicode.IsPrint(r) {
			return r
		}
		return '?'
	}, e.Problem+"; "+e.Remedy)
}

// based is a number in hexadecimal, octal or binary.
var based = regexp.MustCompile(`^[+-]?0[xXoObB][0-9a-fA-F]`)

// maxText bounds what a quantity may be long, so that error texts stay readable.
const maxText = 100

// Parse reads a quantity of one of the kinds and gives it in SI units with the kind found. A bare
// number is read only as a Ratio, Count or Sign. The error is an *Error.
func Parse(text string, allowed ...Kind) (float64, Kind, error) {
	if len(allowed) == 0 {
		panic("units: Parse without a kind")
	}
	t := strings.TrimSpace(text)
	if len(t) > maxText {
		return 0, 0, &Error{"the text is too long for a quantity", "write one such as " + samples(allowed)}
	}
	num := t[:numeral(t)]
	symbol := strings.TrimSpace(t[len(num):])
	if err := shape(t, num, symbol, allowed); err != nil {
		return 0, 0, err
	}
	for _, k := range allowed {
		u, ok := find(symbol, k)
		if symbol == "" && k.Bare() {
			u, ok = Unit{Kind: k, Factor: 1}, true
		}
		if ok {
			v, err := u.Parse(num)
			return v, k, err
		}
	}
	return 0, 0, badUnit(num, symbol, allowed)
}

// shape refuses what is not a number followed by something like a unit.
func shape(t, num, symbol string, allowed []Kind) error {
	low := strings.ToLower(strings.TrimLeft(t, "+-. "))
	switch {
	case num == "" && (strings.HasPrefix(low, "inf") || strings.HasPrefix(low, "nan")):
		return &Error{fmt.Sprintf("%q is not a finite number", t), "write one such as " + samples(allowed)}
	case num == "":
		return &Error{fmt.Sprintf("%q is not a quantity", t), "write one such as " + samples(allowed)}
	case strings.HasPrefix(symbol, ",") && len(symbol) > 1 && symbol[1] >= '0' && symbol[1] <= '9':
		return &Error{fmt.Sprintf("%q has a comma in its number", t), "write a decimal point: " + strings.Replace(t, ",", ".", 1)}
	case symbol != "" && symbol[0] >= '0' && symbol[0] <= '9':
		return &Error{fmt.Sprintf("%q has two numbers", t), "write one number without blanks, then its unit"}
	case based.MatchString(t):
		return &Error{fmt.Sprintf("%s is not a decimal number", t), "write one such as " + samples(allowed)}
	case strings.HasPrefix(symbol, "_"):
		return &Error{fmt.Sprintf("%q has an underscore in its number", t), "write the digits without it"}
	}
	return nil
}

// badUnit words why the symbol is no unit of the kinds.
func badUnit(num, symbol string, allowed []Kind) error {
	if symbol == "" {
		return &Error{fmt.Sprintf("%s has no unit", num), fmt.Sprintf("write it as a quantity, such as %s", samples(allowed))}
	}
	for _, k := range allowed {
		if s, ok := folded(symbol, k); ok {
			return &Error{fmt.Sprintf("unknown unit %q", symbol), fmt.Sprintf("did you mean %s %s?", num, s)}
		}
	}
	choices := choices(allowed)
	if ks := kindsOf(symbol); len(ks) > 0 {
		return &Error{fmt.Sprintf("%s is a unit of %s, not of %s", symbol, ks[0], words(allowed)), choices}
	}
	return &Error{fmt.Sprintf("unknown unit %q", symbol), choices}
}

func choices(allowed []Kind) string {
	var all []string
	for _, k := range allowed {
		all = append(all, Symbols(k)...)
		if k.Bare() {
			all = append(all, "no unit")
		}
	}
	return "write one of " + strings.Join(all, ", ")
}

func samples(ks []Kind) string {
	var s []string
	for _, k := range ks {
		s = append(s, k.Sample())
	}
	return strings.Join(s, " or ")
}

func words(ks []Kind) string {
	var s []string
	for _, k := range ks {
		s = append(s, k.String())
	}
	return strings.Join(s, " or ")
}

// Parse reads a bare decimal number as that many of the unit, in SI. The error is an *Error.
func (u Unit) Parse(num string) (float64, error) {
	if !IsNumber(num) {
		return 0, &Error{fmt.Sprintf("%q is not a finite number", num), "write a decimal number"}
	}
	mantissa, exp := strings.ToLower(num), 0
	if m, e, ok := strings.Cut(mantissa, "e"); ok {
		n, err := strconv.Atoi(e)
		if err != nil || n > 9999 || n < -9999 {
			return 0, &Error{num + " is beyond the range of numbers", "write a number of ordinary size"}
		}
		mantissa, exp = m, n
	}
	v, err := strconv.ParseFloat(mantissa+"e"+strconv.Itoa(exp+u.Exp), 64)
	v *= u.Factor
	if err != nil || math.IsInf(v, 0) {
		return 0, &Error{num + " is beyond the range of numbers", "write a number of ordinary size"}
	}
	if v == 0 && strings.ContainsAny(mantissa, "123456789") {
		return 0, &Error{num + " is too small to be told from zero", "write 0 or a number of ordinary size"}
	}
	return v, nil
}

// Lookup finds a unit of one of the kinds by its symbol, in any usual spelling. The error is an
// *Error.
func Lookup(symbol string, allowed ...Kind) (Unit, error) {
	for _, k := range allowed {
		if u, ok := find(symbol, k); ok {
			return u, nil
		}
	}
	if symbol == "" {
		return Unit{}, &Error{"the unit is missing", choices(allowed)}
	}
	for _, k := range allowed {
		if s, ok := folded(symbol, k); ok {
			return Unit{}, &Error{fmt.Sprintf("unknown unit %q", symbol), fmt.Sprintf("did you mean %s?", s)}
		}
	}
	return Unit{}, badUnit("", symbol, allowed)
}
