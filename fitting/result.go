package fitting

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/stat"

	"afterbeat/data"
)

// Parameter is one fitted parameter.
type Parameter struct {
	Name string // "R"
	Unit string // "mmHg s/mL"
	data.Estimate
}

// Result is a fit. Values and intervals of parameters that are not identified
// are there, and must not be shown without saying so.
type Result struct {
	Model      Model
	Basis      string // BasisBeat, BasisSpan
	Site       data.Site
	PerArea    bool
	Values     Values
	Parameters []Parameter
	// TotalResistance is Z(0), in the unit of R.
	TotalResistance data.Estimate
	IntervalMethod  string
	// Modelled is the pressure of the model, Residual measured less modelled,
	// over the average beat, mmHg.
	Modelled data.Period
	Residual []float64
	// Autocorrelation is that of the residual at lags of 0, 1, ... samples up to half
	// a beat, counted round its end; nil where there is no residual.
	Autocorrelation []float64
	SumOfSquares    float64 // of the residual, mmHg²
	RMSE            float64 // mmHg
	// AICc and BIC compare models fitted to the same beats; NaN with a reason.
	AICc, BIC       float64
	CriterionReason string
	OutflowPressure float64 // Pv of the fit, mmHg
	// OutflowSensitivity is the fit under other outflow pressures.
	OutflowSensitivity []OutflowRow
	Replicates         Replicates
	Converged          bool
	Span               *SpanInfo // of a fit to the whole span; else nil
	Evaluations        int       // of the reduced sum of squares, in the fit to the average beat
	Warnings           []data.Warning
}

// Load is the load with the fitted values.
func (r Result) Load() Lumped { return Lumped{Model: r.Model, Values: r.Values} }

// Parameter finds a parameter by name.
func (r Result) Parameter(name string) (Parameter, bool) {
	for _, p := range r.Parameters {
		if p.Name == name {
			return p, true
		}
	}
	return Parameter{}, false
}

// Identified tells whether the data determine every parameter.
func (r Result) Identified() bool {
	return len(r.Parameters) > 0 && !slices.ContainsFunc(r.Parameters, func(p Parameter) bool { return !p.Estimate.Identified })
}

// result is the fit to the average beat, as yet without doubt.
func (f *beatFit) result() Result {
	r := f.beats.blank(f.model, BasisBeat)
	r.take(f.values())
	r.Evaluations = f.evaluations
	pressure, _ := f.beats.Average()
	modelled := data.Period{Samples: make([]float64, len(pressure.Samples)), Rate: pressure.Rate}
	spectrum := slices.Clone(f.source.flow)
	for k := range spectrum {
		spectrum[k] *= f.model.Impedance(r.Values, f.moments.omega[k])
	}
	spectrum[0] += complex(r.OutflowPressure, 0)
	f.source.plan.inverse(modelled.Samples, spectrum)
	r.compare(pressure, modelled)
	r.Converged = f.converged && finite(r.SumOfSquares)
	return r
}

// blank is a result before there is one.
func (b Beats) blank(m Model, basis string) Result {
	return Result{Model: m, Basis: basis, Site: b.Site, PerArea: b.PerArea, OutflowPressure: b.OutflowPressure}
}

// take takes over the values, as yet without doubt.
func (r *Result) take(v Values) {
	r.Values = v
	for _, s := range r.Model.Parameters() {
		unit := s.Unit
		if r.PerArea {
			unit = s.PerArea
		}
		r.Parameters = append(r.Parameters, Parameter{Name: s.Name, Unit: unit, Estimate: plain(v.Of(s.Name))})
	}
	r.TotalResistance = plain(r.Model.Resistance(v))
}

// compare sets the modelled average beat against the measured one.
func (r *Result) compare(measured, modelled data.Period) {
	r.Modelled, r.Residual = modelled, make([]float64, len(measured.Samples))
	for j, p := range measured.Samples {
		r.Residual[j] = p - modelled.Samples[j]
		r.SumOfSquares += r.Residual[j] * r.Residual[j]
	}
	r.RMSE = math.Sqrt(r.SumOfSquares / float64(len(r.Residual)))
	r.Autocorrelation = autocorrelation(r.Residual)
}

// plain is an estimate whose doubt is not known yet.
func plain(v float64) data.Estimate {
	return data.Estimate{Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true}
}

// withoutInterval says why there is none.
func (r *Result) withoutInterval(why string) {
	r.IntervalMethod = IntervalNone
	r.Replicates = Replicates{}
	for i := range r.Parameters {
		r.Parameters[i].Why = why
	}
	r.TotalResistance.Why = why
}

// takeIntervals reads the intervals off the replicates.
func (r *Result) takeIntervals() {
	for i := range r.Parameters {
		p := &r.Parameters[i]
		of := func(v Values) float64 { return v.Of(p.Name) }
		p.Random, p.Total = percentiles(p.Value, r.Replicates.Random, of), percentiles(p.Value, r.Replicates.Total, of)
	}
	t := &r.TotalResistance
	t.Random, t.Total = percentiles(t.Value, r.Replicates.Random, r.Model.Resistance), percentiles(t.Value, r.Replicates.Total, r.Model.Resistance)
}

// percentiles is the 95 % interval about a value of 0 or more: the distances of
// the percentiles 2.5 and 97.5 of the replicates from their median, laid about
// the value. Drift, or a rhythm that changes, can shift all replicates together;
// that shift is no doubt about the value.
func percentiles(value float64, replicates []Replicate, of func(Values) float64) data.Interval {
	all := make([]float64, len(replicates))
	for i, one := range replicates {
		if all[i] = of(one.Values); math.IsNaN(all[i]) {
			return data.NoInterval()
		}
	}
	slices.Sort(all)
	quantile := func(p float64) float64 { return stat.Quantile(p, stat.LinInterp, all, nil) }
	shift := value - quantile(0.5)
	if !finite(shift) {
		return data.NoInterval()
	}
	return data.Interval{Low: max(0, quantile(0.025)+shift), High: max(0, quantile(0.975)+shift)}
}
