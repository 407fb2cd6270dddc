package study

import (
	"errors"

	"afterbeat/tree/support"
)

// ForecastWhatIf is the forecast of the nominal ventricle with one assumption
// moved. It is for a screen: it has no intervals, and never stands in a note.
type ForecastWhatIf struct {
	Assumption, Change string
	Native             ForecastState
	Speeds             []ForecastState // those of the forecast
	Reason             string          // why there are no states; empty where there are
}

// whatIfs are the assumptions that a screen may move, in its order.
var whatIfs = []string{"resistance R", "outflow-pressure", "output", "contractility, Emax"}

// moves lists the moves of a screen.
func (f *Forecast) moves() []forecastMove {
	if f.drawn == nil {
		return nil
	}
	var out []forecastMove
	all := f.forecastMoves(f.drawn, f.nominal)
	for _, name := range whatIfs {
		for _, m := range all {
			if m.assumption == name {
				out = append(out, m)
			}
		}
	}
	return out
}

// WhatIfs is how many what-ifs there are.
func (f *Forecast) WhatIfs() int { return len(f.moves()) }

// WhatIf computes what-if i, from 0, with waves of that many samples. It takes a
// few times as long as the states of one ventricle do, and panics where there is
// no i.
func (f *Forecast) WhatIf(i, samples int) (ForecastWhatIf, error) {
	m := f.moves()[i]
	out := ForecastWhatIf{Assumption: m.assumption, Change: m.change}
	native, err := m.patient.setUp(m.choice, m.slope, forecastTolerance)
	if errors.Is(err, support.ErrNotMet) {
		out.Reason = err.Error()
		return out, nil
	}
	if err != nil {
		return out, err
	}
	k, err := support.NewCoupled(f.supported(native))
	if err != nil {
		return out, err
	}
	before, err := k.At(0)
	if err != nil {
		return out, err
	}
	coupling := f.supported(native)
	if m.supported != nil {
		m.supported(&coupling)
	}
	if k, err = support.NewCoupled(coupling); err != nil {
		return out, err
	}
	for j, speed := range append([]float64{0}, f.speeds()...) {
		s, err := k.At(speed)
		if err != nil {
			return out, err
		}
		if j == 0 {
			s = before // what is moved on support only leaves it as it was
		}
		w, err := k.Waves(speed, samples)
		if err != nil {
			return out, err
		}
		state := ForecastState{CoupledState: s, Waves: w}
		state.take(drawnOf(&s), drawnOf(&before))
		if j == 0 {
			out.Native = state
			continue
		}
		out.Speeds = append(out.Speeds, state)
	}
	return out, nil
}
