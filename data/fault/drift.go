package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
)

const (
	driftWindow   = 5.0  // s, at least
	driftWindows  = 24   // at most about
	leastDrifting = 5    // windows
	driftOfPulse  = 0.25 // of the pulse, over the recording
	driftScatter  = 4.0  // times the robust standard deviation about the line
)

// drift finds a level that rises or falls all through the recording.
func (t Trace) drift(s scale) []Finding {
	n := t.samples(max(driftWindow, t.seconds()/driftWindows))
	var at, level []float64
	for from := 0; from+n <= len(t.Values); from += n {
		if some := sample(t.Values[from:from+n], 2000); len(some) > 0 {
			at = append(at, (float64(from)+float64(n)/2)/t.Rate)
			level = append(level, quantile(some, 0.5))
		}
	}
	if len(at) < leastDrifting {
		return nil
	}
	slope, scatter := theilSen(at, level)
	change := slope * t.seconds()
	if math.Abs(change) < driftOfPulse*s.pulse || math.Abs(change) < driftScatter*scatter {
		return nil
	}
	return []Finding{{
		Code: data.CodeDrift, Number: 60 * slope,
		Text: fmt.Sprintf("the level drifts by %+.3g %s a minute, %+.3g over the recording, %.0f %% of the pulse", 60*slope, t.Unit, change, 100*math.Abs(change)/s.pulse),
		Cure: "if the patient did not change, zero the sensor and let it settle; else choose a shorter span (--from, --to)",
	}}
}

// theilSen is the median slope of all pairs, and 1.4826 times the median distance
// from the line through the medians, a standard deviation of normal errors.
func theilSen(x, y []float64) (slope, scatter float64) {
	var slopes []float64
	for i := range x {
		for j := range i {
			slopes = append(slopes, (y[i]-y[j])/(x[i]-x[j]))
		}
	}
	slope = median(slopes)
	rest := make([]float64, len(x))
	for i := range x {
		rest[i] = y[i] - slope*x[i]
	}
	middle := median(rest)
	for i, r := range rest {
		rest[i] = math.Abs(r - middle)
	}
	return slope, 1.4826 * median(rest)
}
