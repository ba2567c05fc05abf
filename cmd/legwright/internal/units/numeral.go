package units

// IsNumber reports whether the text is a decimal number: digits with an optional sign, point and
// exponent, and nothing else.
func IsNumber(text string) bool { return text != "" && numeral(text) == len(text) }

// numeral is the length of the decimal number that the text begins with, 0 if it begins with none.
func numeral(text string) int {
	i := 0
	if i < len(text) && (text[i] == '+' || text[i] == '-') {
		i++
	}
	whole := digits(text[i:])
	i += whole
	fraction := 0
	if i < len(text) && text[i] == '.' {
		fraction = digits(text[i+1:])
		if whole+fraction > 0 {
			i += 1 + fraction
		}
	}
	if whole+fraction == 0 {
		return 0
	}
	if i < len(text) && (text[i] == 'e' || text[i] == 'E') {
		j := i + 1
		if j < len(text) && (text[j] == '+' || text[j] == '-') {
			j++
		}
		if n := digits(text[j:]); n > 0 {
			i = j + n
		}
	}
	return i
}

// digits counts the digits that the text begins with.
func digits(text string) int {
	for i := range len(text) {
		if text[i] < '0' || text[i] > '9' {
			return i
		}
	}
	return len(text)
}
