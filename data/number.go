package data

import (
	"bytes"
	"math"
	"strconv"
)

// largest is the largest magnitude that counts as a measurement. It leaves
// room for products and squares of values further down.
const largest = 1e100

// scanNumber reads the plain decimal number at b[i:], such as -12.5, and
// returns where it ends. The value is the nearest float64: at most 18 digits
// make an integer below 2^53, and one correctly rounded division by an exact
// power of ten follows (Clinger 1990). ok is false where that does not hold or
// no digit is there; parseNumber then decides.
func scanNumber(b []byte, i int, decimal byte) (v float64, next int, ok bool) {
	negative := false
	if i < len(b) && (b[i] == '-' || b[i] == '+') {
		negative = b[i] == '-'
		i++
	}
	mantissa, first, fraction := uint64(0), i, 0
	for ; i < len(b); i++ {
		d := b[i] - '0'
		if d > 9 {
			break
		}
		mantissa = mantissa*10 + uint64(d)
	}
	digits := i - first
	if i < len(b) && b[i] == decimal {
		i++
		point := i
		for ; i < len(b); i++ {
			d := b[i] - '0'
			if d > 9 {
				break
			}
			mantissa = mantissa*10 + uint64(d)
		}
		fraction = i - point
		digits += fraction
	}
	if digits == 0 || digits > 18 || mantissa > 1<<53 {
		return 0, i, false
	}
	v = float64(mantissa) / powersOfTen[fraction]
	if negative {
		v = -v
	}
	return v, i, true
}

// powersOfTen are exact up to 1e22; a fraction of scanNumber has at most 18 digits.
var powersOfTen = [19]float64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18}

// content is what a field holds.
type content int

const (
	isMissing content = iota
	isNumber
	isText
)

// parseNumber reads a trimmed field. Missing are the empty field and the words
// that programs write for no value, infinity among them: no instrument
// measures it. Everything that is no decimal number, or one above 1e100, is
// text.
func parseNumber(field []byte, decimal byte) (float64, content) {
	if missing(field) {
		return math.NaN(), isMissing
	}
	if len(field) > 64 {
		return math.NaN(), isText
	}
	if decimal != '.' {
		field = bytes.Replace(field, []byte{decimal}, []byte{'.'}, 1)
	}
	for _, c := range field {
		if c-'0' > 9 && c != '.' && c != '-' && c != '+' && c != 'e' && c != 'E' {
			return math.NaN(), isText
		}
	}
	v, err := strconv.ParseFloat(string(field), 64)
	if err != nil || math.Abs(v) > largest {
		return math.NaN(), isText
	}
	return v, isNumber
}

// missing tells whether a trimmed field says that there is no value.
func missing(field []byte) bool {
	switch {
	case len(field) == 0:
		return true
	case len(field) > 9:
		return false
	}
	var lower [9]byte
	for i, c := range field {
		if 'A' <= c && c <= 'Z' {
			c += 'a' - 'A'
		}
		lower[i] = c
	}
	switch string(lower[:len(field)]) {
	case "nan", "-nan", "+nan", "na", "n/a", "#n/a", "n.a.", "null", "none", "nil", "-", "--", "---", ".", "?",
		"inf", "-inf", "+inf", "infinity", "-infinity", "+infinity", "1.#inf", "-1.#inf", "1.#qnan", "-1.#ind":
		return true
	}
	return false
}
