package study

import (
	"math"

	"afterbeat/data"
	"afterbeat/tree/support"
)

// take fills the estimates with their values, as yet without doubt.
func (s *ForecastState) take(now, native drawn) {
	for _, e := range s.estimates() {
		*e.into = data.Estimate{Value: e.of(now, native), Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: noDraws}
		if why := missing(&s.CoupledState); why != "" {
			e.into.Identified, e.into.Why = false, why
		}
	}
	s.Against.Posing = support.CoupledPosing
	s.ValveOpenDraws = 0
	if s.ValveOpened {
		s.ValveOpenDraws = 1
	}
}

// drawnEstimate is an estimate of a state, as a function of a draw's numbers at
// its speed and natively.
type drawnEstimate struct {
	into *data.Estimate
	of   func(now, native drawn) float64
}

func (s *ForecastState) estimates() []drawnEstimate {
	c := &s.Against
	retained := func(i int) func(drawn, drawn) float64 {
		return func(now, native drawn) float64 { return ratio(now[i], native[i]) }
	}
	number := func(i int) func(drawn, drawn) float64 { return func(now, _ drawn) float64 { return now[i] } }
	change := func(i int) func(drawn, drawn) float64 {
		return func(now, native drawn) float64 { return now[i] - native[i] }
	}
	return []drawnEstimate{
		{&s.MeanPressure, number(drawnMean)},
		{&s.Output, number(drawnOutput)},
		{&s.PulsePressure, number(drawnPulse)},
		{&s.RetainedPulse, retained(drawnPulse)},
		{&s.EEPressure, number(drawnEEP)},
		{&s.SurplusEnergy, number(drawnSHE)},
		{&s.FillingPress, number(drawnFilling)},
		{&s.Resistance, retained(drawnResistance)},
		{&s.ValveOpenTime, number(drawnOpen)},
		{&s.PumpSwing, number(drawnSwing)},
		{&s.PressureChange, change(drawnMean)},
		{&s.OutputChange, change(drawnOutput)},
		{&s.InputPower, func(now, _ drawn) float64 { return now[drawnSteady] + now[drawnPulsatile] }},
		{&s.SteadyPower, number(drawnSteady)},
		{&s.PulsatilePower, number(drawnPulsatile)},
		{&c.RetainedPressure, retained(drawnPulse)},
		{&c.RetainedFlow, retained(drawnRootSwing)},
		{&c.RetainedPI, func(now, native drawn) float64 {
			return ratio(now[drawnRootSwing]/now[drawnOutput], native[drawnRootSwing]/native[drawnOutput])
		}},
		{&c.RetainedSHE, retained(drawnSHE)},
		{&c.RetainedPower, retained(drawnPulsatile)},
		{&c.FlowAmplitude, func(now, native drawn) float64 { return ratio(native[drawnRootSwing], now[drawnRootSwing]) }},
		{&c.PulsatilePower, func(now, native drawn) float64 { return ratio(native[drawnPulsatile], now[drawnPulsatile]) }},
		{&c.MeanPressureChange, change(drawnMean)},
	}
}

// ratio is a/b, NaN unless b is positive.
func ratio(a, b float64) float64 {
	if !(b > 0) {
		return math.NaN()
	}
	return a / b
}

// strokeVolumeRow is the row of the stroke volume in [Forecast.Mismatch].
const strokeVolumeRow = 2

// mismatch sets the native state of the model beside the average beat.
func (f *Forecast) mismatch() []Mismatch {
	b, n := f.Comparison.Fit.Beats, &f.Native
	mean, pulse := b.Pressure.Period.Mean(), measuredPulse(b)
	if cuff := f.Comparison.Fit.Cuff; cuff != nil {
		mean, pulse = cuff.MeanPressure(), cuff.Pulse()
	}
	period := b.Flow.Period.Duration()
	return []Mismatch{
		{"mean pressure", "mmHg", mean, n.Arterial.Mean},
		{"pulse pressure", "mmHg", pulse, n.CoupledState.PulsePressure()},
		{"stroke volume", "mL", b.Flow.Period.Mean() * period, n.Flow() * period},
		{"ejection time", "s", ejectionTime(b.Flow.Period), n.ValveOpen},
	}
}

// measuredPulse is the pulse pressure of the average beat, mmHg.
func measuredPulse(b Beats) float64 {
	low, high := b.Pressure.Period.Extremes()
	return high - low
}

// held lists what is the same at every speed. What is not identified keeps its
// interval.
func (f *Forecast) held(outflow data.Origin) []ForecastHeld {
	k := f.nominal
	l := k.Load
	still := func(v float64) data.Estimate {
		return data.Estimate{Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "held"}
	}
	var all []ForecastHeld
	add := func(quantity, unit string, e data.Estimate, o data.Origin) {
		all = append(all, ForecastHeld{quantity, unit, e, o})
	}
	if !f.match.byResistance() {
		add("R", "mmHg s/mL", still(l.R*f.match.factor), data.Estimated)
	}
	add("C", "mL/mmHg", still(l.C), data.Estimated)
	if l.Kind != support.WK2 {
		add("Zc", "mmHg s/mL", still(l.Zc), data.Estimated)
	}
	if l.Kind == support.WK4S || l.Kind == support.WK4P {
		add("L", "mmHg s2/mL", still(l.L), data.Estimated)
	}
	add("outflow pressure", "mmHg", still(l.OutflowPressure), outflow)
	add("heart rate", "1/min", still(60/k.Ventricle.Period), data.Measured)
	for _, p := range f.Ventricle {
		if p.Symbol == "Emax" {
			e := p.Estimate
			if e.Identified {
				e.Total, e.Random, e.Why = data.NoInterval(), data.NoInterval(), "held"
			}
			add("contractility, Emax", p.Unit, e, p.Origin)
		}
	}
	switch f.match.what {
	case MatchFlow:
		add("mean flow", "L/min", still(litresPerMinute*k.Filling.Flow), data.Estimated)
	case MatchPressure:
		add("mean pressure", "mmHg", still(f.Native.Arterial.Mean), data.Estimated)
	}
	return all
}
