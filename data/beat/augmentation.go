package beat

import (
	"math"

	"afterbeat/data"
)

// Settings of the search for an inflection (assumptions).
const (
	augmentationSmoothing = 0.02 // s, width of each of two running means
	leastProminence       = 0.05 // of the steepest slope, by which the slope must turn
	upstrokePart          = 0.5  // of the steepest slope, that the first upstroke reaches
	ejectionPart          = 0.5  // of the beat, after which no inflection is sought
)

// augmentation finds the shoulder of systole (Murgo et al. 1980, Circulation
// 62:105): where the slope has a minimum within the rise, or the fall one within
// the fall, and turns by at least leastProminence before and after. why is set
// where there is none.
func augmentation(p data.Period) (index float64, why string) {
	low, high := p.Extremes()
	if high == low {
		return math.NaN(), "the trace is flat"
	}
	x, slope := smoothedSlope(p)
	top := peak(x)
	most := slope[peak(slope[:top+1])]
	if most <= 0 {
		return math.NaN(), "the beat does not begin with a rise"
	}
	least := leastProminence * most
	steep := 0 // where the first upstroke is steepest
	for slope[steep] < upstrokePart*most || steep < top && slope[steep+1] > slope[steep] {
		steep++
	}
	if i, ok := turn(slope[steep:top+1], least); ok {
		for i > 0 && slope[steep+i] < 0 { // a first peak of its own
			i--
		}
		return (high - x[steep+i]) / (high - low), ""
	}
	var fall []float64
	for j := top; float64(j) < ejectionPart*float64(len(x)); j++ {
		fall = append(fall, -slope[j])
	}
	if i, ok := slowing(fall, least); ok {
		return (x[top+i] - high) / (high - low), ""
	}
	return math.NaN(), "no inflection beside the peak"
}

// smoothedSlope returns the period, smoothed round, and its central differences
// per sample.
func smoothedSlope(p data.Period) (x, slope []float64) {
	n := len(p.Samples)
	h := min(samplesIn(augmentationSmoothing, p.Rate)/2, (n-1)/2)
	x = roundMean(roundMean(p.Samples, h), h)
	slope = make([]float64, n)
	for j := range slope {
		slope[j] = (x[(j+1)%n] - x[(j+n-1)%n]) / 2
	}
	return x, slope
}

// roundMean is the running mean over the samples within h of each, the period
// taken as closed.
func roundMean(x []float64, h int) []float64 {
	n := len(x)
	out := make([]float64, n)
	for j := range out {
		for i := j - h; i <= j+h; i++ {
			out[j] += x[(i+n)%n] / float64(2*h+1)
		}
	}
	return out
}

// turn returns the first place from which x, having fallen, rises by least.
func turn(x []float64, least float64) (i int, ok bool) {
	for j, v := range x {
		if v < x[i] {
			i = j
		}
		if v >= x[i]+least && i > 0 {
			return i, true
		}
	}
	return 0, false
}

// slowing returns the first place at which a fall (positive) slows by least,
// without becoming a rise, before it quickens by least.
func slowing(fall []float64, least float64) (i int, ok bool) {
	fastest := 0
	for j, v := range fall {
		if v > fall[fastest] {
			fastest = j
		}
		if v <= fall[fastest]-least {
			i, ok = turn(fall[fastest:], least)
			i += fastest
			return i, ok && fall[i] > 0
		}
	}
	return 0, false
}
