package unit

import (
	"math"
	"strconv"
)

// ToInternal converts a value in u to the internal unit of its quantity.
func (u Unit) ToInternal(x float64) float64 { return x * u.Factor }

// FromInternal converts a value in the internal unit to one in u.
func (u Unit) FromInternal(x float64) float64 { return x / u.Factor }

// String is the name of the unit.
func (u Unit) String() string { return u.Name }

// Print gives a value, held in the internal unit, in u: rounded to the given
// number of significant digits (at least 1; digits left of the point are
// never dropped) and followed by the unit. A value that is no number is
// "undefined".
func (u Unit) Print(internal float64, digits int) string {
	x := u.FromInternal(internal)
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return "undefined"
	}
	text := strconv.FormatFloat(x, 'f', decimals(x, digits), 64)
	if u.Name == "" {
		return text
	}
	return text + " " + u.Name
}

// decimals is how many digits after the point show x with the given number of
// significant ones.
func decimals(x float64, digits int) int {
	if x == 0 {
		return max(digits-1, 0)
	}
	return max(digits-1-int(math.Floor(math.Log10(math.Abs(x)))), 0)
}
