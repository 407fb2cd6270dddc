package fitting

import "math"

// OutflowRow is a fit under another outflow pressure.
type OutflowRow struct {
	OutflowPressure float64 // mmHg
	Values          Values
	// Change of R and of C against the fit, relative: -0.3 for 30 % less; NaN
	// where the fit has none.
	R, C float64
}

// zeroFlowPressure is a published zero-flow pressure of the arterial system,
// mmHg: pooled 26.5, seen in an abstract only.
const zeroFlowPressure = 26.5

// outflow fits again with Pv 10 mmHg higher, 0, and the published zero-flow
// pressure, those left out that are the fit itself.
func (f *beatFit) outflow(r *Result) {
	f.search.near, f.search.tolerance = false, sharp
	for _, pv := range otherOutflows(r.OutflowPressure) {
		f.moments.set(f.source.flow, f.source.pressure, asMeasured(pv))
		f.search.run()
		r.addOutflow(pv, f.standing())
	}
}

// otherOutflows are outflow pressures beside the one of a fit, mmHg.
func otherOutflows(pv float64) (others []float64) {
	for _, other := range []float64{0, zeroFlowPressure, pv + 10} {
		if other != pv {
			others = append(others, other)
		}
	}
	return others
}

func (r *Result) addOutflow(pv float64, v Values) {
	r.OutflowSensitivity = append(r.OutflowSensitivity, OutflowRow{
		OutflowPressure: pv, Values: v, R: change(v.R, r.Values.R), C: change(v.C, r.Values.C),
	})
}

func change(to, from float64) float64 {
	if from == 0 {
		return math.NaN()
	}
	return to/from - 1
}
