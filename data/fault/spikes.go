package fault

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
)

const (
	spikeWindow  = 0.020 // s
	spikeTimes   = 10.0  // the 98th percentile of what samples differ by
	spikeOfPulse = 0.25
)

// spikes finds single values that stand out of their neighbours.
func (t Trace) spikes(s scale) []Finding {
	half := max(1, int(spikeWindow*t.Rate/2))
	limit := max(spikeTimes*t.usualDistance(half), spikeOfPulse*s.pulse, 3*s.step)
	var runs []Run
	most := 0.0
	window := make([]float64, 0, 2*half+1)
	for i, v := range t.Values {
		if t.near(i, half+1, limit) {
			continue
		}
		d := math.Abs(v - medianAround(t.Values, i, half, window))
		if !(d > limit) {
			continue
		}
		most = max(most, d)
		if n := len(runs); n > 0 && runs[n-1].To == i {
			runs[n-1].To++
		} else {
			runs = append(runs, Run{i, i + 1})
		}
	}
	if len(runs) == 0 {
		return nil
	}
	f := Finding{Code: data.CodeSpikes, Number: float64(len(runs)), Runs: runs, Unusable: true}
	f.Text = fmt.Sprintf("%s of up to %.3g %s, %.1f times the pulse, of a few samples each", counted(len(runs), "spike", "spikes"), most, t.Unit, most/s.pulse)
	f.Cure = "the samples are left out and filled by straight lines; look for a loose contact or for electrical cautery"
	return []Finding{f}
}

// near tells whether a sample is within limit of one of the two that are away from it:
// no spike then, and no need of a median.
func (t Trace) near(i, away int, limit float64) bool {
	if i < away || i+away >= len(t.Values) {
		return false
	}
	v := t.Values[i]
	return math.Abs(v-t.Values[i-away]) <= limit || math.Abs(v-t.Values[i+away]) <= limit
}

// usualDistance is the 98th percentile of the distances of samples from the median
// around them.
func (t Trace) usualDistance(half int) float64 {
	window := make([]float64, 0, 2*half+1)
	var away []float64
	for i := 0; i < len(t.Values); i += max(1, len(t.Values)/fewInAll) {
		if d := math.Abs(t.Values[i] - medianAround(t.Values, i, half, window)); !math.IsNaN(d) {
			away = append(away, d)
		}
	}
	slices.Sort(away)
	return quantile(away, 0.98)
}

// medianAround is the median of a sample and of half neighbours on either side; NaN
// where more than half of them are missing. window is room for them.
func medianAround(x []float64, i, half int, window []float64) float64 {
	for _, w := range x[max(0, i-half):min(len(x), i+half+1)] {
		if math.IsNaN(w) {
			continue
		}
		window = append(window, w)
		for k := len(window) - 1; k > 0 && window[k] < window[k-1]; k-- {
			window[k], window[k-1] = window[k-1], window[k]
		}
	}
	if len(window) <= half {
		return math.NaN()
	}
	return window[len(window)/2]
}
