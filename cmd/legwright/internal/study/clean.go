package study

import (
	"strings"
	"unicode"
)

// Clean is the text as it may go to a terminal or into a message: control characters, line breaks and
// marks that turn the direction of writing are left out.
func Clean(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\n' || r == '\t' || r == '\u2028' || r == '\u2029':
			return ' '
		case unicode.IsControl(r) || unicode.Is(unicode.Bidi_Control, r) || r == unicode.ReplacementChar:
			return -1
		}
		return r
	}, s)
}
