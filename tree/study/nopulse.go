package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// openToAir is how far from zero, in mmHg, all of a pressure lies that is taken
// for that of a disconnected transducer (an assumption).
const openToAir = 10.0

// withOrigin adds to the reason for which a channel has no pulse what its level
// and its unit make likely.
func withOrigin(reason string, ch data.Channel) string {
	switch {
	case !ch.Unit.Calibrated:
		return fmt.Sprintf("%s; uncalibrated noise? the channel is in %s", reason, data.Clean(ch.Unit.Name))
	case ch.Quantity == unit.Pressure:
		low, high := innerRange(ch.Values)
		if low > -openToAir && high < openToAir {
			return fmt.Sprintf("%s; disconnected, or open to air? it lies between %.2g and %.2g mmHg", reason, low, high)
		}
	}
	return reason
}

// innerRange is the range of the values without a fiftieth at either end; NaN
// where none is there.
func innerRange(values []float64) (low, high float64) {
	s := slices.DeleteFunc(slices.Clone(values), math.IsNaN)
	if len(s) == 0 {
		return math.NaN(), math.NaN()
	}
	slices.Sort(s)
	return s[len(s)/50], s[len(s)-1-len(s)/50]
}
