package harmonic

import (
	"math"

	"afterbeat/data"
)

// Waves are the forward and the backward wave of an average beat.
type Waves struct {
	Zc                float64     // that they were told apart with, mmHg s/mL
	Forward, Backward data.Period // P+ and P-, mmHg; without samples where there is none
	// Magnitude is the reflection magnitude, the swing of P- over that of P+.
	Magnitude float64
	// ReturnTime is from the foot of P+ to the foot of P-, s, in [0, period).
	// NaN where a wave has no upstroke.
	ReturnTime float64
	Reason     string // why there are no waves; empty where there are
}

// WithoutWaves says why there are none.
func WithoutWaves(why string) Waves {
	return Waves{Zc: math.NaN(), Magnitude: math.NaN(), ReturnTime: math.NaN(), Reason: why}
}

// Separate tells the waves of a pressure, mmHg, and a flow, mL/s, of the same
// samples apart: P+- = (P +- Zc Q)/2. Zc must be positive; periods that differ in
// length panic.
func Separate(pressure, flow data.Period, zc float64) Waves {
	if len(pressure.Samples) != len(flow.Samples) || len(pressure.Samples) == 0 {
		panic("harmonic: Separate: pressure and flow differ in length, or are empty")
	}
	if !(zc > 0) || math.IsInf(zc, 0) {
		return WithoutWaves("the characteristic impedance is not positive")
	}
	n := len(pressure.Samples)
	w := Waves{
		Zc:       zc,
		Forward:  data.Period{Samples: make([]float64, n), Rate: pressure.Rate},
		Backward: data.Period{Samples: make([]float64, n), Rate: pressure.Rate},
	}
	for j, p := range pressure.Samples {
		w.Forward.Samples[j], w.Backward.Samples[j] = (p+zc*flow.Samples[j])/2, (p-zc*flow.Samples[j])/2
	}
	if swing(w.Forward) == 0 {
		return WithoutWaves("the forward wave is flat")
	}
	w.Magnitude = swing(w.Backward) / swing(w.Forward)
	w.ReturnTime = math.Mod(Foot(w.Backward)-Foot(w.Forward)+pressure.Duration(), pressure.Duration())
	return w
}

func swing(p data.Period) float64 {
	low, high := p.Extremes()
	return high - low
}

const (
	// slopeHalf is the time on either side of a slope, s: less, and noise would
	// choose the steepest place.
	slopeHalf = 0.01
	// lookBack is how far before the steepest place the foot may lie, in periods.
	lookBack = 0.3
)

// Foot is where the tangent at the steepest rise meets the level of the lowest
// sample before it, s from the first sample; NaN for a flat trace.
func Foot(p data.Period) float64 {
	n := len(p.Samples)
	at := func(j int) float64 { return p.Samples[((j%n)+n)%n] }
	h := max(1, int(math.Round(slopeHalf*p.Rate)))
	steepest, slope := 0, 0.0
	for j := range n {
		if s := (at(j+h) - at(j-h)) * p.Rate / (2 * float64(h)); s > slope {
			steepest, slope = j, s
		}
	}
	if slope == 0 {
		return math.NaN()
	}
	lowest := at(steepest)
	for j := steepest - int(lookBack*float64(n)); j < steepest; j++ {
		lowest = min(lowest, at(j))
	}
	return float64(steepest)/p.Rate - (at(steepest)-lowest)/slope
}

// LeaveOut are the waves of the average of the beats with one block of successive
// beats left out in turn, for the interval of what is read off them. Fewer than
// two blocks have none.
func LeaveOut(pressure, flow [][]float64, rate, zc float64, block int) []Waves {
	n := len(pressure)
	if block < 1 || n/block < 2 {
		return nil
	}
	p, q := total(pressure), total(flow)
	var all []Waves
	for from := 0; from+block <= n; from += block {
		all = append(all, Separate(without(p, pressure, from, block, rate), without(q, flow, from, block, rate), zc))
	}
	return all
}

func total(beats [][]float64) []float64 {
	sum := make([]float64, len(beats[0]))
	for _, beat := range beats {
		for j, v := range beat {
			sum[j] += v
		}
	}
	return sum
}

// without is the average of all beats but a block.
func without(sum []float64, beats [][]float64, from, block int, rate float64) data.Period {
	p := data.Period{Samples: make([]float64, len(sum)), Rate: rate}
	for j, v := range sum {
		for _, beat := range beats[from : from+block] {
			v -= beat[j]
		}
		p.Samples[j] = v / float64(len(beats)-block)
	}
	return p
}
