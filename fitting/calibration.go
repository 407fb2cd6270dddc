package fitting

import (
	"math/rand/v2"
)

// Calibration is what a replicate takes for true about the measurement:
//
//	flow     = FlowScale * measured
//	pressure = PressureScale * measured(t + Delay) + PressureOffset
type Calibration struct {
	FlowScale, PressureScale float64
	PressureOffset           float64 // mmHg
	Delay                    float64 // s, positive where the measured pressure is late
	OutflowPressure          float64 // mmHg
}

// asMeasured takes the measurement at its word.
func asMeasured(pv float64) Calibration {
	return Calibration{FlowScale: 1, PressureScale: 1, OutflowPressure: pv}
}

// leastScale keeps a drawn scale positive; with an error of 40 %, the largest of
// the defaults, one draw in a million lies below.
const leastScale = 0.05

// draw takes systematic errors from normal distributions whose 95 % half-widths
// are given.
func (s Systematic) draw(rng *rand.Rand, pv float64) Calibration {
	normal := func(halfWidth float64) float64 { return halfWidth / z95 * rng.NormFloat64() }
	c := Calibration{
		FlowScale:       max(leastScale, 1+normal(s.Flow)),
		PressureScale:   max(leastScale, 1+normal(s.PressureScale)),
		PressureOffset:  normal(s.PressureOffset),
		Delay:           normal(s.Delay),
		OutflowPressure: pv + normal(s.OutflowPressure),
	}
	c.PressureOffset += s.PressurePivot * (1 - c.PressureScale)
	return c
}

// z95 is the half-width of the 95 % interval of a normal distribution, in
// standard deviations.
const z95 = 1.959963984540054
