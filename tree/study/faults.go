package study

import (
	"fmt"
	"slices"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/fault"
)

// faults are those of a calibrated channel within the span, outside the excluded
// stretches; none of a single period, which is too short to judge.
func (t Intake) faults(ch data.Channel) []fault.Finding {
	if !pulsatile(ch.Quantity) || t.Case.OneBeat {
		return nil
	}
	values := slices.Clone(ch.Values)
	t.mask(values)
	return fault.Find(fault.Trace{Values: values, Rate: t.Grid.Rate, Quantity: ch.Quantity, Unit: unitOfValues(ch), Name: ch.Name})
}

// madeReady is a channel without what its faults make unusable, short holes filled,
// and nothing outside the span.
func (t Intake) madeReady(ch data.Channel) readyChannel {
	r := readyChannel{faults: t.faults(ch)}
	values := ch.Values
	for _, f := range r.faults {
		if f.Code == data.CodeAliased {
			values = fault.Unwrap(values, f.Number)
		}
	}
	whole, filled := beat.Bridge(withoutFaults(values, r.faults), t.Grid.Rate)
	r.values, r.filled = slices.Clone(whole), filled
	t.mask(r.values)
	return r
}

type readyChannel struct {
	values []float64
	filled int
	faults []fault.Finding
}

// withoutFaults is the values with NaN where a fault makes them unusable.
func withoutFaults(values []float64, found []fault.Finding) []float64 {
	for _, f := range found {
		if f.Unusable {
			values = fault.Without(values, f.Runs)
		}
	}
	return values
}

// Unusable counts the samples of channel i that faults make unusable.
func (t Intake) Unusable(i int) int {
	n := 0
	for _, f := range t.Faults[i] {
		if f.Unusable {
			n += f.Samples()
		}
	}
	return n
}

// faultWarnings are the faults of all channels as warnings.
func (t Intake) faultWarnings() []data.Warning {
	var out []data.Warning
	for i, found := range t.Faults {
		for _, f := range found {
			out = append(out, f.Warning(t.Channels[i].Name))
		}
	}
	return out
}

// faultWords says what was left out of each channel because of a fault.
func (t Intake) faultWords() []string {
	var out []string
	for i, found := range t.Faults {
		for _, f := range found {
			if f.Unusable {
				n := f.Samples()
				out = append(out, fmt.Sprintf("%d samples of %s (%.3g s), %s", n, t.Channels[i].Name, float64(n)/t.Grid.Rate, f.Code))
			}
		}
	}
	return out
}
