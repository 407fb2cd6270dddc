package fault

import (
	"math"
	"slices"
)

// scale is the yardstick of a trace.
type scale struct {
	pulse     float64 // see the package's page; 0 where there is none
	low, high float64 // quartiles, over the windows, of their 2nd and 98th percentiles
	step      float64 // between neighbouring levels; 0 where levels cannot be told
}

const (
	windowOfPulse = 2.5 // s: the longest beat
	fewInWindow   = 256 // samples of a window that are looked at
	fewInAll      = 20_000
)

// measure takes the yardstick of a trace from a part of its samples.
func measure(values []float64, rate float64) scale {
	n := max(2, int(windowOfPulse*rate))
	var ranges, lows, highs []float64
	for from := 0; from+n <= len(values) || from == 0; from += n {
		some := sample(values[from:min(from+n, len(values))], fewInWindow)
		if len(some) >= fewInWindow/4 || from == 0 && len(some) > 1 {
			low, high := quantile(some, 0.02), quantile(some, 0.98)
			ranges, lows, highs = append(ranges, high-low), append(lows, low), append(highs, high)
		}
	}
	s := scale{pulse: median(ranges)}
	if math.IsNaN(s.pulse) {
		s.pulse = 0
	}
	slices.Sort(lows)
	slices.Sort(highs)
	s.low, s.high = quantile(lows, 0.25), quantile(highs, 0.75)
	s.step = stepOf(sample(values, fewInAll))
	return s
}

// sample returns at most about n of the values that there are, sorted, taken
// evenly over the trace.
func sample(values []float64, n int) []float64 {
	stride := max(1, len(values)/n)
	out := make([]float64, 0, len(values)/stride+1)
	for i := 0; i < len(values); i += stride {
		if v := values[i]; !math.IsNaN(v) && !math.IsInf(v, 0) {
			out = append(out, v)
		}
	}
	slices.Sort(out)
	return out
}

const (
	nearLevel = 0.1  // of a step, that a level may be off: printing rounds too
	onLattice = 0.95 // of the levels
)

// stepOf is the distance of the levels on which sorted values lie, between their 10th
// and 90th percentile; 0 where they lie on no lattice, or where fewer than four fall
// on a level, so that it cannot be told from chance. The levels of a trace that
// repeats itself exactly are no lattice.
func stepOf(sorted []float64) float64 {
	if len(sorted) < 40 {
		return 0
	}
	middle := sorted[len(sorted)/10 : len(sorted)*9/10]
	same := 1e-9 * (math.Abs(middle[0]) + math.Abs(middle[len(middle)-1]))
	var gaps []float64
	for i := 1; i < len(middle); i++ {
		if g := middle[i] - middle[i-1]; g > same {
			gaps = append(gaps, g)
		}
	}
	if len(gaps) < 2 || 4*len(gaps) > len(middle) {
		return 0
	}
	slices.Sort(gaps)
	step := median(gaps[:1+len(gaps)/10])
	on := 0
	for _, g := range gaps {
		if n := math.Round(g / step); n >= 1 && math.Abs(g-n*step) <= nearLevel*step {
			on++
		}
	}
	if float64(on) < onLattice*float64(len(gaps)) {
		return 0
	}
	return step
}

// quantile of sorted values, NaN of none.
func quantile(sorted []float64, p float64) float64 {
	if len(sorted) == 0 {
		return math.NaN()
	}
	return sorted[int(p*float64(len(sorted)-1)+0.5)]
}

// median of values in any order, NaN of none.
func median(values []float64) float64 {
	sorted := slices.Clone(values)
	slices.Sort(sorted)
	n := len(sorted)
	if n == 0 {
		return math.NaN()
	}
	return (sorted[(n-1)/2] + sorted[n/2]) / 2
}
