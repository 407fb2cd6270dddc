package study

import (
	"context"
	"fmt"
	"slices"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/unit"
	"afterbeat/fitting"
	"afterbeat/fitting/delay"
	"afterbeat/fitting/estimate"
	"afterbeat/fitting/harmonic"
	"afterbeat/fitting/means"
)

// Fit is what the average beat says about the load.
type Fit struct {
	Beats Beats
	Row   Row         // of the table of what the data allow
	Cuff  *means.Cuff // the reading that stands for the pressure; nil where there is one

	Results    []fitting.Result
	Estimators []estimate.Estimate
	// TimeConstant is that of diastole, s, where the pressure allows nothing else;
	// the zero Estimate elsewhere.
	TimeConstant data.Estimate
	// Impedance is that of the beats, harmonic by harmonic; nil without a flow.
	Impedance []harmonic.Harmonic
	Waves     Waves
	// Delay is what the beats say of the delay, beside the one in use; nil without
	// a flow.
	Delay       *delay.Profile
	Recommended fitting.Recommendation
	// Chosen is the index of the result that goes downstream: the model that
	// the case names, else the recommended one; -1 where nothing was fitted.
	Chosen int
	// Sensitivity is what one assumption at a time does to the chosen fit.
	Sensitivity []Sensitivity
	Reason      string // why nothing could be estimated; empty where something was
	Warnings    []data.Warning
}

// Sensitivity is a chosen fit with one assumption moved.
type Sensitivity struct {
	Assumption string // "outflow-pressure", "delay"
	Change     string // "+10 mmHg"
	// By is the same as a number: in mmHg, in s, or relative for the output.
	By     float64
	Values fitting.Values
	// Percent is the change of R, C and Zc, in percent of the chosen fit's.
	Percent fitting.Values
}

// FitLoad fits every model to the average beat and, where it is long enough, to the
// whole span, and where there is no flow estimates what the pressure alone allows. A model that the case names is the
// chosen one.
func FitLoad(ctx context.Context, b Beats) (Fit, error) {
	f := Fit{Beats: b, Chosen: -1, Reason: b.Reason}
	if err := checkModel(b.Intake.Case); err != nil {
		return f, err
	}
	settings, err := fitSettings(b.Intake.Case)
	if err != nil {
		return f, err
	}
	cuff, err := b.Intake.cuff()
	if err != nil {
		return f, err
	}
	if _, err := cardiacOutput(b.Intake.Case); err != nil {
		return f, err
	}
	if b.Intake.Ambiguous != nil && b.NoPulse() == "" {
		return f, b.Intake.Ambiguous
	}
	if f.Reason != "" {
		return f, nil
	}
	if f.Reason = notFittable(b); f.Reason != "" {
		return f, nil
	}
	if err := checkOutflow(b); err != nil {
		return f, err
	}
	if _, hasFlow := b.Intake.flowChannel(); !hasFlow {
		return f.fromPressure(ctx, settings)
	}
	if b.Pressure.Count == 0 {
		return f.fromCuff(ctx, settings, *cuff)
	}
	f.Row = RowAll
	if b.FlowInfo.PerArea {
		f.Row = RowPerArea
	}
	beats, err := fitData(b)
	if err != nil {
		return f, err
	}
	span := fitting.Span{Beats: beats, Runs: b.Runs}
	if f.Results, err = fitting.FitAll(ctx, fitting.Models(), span, settings); err != nil {
		return f, err
	}
	return f.conclude(ctx, span)
}

// fromPressureAlone estimates the time constant of diastole, all that a
// pressure without a flow allows.
func (f Fit) fromPressureAlone() Fit {
	f.Row = RowPressure
	f.Estimators = estimators(f.Beats, nil)
	if decay := f.Estimators[0]; decay.Reason != "" {
		f.Reason = "no flow to fit with, and no time constant either: " + decay.Reason
		return f
	}
	f.Warnings = append(f.Warnings, data.Warning{
		Code: data.CodeNoFlow,
		Text: "a pressure alone gives the time constant of diastole, and no R or C",
		Cure: "a flow or a velocity recorded with it, or a cardiac output even within 20 % (--cardiac-output L_PER_MIN), would turn it into R and C",
	})
	return f
}

