package estimate

// ByArea estimates
//
//	C = int_t1^t2 (P - Pv) dt / (R (P1 - P2))
//
// over diastole, from where the flow stops to 5 % of the period before the foot
// (Liu, Brin and Yin 1986, Am J Physiol 251:H588): what leaves through R while no
// flow enters is what C gives up. P1 and P2 are means of three samples.
func ByArea(b Beat) Estimate {
	e := newEstimate(Area)
	r, why := b.resistance()
	if why != "" {
		return e.without("%s", why)
	}
	s, why := b.diastole()
	if why != "" {
		return e.without("%s", why)
	}
	s = stretch{s.from + 1, s.to - 1} // the three samples about each end lie in it
	if s.samples() < leastDiastole {
		return e.without("%d samples of diastole are too few", s.samples())
	}
	fall := b.level(s.from) - b.level(s.to)
	if !(fall > 0) {
		return e.without("pressure does not fall in diastole")
	}
	area := integral(b.Pressure.Samples, b.OutflowPressure, s, b.Pressure.Rate)
	if !(area > 0) {
		return e.without("pressure in diastole does not exceed the outflow pressure of %.3g mmHg", b.OutflowPressure)
	}
	e.R, e.Tau = r, area/fall
	e.C = e.Tau / r
	return e
}
