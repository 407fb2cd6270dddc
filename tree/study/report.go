package study

import (
	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/tree/support"
)

// BeatReport describes the average beat.
type BeatReport struct {
	Samples       int         `json:"samples"`
	Rate          Number      `json:"sampling_hz"`
	Period        Number      `json:"period_s"`
	Count         int         `json:"count"`
	MeanPressure  Number      `json:"mean_pressure"`
	MeanFlow      Number      `json:"mean_flow"`
	EndMinusStart Number      `json:"end_minus_start_mmHg"`
	Delay         DelayReport `json:"delay_s"`
}

// ModelReport is one fitted model.
type ModelReport struct {
	Model           string                    `json:"model"`
	Basis           string                    `json:"basis"`
	Site            data.Site                 `json:"site"`
	Parameters      map[string]EstimateReport `json:"parameters"`
	TotalResistance EstimateReport            `json:"total_resistance"`
	IntervalMethod  string                    `json:"interval_method"`
	RMSE            Number                    `json:"rmse_mmHg"`
	SumOfSquares    Number                    `json:"sum_of_squares"`
	AICc            Number                    `json:"aicc"`
	BIC             Number                    `json:"bic"`
	CriterionReason *string                   `json:"criterion_reason"`
	Converged       bool                      `json:"converged"`
	Span            *SpanReport               `json:"span"` // null for the average beat
	Warnings        []WarningReport           `json:"warnings"`
}

// SpanReport says what a fit to the whole span rests on.
type SpanReport struct {
	Runs            int    `json:"runs"`
	Samples         int    `json:"samples"`
	Duration        Number `json:"duration_s"`
	RMSE            Number `json:"rmse_mmHg"`
	CorrelationTime Number `json:"correlation_time_s"` // null where the residual does not forget
	Blocks          int    `json:"blocks"`
	BlockLength     Number `json:"block_s"`
}

// EstimatorReport is one way to R, C or tau beside the fits.
type EstimatorReport struct {
	Name string `json:"name"`
	R    Number `json:"R"`
	C    Number `json:"C"`
	Tau  Number `json:"tau_s"`
	Zc   Number `json:"Zc"`
	// Index is stroke volume over pulse pressure, which is no compliance.
	Index     Number  `json:"index"`
	Asymptote Number  `json:"asymptote_mmHg"`
	Reason    *string `json:"reason"` // why the method does not apply
	Remark    *string `json:"remark"`
}

// RecommendedReport names the recommended fit and why.
type RecommendedReport struct {
	Model string `json:"model"`
	Basis string `json:"basis"`
	Why   string `json:"why"`
}

// FitReport is what `fit --json` prints: what check prints, and the fits.
type FitReport struct {
	CheckReport
	FlowUnit    *string            `json:"flow_unit"`
	Beat        *BeatReport        `json:"beat"`
	Fits        []ModelReport      `json:"fits"`
	Estimators  []EstimatorReport  `json:"estimators"`
	Impedance   []HarmonicReport   `json:"impedance"`
	Waves       *WavesReport       `json:"waves"`
	Recommended *RecommendedReport `json:"recommended"`
}

// MeasuresReport is a pressure or a flow over one beat.
type MeasuresReport struct {
	Mean          Number   `json:"mean"`
	Min           Number   `json:"min"`
	Max           Number   `json:"max"`
	Amplitude     Number   `json:"amplitude"`
	Harmonics     []Number `json:"harmonic_amplitudes"`
	GoslingPI     Number   `json:"gosling_pi"`
	PourcelotRI   Number   `json:"pourcelot_ri"`
	SystolicRatio Number   `json:"s_over_d"`
	FormFactor    Number   `json:"form_factor"`
	PowerIndex    Number   `json:"pulsatile_power_index"`
	TimeToPeak    Number   `json:"time_to_peak_s"`
	MaxSlope      Number   `json:"max_slope_per_s"`
	Augmentation  Number   `json:"augmentation_index"`
	// Remarks say why an index is null, or what to mind about it.
	Remarks map[beat.Index]string `json:"remarks"`
}

