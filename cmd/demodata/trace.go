package main

import (
	"math"
	"math/rand/v2"

	"afterbeat/data/demo"
)

// How a recording is spoilt. The values are invented.
const (
	lead = 0.15 // s recorded before the first onset
	tail = 0.40 // s recorded after the last

	chest = 1.0 // mmHg: swing of the pressure around the aorta with breathing

	pressureNoise = 0.3 // mmHg, SD, white
	wander        = 0.5 // mmHg, SD, first-order autoregressive
	wanderTime    = 0.2 // s, its correlation time
	velocityNoise = 1.0 // cm/s, SD, white
)

// trace is the recording before it is printed.
type trace struct {
	start    float64   // s after the first beat of the run-in
	time     []float64 // s
	pressure []float64 // mmHg, late by the delay
	velocity []float64 // cm/s
}

// clean is what sensors without fault would record, but for the delay.
func clean(p demo.Patient) trace {
	all := beats(p)
	l := newLoad(p, strokes(all))
	start := all[runIn].onset - lead
	n := 1 + int((all[len(all)-1].onset+tail-start)*p.Rate)
	area := math.Pi * p.Diameter * p.Diameter / 4
	tr := trace{start: start}
	for i := range n {
		t := float64(i) / p.Rate
		tr.time = append(tr.time, t)
		tr.pressure = append(tr.pressure, l.pressure(start+t-p.Delay))
		tr.velocity = append(tr.velocity, l.flow(start+t)/area)
	}
	return tr
}

// spoil adds breathing and noise. The chest presses least where the stroke is
// least, as when a person breathes in unaided.
func (tr trace) spoil(p demo.Patient) trace {
	random := rand.New(rand.NewPCG(p.Seed, 0))
	keep := math.Exp(-1 / (wanderTime * p.Rate))
	fresh := math.Sqrt(1 - keep*keep)
	slow := random.NormFloat64()
	spoilt := trace{start: tr.start, time: tr.time}
	for i, t := range tr.time {
		slow = keep*slow + fresh*random.NormFloat64()
		breath := chest * breathing(p, tr.start+t)
		spoilt.pressure = append(spoilt.pressure, tr.pressure[i]+breath+wander*slow+pressureNoise*random.NormFloat64())
		spoilt.velocity = append(spoilt.velocity, tr.velocity[i]+velocityNoise*random.NormFloat64())
	}
	return spoilt
}
