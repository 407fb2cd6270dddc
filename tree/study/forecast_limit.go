package study

import (
	"math"

	"afterbeat/tree/support"
)

// valveLimit is the lowest speed at which the valve stays shut, 1000/min,
// narrowed down from states that are known; +Inf where it opens up to the speed
// most, 0 where it never opens, NaN where it was not found.
func valveLimit(k *support.Coupled, known []support.CoupledState, most float64) float64 {
	opens, shut := math.NaN(), math.NaN()
	for _, s := range known {
		if missing(&s) != "" {
			continue
		}
		if s.ValveOpened {
			opens = s.Speed
		} else {
			shut = s.Speed
			break
		}
	}
	if math.IsNaN(opens) {
		return 0
	}
	for next := max(1.2*opens, most/8); math.IsNaN(shut); next *= 1.2 {
		s, err := k.At(min(next, most))
		switch {
		case err != nil || missing(&s) != "":
			return math.NaN()
		case !s.ValveOpened:
			shut = s.Speed
		case next >= most:
			return math.Inf(1)
		default:
			opens = s.Speed
		}
	}
	limit, err := k.ValveLimit(opens, shut)
	if err != nil {
		return math.NaN()
	}
	return limit
}
