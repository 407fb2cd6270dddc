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
	for _, pv := range []float64{0, zeroFlowPressure, r.OutflowPressure + 10} {
		if pv == r.OutflowPressure {
			continue
		}
		f.moments.set(f.source.flow, f.source.pressure, asMeasured(pv))
		f.search.run()
		v := f.values()
		r.OutflowSensitivity = append(r.OutflowSensitivity, OutflowRow{
			OutflowPressure: pv, Values: v, R: change(v.R, r.Values.R), C: change(v.C, r.Values.C),
		})
	}
}

func change(to, from float64) float64 {
	if from == 0 {
		return math.NaN()
	}
	return to/from - 1
}
