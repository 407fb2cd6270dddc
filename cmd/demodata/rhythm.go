package main

import (
	"math"

	"afterbeat/data/demo"
)

// How the beats differ from one another. The values are invented.
const (
	runIn = 30 // beats before the recording, so that nothing is left of the start

	breathVolume = 0.04  // swing of the stroke volume with breathing, relative
	breathPeriod = 0.02  // swing of the period, relative
	closing      = 1.0   // mL that flow back while the valve closes
	closingTime  = 0.035 // s

	prematureAt       = 0.62 // of a period after the onset before it
	prematureVolume   = 0.45 // of a usual stroke volume
	prematureEjection = 0.8  // of a usual ejection time
	strongerVolume    = 1.3  // of a usual stroke volume: the beat after the pause
)

// beat is one beat of the heart.
type beat struct{ onset, volume, ejection float64 } // s, mL (net), s

// beats are those of the run-in, of the recording, and the one whose onset ends
// it; the first begins at time 0. The pause after the premature beat is
// compensatory: the two intervals add up to two periods.
func beats(p demo.Patient) []beat {
	var all []beat
	onset := 0.0
	ectopic := runIn + p.Ectopic
	for k := range runIn + p.Beats + 1 {
		breath := breathing(p, onset)
		b := beat{onset: onset, volume: p.StrokeVolume * (1 + breathVolume*breath), ejection: p.Ejection}
		period := p.Period * (1 + breathPeriod*breath)
		switch k {
		case ectopic - 1:
			period *= prematureAt
		case ectopic:
			b.volume *= prematureVolume
			b.ejection *= prematureEjection
			period = 2*p.Period - (onset - all[k-1].onset)
		case ectopic + 1:
			b.volume *= strongerVolume
		}
		all = append(all, b)
		onset += period
	}
	return all
}

// breathing is -1 at the end of inspiration and 1 at that of expiration.
func breathing(p demo.Patient, t float64) float64 {
	return math.Sin(2 * math.Pi * p.Breathing * t)
}

// strokes are three to a beat: ejection, the flow that closes the valve, and
// none until the next onset.
func strokes(beats []beat) []stroke {
	var all []stroke
	for _, b := range beats {
		closes := b.onset + b.ejection
		all = append(all,
			stroke{from: b.onset, duration: b.ejection, volume: b.volume + closing},
			stroke{from: closes, duration: closingTime, volume: -closing},
			stroke{from: closes + closingTime, duration: 1, volume: 0})
	}
	return all
}
