package support

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/fitting"
	"afterbeat/tree/energy"
)

// State is a load in periodic state: the flow that enters it, the pressure it
// answers with, and what the two carry.
type State struct {
	Posing    Posing
	Share     float64     // of the pump in the mean flow, 0..1
	Flow      data.Period // into the arteries, mL/s
	Pressure  data.Period // at the same place, mmHg
	PumpFlow  float64     // steady, share times mean flow, mL/s
	ValveFlow float64     // mean of what still passes the valve, mL/s
	Threshold float64     // q0 of the late valve, mL/s; 0 under other posings

	FlowMeasures, PressureMeasures beat.Measures
	Figures
	Power energy.Power
	// Ledger is filled for a [fitting.Lumped] load of model wk2 or wk3.
	Ledger energy.Ledger
	// ByConstruction is true where the retained pulse follows from the posing.
	ByConstruction bool
	Warnings       []data.Warning
}

// Native is the state of a load under its native flow, mL/s, against the
// outflow pressure pv, mmHg. A mean flow that is not positive leaves what needs
// one undefined, and is warned of.
func Native(l fitting.Load, flow data.Period, pv float64) State {
	s := stateOf(l, flow, pv)
	s.Posing, s.ValveFlow = NativePosing, flow.Mean()
	if mean := flow.Mean(); !(mean > 0) {
		s.Warnings = append(s.Warnings, data.Warning{
			Code: data.CodeNegativeFlow,
			Text: fmt.Sprintf("mean flow is %.4g mL/s: no energy-equivalent pressure, and no share for a pump to take", mean),
			Cure: "check the sign of the flow channel (--invert) and its zero (--offset)",
		})
	}
	return s
}

// Supported is the state of the same load when a steady pump takes a share, 0 to
// 1, of the mean flow. It is an error where the share is out of range, the
// posing takes none, or mean flow is not positive.
func Supported(l fitting.Load, flow data.Period, pv float64, posing Posing, share float64) (State, error) {
	states, err := Sweep(l, flow, pv, posing, []float64{share})
	if err != nil {
		return State{}, err
	}
	return states[0], nil
}

// Sweep is [Supported] at each of the shares, in their order.
func Sweep(l fitting.Load, flow data.Period, pv float64, posing Posing, shares []float64) ([]State, error) {
	if err := check(flow, posing, shares); err != nil {
		return nil, err
	}
	mean := flow.Mean()
	states := make([]State, len(shares))
	for i, share := range shares {
		root, threshold := pose(flow, posing, share)
		s := stateOf(l, root, pv)
		s.Posing, s.Share, s.Threshold = posing, share, threshold
		s.PumpFlow, s.ValveFlow = share*mean, (1-share)*mean
		s.ByConstruction = posing.ByConstruction()
		states[i] = s
	}
	return states, nil
}

// stateOf solves the load for a flow and measures both.
func stateOf(l fitting.Load, flow data.Period, pv float64) State {
	pressure := respond(l, flow, pv)
	s := State{
		Flow: flow, Pressure: pressure,
		FlowMeasures: beat.Measure(flow), PressureMeasures: beat.Measure(pressure),
		Power: energy.PowerOf(pressure, flow),
	}
	s.Figures = figuresOf(s)
	if lumped, ok := l.(fitting.Lumped); ok {
		s.Ledger = ledger(lumped, pressure, flow, pv, s.Power.Input)
		s.Warnings = s.Ledger.Warnings()
	}
	return s
}

// respond is [fitting.Respond], taken about the first sample of flow, so that a
// steady flow meets an exactly steady pressure.
func respond(l fitting.Load, flow data.Period, pv float64) data.Period {
	first := flow.Samples[0]
	pulse := data.Period{Samples: make([]float64, len(flow.Samples)), Rate: flow.Rate}
	for j, x := range flow.Samples {
		pulse.Samples[j] = x - first
	}
	pressure := fitting.Respond(l, pulse, 0)
	for j := range pressure.Samples {
		pressure.Samples[j] += pv + l.Resistance()*first
	}
	return pressure
}
