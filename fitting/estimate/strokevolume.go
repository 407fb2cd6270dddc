package estimate

const indexRemark = "an index, not a compliance: 16 to 74 % above C on beats of known loads"

// ByStrokeVolume is stroke volume over pulse pressure, an index and no
// compliance: on half-sine beats of known loads it lies 16 to 74 % above C
// (Chemla et al. 1998, Am J Physiol 274:H500, found it near the area method in 31
// adults). The stroke volume is the net volume of a beat, mean flow times period.
func ByStrokeVolume(b Beat) Estimate {
	e := newEstimate(SVOverPP)
	q := b.output()
	low, high := b.Pressure.Extremes()
	switch {
	case q == 0 && !b.hasFlow():
		return e.without("it needs a flow, or a cardiac output")
	case !(q > 0):
		return e.without("a mean flow of %.3g makes no stroke", q)
	case !(high > low):
		return e.without("the pressure has no pulse")
	}
	e.Index = q * b.Pressure.Duration() / (high - low)
	e.Remark = indexRemark
	return e
}
