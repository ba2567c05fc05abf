package brief

import (
	"bytes"
	"fmt"
	"math"
	"strings"
	"unicode"

	"legwright/cmd/legwright/internal/units"
)

// Encode writes the design as YAML. Reading the text gives the same bits: quantities stand in SI
// units with as many digits as that takes, and in the usual unit in a comment. Encode panics if a
// number is not finite.
func (d *Design) Encode() []byte {
	var b bytes.Buffer
	for _, line := range []struct{ name, value string }{{"brief", d.Brief}, {"id", d.ID}, {"title", d.Title}, {"family", d.Family}} {
		if line.value != "" {
			fmt.Fprintf(&b, "%s: %s\n", line.name, scalar(line.value))
		}
	}
	if len(d.Dimensions) > 0 {
		b.WriteString("dimensions:\n")
	}
	for _, dim := range d.Dimensions {
		exact, shown := sequence(dim.Values, dim.Kind)
		if len(dim.Values) == 1 {
			exact, shown = exact[1:len(exact)-1], shown[1:len(shown)-1]
		}
		fmt.Fprintf(&b, "  %s: %s%s\n", dim.Name, exact, comment(exact, shown))
	}
	if d.Joints != nil {
		b.WriteString("joints:\n")
		points(&b, "base", d.Joints.Base)
		points(&b, "platform", d.Joints.Platform)
	}
	if d.Home != nil {
		p, pShown := sequence(d.Home[:3], units.Length)
		a, aShown := sequence(d.Home[3:], units.Angle)
		join := func(p, a string) string { return p[:len(p)-1] + ", " + a[1:] }
		fmt.Fprintf(&b, "home: %s%s\n", join(p, a), comment(join(p, a), join(pShown, aShown)))
	}
	if len(d.Rails) > 0 {
		b.WriteString("rails:\n")
	}
	for _, r := range d.Rails {
		p, shown := sequence(r.Point[:], units.Length)
		v, _ := sequence(r.Direction[:], units.Ratio)
		fmt.Fprintf(&b, "  - {point: %s, direction: %s} # point %s\n", p, v, shown)
	}
	return b.Bytes()
}

func points(b *bytes.Buffer, name string, ps [][3]float64) {
	if len(ps) == 0 {
		return
	}
	fmt.Fprintf(b, "  %s:\n", name)
	for _, p := range ps {
		exact, shown := sequence(p[:], units.Length)
		fmt.Fprintf(b, "    - %s%s\n", exact, comment(exact, shown))
	}
}

// sequence is [a, b, …] exactly in SI and rounded in the usual unit.
func sequence(values []float64, k units.Kind) (exact, shown string) {
	var e, s []string
	for _, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			panic("brief: Encode of a number that is not finite")
		}
		e = append(e, units.Exact(v, k))
		s = append(s, units.Format(v, k, 6))
	}
	return "[" + strings.Join(e, ", ") + "]", "[" + strings.Join(s, ", ") + "]"
}

func comment(exact, shown string) string {
	if exact == shown {
		return ""
	}
	return " # " + shown
}

// scalar writes a string in the double quotes of YAML. What does not print is escaped.
func scalar(s string) string {
	var b strings.Builder
	b.WriteByte('"')
	for _, c := range s {
		switch {
		case c == '"' || c == '\\':
			b.WriteByte('\\')
			b.WriteRune(c)
		case c == ' ' || unicode.IsPrint(c):
			b.WriteRune(c)
		case c <= 0xffff:
			fmt.Fprintf(&b, "\\u%04x", c)
		default:
			fmt.Fprintf(&b, "\\U%08x", c)
		}
	}
	b.WriteByte('"')
	return b.String()
}
