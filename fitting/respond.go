package fitting

import "afterbeat/data"

// Respond is the periodic pressure that a load makes of a periodic flow above
// the outflow pressure pv,
//
//	P = pv + irfft(rfft(Q) Z)
//
// with the real part only at the Nyquist bin of an even number of samples. It
// panics on a flow without samples. Where many flows of one length are answered,
// a [Responder] does it without allocating.
func Respond(l Load, flow data.Period, pv float64) data.Period {
	pressure := make([]float64, len(flow.Samples))
	NewResponder(len(flow.Samples), flow.Rate).Respond(pressure, l, flow.Samples, pv)
	return data.Period{Samples: pressure, Rate: flow.Rate}
}

// Responder computes responses to flows of one length and rate. It is not safe
// for concurrent use.
type Responder struct {
	plan     *transform
	rate     float64
	zero     []float64
	spectrum []complex128
	unused   []complex128
}

// NewResponder plans for n samples at rate, Hz. It panics if n < 1.
func NewResponder(n int, rate float64) *Responder {
	if n < 1 {
		panic("fitting: a response needs at least one sample")
	}
	return &Responder{
		plan: newTransform(n), rate: rate, zero: make([]float64, n),
		spectrum: make([]complex128, n/2+1), unused: make([]complex128, n/2+1),
	}
}

// Respond writes the pressure to dst, which may be flow itself. It allocates
// nothing.
func (r *Responder) Respond(dst []float64, l Load, flow []float64, pv float64) {
	r.plan.pair(r.spectrum, r.unused, flow, r.zero)
	r.apply(dst, l, r.spectrum, pv)
}

// apply multiplies a spectrum of flow by Z, in place, and writes the pressure.
func (r *Responder) apply(dst []float64, l Load, flow []complex128, pv float64) {
	for k := range flow {
		flow[k] *= l.Impedance(omega(k, r.plan.n, r.rate))
	}
	flow[0] += complex(pv, 0)
	r.plan.inverse(dst, flow)
}
