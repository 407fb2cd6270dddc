package fitting

import (
	"math"
	"math/rand/v2"

	"afterbeat/data"
)

// BasisMeans is the basis of a load whose resistance comes from mean values, and
// whose compliance from the decay of diastole or from the pulse pressure (package
// means): no wave was fitted.
const BasisMeans = "means"

// NewResult is a load found outside of this package, above pv mmHg, as yet without
// doubt: without a residual, and without criteria for the reason given.
func NewResult(m Model, basis string, v Values, site data.Site, pv float64, why string) Result {
	nan := math.NaN()
	r := Result{
		Model: m, Basis: basis, Site: site, Values: v, OutflowPressure: pv,
		SumOfSquares: nan, RMSE: nan, AICc: nan, BIC: nan, CriterionReason: why, Converged: true,
		TotalResistance: plain(m.Resistance(v)),
	}
	for _, s := range m.Parameters() {
		r.Parameters = append(r.Parameters, Parameter{Name: s.Name, Unit: s.Unit, Estimate: plain(v.Of(s.Name))})
	}
	return r
}

// WithReplicates is the result with the intervals of replicates, and the judgement
// of what they determine; without a replicate there is no interval, for the reason
// given.
func (r Result) WithReplicates(all Replicates, method, why string) Result {
	if len(all.Random) == 0 || len(all.Total) == 0 {
		r.withoutInterval(why)
		return r
	}
	r.Replicates, r.IntervalMethod = all, method
	r.takeIntervals()
	for i := range r.Parameters {
		doubtIf(&r.Parameters[i].Estimate, r.unsure(r.Parameters[i].Estimate))
	}
	doubtIf(&r.TotalResistance, r.unsure(r.TotalResistance))
	return r
}

// WithOutflow is the result with the values that it has under other outflow
// pressures, mmHg: 0, the published zero-flow pressure, and 10 mmHg more.
func (r Result) WithOutflow(at func(pv float64) Values) Result {
	for _, pv := range []float64{0, zeroFlowPressure, r.OutflowPressure + 10} {
		if pv == r.OutflowPressure {
			continue
		}
		v := at(pv)
		r.OutflowSensitivity = append(r.OutflowSensitivity, OutflowRow{OutflowPressure: pv, Values: v, R: change(v.R, r.Values.R), C: change(v.C, r.Values.C)})
	}
	return r
}

// OutflowWords tell what other outflow pressures would make of R and C.
func (r Result) OutflowWords() string { return r.outflowWords() }

// NewReplicate is an answer found outside of this package; flow is its average
// beat before FlowScale, without samples where there is no wave.
func NewReplicate(v Values, c Calibration, flow data.Period) Replicate {
	return Replicate{Values: v, Calibration: c, pool: &pool{mean: flow.Samples, beats: Beats{Rate: flow.Rate}}}
}

// Draw takes systematic errors from normal distributions about a measurement above
// pv mmHg.
func (s Systematic) Draw(rng *rand.Rand, pv float64) Calibration { return s.draw(rng, pv) }

// AsMeasured takes a measurement above pv mmHg at its word.
func AsMeasured(pv float64) Calibration { return asMeasured(pv) }

// Blocks is the length in beats of the blocks that are drawn for an interval, and
// the factor by which averages of drawn beats are moved away from the average; breath
// and period in s, breath 0: 4 s.
func Blocks(beats int, breath, period float64) (block int, inflation float64) {
	block = blockLength(beats, breath, period)
	return block, inflationOf(beats, block)
}

func inflationOf(beats, block int) float64 { return inflation(float64(beats) / float64(block)) }

// Percentiles is the 95 % interval, about a value, of what is computed of replicates.
func Percentiles(value float64, all []Replicate, of func(Values) float64) data.Interval {
	return percentiles(value, all, of)
}

// FewBeats is the number of beats below which blocks of beats say too little.
const FewBeats = fewBeats
