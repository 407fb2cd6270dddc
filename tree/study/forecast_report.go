package study

import (
	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/tree/support"
)

// VentricleReport is a parameter of the ventricle.
type VentricleReport struct {
	Symbol  string `json:"symbol"`
	Meaning string `json:"meaning"`
	Unit    string `json:"unit"`
	EstimateReport
	Origin data.Origin `json:"origin"`
}

// PumpReport is the set of coefficients of the pump, each of which is assumed.
type PumpReport struct {
	Name       string      `json:"name"`
	Source     string      `json:"source"`
	Origin     data.Origin `json:"origin"`
	A          Number      `json:"a"`
	B          Number      `json:"b"`
	C          Number      `json:"c"`
	Resistance Number      `json:"Rc"`
	Inertance  Number      `json:"Lc"`
	Low        Number      `json:"lowest_speed"`
	High       Number      `json:"highest_speed"`
}

// CoupledReport is what a coupled state has beyond pressure and flow at the root.
type CoupledReport struct {
	Speed       Number         `json:"speed"`
	Settled     bool           `json:"settled"`
	Output      EstimateReport `json:"output"`
	Filling     EstimateReport `json:"filling_pressure"`
	ValveOpen   EstimateReport `json:"valve_open_s"`
	OpenDraws   Number         `json:"valve_opens_in_draws"`
	PumpFlow    RangeReport    `json:"pump_flow"`
	PumpSwing   EstimateReport `json:"pump_flow_swing"`
	ValveFlow   ValveReport    `json:"valve_flow"`
	Systemic    Number         `json:"systemic_flow"` // into the arteries, mL/s
	Loop        Number         `json:"loop_flow"`     // back through the aortic valve, mL/s
	Volume      VolumeReport   `json:"volume"`
	StrokeWork  Number         `json:"stroke_work"`
	BackFlow    bool           `json:"back_flow"`
	Suction     bool           `json:"suction"`
	Ventricular RangeReport    `json:"ventricular_pressure"`
}

// MismatchReport is a native quantity as measured and as the model has it.
type MismatchReport struct {
	Quantity string `json:"quantity"`
	Unit     string `json:"unit"`
	Measured Number `json:"measured"`
	Modelled Number `json:"modelled"`
}

// LeaningReport is the retained pulse with one assumption moved.
type LeaningReport struct {
	Assumption    string `json:"assumption"`
	Change        string `json:"change"`
	RetainedPulse Number `json:"retained_pulse_pressure"`
	Difference    Number `json:"difference"`
	PulsePressure Number `json:"pulse_pressure"`
	Beyond        bool   `json:"beyond_its_error"`
}

// PublishedReport is a number of the forecast beside a published range.
type PublishedReport struct {
	Name   string  `json:"name"`
	Unit   string  `json:"unit"`
	At     string  `json:"at"`
	Value  Number  `json:"value"`
	Low    Number  `json:"low"`
	High   Number  `json:"high"`
	Inside bool    `json:"inside"`
	Source string  `json:"source"`
	Reason *string `json:"reason"`
}

// ForecastReport is what the coupled states have in common.
type ForecastReport struct {
	Reason      *string               `json:"reason"`
	Draws       int                   `json:"draws"`
	MiddleSpeed Number                `json:"middle_speed"`
	ValveLimit  EstimateReport        `json:"valve_limit"`
	Mismatch    []MismatchReport      `json:"mismatch"`
	Sensitivity []LeaningReport       `json:"sensitivity"`
	Published   []PublishedReport     `json:"published"`
	Disproof    string                `json:"disproof"`
	Match       string                `json:"match"`
	Modulated   *ModulatedStudyReport `json:"modulated"`
}

// ModulatedStudyReport is what a modulated speed has beyond its states.
type ModulatedStudyReport struct {
	Words       string         `json:"words"`
	Locked      int            `json:"locked_beats"` // 0: free
	Window      Number         `json:"window_s"`
	MeanSpeed   Number         `json:"mean_speed"`
	BeatPulse   EstimateReport `json:"pulse_pressure_beat_mean"`
	SteadyPulse EstimateReport `json:"pulse_pressure_at_mean_speed"`
	Settled     bool           `json:"settled"`
}

// report puts the forecast into the report of a study: its states among the
// supported ones, that at speed 0 first.
func (f *Forecast) report(r *Report, site data.Site) {
	out := ForecastReport{
		Reason: reason(f.Reason), Draws: f.Draws, MiddleSpeed: nan, ValveLimit: estimateReport(f.ValveLimit),
		Mismatch: []MismatchReport{}, Sensitivity: []LeaningReport{}, Published: []PublishedReport{}, Disproof: f.Disproof, Match: string(f.Matching),
	}
	r.Forecast = &out
	if f.Reason != "" {
		out.ValveLimit = estimateReport(data.Estimate{Value: float64(nan), Total: data.NoInterval(), Random: data.NoInterval(), Why: f.Reason})
		return
	}
	out.MiddleSpeed = Number(f.Speeds[f.Middle].Speed)
	for _, m := range f.Mismatch {
		out.Mismatch = append(out.Mismatch, MismatchReport{m.Quantity, m.Unit, Number(m.Measured), Number(m.Modelled)})
	}
	for _, s := range f.Sensitivity {
		out.Sensitivity = append(out.Sensitivity, LeaningReport{s.Assumption, s.Change, Number(s.RetainedPulse), Number(s.Difference), Number(s.PulsePressure), s.Beyond})
	}
	for _, p := range f.Published {
		out.Published = append(out.Published, PublishedReport{p.Name, p.Unit, p.At, Number(p.Value), Number(p.Low), Number(p.High), p.Inside(), p.Source, reason(p.Reason)})
	}
	for _, p := range f.Ventricle {
		r.Ventricle = append(r.Ventricle, VentricleReport{p.Symbol, p.Meaning, p.Unit, estimateReport(p.Estimate), p.Origin})
	}
	p := f.Pump
	r.Pump = &PumpReport{p.Name, p.Origin, givenOr(p.Given["a"], data.Assumed), Number(p.A), Number(p.B), Number(p.C), Number(p.Resistance), Number(p.Inertance), Number(p.Low), Number(p.High)}
	for i := range len(f.Speeds) + 1 {
		s := f.state(i)
		r.Supported = append(r.Supported, s.stateReport(site))
		r.Energy.Supported = append(r.Energy.Supported, s.powerReport(60/f.heartRate()))
		if i > 0 {
			r.Comparison = append(r.Comparison, f.comparisonReport(s))
		}
	}
	if m := f.Modulated; m != nil {
		out.Modulated = &ModulatedStudyReport{m.Words, m.Locked, Number(m.Window), Number(m.State.Speed), estimateReport(m.BeatPulse), estimateReport(m.Steady.PulsePressure), m.State.Settled}
		state, against := m.State.stateReport(site), f.comparisonReport(&m.State)
		state.Posing, against.Posing, state.Coupled = support.ModulatedPosing, support.ModulatedPosing, nil
		r.Supported, r.Comparison = append(r.Supported, state), append(r.Comparison, against)
	}
}