// StateReport is one state of the load: native, or under one share of a pump.
type StateReport struct {
	Posing         support.Posing `json:"posing"`
	Share          Number         `json:"share"`
	ByConstruction bool           `json:"by_construction"`
	Site           data.Site      `json:"site"`
	Pressure       MeasuresReport `json:"pressure"`
	Flow           MeasuresReport `json:"flow"`
	PumpFlow       Number         `json:"pump_flow"`
	EEP            EstimateReport `json:"eep"`
	SHE            EstimateReport `json:"she"`
	MeanPressure   EstimateReport `json:"mean_pressure"`
	PulsePressure  EstimateReport `json:"pulse_pressure"`
	// Coupled is what only the coupled posing has; null for the others.
	Coupled *CoupledReport `json:"coupled"`
}

// RootComparison sets a supported state against the native one at the root.
type RootComparison struct {
	RetainedPressure EstimateReport `json:"retained_pulse_pressure"`
	RetainedFlow     EstimateReport `json:"retained_pulse_flow"`
	RetainedPI       EstimateReport `json:"retained_gosling_pi_flow"`
	RetainedSHE      EstimateReport `json:"retained_she"`
	RetainedPower    EstimateReport `json:"retained_pulsatile_power_in"`
	FlowAmplitude    EstimateReport `json:"flow_amplitude_native_over_supported"`
	PulsatilePower   EstimateReport `json:"pulsatile_power_in_native_over_supported"`
	MeanPressure     EstimateReport `json:"mean_pressure_change_mmHg"`
}

// HeldReport is a quantity that is the same natively and on support.
type HeldReport struct {
	Quantity string      `json:"quantity"`
	Value    Number      `json:"value"`
	Unit     string      `json:"unit"`
	Origin   data.Origin `json:"origin"`
	// Low, High and Identified are the doubt of what is not fixed by the traces;
	// null where it stands with the fit.
	Low        Number `json:"low"`
	High       Number `json:"high"`
	Identified bool   `json:"identified"`
}

// ComparisonReport is the comparison of one supported state.
type ComparisonReport struct {
	Posing         support.Posing `json:"posing"`
	Share          Number         `json:"share"` // null where the posing is coupled
	Speed          Number         `json:"speed"` // 1000/min; null where it is not
	ByConstruction bool           `json:"by_construction"`
	Held           []HeldReport   `json:"held"`
	// Matched is what is made equal to the native state; Changed is what differs
	// from it to make it so, or follows.
	Matched string         `json:"matched"`
	Changed []HeldReport   `json:"changed"`
	Root    RootComparison `json:"root"`
}

// PowerReport is the power of the arterial side in one state, mmHg mL/s.
type PowerReport struct {
	Posing    support.Posing    `json:"posing"`
	Share     Number            `json:"share"`
	Speed     Number            `json:"speed"`
	Input     EstimateReport    `json:"input"`
	Steady    EstimateReport    `json:"steady"`
	Pulsatile EstimateReport    `json:"pulsatile"`
	Terms     map[string]Number `json:"terms"`
	// Sources are what filling, ventricle and pump give; null where the posing is
	// not coupled.
	Sources map[string]Number `json:"source"`
	Balance Number            `json:"balance"`
}

// EnergyReport is the power of the arterial side, natively and supported.
type EnergyReport struct {
	Native    PowerReport   `json:"native"`
	Supported []PowerReport `json:"supported"`
}

// SensitivityReport is what one assumption does to the chosen fit.
type SensitivityReport struct {
	Assumption string            `json:"assumption"`
	Change     string            `json:"change"`
	Values     map[string]Number `json:"values"`
	Percent    map[string]Number `json:"percent"`
}

// Report is what `study --json` prints: what fit prints, and the comparison.
type Report struct {
	FitReport
	Native     *StateReport       `json:"native"`
	Supported  []StateReport      `json:"supported"`
	Comparison []ComparisonReport `json:"comparison"`
	// ComparisonReason says why there is no comparison; null where there is one.
	ComparisonReason *string             `json:"comparison_reason"`
	Energy           *EnergyReport       `json:"energy"`
	Ventricle        []VentricleReport   `json:"ventricle"`
	Pump             *PumpReport         `json:"pump"`
	Forecast         *ForecastReport     `json:"forecast"`
	Sensitivity      []SensitivityReport `json:"sensitivity"`
	Tree             *TreeReport         `json:"tree"`
	// TreeReason says why there is no tree; null where there is one.
	TreeReason *string         `json:"tree_reason"`
	Response   *ResponseReport `json:"response"`
	Note       string          `json:"note"`
}
