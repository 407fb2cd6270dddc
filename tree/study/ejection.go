package study

import (
	"math"

	"afterbeat/data"
)

// ejectionTime is the time that the aortic valve is open, s, read off the flow
// of one beat: from where the rise, a straight line through 10 and 30 % of the
// peak, leaves 0, to where the fall, likewise, comes back to it. The noise of a
// closed valve does not reach these levels. NaN where the flow has no such rise
// and fall.
func ejectionTime(flow data.Period) float64 {
	n := len(flow.Samples)
	peak := 0
	for i, q := range flow.Samples {
		if q > flow.Samples[peak] {
			peak = i
		}
	}
	top := flow.Samples[peak]
	if n == 0 || !(top > 0) {
		return math.NaN()
	}
	// passes is how many samples away from the peak, in steps of way, the flow
	// passes a level.
	passes := func(level float64, way int) float64 {
		at := func(k int) float64 { return flow.Samples[((peak+way*k)%n+n)%n] }
		for k := 1; k < n; k++ {
			if at(k) <= level {
				return float64(k-1) + (at(k-1)-level)/(at(k-1)-at(k))
			}
		}
		return math.NaN()
	}
	side := func(way int) float64 {
		low, high := passes(0.1*top, way), passes(0.3*top, way)
		return low + (low-high)*0.1/0.2
	}
	return (side(-1) + side(1)) / flow.Rate
}
