package brief

import (
	"fmt"
	"strings"
)

// near gives the name that the misspelt word most likely means, "" if none is close.
func near(word string, names []string) string {
	best, least := "", 1+max(2, min(len(word), 40)/3)
	for _, n := range names {
		if d := distance(strings.ToLower(word), strings.ToLower(n)); d < least && d < max(len(n), len(word)) {
			best, least = n, d
		}
	}
	return best
}

// Suggest words what to write in place of an unknown name, of the names that there are.
func Suggest(word string, names []string) string { return suggest(word, names) }

// suggest words what to write in place of an unknown name.
func suggest(word string, names []string) string {
	if n := near(word, names); n != "" {
		return fmt.Sprintf("did you mean %s?", n)
	}
	if len(names) == 0 {
		return "leave it out"
	}
	return "known here: " + strings.Join(names, ", ")
}

// distance is the optimal string alignment distance: insertions, deletions, substitutions and
// swaps of neighbours (common practice; Damerau 1964, from memory).
func distance(a, b string) int {
	if len(a) > 64 || len(b) > 64 {
		return 64
	}
	var row [3][65]int // two rows back, one row back, this one
	for j := range len(b) + 1 {
		row[1][j] = j
	}
	for i := 1; i <= len(a); i++ {
		row[2][0] = i
		for j := 1; j <= len(b); j++ {
			change := 1
			if a[i-1] == b[j-1] {
				change = 0
			}
			d := min(row[1][j]+1, row[2][j-1]+1, row[1][j-1]+change)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				d = min(d, row[0][j-2]+1)
			}
			row[2][j] = d
		}
		row[0], row[1] = row[1], row[2]
	}
	return row[1][len(b)]
}
