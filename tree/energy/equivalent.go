package energy

import (
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// EEP is the energy-equivalent pressure int P Q dt / int Q dt, mmHg, of
// pressure p (mmHg) and flow q (mL/s).
//
// It is NaN unless mean flow is positive: EEP is energy per volume delivered,
// and nothing is delivered. An inverted flow channel would otherwise pass
// unseen, since the quotient does not change with the sign of flow.
func EEP(p, q data.Period) float64 { return p.Mean() + surplus(p, q) }

// SHE is the surplus haemodynamic energy 1333.22387415 (EEP - mean P), erg/cm³.
// It may be negative; NaN where [EEP] is.
func SHE(p, q data.Period) float64 { return unit.DynPerMmHg * surplus(p, q) }

// PercentPulsatility is 100 (EEP/mean P - 1), %. It is NaN where [EEP] is, and
// where mean pressure is not positive.
func PercentPulsatility(p, q data.Period) float64 {
	mean := p.Mean()
	if mean <= 0 {
		return math.NaN()
	}
	return 100 * surplus(p, q) / mean
}

// surplus is EEP - mean P = mean((P - mean P)(Q - mean Q))/mean Q, mmHg. Written
// so, no digits are lost where little of the pulse is left, and steady signals
// have none exactly.
func surplus(p, q data.Period) float64 {
	mustMatch(p, q)
	meanQ := q.Mean()
	if !(meanQ > 0) {
		return math.NaN()
	}
	p, q = pulse(p), pulse(q)
	pulseP, pulseQ := p.Mean(), q.Mean()
	sum := 0.0
	for j := range p.Samples {
		sum += (p.Samples[j] - pulseP) * (q.Samples[j] - pulseQ)
	}
	return sum / float64(len(p.Samples)) / meanQ
}

// pulse is p less its first sample: the same harmonics on a smaller mean, and
// exactly zero where p is steady.
func pulse(p data.Period) data.Period {
	d := data.Period{Samples: make([]float64, len(p.Samples)), Rate: p.Rate}
	for j, x := range p.Samples {
		d.Samples[j] = x - p.Samples[0]
	}
	return d
}

// mustMatch panics unless p and q are samples of the same instants.
func mustMatch(p, q data.Period) {
	if len(p.Samples) == 0 || len(p.Samples) != len(q.Samples) || p.Rate != q.Rate {
		panic("energy: pressure and flow are not sampled alike")
	}
}