// conclude recommends, chooses, and moves the assumptions about the choice.
func (f Fit) conclude(ctx context.Context, d fitting.Span) (Fit, error) {
	var err error
	if f.Delay, err = profiled(ctx, f.Beats); err != nil {
		return f, err
	}
	f.refuseZc()
	f.Recommended = fitting.Recommend(f.Results)
	wanted := f.Recommended.Model
	if f.named() {
		wanted = f.Beats.Intake.Case.Model
	}
	f.Chosen = pick(f.Results, wanted, f.Beats.Intake.Case.Basis)
	f.Impedance = impedance(f.Beats)
	f.Estimators = estimators(f.Beats, f.Impedance)
	f.Waves = f.waves()
	if f.Chosen < 0 {
		for _, r := range f.Results {
			f.Warnings = append(f.Warnings, r.Warnings...)
		}
		f.Warnings = append(f.Warnings, f.delayWarnings()...)
		return f, nil
	}
	chosen := f.Results[f.Chosen]
	f.Warnings = chosen.Warnings
	f.Sensitivity, err = sensitivities(ctx, chosen, d)
	f.Warnings = slices.Concat(f.Warnings, f.delayWarnings(), disagreements(f), f.outputWarnings(), f.cuffWarnings())
	return f, err
}

// named tells whether a person named the model.
func (f Fit) named() bool {
	m := f.Beats.Intake.Case.Model
	return m != "" && m != "all"
}

// outflow is the pressure that the flow runs against, mmHg.
func outflow(b Beats) float64 {
	if p := b.Intake.Case.OutflowPressure; p != nil {
		return *p
	}
	return 0
}

// fitData hands the beats to the fit.
func fitData(b Beats) (fitting.Beats, error) {
	widths, err := halfWidths(b.Intake.Case)
	if err != nil {
		return fitting.Beats{}, err
	}
	pressure := b.Intake.pressureErrors(widths)
	return fitting.Beats{
		Rate:            b.Ensemble.Rate,
		Pressure:        b.Ensemble.Beats[0],
		Flow:            b.Ensemble.Beats[1],
		OutflowPressure: outflow(b),
		OutflowMeasured: b.Intake.Case.OutflowPressure != nil,
		Site:            siteOfFit(b.FlowInfo.Site),
		PerArea:         b.FlowInfo.PerArea,
		Systematic: fitting.Systematic{
			Flow:            b.FlowInfo.Error,
			PressureScale:   pressure.Scale,
			PressurePivot:   pressure.Pivot,
			PressureOffset:  pressure.Offset,
			Delay:           b.Delay.Error,
			OutflowPressure: widths["outflow-pressure"],
		},
	}, nil
}

// siteOfFit names the load by where its flow was measured: root for all of the
// heart's output, else the site itself.
func siteOfFit(s data.Site) data.Site {
	if s.Systemic() {
		return data.SiteRoot
	}
	return s
}

// flowUnit is the unit of the average beat of the flow: that of a velocity
// where the fit is per unit area, that of the channel where it is uncalibrated.
func (b Beats) flowUnit() string {
	switch ch, ok := b.Intake.flowChannel(); {
	case ok && !ch.Unit.Calibrated:
		return ch.Unit.Name
	case b.FlowInfo.PerArea:
		return unit.Internal(unit.Velocity).Name
	}
	return unit.Internal(unit.Flow).Name
}

// fitSettings are the replicates and the seed that the case asks for.
func fitSettings(c casefile.Case) (fitting.Settings, error) {
	var s fitting.Settings
	if n := c.Replicates; n != nil {
		if *n < 1 || *n > 100_000 {
			return s, &ChoiceError{Key: "replicates", What: fmt.Sprintf("%d is not between 1 and 100000", *n), Hint: "leave it out for 1000"}
		}
		s.Replicates = *n
	}
	if n := c.Seed; n != nil {
		if *n < 1 {
			return s, &ChoiceError{Key: "seed", What: fmt.Sprintf("%d is not a whole number from 1", *n), Hint: "leave it out for 1"}
		}
		s.Seed = uint64(*n)
	}
	return s, nil
}
