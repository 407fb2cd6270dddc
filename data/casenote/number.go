package casenote

import (
	"math"
	"strconv"
	"strings"

	"afterbeat/data"
)

// What the rounding of [Format] goes by, and the sizes it writes without an
// exponent.
const (
	intervalDigits = 2 // significant digits of the half-width of the interval
	mostDigits     = 5 // significant digits of the value at most
	bareDigits     = 4 // significant digits of a value without interval
	exactDigits    = 7 // significant digits of a value without doubt at most

	smallestPlain = 1e-4
	plainPlaces   = 6
	largestPlain  = 1e9
)

// Format writes v, rounded to two significant digits of the half-width of its
// interval i, but to no more than five significant digits of its own. Without
// an interval it keeps four significant digits. A value without doubt
// (i.Low == i.High) is written out as far as seven digits go, and a whole number
// without doubt or without interval in full: 168000 rows are 168000 rows.
//
// There is no exponent from 1e-4 up to 1e9, nor where six decimal places are
// enough, and never a minus before a zero. Infinity is "inf", NaN "undefined".
func Format(v float64, i data.Interval) string {
	if i.Low == i.High && !whole(v) {
		return shortest(v)
	}
	return decimal(v, places(v, i))
}

// FormatRange writes the interval i of v as "0.91 to 0.99", both ends rounded
// as [Format] rounds v. It is "exact" where the ends are one, and
// "no interval" where there is none.
func FormatRange(v float64, i data.Interval) string {
	switch {
	case !i.Defined():
		return "no interval"
	case i.Low == i.High:
		return "exact"
	}
	return ends(i, places(v, i))
}

// ends writes the two ends of an interval with the given decimal places.
func ends(i data.Interval, places int) string {
	return decimal(i.Low, places) + " to " + decimal(i.High, places)
}

// places is the number of decimal places to which [Format] rounds v; negative
// where it rounds to tens and more.
func places(v float64, i data.Interval) int {
	half := i.Width() / 2
	switch {
	case half > 0 && !math.IsInf(half, 0):
		p := intervalDigits - 1 - magnitude(half)
		if v != 0 && finite(v) {
			p = min(p, mostDigits-1-magnitude(v))
		}
		return p
	case whole(v):
		return 0
	case finite(v):
		return bareDigits - 1 - magnitude(v)
	}
	return bareDigits - 1
}

// magnitude is the power of ten of the first digit of x, floor(log10|x|).
func magnitude(x float64) int {
	s := strconv.FormatFloat(math.Abs(x), 'e', -1, 64)
	power, err := strconv.Atoi(s[strings.IndexByte(s, 'e')+1:])
	if err != nil {
		panic("casenote: no exponent in " + s)
	}
	return power
}

// decimal writes v with the given decimal places.
func decimal(v float64, places int) string {
	size := math.Abs(v)
	switch {
	case math.IsNaN(v):
		return "undefined"
	case math.IsInf(v, 0):
		return strings.ToLower(strings.TrimPrefix(strconv.FormatFloat(v, 'f', 0, 64), "+"))
	case size < math.Pow10(-places)/2:
		return strconv.FormatFloat(0, 'f', min(max(places, 0), bareDigits), 64)
	case size < smallestPlain && places > plainPlaces,
		size >= largestPlain && (places < 0 || !whole(v)):
		return exponential(v, max(places+magnitude(v), 0))
	case places < 0:
		step := math.Pow10(-places)
		return positiveZero(strconv.FormatFloat(math.Round(v/step)*step, 'f', 0, 64))
	}
	return positiveZero(strconv.FormatFloat(v, 'f', places, 64))
}

// positiveZero takes the sign off a zero.
func positiveZero(s string) string {
	if strings.Trim(s, "-0.") == "" {
		return strings.TrimPrefix(s, "-")
	}
	return s
}

// exponential writes v as 1.2e-7, with the given decimal places.
func exponential(v float64, places int) string {
	mantissa, power, _ := strings.Cut(strconv.FormatFloat(v, 'e', places, 64), "e")
	sign := strings.TrimSuffix(power[:1], "+")
	return mantissa + "e" + sign + strings.TrimLeft(power[1:], "0")
}

// shortest writes v with seven significant digits, without trailing zeros.
func shortest(v float64) string {
	if !finite(v) {
		return decimal(v, 0)
	}
	mantissa, power, isPower := strings.Cut(decimal(v, mostDigits-1-magnitude(v)), "e")
	if strings.Contains(mantissa, ".") {
		mantissa = strings.TrimRight(strings.TrimRight(mantissa, "0"), ".")
	}
	if isPower {
		return mantissa + "e" + power
	}
	return mantissa
}

// whole tells whether v is an integer small enough to be one exactly.
func whole(v float64) bool { return v == math.Trunc(v) && math.Abs(v) < 1e15 }

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }
