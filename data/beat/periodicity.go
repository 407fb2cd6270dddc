package beat

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/dsp/fourier"
)

// The search for a period.
const (
	shortestPeriod = 0.25 // s, 240 beats/min
	longestPeriod  = 2.5  // s, 24 beats/min
	windowLength   = 10.0 // s
	slopeSmoothing = 0.05 // s, width of each of two running means
	slopeSpan      = 0.04 // s, over which a slope is taken
	slopeDetrend   = 1.5  // s, running mean that is taken off the slope
	// leastPeriodicity and its growth in short windows: in 10 s of white
	// noise, of autoregressive noise or of a random walk the largest r stays
	// under 0.42, and it grows with one over the root of the length.
	leastPeriodicity = 0.55
	shortWindow      = 1.6 // s^(1/2)
	mostPeriodicity  = 0.9
	bestOfLags       = 0.8  // a period's r at least this part of the largest r
	neighbours       = 0.15 // and largest within this part of the period
	valley           = 0.5  // and after a fall of r to this part of it
	agreement        = 0.2  // two windows agree on the period within this part
	// The search in the level of a faint pulse.
	leastFaint   = 0.42 // of r, where most of manyWindows agree
	manyWindows  = 3
	bestOfFaint  = 0.7 // breathing that is left over favours some multiple of the period
	levelDetrend = 1.0 // s, width of each of two running means
	silent       = 0.1 // s; the slope over a longer hole is taken as nil
)

// window is a stretch of the coarse trace and its period, in s; 0 where it
// has none.
type window struct {
	from, to int
	period   float64
}

// periods finds the period of each window of the trace. ok tells whether the
// windows make a pulse: two in a row that agree, or the only one.
func (t *trace) periods() (windows []window, ok bool) {
	return t.periodsOf(t.slope(), bestOfLags, least)
}

// faintPeriods looks for the period in the trace itself, less its running mean,
// where the slope has none that is the same in most windows: noise has most of
// its slope at high frequencies, a faint pulse has little there.
func (t *trace) faintPeriods(windows []window, ok bool) ([]window, bool) {
	if ok && commonPeriod(windows) {
		return windows, true
	}
	limit := least
	if len(windows) >= manyWindows {
		limit = func(float64) float64 { return leastFaint }
	}
	faint, found := t.periodsOf(t.levels(), bestOfFaint, limit)
	if found && commonPeriod(faint) {
		return faint, true
	}
	return windows, ok && commonPeriod(windows)
}

// commonPeriod tells whether most windows have the same period, nearly.
func commonPeriod(windows []window) bool {
	usual := usualPeriod(windows)
	n := 0
	for _, w := range windows {
		if math.Abs(w.period-usual) <= agreement*usual {
			n++
		}
	}
	return 2*n > len(windows)
}

// levels is the coarse trace, smoothed, less its running mean.
func (t *trace) levels() []float64 {
	fs := t.rateOfCoarse()
	width := samplesIn(slopeSmoothing, fs)
	z := smooth(smooth(t.coarse, width), width)
	for i, m := range smooth(smooth(z, samplesIn(levelDetrend, fs)), samplesIn(levelDetrend, fs)) {
		z[i] -= m
	}
	return z
}

// periodsOf finds the period of each window of z, which must have an r of at
// least what least gives for the length of a window, and at least the part best of
// the largest one.
func (t *trace) periodsOf(z []float64, best float64, least func(seconds float64) float64) (windows []window, ok bool) {
	fs := t.rateOfCoarse()
	size := min(len(z), int(windowLength*fs))
	a := newAutocorrelation(size, best)
	for from := 0; ; from += max(1, size/2) {
		from = min(from, len(z)-size)
		w := window{from: from, to: from + size}
		if lag, r := a.period(z[w.from:w.to], fs); r >= least(float64(size)/fs) {
			w.period = lag / fs
		}
		windows = append(windows, w)
		if w.to == len(z) {
			break
		}
	}
	return windows, consistent(windows)
}

// least is the r that a period must reach in a window of the given length, s.
func least(seconds float64) float64 {
	return max(leastPeriodicity, min(mostPeriodicity, shortWindow/math.Sqrt(seconds)))
}

func consistent(windows []window) bool {
	for i, w := range windows {
		if w.period == 0 {
			continue
		}
		if len(windows) == 1 || i > 0 && math.Abs(windows[i-1].period-w.period) <= agreement*w.period {
			return true
		}
	}
	return false
}

