package beat

import (
	"math"
	"slices"
)

// Signal is a channel to be cut into beats.
type Signal struct {
	Values []float64
	// Delay is by how much this channel is later than the leading one, s: it is
	// sampled that much later. Negative where it is earlier.
	Delay float64
}

// Ensemble is the used beats of several signals, each brought to the same
// number of samples.
type Ensemble struct {
	Rate float64 // Hz, that of the recording
	N    int     // samples of a beat: the median length; 0 without a beat
	// Used are the beats that were cut, by their samples in the leading channel.
	Used []Beat
	// Beats has the samples [signal][beat][sample], in the unit of the signal.
	Beats [][][]float64
	// EndMinusStart is, for each signal, the mean over the beats of value(To) -
	// value(From).
	EndMinusStart []float64
	// Dropped counts the used beats of which a signal, moved by its delay, lies
	// outside the recording or has an unusable sample.
	Dropped int
}

// Cut samples each used beat at From + j (To - From)/N, j = 0 .. N-1, where N is
// the median length of the used beats rounded to samples, linearly between
// samples; a signal with a delay, that much later. All signals are sampled at
// rate, in Hz.
func Cut(beats []Beat, rate float64, signals ...Signal) Ensemble {
	e := Ensemble{Rate: rate, Beats: make([][][]float64, len(signals)), EndMinusStart: make([]float64, len(signals))}
	for _, b := range used(beats) {
		if slices.ContainsFunc(signals, func(s Signal) bool { return !s.covers(b, rate) }) {
			e.Dropped++
		} else {
			e.Used = append(e.Used, b)
		}
	}
	if len(e.Used) == 0 {
		fill(e.EndMinusStart, math.NaN())
		return e
	}
	e.N = max(1, int(math.Round(median(each(e.Used, func(b Beat) float64 { return float64(b.Samples()) })))))
	for k, s := range signals {
		e.cut(k, s)
	}
	return e
}

// cut fills in signal k.
func (e *Ensemble) cut(k int, s Signal) {
	e.Beats[k] = make([][]float64, len(e.Used))
	store := make([]float64, len(e.Used)*e.N)
	shift := s.Delay * e.Rate
	for i, b := range e.Used {
		from := float64(b.From) + shift
		step := float64(b.Samples()) / float64(e.N)
		x := store[i*e.N : (i+1)*e.N : (i+1)*e.N]
		for j := range x {
			x[j] = between(s.Values, from+float64(j)*step)
		}
		e.Beats[k][i] = x
		e.EndMinusStart[k] += (between(s.Values, from+float64(b.Samples())) - x[0]) / float64(len(e.Used))
	}
}

// covers tells whether the signal has a usable sample wherever the beat, moved
// by the delay, needs one.
func (s Signal) covers(b Beat, rate float64) bool {
	shift := s.Delay * rate
	from, to := int(math.Floor(float64(b.From)+shift)), int(math.Ceil(float64(b.To)+shift))
	if from < 0 || to >= len(s.Values) {
		return false
	}
	return !slices.ContainsFunc(s.Values[from:to+1], func(v float64) bool { return !finite(v) })
}

// OneBeat takes all of values, and of others beside them, as exactly one
// period: sample N would be sample 0 again, so that end minus start is 0 by what
// the caller states. Signals of different lengths, and an empty one, panic; so
// does an unusable sample.
func OneBeat(values []float64, rate float64, others ...[]float64) Ensemble {
	n := len(values)
	if n == 0 {
		panic("beat: OneBeat: no samples")
	}
	whole := measured(values, 0, n)
	whole.Interval = float64(n) / rate
	e := Ensemble{Rate: rate, N: n, Used: []Beat{whole}}
	for _, x := range append([][]float64{values}, others...) {
		if len(x) != n {
			panic("beat: OneBeat: signals of different lengths")
		}
		if slices.ContainsFunc(x, func(v float64) bool { return !finite(v) }) {
			panic("beat: OneBeat: unusable sample")
		}
		e.Beats = append(e.Beats, [][]float64{slices.Clone(x)})
		e.EndMinusStart = append(e.EndMinusStart, 0)
	}
	return e
}

func fill(x []float64, v float64) {
	for i := range x {
		x[i] = v
	}
}
