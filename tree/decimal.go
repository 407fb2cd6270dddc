package tree

import (
	"math"
	"strconv"
	"strings"
)

// parseDecimal reads a decimal number times ten to the power shift, correctly
// rounded. inf, with or without a sign, is one; NaN, hexadecimal numbers and
// those with underscores are none.
func parseDecimal(field string, decimal byte, shift int) (v float64, ok bool) {
	if decimal == ',' {
		field = strings.Replace(field, ",", ".", 1)
	}
	switch strings.ToLower(strings.TrimPrefix(field, "+")) {
	case "inf", "infinity":
		return math.Inf(1), true
	}
	for i := range len(field) {
		if !strings.ContainsRune("0123456789+-.eE", rune(field[i])) {
			return 0, false
		}
	}
	mantissa, exponent := field, 0
	if at := strings.IndexAny(field, "eE"); at >= 0 {
		var err error
		if exponent, err = strconv.Atoi(field[at+1:]); err != nil || exponent > 400 || exponent < -400 {
			return 0, false
		}
		mantissa = field[:at]
	}
	v, err := strconv.ParseFloat(mantissa+"e"+strconv.Itoa(exponent+shift), 64)
	return v, err == nil
}

// formatDecimal writes v divided by ten to the power shift, so that
// parseDecimal gives v again.
func formatDecimal(v float64, shift int) string {
	if shift == 0 || v == 0 || math.IsInf(v, 0) {
		return strings.ToLower(strings.TrimPrefix(strconv.FormatFloat(v, 'g', -1, 64), "+"))
	}
	text := strconv.FormatFloat(v, 'e', -1, 64)
	at := strings.IndexByte(text, 'e')
	exponent, _ := strconv.Atoi(text[at+1:])
	shifted := text[:at] + "e" + strconv.Itoa(exponent-shift)
	// A plain number is better to read, where it is the same.
	plain := strconv.FormatFloat(v/math.Pow10(shift), 'f', -1, 64)
	if back, ok := parseDecimal(plain, '.', shift); ok && back == v {
		return plain
	}
	return shifted
}
