package support

import (
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/unit"
	"afterbeat/tree/energy"
)

// Figures are the numbers of a state that a note quotes. Powers are those of
// the arterial side, mmHg mL/s.
type Figures struct {
	MeanPressure  data.Estimate // mmHg
	MaxPressure   data.Estimate // mmHg
	MinPressure   data.Estimate // mmHg
	PulsePressure data.Estimate // max - min of pressure, mmHg
	FlowSwing     data.Estimate // max - min of flow, mL/s
	// FlowPI is the Gosling pulsatility index of flow, (max - min)/mean.
	FlowPI data.Estimate
	// EEP (mmHg), SHE (erg/cm³) and PercentPulsatility (%): see package energy.
	EEP, SHE, PercentPulsatility data.Estimate
	// InputPower is SteadyPower and PulsatilePower together.
	InputPower, SteadyPower, PulsatilePower data.Estimate
}

// figure numbers the fields of [Figures].
type figure int

const (
	meanPressure figure = iota
	maxPressure
	minPressure
	pulsePressure
	flowSwing
	flowPI
	eep
	she
	percentPulsatility
	inputPower
	steadyPower
	pulsatilePower
	figureCount
)

// numbers are the values of [Figures] without their doubt.
type numbers [figureCount]float64

func (f *Figures) fields() [figureCount]*data.Estimate {
	return [figureCount]*data.Estimate{
		&f.MeanPressure, &f.MaxPressure, &f.MinPressure, &f.PulsePressure, &f.FlowSwing, &f.FlowPI,
		&f.EEP, &f.SHE, &f.PercentPulsatility, &f.InputPower, &f.SteadyPower, &f.PulsatilePower,
	}
}

func (f *Figures) numbers() numbers {
	var n numbers
	for i, e := range f.fields() {
		n[i] = e.Value
	}
	return n
}

// figuresOf takes the figures from a state's signals.
func figuresOf(s State) Figures {
	lowP, highP := s.Pressure.Extremes()
	lowQ, highQ := s.Flow.Extremes()
	n := numbers{
		meanPressure: s.Pressure.Mean(), maxPressure: highP, minPressure: lowP, pulsePressure: highP - lowP,
		flowSwing: highQ - lowQ, flowPI: s.FlowMeasures.GoslingPI,
		eep:                energy.EEP(s.Pressure, s.Flow),
		she:                energy.SHE(s.Pressure, s.Flow),
		percentPulsatility: energy.PercentPulsatility(s.Pressure, s.Flow),
		inputPower:         s.Power.Input, steadyPower: s.Power.Steady, pulsatilePower: s.Power.Pulsatile,
	}
	var f Figures
	for i, e := range f.fields() {
		*e = pointEstimate(n[i], "mean flow or mean pressure is not positive")
	}
	if why := s.FlowMeasures.Remark(beat.GoslingPI); f.FlowPI.Why != noReplicates && why != "" {
		f.FlowPI.Why = why
	}
	return f
}

// noReplicates is why a figure has no interval before replicates were pushed.
const noReplicates = "computed without replicates of a fit"

// pointEstimate is a value without an interval, and where it does not exist
// the reason.
func pointEstimate(v float64, undefined string) data.Estimate {
	e := data.Estimate{Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: noReplicates}
	if math.IsNaN(v) {
		e.Identified, e.Why = false, undefined
	}
	return e
}

// signal is what the figures need of one flow and of the pressure it meets.
type signal struct {
	meanP, lowP, highP float64 // mmHg
	meanQ, lowQ, highQ float64 // mL/s
	// product is mean((P - mean P)(Q - mean Q)): by Parseval the pulsatile power.
	product float64
}

// scaled is the signal of a linear load under [Scaled], left = 1-s: what lies
// about the means shrinks by the factor left.
func (s signal) scaled(left float64) signal {
	about := func(mean, x float64) float64 { return mean + left*(x-mean) }
	s.lowP, s.highP = about(s.meanP, s.lowP), about(s.meanP, s.highP)
	s.lowQ, s.highQ = about(s.meanQ, s.lowQ), about(s.meanQ, s.highQ)
	s.product *= left * left
	return s
}

// numbers gives the figures of a signal by the formulas of package energy.
func (s signal) numbers() numbers {
	surplus, index, percent := math.NaN(), math.NaN(), math.NaN()
	if s.meanQ > 0 {
		surplus, index = s.product/s.meanQ, (s.highQ-s.lowQ)/s.meanQ
	}
	if s.meanP > 0 {
		percent = 100 * surplus / s.meanP
	}
	return numbers{
		meanPressure: s.meanP, maxPressure: s.highP, minPressure: s.lowP, pulsePressure: s.highP - s.lowP,
		flowSwing: s.highQ - s.lowQ, flowPI: index,
		eep: s.meanP + surplus, she: unit.DynPerMmHg * surplus, percentPulsatility: percent,
		inputPower: s.meanP*s.meanQ + s.product, steadyPower: s.meanP * s.meanQ, pulsatilePower: s.product,
	}
}