// slope of the coarse trace, smoothed, less its running mean; nil over holes.
func (t *trace) slope() []float64 {
	fs := t.rateOfCoarse()
	width := samplesIn(slopeSmoothing, fs)
	y := smooth(smooth(t.coarse, width), width)
	h := samplesIn(slopeSpan/2, fs)
	z := make([]float64, len(y))
	for i := h; i+h < len(y); i++ {
		z[i] = y[i+h] - y[i-h]
	}
	for _, hole := range t.holes {
		if float64(hole.To-hole.From) > silent*t.rate {
			for i := max(0, hole.From/t.factor-width-h); i < min(len(z), hole.To/t.factor+width+h+1); i++ {
				z[i] = 0
			}
		}
	}
	for i, m := range smooth(z, samplesIn(slopeDetrend, fs)) {
		z[i] -= m
	}
	return z
}

// autocorrelation holds what the windows of one length share.
type autocorrelation struct {
	fft      *fourier.FFT
	padded   []float64
	spectrum []complex128
	sorted   []float64
	best     float64   // part of the largest r that a period must reach
	energy   []float64 // energy[i] = sum of the squares before i
}

func newAutocorrelation(size int, best float64) *autocorrelation {
	n := 1
	for n < 2*size {
		n *= 2
	}
	return &autocorrelation{
		fft: fourier.NewFFT(n), padded: make([]float64, n), spectrum: make([]complex128, n/2+1),
		sorted: make([]float64, size), best: best, energy: make([]float64, size+1),
	}
}

// period returns the lag of the period, in samples, and r there; 0 and 0 where
// the shortest lag that qualifies is not one of a pulse.
func (a *autocorrelation) period(z []float64, fs float64) (lag, r float64) {
	rs := a.of(z)
	if len(rs) < 3 {
		return 0, 0
	}
	first := min(len(rs)-1, max(1, int(shortestPeriod*fs)))
	highest := slices.Max(rs[first:])
	lowest := rs[0]
	for l := 1; l+1 < len(rs) && float64(l) <= longestPeriod*fs+1; l++ {
		lowest = min(lowest, rs[l])
		if rs[l] >= a.best*highest && lowest <= valley*rs[l] && largestAround(rs, l) {
			if l < first {
				return 0, 0
			}
			return float64(l) + vertex(rs[l-1], rs[l], rs[l+1]), rs[l]
		}
	}
	return 0, 0
}

// largestAround tells whether no lag near l, and neither of its neighbours, has
// a larger r.
func largestAround(rs []float64, l int) bool {
	near := max(1, int(math.Ceil(neighbours*float64(l))))
	return rs[l] > 0 && rs[l] > rs[l-1] && rs[l] >= slices.Max(rs[max(1, l-near):min(len(rs), l+near+1)])
}

// of returns r for the lags 0 .. len(z)/2, each normalised by the two stretches
// that it compares. Slopes beyond twice the 95th percentile are clipped, so
// that a single artefact does not decide.
func (a *autocorrelation) of(z []float64) []float64 {
	n := len(z)
	for i, v := range z {
		a.sorted[i] = math.Abs(v)
	}
	slices.Sort(a.sorted)
	limit := 2 * a.sorted[int(0.95*float64(n-1))]
	clear(a.padded)
	for i, v := range z {
		a.padded[i] = max(-limit, min(limit, v))
	}
	for i, v := range a.padded[:n] {
		a.energy[i+1] = a.energy[i] + v*v
	}
	x := a.fft.Coefficients(a.spectrum, a.padded)
	for k, c := range x {
		x[k] = complex(real(c)*real(c)+imag(c)*imag(c), 0)
	}
	products := a.fft.Sequence(a.padded, x)
	r := make([]float64, n/2+1)
	for l := range r {
		norm := math.Sqrt(a.energy[n-l] * (a.energy[n] - a.energy[l]))
		if norm > 0 {
			r[l] = products[l] / float64(len(a.padded)) / norm
		}
	}
	return r
}

// vertex of the parabola through three equally spaced values of which the
// middle one is largest, in steps from the middle.
func vertex(a, b, c float64) float64 {
	if d := a - 2*b + c; d < 0 {
		return (a - c) / (2 * d)
	}
	return 0
}
