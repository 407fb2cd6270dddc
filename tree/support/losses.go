package support

import (
	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/tree/energy"
)

// ledger says where the power goes that enters a lumped load of R and C in
// parallel behind series elements of impedance Zs. With Pd = P - Zs Q - Pv the
// pressure across R and C,
//
//	"Zc"       sum weight_k Re(Zs) |Q_k|²: Zc mean Q², or Zc mean (Q - QL)² of wk4p
//	"R"        mean Pd²/R
//	"outflow"  Pv mean Q
//
// of which the squared means are the steady part, and C and L give back what they
// take. The input is mean PQ. Nothing here uses the load's impedance behind Zs but
// through P, so that the balance checks it.
//
// Zc is a wave impedance: what is booked there travels on as a wave, and is no
// loss in blood. So on a lumped load only the pulsatile power that enters means
// something, not the terms that it is split into.
func ledger(l fitting.Lumped, p, q data.Period, pv, input float64) energy.Ledger {
	pk, qk := p.Spectrum(), q.Spectrum()
	meanQ := real(qk[0])
	steady := real(l.Model.Series(l.Values, 0))
	zc := energy.Term{Name: "Zc", Steady: steady * meanQ * meanQ}
	r := energy.Term{Name: "R", Steady: over(square(real(pk[0])-steady*meanQ-pv), l.Values.R)}
	for k := 1; k < len(qk); k++ {
		weight := data.Weight(k, len(q.Samples))
		zs := l.Model.Series(l.Values, q.Omega(k))
		zc.Pulsatile += weight * real(zs) * norm(qk[k])
		if 2*k == len(q.Samples) {
			// Samples do not show the quadrature part of this bin, and without
			// it Pd is not whole; but what enters R and C stays in R.
			r.Pulsatile += (real(pk[k]) - real(zs)*real(qk[k])) * real(qk[k])
		} else {
			r.Pulsatile += weight * over(norm(pk[k]-zs*qk[k]), l.Values.R)
		}
	}
	outflow := energy.Term{Name: "outflow", Steady: pv * meanQ}
	return energy.Ledger{Input: input, Terms: []energy.Term{zc, r, outflow}}
}

// over is what the mean square pressure p2 loses in r; a short loses nothing.
func over(p2, r float64) float64 {
	if r == 0 {
		return 0
	}
	return p2 / r
}

func square(x float64) float64 { return x * x }

// norm is |z|².
func norm(z complex128) float64 { return square(real(z)) + square(imag(z)) }
