package unit

import (
	"strings"
	"unicode"
)

// Words splits a column name into its words, in lower case: at everything that
// is no letter or digit, between letters and digits, and where a capital
// follows a small letter. "AoPressure_2" is ao, pressure, 2; "MCAv" is mcav.
func Words(name string) []string {
	var words []string
	start, last := -1, rune(0)
	for i, r := range name {
		inside := unicode.IsLetter(r) || unicode.IsDigit(r)
		if start >= 0 && (!inside || breaks(last, r)) {
			words = append(words, strings.ToLower(name[start:i]))
			start = -1
		}
		if inside && start < 0 {
			start = i
		}
		last = r
	}
	if start >= 0 {
		words = append(words, strings.ToLower(name[start:]))
	}
	return words
}

// breaks tells whether a new word begins at r, which follows last in a run of
// letters and digits.
func breaks(last, r rune) bool {
	return unicode.IsDigit(last) != unicode.IsDigit(r) || unicode.IsLower(last) && unicode.IsUpper(r)
}
