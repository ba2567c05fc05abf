package study

import (
	"fmt"
	"strconv"
	"strings"
)

// mostNumbers bounds how many missing parts a note names.
const mostNumbers = 20

// Note says in words what a merged front is made of.
func (p *Parts) Note() string {
	if len(p.Missing) == 0 {
		return fmt.Sprintf("merged from all %d parts", p.Of)
	}
	var names []string
	for _, n := range p.Missing[:min(mostNumbers, len(p.Missing))] {
		names = append(names, strconv.Itoa(n))
	}
	if more := len(p.Missing) - len(names); more > 0 {
		names = append(names, fmt.Sprintf("%d more", more))
	}
	return fmt.Sprintf("merged from %d of %d parts; missing: %s", len(p.Present), p.Of, strings.Join(names, ", "))
}
