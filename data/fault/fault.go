package fault

import (
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// Trace is a channel on an even clock.
type Trace struct {
	Values   []float64 // NaN where a sample is missing
	Rate     float64   // Hz
	Quantity unit.Quantity
	Unit     string // of the values, for the words
	Name     data.Text
}

// Run is the samples From <= i < To.
type Run struct{ From, To int }

// Finding is a fault of a trace.
type Finding struct {
	Code   data.Code
	Number float64 // what Text names first, in its unit there
	Text   string  // what is the matter, with the number
	Cure   string
	// Runs are the samples that the fault touches, in order; none where it
	// touches all of them alike.
	Runs []Run
	// Unusable tells that the samples of Runs show something else than the patient.
	Unusable bool
}

// Samples counts the samples of the runs.
func (f Finding) Samples() int {
	n := 0
	for _, r := range f.Runs {
		n += r.To - r.From
	}
	return n
}

// Warning is the finding as a warning about a channel.
func (f Finding) Warning(channel data.Text) data.Warning {
	return data.Warning{Code: f.Code, Channel: channel, Text: f.Text, Cure: f.Cure}
}

// leastRate, in Hz, is the lowest at which a pulse can be seen.
const leastRate = 20.0

// Find finds the faults of a trace of pressure, flow or velocity, in the order of
// the package's page. It takes a time that grows with the samples. A trace without
// a usable sample, or all of one value, has no fault of these. The values are not
// changed. A rate that is not positive panics.
func Find(t Trace) []Finding {
	if !(t.Rate > 0) || math.IsInf(t.Rate, 0) {
		panic("fault: Find: rate must be positive")
	}
	s := measure(t.Values, t.Rate)
	if !(s.pulse > 0) {
		return nil
	}
	var out []Finding
	add := func(found ...Finding) {
		for _, f := range found {
			if f.Unusable {
				t.Values = Without(t.Values, f.Runs)
			}
		}
		out = append(out, found...)
	}
	if folded := t.aliased(); len(folded) > 0 {
		t.Values = Unwrap(t.Values, folded[0].Number)
		s = measure(t.Values, t.Rate)
		add(folded...)
	}
	add(t.flushed(s)...)
	add(t.spikes(s)...)
	held, period := t.held()
	add(held...)
	add(t.flat(s)...)
	if t.Rate < leastRate {
		return out
	}
	add(t.quantised(s)...)
	add(t.recalibrated(s)...)
	add(t.clipped(s, period)...)
	add(t.wallFiltered(s, period)...)
	add(t.drift(s)...)
	add(t.hum(s)...)
	return out
}

// Without is values with NaN in the runs; values is not changed.
func Without(values []float64, runs []Run) []float64 {
	out := slices.Clone(values)
	for _, r := range runs {
		for i := max(0, r.From); i < min(len(out), r.To); i++ {
			out[i] = math.NaN()
		}
	}
	return out
}

// seconds is the length of the trace.
func (t Trace) seconds() float64 { return float64(len(t.Values)) / t.Rate }

// samples is a time in samples, at least one.
func (t Trace) samples(seconds float64) int { return max(1, int(math.Round(seconds*t.Rate))) }
