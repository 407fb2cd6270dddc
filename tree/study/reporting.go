package study

import (
	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/fitting"
	"afterbeat/tree/support"
)

// Reason says why the study has no answer: nothing of the recording has a pulse,
// or nothing could be estimated from it. nil where it has one.
func (s Study) Reason() *string {
	switch {
	case s.Fit != nil:
		return reason(s.Fit.Reason)
	case s.Beats != nil:
		return reason(s.Beats.NoPulse())
	}
	return nil
}

// FitReport reports the fits, as far as there are some; where the case names a
// model, that one alone.
func (s Study) FitReport() FitReport {
	f := *s.Fit
	r := FitReport{CheckReport: f.Beats.Check(s.Warnings()), Fits: []ModelReport{}, Estimators: []EstimatorReport{}}
	r.Reason = s.Reason()
	if f.Beats.Reason == "" {
		r.Beat = f.beatReport()
	}
	if f.Beats.FlowInfo.Channel >= 0 {
		r.FlowUnit = reason(f.Beats.flowUnit())
	}
	for _, one := range f.Results {
		if f.named() && one.Model != f.Results[f.Chosen].Model {
			continue
		}
		r.Fits = append(r.Fits, modelReport(one))
	}
	for _, e := range f.Estimators {
		r.Estimators = append(r.Estimators, estimatorReport(e))
	}
	r.Impedance, r.Waves = impedanceReport(f.Impedance), f.wavesReport()
	if f.Recommended.Model != "" {
		r.Recommended = &RecommendedReport{f.Recommended.Model, f.Recommended.Basis, f.Recommended.Why}
	}
	return r
}

func (f Fit) beatReport() *BeatReport {
	b := f.Beats
	some := b.some()
	r := &BeatReport{
		Samples: len(some.Period.Samples), Rate: Number(some.Period.Rate), Period: Number(some.Period.Duration()),
		Count: some.Count, MeanPressure: nan, MeanFlow: nan, EndMinusStart: nan, Delay: delayReport(b.Delay, f.Delay),
	}
	if b.Pressure.Count > 0 {
		r.MeanPressure, r.EndMinusStart = Number(b.Pressure.Period.Mean()), Number(b.Pressure.EndMinusStart)
	}
	if b.Flow.Count > 0 {
		r.MeanFlow = Number(b.Flow.Period.Mean())
	}
	return r
}

func modelReport(r fitting.Result) ModelReport {
	out := ModelReport{
		Model: r.Model.Name, Basis: r.Basis, Site: r.Site, Parameters: map[string]EstimateReport{},
		TotalResistance: estimateReport(r.TotalResistance), IntervalMethod: r.IntervalMethod,
		RMSE: Number(r.RMSE), SumOfSquares: Number(r.SumOfSquares), AICc: Number(r.AICc), BIC: Number(r.BIC),
		CriterionReason: reason(r.CriterionReason), Converged: r.Converged, Warnings: warningReports(r.Warnings),
	}
	for _, p := range r.Parameters {
		out.Parameters[p.Name] = estimateReport(p.Estimate)
	}
	if s := r.Span; s != nil {
		out.Span = &SpanReport{
			s.Runs, s.Samples, Number(s.Duration), Number(s.RMSE), Number(s.CorrelationTime), s.Blocks, Number(s.BlockLength),
		}
	}
	return out
}

// Report reports the whole study; the note in it is rendered with o.
func (s Study) Report(o casenote.Options) Report {
	r := Report{
		FitReport: s.FitReport(), Supported: []StateReport{}, Comparison: []ComparisonReport{},
		Sensitivity: []SensitivityReport{}, Ventricle: []VentricleReport{}, Note: Text(s.Note(), o),
	}
	for _, one := range s.Fit.Sensitivity {
		r.Sensitivity = append(r.Sensitivity, sensitivityReport(one, s.Fit.Results[s.Fit.Chosen].Model))
	}
	if s.Tree != nil {
		s.Tree.report(&r)
	}
	if s.Comparison != nil {
		s.Comparison.report(&r)
	}
	if s.Forecast != nil {
		s.Forecast.report(&r, siteOfFit(s.Fit.Beats.FlowInfo.Site))
	}
	return r
}

