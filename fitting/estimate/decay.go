package estimate

import (
	"fmt"
	"math"

	"afterbeat/data"
)

// ByDecay estimates the time constant of late diastole from the straight line
//
//	ln(P - Pv) = a - t/tau
//
// by least squares (Frank 1899; Simon 1979), over the part of the period from
// 35 % to 5 % before the foot, the lowest sample, and after the flow has stopped;
// and C = tau/R where the mean flow is known. It does not apply where pressure
// does not stay above Pv, or does not fall, or the flow does not stop.
func ByDecay(b Beat) Estimate {
	e := newEstimate(Decay)
	s, why := b.late()
	if why != "" {
		return e.without("%s", why)
	}
	if e.Tau, why = decay(b.Pressure, b.OutflowPressure, s); why != "" {
		return e.without("%s", why)
	}
	return e.withResistance(b)
}

// decay is the time constant over a stretch.
func decay(p data.Period, pv float64, s stretch) (tau float64, why string) {
	count := float64(s.samples())
	if count < leastDiastole {
		return math.NaN(), fmt.Sprintf("%d samples of late diastole are too few", s.samples())
	}
	var st, sy, stt, sty float64
	for j := s.from; j <= s.to; j++ {
		d := at(p.Samples, j) - pv
		if !(d > 0) {
			return math.NaN(), fmt.Sprintf("pressure falls to the outflow pressure of %.3g mmHg or below", pv)
		}
		t, y := float64(j-s.from)/p.Rate, math.Log(d)
		st, sy, stt, sty = st+t, sy+y, stt+t*t, sty+t*y
	}
	slope := (count*sty - st*sy) / (count*stt - st*st)
	if !(slope < -1e-12) || math.IsInf(slope, 0) {
		return math.NaN(), "pressure does not fall in late diastole"
	}
	return -1 / slope, ""
}
