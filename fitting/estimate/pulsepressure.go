package estimate

import (
	"math"

	"afterbeat/fitting"
)

// ByPulsePressure finds the C with which a two-element load of the total
// resistance, driven by the measured flow, has the measured pulse pressure
// (Stergiopulos, Meister and Westerhof 1994, Ann Biomed Eng 22:392). In a
// distributed linear model the method is published to be within 1 % at the
// ascending aorta, thoracic aorta and carotid, 7 % at the iliac artery.
func ByPulsePressure(b Beat) Estimate {
	e := newEstimate(PulsePressure)
	if !b.hasFlow() {
		return e.without("it needs the wave of the flow")
	}
	r, why := b.resistance()
	if why != "" {
		return e.without("%s", why)
	}
	low, high := b.Pressure.Extremes()
	c, why := MatchPulse(b, "wk2", 0, high-low)
	if why != "" {
		return e.without("%s", why)
	}
	e.R, e.C, e.Tau = r, c, r*c
	return e
}

// MatchPulse is the compliance with which a model, wk2 or wk3, of the total
// resistance of b and the characteristic impedance zc, driven by the flow of b,
// has the given pulse pressure, mmHg. The pulse falls as C grows, so the answer
// is bracketed: time constants from a thousandth of a beat to a thousand beats.
// why says why there is none.
func MatchPulse(b Beat, model string, zc, pulse float64) (c float64, why string) {
	total, why := b.resistance()
	if why != "" {
		return math.NaN(), why
	}
	m := NewMatcher(len(b.Flow.Samples), b.Flow.Rate, model)
	return m.Match(b.Flow.Samples, total-zc, zc, pulse)
}

// Matcher matches pulses of flows of one length and rate. It is not safe for
// concurrent use.
type Matcher struct {
	model     fitting.Model
	responder *fitting.Responder
	pressure  []float64
	period    float64
}

// NewMatcher plans for n samples at rate, Hz. It panics for a model that is
// neither wk2 nor wk3.
func NewMatcher(n int, rate float64, model string) *Matcher {
	m, ok := fitting.ByName(model)
	if !ok || (model != "wk2" && model != "wk3") {
		panic("estimate: NewMatcher: no model " + model)
	}
	return &Matcher{model: m, responder: fitting.NewResponder(n, rate), pressure: make([]float64, n), period: float64(n) / rate}
}

// Match is the compliance with which a load of R and Zc, driven by a flow, has a
// pulse pressure, mmHg; why says why there is none.
func (m *Matcher) Match(flow []float64, r, zc, pulse float64) (c float64, why string) {
	swing := func(logTau float64) float64 {
		l := fitting.Lumped{Model: m.model, Values: fitting.Values{R: r, C: math.Exp(logTau) / r, Zc: zc}}
		m.responder.Respond(m.pressure, l, flow, 0)
		low, high := math.Inf(1), math.Inf(-1)
		for _, v := range m.pressure {
			low, high = min(low, v), max(high, v)
		}
		return high - low
	}
	low, high := math.Log(m.period/1000), math.Log(m.period*1000)
	switch {
	case !(r > 0) || !(pulse > 0):
		return math.NaN(), "there is no pulse, or no resistance, to match with"
	case !(swing(low) > pulse):
		return math.NaN(), "the pulse is larger than that of the resistance alone"
	case !(swing(high) < pulse):
		return math.NaN(), "the pulse is smaller than that of the characteristic impedance alone"
	}
	// Illinois: a secant between the ends; the value of an end that stays twice is
	// halved.
	above, below, stayed := math.Log(swing(low)/pulse), math.Log(swing(high)/pulse), 0
	for range 100 {
		next := (low*below - high*above) / (below - above)
		if !(low < next && next < high) || high-low < 1e-10 {
			break
		}
		v := math.Log(swing(next) / pulse)
		if math.Abs(v) < 1e-12 {
			low, high = next, next
			break
		}
		if v > 0 {
			if stayed < 0 {
				below /= 2
			}
			low, above, stayed = next, v, -1
		} else {
			if stayed > 0 {
				above /= 2
			}
			high, below, stayed = next, v, 1
		}
	}
	return math.Exp((low+high)/2) / r, ""
}