// report puts the comparison into the report.
func (c *Comparison) report(r *Report) {
	r.ComparisonReason = reason(c.Reason)
	if len(c.Answers) == 0 {
		return
	}
	site := siteOfFit(c.Fit.Beats.FlowInfo.Site)
	native := stateReport(c.Native, site)
	r.Native = &native
	r.Energy = &EnergyReport{Native: powerReport(c.Native)}
	for _, a := range c.Answers {
		for i, state := range a.Supported {
			r.Supported = append(r.Supported, stateReport(state, site))
			r.Comparison = append(r.Comparison, comparisonReport(a, i))
			r.Energy.Supported = append(r.Energy.Supported, powerReport(state))
		}
	}
}

func stateReport(s support.State, site data.Site) StateReport {
	return StateReport{
		Posing: s.Posing, Share: Number(s.Share), ByConstruction: s.ByConstruction, Site: site,
		Pressure: measuresReport(s.PressureMeasures), Flow: measuresReport(s.FlowMeasures), PumpFlow: Number(s.PumpFlow),
		EEP: estimateReport(s.EEP), SHE: estimateReport(s.SHE),
		MeanPressure: estimateReport(s.MeanPressure), PulsePressure: estimateReport(s.PulsePressure),
	}
}

func measuresReport(m beat.Measures) MeasuresReport {
	r := MeasuresReport{
		Mean: Number(m.Mean), Min: Number(m.Min), Max: Number(m.Max), Amplitude: Number(m.Amplitude),
		Harmonics: numbers(m.Harmonics), GoslingPI: Number(m.GoslingPI), PourcelotRI: Number(m.PourcelotRI),
		SystolicRatio: Number(m.SystolicRatio), FormFactor: Number(m.FormFactor), PowerIndex: Number(m.PulsatilePower),
		TimeToPeak: Number(m.TimeToPeak), MaxSlope: Number(m.MaxSlope), Augmentation: Number(m.Augmentation),
		Remarks: map[beat.Index]string{},
	}
	for _, i := range indices() {
		if why := m.Remark(i); why != "" {
			r.Remarks[i] = why
		}
	}
	return r
}

// indices lists the indices of a beat, in the order of tables.
func indices() []beat.Index {
	return []beat.Index{
		beat.GoslingPI, beat.PourcelotRI, beat.SystolicRatio, beat.FormFactor,
		beat.PulsatilePower, beat.TimeToPeak, beat.MaxSlope, beat.Augmentation,
	}
}

func comparisonReport(a support.Answer, i int) ComparisonReport {
	c := a.Comparisons[i]
	r := ComparisonReport{
		Posing: c.Posing, Share: Number(c.Share), Speed: nan, ByConstruction: c.ByConstruction,
		Root: rootReport(&c),
	}
	for _, h := range a.Held() {
		r.Held = append(r.Held, HeldReport{h.Quantity, Number(h.Value), h.Unit, h.Origin, nan, nan, true})
	}
	r.Matched, r.Changed = string(MatchFlow), []HeldReport{}
	return r
}

func rootReport(c *support.Comparison) RootComparison {
	return RootComparison{
		RetainedPressure: estimateReport(c.RetainedPressure), RetainedFlow: estimateReport(c.RetainedFlow),
		RetainedPI: estimateReport(c.RetainedPI), RetainedSHE: estimateReport(c.RetainedSHE),
		RetainedPower: estimateReport(c.RetainedPower), FlowAmplitude: estimateReport(c.FlowAmplitude),
		PulsatilePower: estimateReport(c.PulsatilePower), MeanPressure: estimateReport(c.MeanPressureChange),
	}
}

func powerReport(s support.State) PowerReport {
	r := PowerReport{
		Posing: s.Posing, Share: Number(s.Share), Speed: nan, Input: estimateReport(s.InputPower), Steady: estimateReport(s.SteadyPower),
		Pulsatile: estimateReport(s.PulsatilePower), Terms: map[string]Number{}, Balance: Number(s.Ledger.Balance()),
	}
	for _, t := range s.Ledger.Terms {
		r.Terms[t.Name] = Number(t.Steady + t.Pulsatile)
	}
	return r
}

func sensitivityReport(s Sensitivity, m fitting.Model) SensitivityReport {
	r := SensitivityReport{Assumption: s.Assumption, Change: s.Change, Values: map[string]Number{}, Percent: map[string]Number{}}
	for _, p := range m.Parameters() {
		r.Values[p.Name], r.Percent[p.Name] = Number(s.Values.Of(p.Name)), Number(s.Percent.Of(p.Name))
	}
	return r
}
