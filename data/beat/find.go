package beat

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data/unit"
)

// Limits of what is searched.
const (
	lowestRate  = 20.0 // Hz: a pulse wave has no onset below
	leastLength = 2.0  // s
	leastBeats  = 1
	// windowsAround is how many windows on either side share in the period.
	windowsAround = 2
	// silentWindows in a row without a period are a stretch without a pulse.
	silentWindows = 2
)

// Find finds the beats of a uniform trace sampled at rate, in Hz; NaN (and ±Inf)
// marks a sample that cannot be used. It works from 30 to 220 beats/min at 25 Hz
// to 2 kHz, whatever the unit, the offset, the drift and the sign of the trace,
// as long as the pulse goes upwards. Where it finds none, Found is false and
// Reason says why. A rate that is not positive panics.
func Find(values []float64, rate float64, q unit.Quantity) Pulse {
	return FindBy(Measured, values, rate, q)
}

// FindBy is [Find] by other criteria. By those of [Support] it finds a pulse of
// a few mmHg in noise; what is less than twice the noise is no pulse.
func FindBy(c Criteria, values []float64, rate float64, q unit.Quantity) Pulse {
	p := find(c, values, rate, q)
	if p.Used() > 0 {
		p.Breathing = p.breathing()
		p.Alternation = p.alternation()
		p.SecondPulse = p.twoPulses(values)
		p.takeSecond(values)
	}
	return p
}

// find is FindBy with one rhythm.
func find(c Criteria, values []float64, rate float64, q unit.Quantity) Pulse {
	if !(rate > 0) || math.IsInf(rate, 0) {
		panic("beat: Find: rate must be positive")
	}
	p := Pulse{Breathing: Breathing{math.NaN(), math.NaN()}, Criteria: c, Amplitude: math.NaN(), Noise: math.NaN(), Quantity: q, Rate: rate, Unusable: holes(values), Period: math.NaN(), PeriodCV: math.NaN()}
	p.Systolic, p.Diastolic, p.Mean = math.NaN(), math.NaN(), math.NaN()
	if p.Reason = unfit(values, rate, q); p.Reason != "" {
		return p
	}
	onsets, reason := onsets(c, values, rate)
	if reason != "" {
		p.Reason = reason
		return p
	}
	p.Found = true
	p.Beats = measure(values, onsets, rate)
	reject(c, p.Beats, values)
	p.Amplitude, p.Noise = pulseAndNoise(p.Beats, values)
	if p.PulseToNoise() < leastPulseToNoise {
		return p.none(fmt.Sprintf("the pulse, %.2g, is less than twice the noise, %.2g", p.Amplitude, p.Noise))
	}
	p.summarise()
	return p
}

// unfit says why the trace is not searched at all; empty where it is.
func unfit(values []float64, rate float64, q unit.Quantity) string {
	if q == unit.ECG || q == unit.Speed {
		return fmt.Sprintf("a channel of quantity %s has no pulse wave", q)
	}
	usable := 0
	low, high := math.Inf(1), math.Inf(-1)
	for _, v := range values {
		if finite(v) {
			usable++
			low, high = min(low, v), max(high, v)
		}
	}
	switch {
	case usable == 0:
		return "no usable sample"
	case high-low <= 1e-12*max(math.Abs(high), math.Abs(low)):
		return "flat"
	case rate < lowestRate:
		return fmt.Sprintf("already averaged over beats? sampled at %.4g Hz, and a pulse wave needs %g Hz or more", rate, lowestRate)
	case float64(usable) < leastLength*rate:
		return fmt.Sprintf("too few samples: %.2g s of usable ones, and at least %g s are needed", float64(usable)/rate, leastLength)
	}
	return ""
}

// onsets returns the onset of every beat, or says why there is no pulse.
func onsets(c Criteria, values []float64, rate float64) (onsets []float64, reason string) {
	t := newTrace(values, rate)
	fs := t.rateOfCoarse()
	windows, regular := t.periods()
	if c == Support {
		if faint, ok := t.faintPeriods(windows, regular); ok {
			if onsets = t.steady(faint); len(onsets) > leastBeats {
				return onsets, ""
			}
		}
	}
	y, ssf := t.slopeSum()
	var ends []int
	if regular {
		ends = withoutNoise(y, t.upstrokes(ssf, periodAt(windows, fs)), windows, fs)
	} else if ends = t.upstrokes(ssf, nil); !alike(y, ends, fs) {
		return nil, t.aperiodic(values)
	}
	onsets = t.feet(ends)
	if len(onsets) < leastBeats+1 {
		return nil, fmt.Sprintf("too few samples: %d onsets, and a beat needs two", len(onsets))
	}
	return onsets, ""
}

// withoutNoise drops the upstrokes of the stretches in which two windows in a
// row, or more, have no period and the upstrokes do not resemble one another: a
// transducer that hangs free.
func withoutNoise(y []float64, ends []int, windows []window, fs float64) []int {
	var out []int
	from := 0
	for i := 0; i < len(windows); i++ {
		first := i
		for i < len(windows) && windows[i].period == 0 {
			i++
		}
		if i-first < silentWindows {
			continue
		}
		quarter := (windows[first].to - windows[first].from) / 4
		begin, end := windows[first].from+quarter, windows[i-1].to-quarter
		if first == 0 {
			begin = 0
		}
		if i == len(windows) {
			end = len(y)
		}
		a, _ := slices.BinarySearch(ends, begin)
		b, _ := slices.BinarySearch(ends, end)
		if r, _ := likeness(y, ends[a:b], fs); len(r) >= leastUpstrokes && median(r) < leastAlike {
			out = append(out, ends[from:a]...)
			from = b
		}
	}
	return append(out, ends[from:]...)
}

// periodAt gives the period at a sample of the coarse trace, in samples: the
// median over the nearest windows that have one, so that a window which an
// artefact misleads counts for nothing.
func periodAt(windows []window, fs float64) func(i int) float64 {
	var at, periods []float64
	for _, w := range windows {
		if w.period > 0 {
			at = append(at, float64(w.from+w.to)/2)
			periods = append(periods, w.period*fs)
		}
	}
	counts := slices.Repeat([]bool{true}, len(periods))
	smooth := make([]float64, len(periods))
	for k := range periods {
		smooth[k] = median(around(periods, counts, k, windowsAround))
	}
	return func(i int) float64 {
		k, _ := slices.BinarySearch(at, float64(i))
		if k == len(at) || k > 0 && float64(i)-at[k-1] < at[k]-float64(i) {
			k--
		}
		return smooth[k]
	}
}
