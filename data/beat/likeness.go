package beat

import (
	"slices"
)

// What makes upstrokes those of a pulse although their rhythm is irregular. In
// white noise, in autoregressive noise and in random walks what the slope sum
// function picks out correlates with its median by less than 0.9.
const (
	beforeEnd      = 0.25 // s before the end of an upstroke
	afterEnd       = 0.20 // s after it
	leastAlike     = 0.93 // median correlation with the median upstroke
	fewAlike       = 0.85 // its lowest fifth
	leastUpstrokes = 16
	mostRises      = 2.0 // all rises of the median upstroke together, over its range
)

// alike tells whether the upstrokes that end at the given samples of y, sampled
// at fs, resemble one another and follow at the intervals of a pulse.
func alike(y []float64, ends []int, fs float64) bool {
	r, middle := likeness(y, ends, fs)
	if len(r) < leastUpstrokes {
		return false
	}
	intervals := make([]float64, len(ends)-1)
	for i := range intervals {
		intervals[i] = float64(ends[i+1]-ends[i]) / fs
	}
	interval := median(intervals)
	return median(r) >= leastAlike && quantile(r, 0.2) >= fewAlike &&
		rises(middle) <= mostRises && interval >= shortestPeriod && interval <= longestPeriod
}

// likeness is the correlation of each upstroke, straightened, with the median
// one. Upstrokes at the very ends of y are left out.
func likeness(y []float64, ends []int, fs float64) (r, middle []float64) {
	before, after := samplesIn(beforeEnd, fs), samplesIn(afterEnd, fs)
	var pieces [][]float64
	for _, e := range ends {
		if e >= before && e+after < len(y) {
			pieces = append(pieces, normalise(straightened(slices.Clone(y[e-before:e+after]))))
		}
	}
	if len(pieces) == 0 {
		return nil, nil
	}
	middle = medianShape(pieces)
	r = make([]float64, len(pieces))
	for i, p := range pieces {
		r[i] = dot(p, middle)
	}
	return r, middle
}

// straightened takes the straight line of least squares off x, in place: a
// piece of a slow wave is little else.
func straightened(x []float64) []float64 {
	middle := float64(len(x)-1) / 2
	mean, slope, squares := 0.0, 0.0, 0.0
	for i, v := range x {
		d := float64(i) - middle
		mean += v / float64(len(x))
		slope += v * d
		squares += d * d
	}
	for i := range x {
		x[i] -= mean + slope/squares*(float64(i)-middle)
	}
	return x
}

// rises is the sum of all rises of x over its range: 1 for a single upstroke,
// many for a hum.
func rises(x []float64) float64 {
	sum := 0.0
	for i := 1; i < len(x); i++ {
		sum += max(0, x[i]-x[i-1])
	}
	return sum / (slices.Max(x) - slices.Min(x))
}