// heartRate is the one that is held, 1/min.
func (f *Forecast) heartRate() float64 { return 60 / f.Comparison.Fit.Beats.Flow.Period.Duration() }

func (s *ForecastState) stateReport(site data.Site) StateReport {
	r := StateReport{
		Posing: support.CoupledPosing, Share: nan, Site: site,
		Pressure: waveReport(s.Waves.Pressure, s.Arterial), Flow: waveReport(s.Waves.RootFlow, s.RootFlow),
		PumpFlow: Number(s.CoupledState.PumpFlow.Mean),
		EEP:      estimateReport(s.EEPressure), SHE: estimateReport(s.SurplusEnergy),
		MeanPressure: estimateReport(s.MeanPressure), PulsePressure: estimateReport(s.PulsePressure),
	}
	c := &s.CoupledState
	r.Coupled = &CoupledReport{
		Speed: Number(s.Speed), Settled: s.Settled, Output: estimateReport(s.Output), Filling: estimateReport(s.FillingPress),
		ValveOpen: estimateReport(s.ValveOpenTime), OpenDraws: Number(s.ValveOpenDraws),
		PumpFlow: rangeReport(c.PumpFlow), PumpSwing: estimateReport(s.PumpSwing),
		ValveFlow: ValveReport{Number(c.ValveFlow.Mean), Number(c.ValveFlow.Max), c.ValveOpened, Number(c.ValveOpen)},
		Systemic:  Number(c.Flow()), Loop: Number(c.Loop),
		Volume: VolumeReport{Number(c.Volume.Min), Number(c.Volume.Max)}, StrokeWork: Number(c.StrokeWork),
		BackFlow: c.BackFlow(), Suction: c.Suction, Ventricular: rangeReport(c.Ventricular),
	}
	return r
}

// waveReport has the indices of the samples, with mean and extremes of the
// continuous beat; no indices where there are no samples.
func waveReport(wave data.Period, whole support.Range) MeasuresReport {
	r := MeasuresReport{
		Harmonics: []Number{}, GoslingPI: nan, PourcelotRI: nan, SystolicRatio: nan, FormFactor: nan,
		PowerIndex: nan, TimeToPeak: nan, MaxSlope: nan, Augmentation: nan, Remarks: map[beat.Index]string{},
	}
	if len(wave.Samples) > 0 {
		r = measuresReport(beat.Measure(wave))
	}
	r.Mean, r.Min, r.Max, r.Amplitude = Number(whole.Mean), Number(whole.Min), Number(whole.Max), Number(whole.Swing())
	return r
}

// powerReport is the mean power over a beat of a period, s.
func (s *ForecastState) powerReport(period float64) PowerReport {
	e := s.Energy
	per := func(energy float64) Number { return Number(energy / period) }
	return PowerReport{
		Posing: support.CoupledPosing, Share: nan, Speed: Number(s.Speed), Input: estimateReport(s.InputPower),
		Steady: estimateReport(s.SteadyPower), Pulsatile: estimateReport(s.PulsatilePower),
		Terms: map[string]Number{
			"mitral": per(e.Mitral), "aortic": per(e.Aortic), "cannula": per(e.Cannula), "Zc": per(e.Zc), "R": per(e.R), "outflow": per(e.Outflow),
		},
		Sources: map[string]Number{"filling": per(e.Filling), "ventricle": per(e.Ventricle), "pump": per(e.Pump)},
		Balance: Number(e.Balance()),
	}
}

func (f *Forecast) comparisonReport(s *ForecastState) ComparisonReport {
	r := ComparisonReport{Posing: support.CoupledPosing, Share: nan, Speed: Number(s.Speed), Root: rootReport(&s.Against)}
	r.Matched = string(f.Matching)
	for _, h := range f.Held {
		r.Held = append(r.Held, heldReport(h))
	}
	r.Changed = []HeldReport{
		heldReport(ForecastHeld{"filling pressure", "mmHg", s.FillingPress, data.Estimated}),
		heldReport(ForecastHeld{"resistance R over the native one", "", s.Resistance, data.Estimated}),
	}
	return r
}

func heldReport(h ForecastHeld) HeldReport {
	e := h.Estimate
	return HeldReport{h.Quantity, Number(e.Value), h.Unit, h.Origin, Number(e.Total.Low), Number(e.Total.High), e.Identified}
}
