package casefile

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Amount reads what the table of systematic errors holds: a number, or a
// percentage, "10%", which gives 0.1 and relative.
func Amount(s string) (value float64, relative bool, err error) {
	digits, relative := strings.CutSuffix(strings.TrimSpace(s), "%")
	value, err = strconv.ParseFloat(strings.TrimSpace(digits), 64)
	if err != nil || math.IsNaN(value) || math.IsInf(value, 0) {
		return 0, false, fmt.Errorf("want a number or a percentage, not %q", clean(s))
	}
	if relative {
		value /= 100
	}
	return value, relative, nil
}
