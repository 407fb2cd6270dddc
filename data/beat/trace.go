package beat

import "math"

// trace is a channel made ready for the search: holes bridged, and a coarse
// copy at 100 to 200 Hz (or the rate itself, where that is lower).
type trace struct {
	rate   float64   // Hz
	sums   []float64 // sums[i] = sum of the bridged samples before i, less their first
	holes  []Run
	coarse []float64
	factor int // samples in one of coarse
}

// coarseRate is the rate, Hz, at or above which the search works.
const coarseRate = 100

// newTrace bridges the holes of values linearly. At least one sample is usable.
func newTrace(values []float64, rate float64) *trace {
	t := &trace{rate: rate, holes: holes(values), factor: max(1, int(rate/coarseRate))}
	filled := bridge(values, t.holes)
	t.sums = make([]float64, len(filled)+1)
	for i, v := range filled {
		t.sums[i+1] = t.sums[i] + v - filled[0]
	}
	t.coarse = make([]float64, len(filled)/t.factor)
	for k := range t.coarse {
		t.coarse[k] = t.mean(k*t.factor, (k+1)*t.factor)
	}
	return t
}

// mean of the bridged samples from <= i < to, less the first sample.
func (t *trace) mean(from, to int) float64 {
	return (t.sums[to] - t.sums[from]) / float64(to-from)
}

// samples is the length of the trace.
func (t *trace) samples() int { return len(t.sums) - 1 }

// rateOfCoarse is the rate of the coarse copy, Hz.
func (t *trace) rateOfCoarse() float64 { return t.rate / float64(t.factor) }

// holes returns the runs of samples that are not finite.
func holes(values []float64) []Run {
	var runs []Run
	for i, v := range values {
		if finite(v) {
			continue
		}
		if n := len(runs); n > 0 && runs[n-1].To == i {
			runs[n-1].To++
		} else {
			runs = append(runs, Run{i, i + 1})
		}
	}
	return runs
}

// bridge returns values with every hole filled linearly between its edges, and
// evenly at an end of the trace.
func bridge(values []float64, holes []Run) []float64 {
	if len(holes) == 0 {
		return values
	}
	out := append([]float64(nil), values...)
	for _, h := range holes {
		var before, after float64
		switch {
		case h.From == 0:
			after = values[h.To]
			before = after
		case h.To == len(values):
			before = values[h.From-1]
			after = before
		default:
			before, after = values[h.From-1], values[h.To]
		}
		step := (after - before) / float64(h.To-h.From+1)
		for i := h.From; i < h.To; i++ {
			out[i] = before + step*float64(i-h.From+1)
		}
	}
	return out
}

// bridgeable is the longest hole, s, that [Bridge] closes.
const bridgeable = 0.02

// Bridge returns values with every hole of up to 20 ms filled linearly between
// its edges, and how many samples it filled. [Find] rejects every beat that
// holds an unusable sample, however short the hole; in a recording that misses
// a sample here and there, call Bridge first, and use what it returns wherever
// the beats are used. Holes at the ends stay. values is not changed.
func Bridge(values []float64, rate float64) (bridged []float64, filled int) {
	var short []Run
	for _, h := range holes(values) {
		if float64(h.To-h.From) <= bridgeable*rate && h.From > 0 && h.To < len(values) {
			short = append(short, h)
			filled += h.To - h.From
		}
	}
	return bridge(values, short), filled
}

// smooth returns the running mean of x over width samples (odd; an even width
// is raised by one), the ends repeated.
func smooth(x []float64, width int) []float64 {
	h := width / 2
	if h == 0 || len(x) == 0 {
		return append([]float64(nil), x...)
	}
	n := len(x)
	out := make([]float64, n)
	sum := 0.0
	at := func(i int) float64 { return x[max(0, min(n-1, i))] }
	for i := -h; i <= h; i++ {
		sum += at(i)
	}
	for i := range out {
		out[i] = sum / float64(2*h+1)
		sum += at(i+h+1) - at(i-h)
	}
	return out
}

// samplesIn is a time in samples, at least one.
func samplesIn(seconds, rate float64) int { return max(1, int(math.Round(seconds*rate))) }
