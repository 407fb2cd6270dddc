package energy

import (
	"math/cmplx"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// Power is the power that a flow carries at a place, mean over the period, in
// mmHg mL/s.
type Power struct {
	Input     float64 // mean PQ
	Steady    float64 // mean P mean Q
	Pulsatile float64 // sum over harmonics of 1/2 Re(P_k Q_k*); may be negative
}

// PowerOf computes the power of pressure p (mmHg) and flow q (mL/s). Input is
// taken from the samples and Pulsatile from the spectra, so that
// Input = Steady + Pulsatile (Parseval) checks one against the other.
func PowerOf(p, q data.Period) Power {
	mustMatch(p, q)
	n := len(p.Samples)
	var w Power
	for j := range p.Samples {
		w.Input += p.Samples[j] * q.Samples[j] / float64(n)
	}
	w.Steady = p.Mean() * q.Mean()
	pk, qk := pulse(p).Spectrum(), pulse(q).Spectrum()
	for k := 1; k < len(pk); k++ {
		w.Pulsatile += data.Weight(k, n) * real(pk[k]*cmplx.Conj(qk[k]))
	}
	return w
}

// CardiacPower is mean pressure (mmHg) times output (mL/s) in W: the
// MAP CO/450.04 of the wards, with CO in L/min (common practice; 1 mmHg L/min is 1/450.04 W).
func CardiacPower(meanPressure, output float64) float64 {
	return meanPressure * output * unit.MilliwattPerMmHgMLPerS / 1000
}
