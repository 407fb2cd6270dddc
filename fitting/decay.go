package fitting

import (
	"fmt"
	"math"

	"afterbeat/data"
)

// Estimator is an estimate by a method other than a fit, to stand beside the
// fits. What the method does not give, or could not, is NaN.
type Estimator struct {
	Name   string
	R      float64 // mmHg s/mL
	C      float64 // mL/mmHg
	Tau    float64 // s
	Reason string  // why there is no estimate; empty where there is one
}

// The part of the beat that Decay looks at, in fractions of the period before
// the foot. It ends short of the foot, where averaging beats of different
// length and the first of the inflow bend the trace, and begins late enough
// that the valve has shut and the waves of early diastole, which bias tau, have
// largely died down: systole takes less than half of a period and ends there
// even at 120 beats a minute.
const (
	decayFrom  = 0.35
	decayTo    = 0.05
	leastDecay = 4 // samples
)

// Decay estimates the time constant of late diastole from the straight line
//
//	ln(P - Pv) = a - t/tau
//
// by least squares (Frank 1899; Simon 1979), over the part of the period from
// 35 % to 5 % before the foot, the lowest sample. pv in mmHg. R and C are not
// known from pressure alone: see [Estimator.WithResistance]. Reason is set, and
// tau NaN, where pressure does not stay above pv or does not fall there.
func Decay(p data.Period, pv float64) Estimator {
	e := Estimator{Name: "decay", R: math.NaN(), C: math.NaN(), Tau: math.NaN()}
	n := float64(len(p.Samples))
	foot := 0
	for j, v := range p.Samples {
		if v < p.Samples[foot] {
			foot = j
		}
	}
	e.Tau, e.Reason = decay(p, pv, foot-int(math.Round(decayFrom*n)), foot-int(math.Round(decayTo*n)))
	return e
}

// WithResistance adds the total resistance, mmHg s/mL, and C = tau/R.
func (e Estimator) WithResistance(r float64) Estimator {
	if e.Reason == "" && !(r > 0 && finite(r)) {
		e.Reason = fmt.Sprintf("a resistance of %.3g mmHg s/mL gives no compliance", r)
		return e
	}
	if e.Reason == "" {
		e.R, e.C = r, e.Tau/r
	}
	return e
}

// decay is the time constant between samples from and to, both included, which
// may be negative: the beat is periodic.
func decay(p data.Period, pv float64, from, to int) (tau float64, reason string) {
	n := len(p.Samples)
	count := float64(to - from + 1)
	if count < leastDecay {
		return math.NaN(), fmt.Sprintf("%d samples of late diastole are too few", max(0, to-from+1))
	}
	var st, sy, stt, sty float64
	for j := from; j <= to; j++ {
		d := p.Samples[((j%n)+n)%n] - pv
		if !(d > 0) {
			return math.NaN(), fmt.Sprintf("pressure falls to the outflow pressure of %.3g mmHg or below", pv)
		}
		t, y := float64(j-from)/p.Rate, math.Log(d)
		st, sy, stt, sty = st+t, sy+y, stt+t*t, sty+t*y
	}
	slope := (count*sty - st*sy) / (count*stt - st*st)
	if !(slope < -1e-12) || !finite(slope) {
		return math.NaN(), "pressure does not fall in late diastole"
	}
	return -1 / slope, ""
}
