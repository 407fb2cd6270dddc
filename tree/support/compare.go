package support

import (
	"math"

	"afterbeat/data"
)

// Comparison sets a supported state against the native one of the same load.
// Retained is supported over native, pure numbers. What does not exist is NaN
// with the reason in its Why.
type Comparison struct {
	Posing Posing
	Share  float64
	// ByConstruction is true where the ratios follow from the posing on any
	// linear load: an identity, without an interval, and no forecast.
	ByConstruction bool

	RetainedPressure data.Estimate // of pulse pressure
	RetainedFlow     data.Estimate // of max - min of flow
	RetainedPI       data.Estimate // of the Gosling index of flow
	RetainedSHE      data.Estimate // of surplus haemodynamic energy
	RetainedPower    data.Estimate // of the pulsatile power that enters
	// FlowAmplitude and PulsatilePower are native over supported.
	FlowAmplitude, PulsatilePower data.Estimate
	// MeanPressureChange is supported less native, mmHg.
	MeanPressureChange data.Estimate
}

// ratio numbers the estimates of a [Comparison].
type ratio int

const (
	retainedPressure ratio = iota
	retainedFlow
	retainedPI
	retainedSHE
	retainedPower
	flowAmplitude
	powerRatio
	pressureChange
	ratioCount
)

// ratios are the values of a [Comparison] without their doubt.
type ratios [ratioCount]float64

func (c *Comparison) fields() [ratioCount]*data.Estimate {
	return [ratioCount]*data.Estimate{
		&c.RetainedPressure, &c.RetainedFlow, &c.RetainedPI, &c.RetainedSHE, &c.RetainedPower,
		&c.FlowAmplitude, &c.PulsatilePower, &c.MeanPressureChange,
	}
}

// whyNot says why a ratio does not exist.
func (r ratio) whyNot() string {
	switch r {
	case flowAmplitude:
		return "no swing of flow is left to divide by"
	case powerRatio:
		return "no pulsatile power is left to divide by"
	case retainedSHE:
		return "the native surplus energy is not positive"
	case retainedPower:
		return "the native pulsatile power is not positive"
	default:
		return "there is no native pulse to divide by"
	}
}

// byConstruction is why a ratio of the scaled posing has no interval.
const byConstruction = "by construction"

// Compare sets a supported state against the native one. The intervals come
// with [Answer.WithIntervals].
func Compare(native, supported State) Comparison {
	c := Comparison{Posing: supported.Posing, Share: supported.Share, ByConstruction: supported.ByConstruction}
	values := compare(native.numbers(), supported.numbers())
	for i, e := range c.fields() {
		*e = pointEstimate(values[i], ratio(i).whyNot())
		if c.ByConstruction && !math.IsNaN(values[i]) {
			e.Why = byConstruction
		}
	}
	return c
}

func compare(native, supported numbers) ratios {
	retained := func(f figure) float64 { return quotient(supported[f], native[f]) }
	return ratios{
		retainedPressure: retained(pulsePressure),
		retainedFlow:     retained(flowSwing),
		retainedPI:       retained(flowPI),
		retainedSHE:      retained(she),
		retainedPower:    retained(pulsatilePower),
		flowAmplitude:    quotient(native[flowSwing], supported[flowSwing]),
		powerRatio:       quotient(native[pulsatilePower], supported[pulsatilePower]),
		pressureChange:   difference(supported[meanPressure], native[meanPressure]),
	}
}

// quotient is a/b, NaN unless b is positive.
func quotient(a, b float64) float64 {
	if !(b > 0) {
		return math.NaN()
	}
	return a / b
}

// difference is a - b, 0 where rounding alone tells them apart.
func difference(a, b float64) float64 {
	if math.Abs(a-b) <= 1e-12*math.Abs(a) {
		return 0
	}
	return a - b
}
