package estimate

// OfCuff are the estimates of all methods where the pressure is known by its mean
// and its pulse alone, mmHg, as a cuff reads them, and the flow of b by its wave:
// the pulse-pressure method and the index; the others need the wave of the pressure.
func OfCuff(b Beat, mean, pulse float64) []Estimate {
	var all []Estimate
	for _, name := range []string{Decay, DecayAsymptote, Area, TwoArea} {
		all = append(all, newEstimate(name).without("it needs the wave of the pressure"))
	}
	return append(all, pulseOfCuff(b, mean, pulse), volumeOfCuff(b, pulse), newEstimate(ZcModulus).without("it needs the wave of the pressure"))
}

func pulseOfCuff(b Beat, mean, pulse float64) Estimate {
	e := newEstimate(PulsePressure)
	q := b.output()
	if !(q > 0) || !(mean > b.OutflowPressure) {
		return e.without("the mean flow is not positive, or the mean pressure not above the outflow pressure")
	}
	e.R = (mean - b.OutflowPressure) / q
	c, why := NewMatcher(len(b.Flow.Samples), b.Flow.Rate, "wk2").Match(b.Flow.Samples, e.R, 0, pulse)
	if why != "" {
		return e.without("%s", why)
	}
	e.C, e.Tau = c, e.R*c
	return e
}

func volumeOfCuff(b Beat, pulse float64) Estimate {
	e := newEstimate(SVOverPP)
	if !(b.output() > 0) || !(pulse > 0) {
		return e.without("it needs a positive mean flow and a pulse")
	}
	e.Index, e.Remark = b.output()*b.Flow.Duration()/pulse, indexRemark
	return e
}
