package beat

import "math"

// Settings of the foot.
const (
	footSmoothing = 0.02 // s: a slope compares the means of two stretches of this length
	footLookback  = 0.3  // of the interval before: how far the lowest point may lie
	leastLookback = 0.15 // s
)

// feet returns the onset of each upstroke, in samples and parts of them; the
// nearest samples rise strictly. ends are the ends of the upstrokes in the
// coarse trace.
func (t *trace) feet(ends []int) []float64 {
	var onsets []float64
	for i, e := range ends {
		end := (e+1)*t.factor - 1
		interval := t.interval(ends, i)
		limit := 0
		if n := len(onsets); n > 0 {
			limit = sample(onsets[n-1]) + 1
		}
		if foot, ok := t.foot(end, interval, limit); ok {
			onsets = append(onsets, foot)
		}
	}
	return onsets
}

// interval is the median distance, in samples, between the upstrokes around
// number i.
func (t *trace) interval(ends []int, i int) float64 {
	from, to := max(0, i-5), min(len(ends)-1, i+5)
	var d []float64
	for k := from; k < to; k++ {
		d = append(d, float64((ends[k+1]-ends[k])*t.factor))
	}
	return median(d)
}

// foot finds the foot of the upstroke that ends near the sample end. No sample
// before limit is looked at. ok is false where there is no rise, and where the
// trace begins within it.
func (t *trace) foot(end int, interval float64, limit int) (foot float64, ok bool) {
	w := samplesIn(footSmoothing, t.rate)
	limit = max(limit, w)
	steepest, slope := 0, 0.0
	for i := max(limit, end-samplesIn(sumLength+sumSmoothing, t.rate)); i <= min(end+w, t.samples()-1-w); i++ {
		if s := t.slopeAt(i, w); s > slope {
			steepest, slope = i, s
		}
	}
	if slope == 0 {
		return 0, false
	}
	back := int(max(footLookback*interval, leastLookback*t.rate))
	lowest, level := steepest, t.levelAt(steepest, w)
	for i := steepest; i >= max(limit, steepest-back); i-- {
		if l := t.levelAt(i, w/2); l < level {
			lowest, level = i, l
		}
	}
	if lowest == w {
		return 0, false
	}
	tangent := float64(steepest) - (t.levelAt(steepest, w)-level)/slope
	return max(float64(lowest), min(float64(steepest), tangent)), true
}

// sample is the sample nearest to an onset.
func sample(onset float64) int { return int(math.Round(onset)) }

// slopeAt is the slope at sample i, per sample: the mean of the w samples after
// it less that of the w before, over their distance.
func (t *trace) slopeAt(i, w int) float64 {
	return (t.mean(i+1, i+1+w) - t.mean(i-w, i)) / float64(w+1)
}

// levelAt is the mean of the samples within h of sample i.
func (t *trace) levelAt(i, h int) float64 {
	return t.mean(max(0, i-h), min(t.samples(), i+h+1))
}
